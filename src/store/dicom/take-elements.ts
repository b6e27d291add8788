import type { Element } from 'dicom-parser';
import {
  type AttributeRow,
  type Attributes,
  attributeRow,
  type Keyword,
  keywords,
  openedSequences,
  saturationBandSequence,
} from '../../headers/attribute-table.js';
import { takeValue } from '../../headers/take-value.js';
import type { Elements } from './parse-object.js';

const keywordByTag = new Map<string, Keyword>(
  keywords.flatMap((keyword) => {
    const { tag } = attributeRow(keyword);
    return tag === null ? [] : [[`x${tag}`, keyword] as const];
  }),
);
const opened = new Set<string>(Object.values(openedSequences).map((tag) => `x${tag}`));
const { SharedFunctionalGroupsSequence, PerFrameFunctionalGroupsSequence } = openedSequences;
const shared = `x${SharedFunctionalGroupsSequence}`;
const perFrame = `x${PerFrameFunctionalGroupsSequence}`;

/** Longer values are none of the list's. */
const mostValueBytes = 512;
/** Sequences inside each other: the functional groups need four. */
const mostNesting = 6;

/** A number as DICOM writes it in text (PS3.5, DS and IS). */
const decimal = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

const binary: Readonly<Record<string, { readonly bytes: number; readonly read: (bytes: Buffer, at: number) => number }>> = {
  US: { bytes: 2, read: (bytes, at) => bytes.readUInt16LE(at) },
  SS: { bytes: 2, read: (bytes, at) => bytes.readInt16LE(at) },
  UL: { bytes: 4, read: (bytes, at) => bytes.readUInt32LE(at) },
  SL: { bytes: 4, read: (bytes, at) => bytes.readInt32LE(at) },
  FL: { bytes: 4, read: (bytes, at) => bytes.readFloatLE(at) },
  FD: { bytes: 8, read: (bytes, at) => bytes.readDoubleLE(at) },
};

/** The values of an element, as numbers or as pieces of text; an empty list where there are none. */
function valuesOf(element: Element, bytes: Buffer, row: AttributeRow): readonly unknown[] {
  const { length, dataOffset } = element;
  if (length === 0 || length > mostValueBytes || dataOffset + length > bytes.length) return [];
  const vr = element.vr === undefined || element.vr === 'UN' ? row.vr : element.vr;
  const form = binary[vr];
  const values: unknown[] = [];
  if (form !== undefined) {
    if (length % form.bytes !== 0) return [];
    for (let at = dataOffset; at < dataOffset + length; at += form.bytes) values.push(form.read(bytes, at));
    return values;
  }
  const padded = bytes.toString('latin1', dataOffset, dataOffset + length);
  const end = padded.indexOf('\0');
  const text = end === -1 ? padded : padded.slice(0, end);
  let from = 0;
  while (from <= text.length) {
    const next = text.indexOf('\\', from);
    const piece = text.slice(from, next === -1 ? text.length : next).trim();
    values.push(row.kind === 'words' ? piece : decimal.test(piece) ? Number(piece) : Number.NaN);
    if (next === -1) break;
    from = next + 1;
  }
  return values;
}

/** Takes what the allow-list names out of a data set and the sequences in it that are looked into. */
function takeElements(elements: Elements, bytes: Buffer, into: Attributes, nesting = 0): void {
  for (const tag in elements) {
    // The functional groups of frames stand over what the data set says: they are taken after it.
    if (nesting === 0 && (tag === shared || tag === perFrame)) continue;
    const element = elements[tag] as Element;
    const keyword = keywordByTag.get(tag);
    if (keyword !== undefined) takeValue(into, keyword, valuesOf(element, bytes, attributeRow(keyword)));
    else if (element.items === undefined) continue;
    else if (tag === `x${saturationBandSequence}`) takeValue(into, 'SaturationBandCount', [element.items.length]);
    else if (opened.has(tag) && nesting < mostNesting) {
      for (const item of element.items) if (item.dataSet !== undefined) takeElements(item.dataSet.elements, bytes, into, nesting + 1);
    }
  }
}

/**
 * The attributes of each image of an object: of a single-frame object one set, of an enhanced one a set for each frame, in which what
 * all frames share stands as well (PS3.3, C.7.6.16). Given one by one, so that many frames need no memory.
 */
export function* takeFrames(elements: Elements, bytes: Buffer): Generator<Attributes> {
  const frames = elements[perFrame];
  const common: Attributes = {};
  takeElements(elements, bytes, common);
  for (const item of elements[shared]?.items ?? []) if (item.dataSet !== undefined) takeElements(item.dataSet.elements, bytes, common, 1);
  if (frames?.items === undefined || frames.items.length === 0) {
    yield common;
    return;
  }
  for (const frame of frames.items) {
    const own: Attributes = { ...common };
    if (frame.dataSet !== undefined) takeElements(frame.dataSet.elements, bytes, own, 1);
    yield own;
  }
}
