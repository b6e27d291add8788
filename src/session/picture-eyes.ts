import type { DrawnPictures } from '../picture/picture-problem.js';

/** The newest pair of pictures. */
export interface PictureView {
  readonly seriesId: string;
  /** What it was asked with, to see whether it still stands. */
  readonly key: string;
  readonly ask: number;
  /** Pictures of an earlier ask stay until the new ones are there. */
  readonly drawn: DrawnPictures | null;
  readonly trouble: string | null;
}

/** How the pictures are looked at. */
export interface PictureEyes {
  /** The square at the fine lines instead of the whole field. */
  readonly close: boolean;
  /** One picture with the preset to the left of this share of its width; null shows both side by side. */
  readonly divider: number | null;
  /** On a wide screen the pictures stand beside the series, in the place of the range chart. */
  readonly beside: boolean;
}

/** Both pictures, whole. */
export const plainEyes: PictureEyes = { close: false, divider: null, beside: false };

/** True for a screen on which a series, its range chart and more stand together. */
export function isWide({ columns, rows }: { readonly columns: number; readonly rows: number }): boolean {
  return columns >= 150 && rows >= 40;
}
