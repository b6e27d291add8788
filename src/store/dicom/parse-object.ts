import { constants, inflateRawSync } from 'node:zlib';
import parser, { type ByteStream, type Element } from 'dicom-parser';
import { attributeRow, keywords, openedSequences, saturationBandSequence } from '../../headers/attribute-table.js';

/** Never more than this of one object is read, and never inflated past the second. */
export const mostObjectBytes = 8 * 1024 * 1024;
const mostInflatedBytes = 64 * 1024 * 1024;

/** Elements of one data set by tag (`x00180080`). */
export type Elements = Readonly<Record<string, Element>>;

/** Why an object gives nothing. Fixed words: nothing that the file says is in them. */
export type ObjectTrouble = 'no-object' | 'big-endian' | 'damaged' | 'inflates-too-far';

export type ParsedObject =
  | {
      readonly kind: 'parsed';
      readonly meta: Elements;
      readonly elements: Elements;
      /** What the offsets of the elements count in. */
      readonly bytes: Buffer;
      /** Where the pixels would end in the file; null where that is not said. */
      readonly pixelsEnd: number | null;
    }
  /** The header goes on after the bytes that were given. */
  | { readonly kind: 'short' }
  | { readonly kind: 'trouble'; readonly trouble: ObjectTrouble };

const implicitLittleEndian = '1.2.840.10008.1.2';
const deflated = '1.2.840.10008.1.2.1.99';
const explicitBigEndian = '1.2.840.10008.1.2.2';
const pixelGroup = 0x7fe0;
const undefinedLength = 0xffffffff;

const opened = new Set<string>([...Object.values(openedSequences), saturationBandSequence].map((tag) => `x${tag}`));
/** Representations of what implicit files do not name: sequences that are looked into, and attributes of the allow-list. */
const representations = new Map<string, string>([
  ...keywords.flatMap((keyword) => {
    const { tag, vr } = attributeRow(keyword);
    return tag === null ? [] : [[`x${tag}`, vr] as const];
  }),
  ...[...opened].map((tag) => [tag, 'SQ'] as const),
]);

/** What is asked for in a data set, as numbers: the list, sequences that are looked into, and what tells an MR image and its series. */
const wanted = new Set<number>(
  [...representations.keys(), ...opened, 'x00080016', 'x0020000e'].map((tag) => Number.parseInt(tag.slice(1), 16)),
);

/** Bytes before the value by the two letters of a representation (PS3.5, 7.1.2): 12 where the length takes four bytes, 8 where two; 0 is none. */
const headBytes = new Uint8Array(0x10000);
const setHead = (names: string, bytes: number) => {
  for (const name of names.split(' ')) headBytes[name.charCodeAt(0) * 0x100 + name.charCodeAt(1)] = bytes;
};
setHead('OB OD OF OL OV OW SQ SV UC UN UR UT UV', 12);
setHead('AE AS AT CS DA DS DT FD FL IS LO LT PN SH SL SS ST TM UI UL US', 8);

/** Text of an element, to its first zero byte. Stays within this folder. */
export function textOf(element: Element | undefined, bytes: Buffer): string {
  if (element === undefined || element.length > 1024 || element.dataOffset + element.length > bytes.length) return '';
  const text = bytes.toString('latin1', element.dataOffset, element.dataOffset + element.length);
  const end = text.indexOf('\0');
  return (end === -1 ? text : text.slice(0, end)).trim();
}

/**
 * Parses the beginning of a DICOM object (PS3.10) up to its pixels, which are never touched. Nothing is thrown, whatever the bytes are:
 * what a parser says of a broken file could hold a piece of it, so it ends here.
 *
 * @param whole True when the bytes are all that the file has: what is missing then is missing.
 */
export function parseObject(bytes: Buffer, whole: boolean): ParsedObject {
  if (bytes.length < 132 || bytes.toString('latin1', 128, 132) !== 'DICM') return { kind: 'trouble', trouble: 'no-object' };
  try {
    const meta = parser.readPart10Header(bytes) as unknown as { elements: Elements; position: number };
    if (meta.position > bytes.length || (meta.position === bytes.length && !whole)) return cut(whole);
    const syntax = textOf(meta.elements['x00020010'], bytes);
    if (syntax === '') return { kind: 'trouble', trouble: 'damaged' };
    if (syntax === explicitBigEndian) return { kind: 'trouble', trouble: 'big-endian' };
    if (syntax === deflated) return parseDeflated(bytes, meta, whole);
    return parseDataSet(bytes, meta, syntax !== implicitLittleEndian, whole);
  } catch {
    return cut(whole);
  }
}

