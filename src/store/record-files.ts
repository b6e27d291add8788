import { join } from 'node:path';
import type { Disk } from '../store/disk.js';

/** The files of records behind one name: the file itself, or of a folder every `*.jsonl` (one a scanner). None where nobody recorded yet. */
export async function recordFiles(disk: Disk, path: string): Promise<readonly string[]> {
  const facts = await disk.facts(path).catch((error: unknown) => ((error as { code?: string }).code === 'ENOENT' ? null : 'refused'));
  if (facts === null) return [];
  if (facts === 'refused' || (typeof facts === 'object' && facts.kind !== 'folder')) return [path];
  return (await disk.names(path)).filter((name) => name.endsWith('.jsonl')).map((name) => join(path, name));
}
