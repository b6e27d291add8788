import { deflateRawSync } from 'node:zlib';

/** One attribute of an invented object: tag as `gggg,eeee`; a sequence holds items. */
export interface Attribute {
  readonly tag: string;
  readonly vr: string;
  readonly value: string | readonly number[] | readonly (readonly Attribute[])[];
}

export type Syntax = 'explicit' | 'implicit' | 'deflated' | 'big-endian';

export interface ObjectForm {
  readonly syntax?: Syntax;
  /** Sequences and items of undefined length, closed by delimiters. */
  readonly undefinedLengths?: boolean;
}

const syntaxUids: Readonly<Record<Syntax, string>> = {
  explicit: '1.2.840.10008.1.2.1',
  implicit: '1.2.840.10008.1.2',
  deflated: '1.2.840.10008.1.2.1.99',
  'big-endian': '1.2.840.10008.1.2.2',
};

/** Representations whose explicit form has four bytes of length (PS3.5, 7.1.2). */
const longLength = new Set(['OB', 'OD', 'OF', 'OL', 'OV', 'OW', 'SQ', 'SV', 'UC', 'UN', 'UR', 'UT', 'UV']);

const binary: Readonly<
  Record<
    string,
    {
      readonly size: number;
      readonly little: (b: Buffer, v: number, at: number) => void;
      readonly big: (b: Buffer, v: number, at: number) => void;
    }
  >
> = {
  US: { size: 2, little: (b, v, at) => b.writeUInt16LE(v, at), big: (b, v, at) => b.writeUInt16BE(v, at) },
  SS: { size: 2, little: (b, v, at) => b.writeInt16LE(v, at), big: (b, v, at) => b.writeInt16BE(v, at) },
  UL: { size: 4, little: (b, v, at) => b.writeUInt32LE(v, at), big: (b, v, at) => b.writeUInt32BE(v, at) },
  FL: { size: 4, little: (b, v, at) => b.writeFloatLE(v, at), big: (b, v, at) => b.writeFloatBE(v, at) },
  FD: { size: 8, little: (b, v, at) => b.writeDoubleLE(v, at), big: (b, v, at) => b.writeDoubleBE(v, at) },
  OW: { size: 2, little: (b, v, at) => b.writeUInt16LE(v, at), big: (b, v, at) => b.writeUInt16BE(v, at) },
  OB: { size: 1, little: (b, v, at) => b.writeUInt8(v, at), big: (b, v, at) => b.writeUInt8(v, at) },
};

interface Form {
  readonly explicit: boolean;
  readonly big: boolean;
  readonly open: boolean;
}

function u16(value: number, big: boolean): Buffer {
  const bytes = Buffer.alloc(2);
  if (big) bytes.writeUInt16BE(value);
  else bytes.writeUInt16LE(value);
  return bytes;
}

function u32(value: number, big: boolean): Buffer {
  const bytes = Buffer.alloc(4);
  if (big) bytes.writeUInt32BE(value);
  else bytes.writeUInt32LE(value);
  return bytes;
}

function tagBytes(tag: string, big: boolean): Buffer {
  return Buffer.concat([u16(Number.parseInt(tag.slice(0, 4), 16), big), u16(Number.parseInt(tag.slice(5), 16), big)]);
}

function valueBytes({ vr, value }: Attribute, form: Form): Buffer {
  if (typeof value === 'string') {
    const pad = vr === 'UI' || vr === 'OB' ? '\0' : ' ';
    return Buffer.from(value.length % 2 === 0 ? value : value + pad, 'latin1');
  }
  if (vr === 'SQ')
    return Buffer.concat([...(value as readonly (readonly Attribute[])[]).map((item) => itemBytes(item, form)), ...closed(form, 'e0dd')]);
  const row = binary[vr];
  if (row === undefined) throw new Error(`no numbers in ${vr}`);
  const numbers = value as readonly number[];
  const bytes = Buffer.alloc(row.size * numbers.length);
  for (const [i, number] of numbers.entries()) (form.big ? row.big : row.little)(bytes, number, i * row.size);
  return bytes;
}

function closed(form: Form, element: string): Buffer[] {
  return form.open ? [Buffer.concat([tagBytes(`fffe,${element}`, form.big), u32(0, form.big)])] : [];
}

function itemBytes(item: readonly Attribute[], form: Form): Buffer {
  const body = Buffer.concat(sorted(item).map((attribute) => elementBytes(attribute, form)));
  const length = u32(form.open ? 0xffffffff : body.length, form.big);
  return Buffer.concat([tagBytes('fffe,e000', form.big), length, body, ...closed(form, 'e00d')]);
}

function elementBytes(attribute: Attribute, form: Form): Buffer {
  const { tag, vr } = attribute;
  const body = valueBytes(attribute, form);
  const length = vr === 'SQ' && form.open ? 0xffffffff : body.length;
  const head = tagBytes(tag, form.big);
  if (!form.explicit) return Buffer.concat([head, u32(length, form.big), body]);
  const lengthBytes = longLength.has(vr) ? Buffer.concat([Buffer.alloc(2), u32(length, form.big)]) : u16(length, form.big);
  return Buffer.concat([head, Buffer.from(vr, 'latin1'), lengthBytes, body]);
}

/** Tags ascend in a data set. */
function sorted(attributes: readonly Attribute[]): readonly Attribute[] {
  return [...attributes].sort((a, b) => (a.tag < b.tag ? -1 : 1));
}

/** The bytes of a DICOM object (PS3.10): preamble, file meta information, data set. The tests' own writer; it shares nothing with the reader. */
export function dicomObject(attributes: readonly Attribute[], { syntax = 'explicit', undefinedLengths = false }: ObjectForm = {}): Buffer {
  const textOf = (tag: string, otherwise: string) => {
    const value = attributes.find((one) => one.tag === tag)?.value;
    return typeof value === 'string' ? value : otherwise;
  };
  const metaForm: Form = { explicit: true, big: false, open: false };
  const meta = Buffer.concat(
    [
      { tag: '0002,0001', vr: 'OB', value: [0, 1] },
      { tag: '0002,0002', vr: 'UI', value: textOf('0008,0016', mrImage) },
      { tag: '0002,0003', vr: 'UI', value: textOf('0008,0018', '1.2.3') },
      { tag: '0002,0010', vr: 'UI', value: syntaxUids[syntax] },
      { tag: '0002,0012', vr: 'UI', value: '1.2.3.4' },
    ].map((attribute) => elementBytes(attribute, metaForm)),
  );
  const length = elementBytes({ tag: '0002,0000', vr: 'UL', value: [meta.length] }, metaForm);
  const form: Form = { explicit: syntax !== 'implicit', big: syntax === 'big-endian', open: undefinedLengths };
  const body = Buffer.concat(sorted(attributes).map((attribute) => elementBytes(attribute, form)));
  return Buffer.concat([Buffer.alloc(128), Buffer.from('DICM'), length, meta, syntax === 'deflated' ? deflateRawSync(body) : body]);
}

/** MR Image Storage and Enhanced MR Image Storage (PS3.4, annex B). */
export const mrImage = '1.2.840.10008.5.1.4.1.1.4';
export const enhancedMrImage = '1.2.840.10008.5.1.4.1.1.4.1';

/** A number as a decimal string of at most 16 characters (PS3.5, DS). */
export function decimal(...values: readonly number[]): string {
  return values.map((value) => (String(value).length <= 16 ? String(value) : value.toPrecision(10))).join('\\');
}
