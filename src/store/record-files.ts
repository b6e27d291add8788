import { join } from 'node:path';
import type { Disk } from './disk.js';

/** The files of records behind one name: the file itself, or of a folder every `*.jsonl` (one a scanner). Throws what the disk says. */
export async function recordFilesAt(disk: Disk, path: string): Promise<readonly string[]> {
  const { kind } = await disk.facts(path);
  if (kind !== 'folder') return [path];
  return (await disk.names(path)).filter((name) => name.endsWith('.jsonl')).map((name) => join(path, name));
}
