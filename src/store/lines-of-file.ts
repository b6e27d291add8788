import type { OpenFile } from './disk.js';

const newline = 0x0a;
const chunkBytes = 256 * 1024;

/** One line as it stands in the file, without its end. */
export interface FileLine {
  /** Counted from 1, empty lines included. */
  readonly number: number;
  /** Valid until the next line is asked for; null when the line is longer than allowed. */
  readonly bytes: Buffer | null;
}

/**
 * The lines of a file one after the other, in a buffer of fixed size however long the file or a line of it is.
 *
 * @param onRead Told how many bytes have been read so far, once a chunk.
 */
export async function* linesOfFile(
  file: OpenFile,
  longestBytes: number,
  onRead: (bytes: number) => void = () => {},
): AsyncGenerator<FileLine> {
  const buffer = Buffer.alloc(longestBytes + chunkBytes);
  let filled = 0;
  let position = 0;
  let number = 1;
  let overlong = false;
  for (;;) {
    const count = await file.read(buffer.subarray(filled, filled + chunkBytes), position);
    if (count === 0) break;
    position += count;
    onRead(position);
    let start = 0;
    let search = filled;
    filled += count;
    for (;;) {
      const end = buffer.subarray(0, filled).indexOf(newline, search);
      if (end < 0) break;
      yield { number, bytes: overlong || end - start > longestBytes ? null : buffer.subarray(start, end) };
      overlong = false;
      number += 1;
      start = end + 1;
      search = start;
    }
    buffer.copyWithin(0, start, filled);
    filled -= start;
    if (filled > longestBytes) {
      // What is known to be too long is not kept: only its end is still looked for.
      overlong = true;
      filled = 0;
    }
  }
  if (overlong || filled > 0) yield { number, bytes: overlong ? null : buffer.subarray(0, filled) };
}
