import type { Attributes } from '../../headers/attribute-table.js';
import type { Header } from '../../headers/header.js';
import { type Elements, type ParsedObject, textOf } from './parse-object.js';
import { takeFrames } from './take-elements.js';

/** Objects that hold MR images (PS3.4, annex B): single-frame, enhanced, enhanced in colour, converted to enhanced. */
const imageClasses = new Set(['4', '4.1', '4.3', '4.4'].map((end) => `1.2.840.10008.5.1.4.1.1.${end}`));
const seriesUid = 'x0020000e';
const sopClassUid = 'x00080016';
const modality = 'x00080060';

type Parsed = Extract<ParsedObject, { kind: 'parsed' }>;

/**
 * The headers of an MR object, one an image; null when it is none. Here UIDs end: what goes on is a keyed hash.
 */
export function objectHeaders({ elements, meta, bytes }: Parsed, hash: (uid: string) => string): Iterable<Header> | null {
  if (!isMrImage(elements, meta, bytes)) return null;
  const seriesKey = hash(textOf(elements[seriesUid], bytes));
  return headersOf(takeFrames(elements, bytes), seriesKey);
}

/** True for the index of a medium (Media Storage Directory Storage, PS3.10): no image, and no fault in a folder. */
export function isIndex({ meta, bytes }: Parsed): boolean {
  return textOf(meta['x00020002'], bytes) === '1.2.840.10008.1.3.10';
}

function* headersOf(frames: Iterable<Attributes>, seriesKey: string): Generator<Header> {
  for (const attributes of frames) yield { source: 'dicom', seriesKey, attributes };
}

function isMrImage(elements: Elements, meta: Elements, bytes: Buffer): boolean {
  const sopClass = textOf(elements[sopClassUid], bytes) || textOf(meta['x00020002'], bytes);
  if (sopClass !== '') return imageClasses.has(sopClass);
  return textOf(elements[modality], bytes) === 'MR';
}
