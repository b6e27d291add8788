import type { PlanePoint } from '../study/object-file.js';
import type { Picture } from './picture.js';
import type { PictureWindow } from './picture-window.js';
import { valueAt } from './sample-picture.js';

/** A part of a picture as so many squares of one size. */
export interface FieldView {
  readonly columns: number;
  readonly rows: number;
  readonly squareMm: number;
  readonly middleMm: PlanePoint;
}

/** Brightness of each square, 0 black to 1 white, row after row: the value in its middle, since a mean over the square would hide the grain. */
export function pictureField(
  picture: Picture,
  { columns, rows, squareMm, middleMm }: FieldView,
  [black, white]: PictureWindow,
): Float64Array {
  const field = new Float64Array(columns * rows);
  for (let row = 0; row < rows; row += 1) {
    for (let column = 0; column < columns; column += 1) {
      const x = middleMm[0] + (column + 0.5 - columns / 2) * squareMm;
      const y = middleMm[1] + (row + 0.5 - rows / 2) * squareMm;
      field[row * columns + column] = Math.min(1, Math.max(0, (valueAt(picture, x, y) - black) / (white - black)));
    }
  }
  return field;
}

/**
 * Squares that are on when only on and off can be shown: the error of each is spread over its neighbours that are still to come
 * (Floyd & Steinberg, Proc SID 1976;17:75).
 */
export function diffused(field: Float64Array, columns: number): Uint8Array {
  const left = Float64Array.from(field);
  const on = new Uint8Array(field.length);
  const add = (at: number, share: number) => {
    if (at < left.length) left[at] = (left[at] as number) + share;
  };
  for (let at = 0; at < left.length; at += 1) {
    const value = left[at] as number;
    on[at] = value >= 0.5 ? 1 : 0;
    const error = value - (on[at] as number);
    const column = at % columns;
    if (column < columns - 1) add(at + 1, (7 / 16) * error);
    if (column > 0) add(at + columns - 1, (3 / 16) * error);
    add(at + columns, (5 / 16) * error);
    if (column < columns - 1) add(at + columns + 1, (1 / 16) * error);
  }
  return on;
}
