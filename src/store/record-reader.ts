import * as zlib from 'node:zlib';
import type { Problem } from '../calc/problem.js';
import { cleanText } from '../study/clean-text.js';
import { KnownValues } from '../study/known-values.js';
import type { Checksum } from '../study/line-sum.js';
import type { SessionRecord } from '../study/record.js';
import { readRecordLine } from '../study/record-line-reader.js';
import type { Disk, OpenFile } from './disk.js';
import { linesOfFile } from './lines-of-file.js';
import { problemOfError, type StoreProblem, storeProblem } from './problem-of-error.js';
import { maximumRecordBytes } from './record-file.js';

/** Node's own CRC-32, several times faster than ours; the first versions of Node 20 have none. */
const checksum = (zlib as { readonly crc32?: Checksum }).crc32;

/** One thing met while reading records. */
export type RecordEntry =
  | { readonly kind: 'record'; readonly file: string; readonly line: number; readonly record: SessionRecord }
  /** A line that is no whole record: said and skipped. */
  | { readonly kind: 'damaged'; readonly file: string; readonly line: number; readonly problem: Problem }
  /** A file that could not be read, or not to its end: the other files are. */
  | { readonly kind: 'unread'; readonly file: string; readonly problem: StoreProblem };

export interface ReadRecordsOptions {
  /** Told how far the reading is, over all files. */
  readonly onProgress?: (readBytes: number, totalBytes: number) => void;
}

/**
 * Reads record files line by line, one file after the other, as one stream. Memory does not grow with the files.
 * Empty lines are no damage; a damaged line is reported with its number and skipped.
 */
export async function* readRecords(disk: Disk, paths: readonly string[], options: ReadRecordsOptions = {}): AsyncGenerator<RecordEntry> {
  const sizes = options.onProgress === undefined ? [] : await Promise.all(paths.map((path) => sizeOf(disk, path)));
  const totalBytes = sizes.reduce((sum, size) => sum + size, 0);
  const known = new KnownValues();
  let before = 0;
  for (const [index, path] of paths.entries()) {
    const startedAt = before;
    // One generator and not one inside another: each record is handed on once.
    let file: OpenFile | null = null;
    try {
      const problem = await notReadable(disk, path);
      if (problem !== null) yield { kind: 'unread', file: path, problem };
      else {
        file = await disk.open(path, 'read');
        for await (const { number, bytes } of linesOfFile(file, maximumRecordBytes, (read) =>
          options.onProgress?.(startedAt + read, totalBytes),
        )) {
          const entry = entryOf(path, number, bytes, known);
          if (entry !== null) yield entry;
        }
      }
    } catch (error) {
      yield { kind: 'unread', file: path, problem: problemOfError(error, 'read', 'the record file', path) };
    } finally {
      await file?.close().catch(() => {});
    }
    before += sizes[index] ?? 0;
  }
}

/** A folder has no records, and a pipe or a device might never end. */
async function notReadable(disk: Disk, path: string): Promise<StoreProblem | null> {
  const { kind } = await disk.facts(path);
  if (kind === 'folder') return problemOfError({ code: 'EISDIR' }, 'read', 'the record file', path);
  if (kind === 'file') return null;
  return storeProblem('not-a-file', 74, path, `the record file ${cleanText(path)} is no ordinary file.`, 'Name a file on a disk.');
}

function entryOf(file: string, line: number, bytes: Buffer | null, known: KnownValues): RecordEntry | null {
  if (bytes === null)
    return damagedEntry(file, line, {
      code: 'record-too-long',
      path: '',
      message: `the line is longer than ${maximumRecordBytes} bytes`,
      hint: '',
    });
  const text = bytes.toString('utf8');
  if (text.trim() === '') return null;
  const outcome = readRecordLine(text, bytes, checksum, known);
  if (outcome.ok) return { kind: 'record', file, line, record: outcome.value };
  return damagedEntry(file, line, outcome.problems[0]!);
}

function damagedEntry(file: string, line: number, problem: Problem): RecordEntry {
  const where = problem.path === '' ? '' : ` at ${cleanText(problem.path)}`;
  const message = `Line ${line} of ${cleanText(file)} is damaged and was skipped: ${problem.message}${where}.`;
  return { kind: 'damaged', file, line, problem: { ...problem, message } };
}

async function sizeOf(disk: Disk, path: string): Promise<number> {
  return disk.facts(path).then(
    ({ sizeBytes }) => sizeBytes,
    () => 0,
  );
}