function cut(whole: boolean): ParsedObject {
  return whole ? { kind: 'trouble', trouble: 'damaged' } : { kind: 'short' };
}

function parseDeflated(bytes: Buffer, meta: { elements: Elements; position: number }, whole: boolean): ParsedObject {
  let inflated: Buffer;
  try {
    // What was read may stop in the middle of the compressed part: what is there is inflated all the same.
    inflated = inflateRawSync(bytes.subarray(meta.position), { finishFlush: constants.Z_SYNC_FLUSH, maxOutputLength: mostInflatedBytes });
  } catch (error) {
    const tooFar = (error as { code?: string }).code === 'ERR_BUFFER_TOO_LARGE';
    return { kind: 'trouble', trouble: tooFar ? 'inflates-too-far' : 'damaged' };
  }
  if (inflated.length === 0) return cut(whole);
  const parsed = parseDataSet(inflated, { elements: {}, position: 0 }, true, whole);
  return parsed.kind === 'parsed' ? { ...parsed, pixelsEnd: null } : parsed;
}

function parseDataSet(bytes: Buffer, meta: { elements: Elements; position: number }, explicit: boolean, whole: boolean): ParsedObject {
  const stream = new parser.ByteStream(parser.littleEndianByteArrayParser, bytes, meta.position);
  const elements: Record<string, Element> = {};
  const done = (pixelsEnd: number | null): ParsedObject => ({ kind: 'parsed', meta: meta.elements, elements, bytes, pixelsEnd });
  while (stream.position + 8 <= bytes.length) {
    if (bytes.readUInt16LE(stream.position) >= pixelGroup) return done(pixelsEndOf(bytes, stream.position, explicit));
    if (skipsElement(bytes, stream, explicit)) continue;
    const element = explicit
      ? parser.readDicomElementExplicit(stream, stream.warnings)
      : parser.readDicomElementImplicit(stream, undefined, ((tag: string) => representations.get(tag)) as (tag: string) => string);
    elements[element.tag] = element;
  }
  // Warnings are about a sequence that goes on after the last byte.
  const complete = stream.position === bytes.length && !stream.warnings.some((warning) => warning.startsWith('eof'));
  return complete && whole ? done(null) : cut(whole);
}

/**
 * Steps over an element of known length that nobody asks for: most of a header is such, private groups above all. False where the
 * parser must look: at what is asked for, at lengths that are not stated, and at what has no form.
 */
function skipsElement(bytes: Buffer, stream: ByteStream, explicit: boolean): boolean {
  const at = stream.position;
  const group = bytes[at]! + bytes[at + 1]! * 0x100;
  // Odd groups are private: none is asked for.
  if (group % 2 === 0 && wanted.has(group * 0x10000 + bytes[at + 2]! + bytes[at + 3]! * 0x100)) return false;
  const head = explicit ? headBytes[bytes[at + 4]! * 0x100 + bytes[at + 5]!]! : 8;
  if (head === 0 || at + head > bytes.length) return false;
  const length = explicit && head === 8 ? bytes[at + 6]! + bytes[at + 7]! * 0x100 : bytes.readUInt32LE(at + head - 4);
  if (length === undefinedLength) return false;
  stream.position = at + head + length;
  return true;
}

function tagAt(bytes: Buffer, at: number): string {
  const hex = (value: number) => value.toString(16).padStart(4, '0');
  return `x${hex(bytes.readUInt16LE(at))}${hex(bytes.readUInt16LE(at + 2))}`;
}

/** End of the pixels by the length that stands before them. */
function pixelsEndOf(bytes: Buffer, at: number, explicit: boolean): number | null {
  if (tagAt(bytes, at) !== 'x7fe00010' || at + 12 > bytes.length) return null;
  const length = bytes.readUInt32LE(at + (explicit ? 8 : 4));
  return length === undefinedLength ? null : at + (explicit ? 12 : 8) + length;
}
