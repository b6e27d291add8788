import type { Attributes } from './attribute-table.js';

/** One image (a frame of an enhanced object, or a single-frame object) or one sidecar, as it leaves the reader of files. */
export interface Header {
  readonly source: HeaderSource;
  /** What groups images of one series: a keyed hash of its UID, never the UID. */
  readonly seriesKey: string;
  readonly attributes: Attributes;
}

export type HeaderSource = 'dicom' | 'sidecar';
