import type { Header } from '../../headers/header.js';
import type { Disk } from '../disk.js';
import type { StoreProblem } from '../problem-of-error.js';
import { type FileHeaders, firstBytes, readFileHeaders } from './read-file-headers.js';
import { seriesHash } from './series-hash.js';
import { type Found, walkFiles } from './walk-files.js';

/** What comes of reading, piece by piece. */
export interface HeaderReceiver {
  readonly header: (header: Header) => void;
  readonly problem: (problem: StoreProblem) => void;
  /** After each file: how many were looked at so far. */
  readonly progress?: (files: number) => void;
  /** True once nobody wants to go on: what is being read is finished, no more is begun. */
  readonly isStopped?: () => boolean;
  /** Between two files, and between some images of one: gives others their turn where that is due. */
  readonly pause?: () => Promise<void> | null;
}

/** What was looked at. */
export interface HeadersRead {
  readonly files: number;
  /** Files that gave at least one header. */
  readonly read: number;
  /** Files of folders that are neither objects nor sidecars. */
  readonly passedOver: number;
}

/** Files that are being read while one is gone through: the disk works meanwhile. */
const ahead = 4;

/** Images of one file that are taken without a pause. */
const imagesAtOnce = 50;

/**
 * Reads the headers of files and folders and gives them away one by one, in the order of the names: nothing is kept, so that memory
 * does not grow with their number.
 */
export async function readHeaders(disk: Disk, paths: readonly string[], receiver: HeaderReceiver): Promise<HeadersRead> {
  const hash = seriesHash();
  const buffers: Buffer[] = Array.from({ length: ahead }, () => Buffer.alloc(firstBytes));
  const waiting: { readonly found: Found; readonly read: Promise<FileHeaders> | null; readonly buffer: Buffer | null }[] = [];
  const counts = { files: 0, read: 0, passedOver: 0 };
  const finishOne = async () => {
    const first = waiting.shift();
    if (first === undefined) return;
    const { found, read, buffer } = first;
    if (found.kind === 'problem') receiver.problem(found.problem);
    else if (read !== null) {
      counts.files += 1;
      const result = await read;
      if (result.kind === 'headers') {
        counts.read += 1;
        let images = 0;
        for (const header of result.headers) {
          receiver.header(header);
          images += 1;
          if (images % imagesAtOnce === 0) await receiver.pause?.();
        }
        if (result.problem !== null) receiver.problem(result.problem);
      } else if (result.kind === 'problem' || found.named) receiver.problem(result.problem);
      else counts.passedOver += 1;
      receiver.progress?.(counts.files);
      await receiver.pause?.();
    }
    if (buffer !== null) buffers.push(buffer);
  };
  for await (const found of walkFiles(disk, paths)) {
    if (receiver.isStopped?.() === true) break;
    if (found.kind === 'problem') waiting.push({ found, read: null, buffer: null });
    else {
      while (buffers.length === 0) await finishOne();
      const buffer = buffers.pop() as Buffer;
      waiting.push({ found, read: readFileHeaders(disk, found.path, buffer, hash), buffer });
    }
  }
  while (waiting.length > 0) await finishOne();
  return counts;
}
