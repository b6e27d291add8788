import type { PlanePoint } from '../study/object-file.js';
import type { Picture } from './picture.js';

/** Value of a picture at a place, mm from the middle of the field, straight between pixels; 0 beyond its edge. */
export function valueAt({ columns, rows, columnMm, rowMm, leftMm, topMm, values }: Picture, xMm: number, yMm: number): number {
  const x = (xMm - leftMm) / columnMm;
  const y = (yMm - topMm) / rowMm;
  // Half a pixel around the middles of the outermost ones still belongs to them.
  if (x < -0.5 || y < -0.5 || x > columns - 0.5 || y > rows - 0.5) return 0;
  const i = Math.min(columns - 1, Math.max(0, Math.floor(x)));
  const j = Math.min(rows - 1, Math.max(0, Math.floor(y)));
  const right = Math.min(columns - 1, i + 1);
  const below = Math.min(rows - 1, j + 1);
  const u = Math.min(1, Math.max(0, x - i));
  const v = Math.min(1, Math.max(0, y - j));
  const at = (column: number, row: number) => values[row * columns + column] as number;
  return (1 - v) * ((1 - u) * at(i, j) + u * at(right, j)) + v * ((1 - u) * at(i, below) + u * at(right, below));
}

/** Values along a straight line, evenly from its beginning to its end. */
export function profileOf(picture: Picture, fromMm: PlanePoint, toMm: PlanePoint, count: number): number[] {
  return Array.from({ length: count }, (_, i) => {
    const share = count === 1 ? 0 : i / (count - 1);
    return valueAt(picture, fromMm[0] + share * (toMm[0] - fromMm[0]), fromMm[1] + share * (toMm[1] - fromMm[1]));
  });
}

/** Extent of a picture, mm: to the right and downwards. */
export function extentOf({ columns, rows, columnMm, rowMm }: Picture): readonly [number, number] {
  return [columns * columnMm, rows * rowMm];
}
