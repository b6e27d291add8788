import type { Header } from '../../headers/header.js';
import { readSidecar } from '../../headers/read-sidecar.js';
import type { Disk, OpenFile } from '../disk.js';
import { problemOfError, type StoreProblem } from '../problem-of-error.js';
import { fileTrouble } from './file-trouble.js';
import { isIndex, objectHeaders } from './object-headers.js';
import { mostObjectBytes, parseObject } from './parse-object.js';

/** What one file gave. */
export type FileHeaders =
  /** `problem` beside headers: they could be read, but the file is not whole. */
  | { readonly kind: 'headers'; readonly headers: Iterable<Header>; readonly problem: StoreProblem | null }
  | { readonly kind: 'problem'; readonly problem: StoreProblem }
  /** Neither an object nor a sidecar: no fault in a folder, where other files may lie beside. */
  | { readonly kind: 'other'; readonly problem: StoreProblem };

/** First look at a file: most headers are shorter. */
export const firstBytes = 64 * 1024;

/**
 * Reads the header of one file: its first 64 kB, more only where the header goes on, 8 MB at most. It never rejects.
 *
 * @param buffer At least 64 kB to read into; nothing that is given back points into it once the headers have been gone through.
 * @param hash What turns a UID into what groups images.
 */
export async function readFileHeaders(disk: Disk, path: string, buffer: Buffer, hash: (uid: string) => string): Promise<FileHeaders> {
  let file: OpenFile | null = null;
  try {
    file = await disk.open(path, 'read');
    let bytes = buffer.subarray(0, await fill(file, buffer, 0));
    const form = formOf(bytes);
    if (form === 'zip') return { kind: 'problem', problem: fileTrouble('zip', path) };
    if (form === 'gzip') return { kind: 'other', problem: fileTrouble('zip', path) };
    if (form === 'other') return { kind: 'other', problem: fileTrouble('no-object', path) };
    let whole = bytes.length < firstBytes;
    if (form === 'text') {
      if (!whole) bytes = await more(file, bytes, mostObjectBytes);
      return bytes.length > mostObjectBytes
        ? { kind: 'problem', problem: fileTrouble('too-long', path) }
        : sidecarHeaders(bytes, path, hash);
    }
    for (;;) {
      const parsed = parseObject(bytes, whole);
      if (parsed.kind === 'trouble') return { kind: 'problem', problem: fileTrouble(parsed.trouble, path) };
      if (parsed.kind === 'parsed') {
        const headers = objectHeaders(parsed, hash);
        if (headers === null) return { kind: isIndex(parsed) ? 'other' : 'problem', problem: fileTrouble('not-mr', path) };
        const isCut = parsed.pixelsEnd !== null && parsed.pixelsEnd > (whole ? bytes.length : (await file.facts()).sizeBytes);
        return { kind: 'headers', headers, problem: isCut ? fileTrouble('cut', path) : null };
      }
      if (bytes.length >= mostObjectBytes) return { kind: 'problem', problem: fileTrouble('too-long', path) };
      const wanted = Math.min(bytes.length * 4, mostObjectBytes);
      bytes = await more(file, bytes, wanted);
      whole = bytes.length < wanted;
    }
  } catch (error) {
    return { kind: 'problem', problem: problemOfError(error, 'read', 'the file', path) };
  } finally {
    await file?.close().catch(() => {});
  }
}

/** Reads until the array is full or the file ends; the number of bytes that are there. */
async function fill(file: OpenFile, into: Buffer, from: number): Promise<number> {
  let filled = from;
  while (filled < into.length) {
    const count = await file.read(into.subarray(filled), filled);
    if (count === 0) break;
    filled += count;
  }
  return filled;
}

async function more(file: OpenFile, bytes: Buffer, wanted: number): Promise<Buffer> {
  const larger = Buffer.alloc(wanted);
  bytes.copy(larger);
  return larger.subarray(0, await fill(file, larger, bytes.length));
}

/** What the first bytes are: an object (PS3.10 prefix), a packed file, text that may be JSON, or something else. */
function formOf(bytes: Buffer): 'object' | 'zip' | 'gzip' | 'text' | 'other' {
  if (bytes.length >= 132 && bytes.toString('latin1', 128, 132) === 'DICM') return 'object';
  const [first, second] = bytes;
  if (first === 0x50 && second === 0x4b) return 'zip';
  // Pictures of a sidecar are packed this way: in a folder it is no fault.
  if (first === 0x1f && second === 0x8b) return 'gzip';
  return /^(?:\xef\xbb\xbf)?\s*\{/.test(bytes.toString('latin1', 0, 256)) ? 'text' : 'other';
}

function sidecarHeaders(bytes: Buffer, path: string, hash: (uid: string) => string): FileHeaders {
  const read = readSidecar(bytes.toString('utf8'));
  if (read === 'not-json') return { kind: 'problem', problem: fileTrouble('not-json', path) };
  if (read === 'no-sidecar') return { kind: 'other', problem: fileTrouble('no-sidecar', path) };
  // Each sidecar is a series of its own.
  return { kind: 'headers', headers: [{ source: 'sidecar', seriesKey: hash(path), attributes: read }], problem: null };
}
