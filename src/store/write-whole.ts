import { dirname } from 'node:path';
import type { Disk, OpenFile } from './disk.js';
import { problemOfError, refused, type Stored } from './problem-of-error.js';

/**
 * Writes a file so that its path holds either what it held before or the new content whole, whatever fails and whenever the machine
 * stops: temporary file, sync, rename, sync of the folder. Two writers must not share a temporary path.
 */
export async function writeWhole(
  disk: Disk,
  path: string,
  content: string | Uint8Array,
  fileMode: number,
  thing: string,
  temporaryPath = `${path}.tmp`,
): Promise<Stored<void>> {
  const prepared = await writeTemporary(disk, temporaryPath, content, fileMode, thing);
  if (!prepared.ok) return prepared;
  try {
    await disk.rename(temporaryPath, path);
  } catch (error) {
    await disk.remove(temporaryPath).catch(() => {});
    return refused(problemOfError(error, 'create', thing, path));
  }
  try {
    await disk.syncFolder(dirname(path));
    return { ok: true, value: undefined };
  } catch (error) {
    return refused(problemOfError(error, 'write', thing, path));
  }
}

/** Writes and syncs a temporary file, or leaves none. One that an earlier program left behind is replaced. */
export async function writeTemporary(
  disk: Disk,
  path: string,
  content: string | Uint8Array,
  fileMode: number,
  thing: string,
): Promise<Stored<void>> {
  let file: OpenFile;
  try {
    file = await openNew(disk, path, fileMode);
  } catch (error) {
    return refused(problemOfError(error, 'create', thing, path));
  }
  try {
    await file.setMode(fileMode);
    await writeAll(file, typeof content === 'string' ? Buffer.from(content, 'utf8') : content);
    await file.sync();
    await file.close();
    return { ok: true, value: undefined };
  } catch (error) {
    await file.close().catch(() => {});
    await disk.remove(path).catch(() => {});
    return refused(problemOfError(error, 'write', thing, path));
  }
}

async function openNew(disk: Disk, path: string, fileMode: number): Promise<OpenFile> {
  try {
    return await disk.open(path, 'new', fileMode);
  } catch (error) {
    if ((error as { code?: string }).code !== 'EEXIST') throw error;
    await disk.remove(path);
    return disk.open(path, 'new', fileMode);
  }
}

/** A file that nobody else writes may be written in pieces. */
async function writeAll(file: OpenFile, bytes: Uint8Array): Promise<void> {
  let written = 0;
  while (written < bytes.length) {
    const count = await file.write(bytes.subarray(written));
    if (count === 0) throw Object.assign(new Error('the disk takes no more bytes'), { code: 'ENOSPC' });
    written += count;
  }
}
