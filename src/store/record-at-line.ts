import { cleanText } from '../study/clean-text.js';
import type { SessionRecord } from '../study/record.js';
import { readRecordLine } from '../study/record-line-reader.js';
import type { Disk, OpenFile } from './disk.js';
import { linesOfFile } from './lines-of-file.js';
import { problemOfError, refused, type Stored, storeProblem } from './problem-of-error.js';
import { maximumRecordBytes } from './record-file.js';

/**
 * The record in one line of a file: the lines before are passed without being read as records. `record-not-there` where the file has no
 * such line any more, where it is damaged, or where it was stopped.
 */
export async function recordAtLine(
  disk: Disk,
  path: string,
  line: number,
  { onProgress, goOn }: { readonly onProgress: (readBytes: number, totalBytes: number) => void; readonly goOn: () => boolean },
): Promise<Stored<SessionRecord>> {
  let file: OpenFile | null = null;
  try {
    const { sizeBytes } = await disk.facts(path);
    file = await disk.open(path, 'read');
    for await (const { number, bytes } of linesOfFile(file, maximumRecordBytes, (read) => onProgress(read, sizeBytes))) {
      if (!goOn()) break;
      if (number < line) continue;
      const read = bytes === null ? null : readRecordLine(bytes.toString('utf8'));
      if (read?.ok === true) return read;
      break;
    }
  } catch (error) {
    return refused(problemOfError(error, 'read', 'the record file', path));
  } finally {
    await file?.close().catch(() => {});
  }
  const message = `line ${line} of ${cleanText(path)} holds no record, or the reading was stopped before it.`;
  return refused(storeProblem('record-not-there', 66, path, message, 'Read the list again.'));
}
