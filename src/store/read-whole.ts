import { cleanText } from '../study/clean-text.js';
import type { Disk, FileFacts, OpenFile } from './disk.js';
import { problemOfError, refused, type Stored, storeProblem } from './problem-of-error.js';

/** A file read whole. */
export interface WholeFile {
  readonly bytes: Buffer;
  /** Bytes that are no UTF-8 stand as U+FFFD; a byte order mark is left out. */
  readonly text: string;
  readonly facts: FileFacts;
}

/**
 * Reads a file whole, unless it is larger than it may be: its size is looked at before a byte is read, and again while reading.
 * Folders, pipes and devices are refused.
 */
export async function readWhole(disk: Disk, path: string, thing: string, maximumBytes: number): Promise<Stored<WholeFile>> {
  let file: OpenFile | null = null;
  try {
    const facts = await disk.facts(path);
    if (facts.kind === 'folder') return refused(problemOfError({ code: 'EISDIR' }, 'read', thing, path));
    if (facts.kind === 'other') {
      return refused(storeProblem('not-a-file', 66, path, `${thing} ${cleanText(path)} is no ordinary file.`, 'Name a file on a disk.'));
    }
    if (facts.sizeBytes > maximumBytes) return refused(tooLarge(thing, path, facts.sizeBytes, maximumBytes));
    file = await disk.open(path, 'read');
    const bytes = await readUpTo(file, maximumBytes + 1);
    if (bytes.length > maximumBytes) return refused(tooLarge(thing, path, bytes.length, maximumBytes));
    return { ok: true, value: { bytes, text: bytes.toString('utf8').replace(/^\ufeff/, ''), facts } };
  } catch (error) {
    return refused(problemOfError(error, 'read', thing, path));
  } finally {
    await file?.close().catch(() => {});
  }
}

async function readUpTo(file: OpenFile, maximumBytes: number): Promise<Buffer> {
  const { sizeBytes } = await file.facts();
  // One byte more than the file had, so that the end is seen; a file that grows meanwhile is read on.
  let bytes = Buffer.alloc(Math.min(sizeBytes + 1, maximumBytes));
  let filled = 0;
  for (;;) {
    if (filled === bytes.length) {
      if (filled >= maximumBytes) break;
      bytes = Buffer.concat([bytes], Math.min(2 * filled, maximumBytes));
    }
    const count = await file.read(bytes.subarray(filled), filled);
    if (count === 0) break;
    filled += count;
  }
  return bytes.subarray(0, filled);
}

function tooLarge(thing: string, path: string, bytes: number, maximumBytes: number) {
  const message = `${thing} ${cleanText(path)} has ${bytes} bytes or more, expected ${maximumBytes} at most.`;
  return storeProblem('too-large', 65, path, message, 'Check that this is the right file.');
}
