import { resolve } from 'node:path';
import { problemOfError } from '../store/problem-of-error.js';
import { recordFilesAt } from '../store/record-files.js';
import { readRecords } from '../store/record-reader.js';
import { cleanText } from '../study/clean-text.js';
import type { SessionRecord } from '../study/record.js';
import { isWanted, type RecordFilter } from '../study/record-report-filter.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { refusedByStore } from './load-preset.js';
import { type ReadingWords, readingProgress } from './reading-progress.js';

/** Damaged lines that are named one by one; more are only counted. */
const mostNamed = 20;

/** What was met while reading. */
export interface RecordsRead {
  /** Whole records, wanted or not. */
  readonly records: number;
  readonly wanted: number;
  readonly damaged: number;
  readonly files: readonly string[];
  /** Done, or the exit code of a file that could not be read to its end. */
  readonly exit: ExitCode;
}

/**
 * The files of records that a command line names: files, and folders whose `*.jsonl` files are taken (one a scanner), each once.
 * None named: the file of this user.
 */
export async function recordFiles(named: readonly string[], ownFile: string, io: CommandIo): Promise<Attempt<string[]>> {
  const files: string[] = [];
  for (const path of named.length === 0 ? [ownFile] : named.map((name) => resolve(io.workingFolder, name))) {
    try {
      files.push(...(await recordFilesAt(io.disk, path)));
    } catch (error) {
      return refusedByStore([problemOfError(error, 'read', 'the record file', path)]);
    }
  }
  return { ok: true, value: [...new Set(files)] };
}

/**
 * Reads records as one stream and calls back for each that is wanted. Damaged lines are named on standard error and skipped, and so is
 * what cannot be read of a file; how far a long reading is, is said where somebody looks.
 *
 * @param onRecord Answers false to stop reading.
 */
export async function forEachRecord(
  files: readonly string[],
  filter: RecordFilter,
  io: CommandIo,
  words: ReadingWords,
  onRecord: (record: SessionRecord) => unknown,
): Promise<RecordsRead> {
  let [records, wanted, damaged] = [0, 0, 0];
  let exit: ExitCode = exitCodes.done;
  const progress = readingProgress(words, io);
  for await (const entry of readRecords(io.disk, files, { onProgress: progress.tell })) {
    if (entry.kind === 'record') {
      records += 1;
      if (!isWanted(entry.record, filter)) continue;
      wanted += 1;
      if (onRecord(entry.record) === false) break;
    } else if (entry.kind === 'damaged') {
      damaged += 1;
      if (damaged <= mostNamed) io.complain(`holdfast: ${cleanText(entry.problem.message)}\n`);
    } else {
      exit = entry.problem.exitCode;
      io.complain(`holdfast: ${entry.problem.message} ${entry.problem.hint}\n`);
    }
  }
  progress.done();
  if (damaged > mostNamed) io.complain(`holdfast: and ${damaged - mostNamed} more damaged lines, skipped as well.\n`);
  return { records, wanted, damaged, files, exit };
}
