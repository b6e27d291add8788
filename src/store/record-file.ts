import { dirname } from 'node:path';
import { cleanText } from '../study/clean-text.js';
import type { SessionRecord } from '../study/record.js';
import { recordLine } from '../study/record-line.js';
import type { Disk, OpenFile } from './disk.js';
import { makeFolder } from './make-folder.js';
import { privateFileMode } from './permissions.js';
import { problemOfError, refused, type Stored, type StoreProblem, storeProblem } from './problem-of-error.js';

/** Longest line that is written or read, in bytes: some twenty times a session of twelve series. */
export const maximumRecordBytes = 1 << 20;

export interface AppendOptions {
  /** Mode of a file that is made; 0600 unless the site's settings say otherwise. */
  readonly fileMode?: number;
  /** The same record failed before: it is not written a second time when it stands in the file after all. */
  readonly again?: boolean;
}

/**
 * Appends a record to the record file, which is made when it is not there: one write of the line with a newline before it, so that
 * a torn line of somebody else never harms it, and one after it; then sync, then read back and compare.
 * Any number of programs may append to one file. What stood in the file before is never changed.
 */
export async function appendRecord(disk: Disk, path: string, record: SessionRecord, options: AppendOptions = {}): Promise<Stored<void>> {
  const line = recordLine(record);
  const bytes = Buffer.from(`\n${line}\n`, 'utf8');
  if (bytes.length > maximumRecordBytes) {
    return refused(
      storeProblem(
        'record-too-long',
        65,
        path,
        `the record has ${bytes.length} bytes, expected ${maximumRecordBytes} at most.`,
        'Save fewer series in one record.',
      ),
    );
  }
  const fileMode = options.fileMode ?? privateFileMode;
  const folder = await makeFolder(disk, dirname(path), fileMode, 'record file');
  if (!folder.ok) return folder;

  const opened = await openForAppend(disk, path, fileMode);
  if (!opened.ok) return opened;
  const { file, isNew } = opened.value;
  try {
    return await writeWhole(disk, path, file, bytes, isNew, options.again ?? false);
  } finally {
    // The bytes are on the disk or known not to be: an error on closing changes neither.
    await file.close().catch(() => {});
  }
}

async function openForAppend(disk: Disk, path: string, fileMode: number): Promise<Stored<{ file: OpenFile; isNew: boolean }>> {
  try {
    const fault = await notAFile(disk, path);
    if (fault !== null) return refused(fault);
    const file = await disk.open(path, 'append-new', fileMode).catch((error: unknown) => {
      if ((error as { code?: string }).code === 'EEXIST') return null;
      throw error;
    });
    if (file === null) return { ok: true, value: { file: await disk.open(path, 'append'), isNew: false } };
    await file.setMode(fileMode).catch(async (error: unknown) => {
      await file.close().catch(() => {});
      throw error;
    });
    return { ok: true, value: { file, isNew: true } };
  } catch (error) {
    return refused(problemOfError(error, 'create', 'the record file', path));
  }
}

/** Opening a pipe or a device could wait for ever, and neither keeps anything. */
async function notAFile(disk: Disk, path: string): Promise<StoreProblem | null> {
  try {
    const { kind } = await disk.facts(path);
    if (kind === 'file') return null;
    if (kind === 'folder') return problemOfError({ code: 'EISDIR' }, 'create', 'the record file', path);
    return storeProblem(
      'not-a-file',
      74,
      path,
      `the record file ${cleanText(path)} is no ordinary file and would keep nothing.`,
      'Name a file on a disk.',
    );
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') return null;
    throw error;
  }
}

async function writeWhole(disk: Disk, path: string, file: OpenFile, bytes: Buffer, isNew: boolean, again: boolean): Promise<Stored<void>> {
  try {
    const sizeBefore = (await file.facts()).sizeBytes;
    const from = again ? Math.max(0, sizeBefore - 2 * maximumRecordBytes) : sizeBefore;
    if (!(again && (await holds(file, from, bytes)))) {
      const written = await file.write(bytes);
      if (written < bytes.length) return refused(notWhole('record-torn', path, `took ${written} of ${bytes.length} bytes`));
    }
    await file.sync();
    if (isNew) await disk.syncFolder(dirname(path));
    return (await holds(file, from, bytes))
      ? { ok: true, value: undefined }
      : refused(notWhole('record-not-read-back', path, 'does not give back what was written'));
  } catch (error) {
    return refused(problemOfError(error, 'write', 'the record file', path));
  }
}

function notWhole(code: string, path: string, says: string): StoreProblem {
  return storeProblem(
    code,
    74,
    path,
    `the record was not saved: ${cleanText(path)} ${says}.`,
    'Make room or choose another disk, then save again: nothing on screen is lost.',
  );
}

/** Whether the bytes stand in the file from a place on; others may have written before and after them. */
async function holds(file: OpenFile, from: number, bytes: Buffer): Promise<boolean> {
  const { sizeBytes } = await file.facts();
  const read = Buffer.alloc(Math.max(0, sizeBytes - from));
  let filled = 0;
  while (filled < read.length) {
    const count = await file.read(read.subarray(filled), from + filled);
    if (count === 0) break;
    filled += count;
  }
  return read.subarray(0, filled).includes(bytes);
}
