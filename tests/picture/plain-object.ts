import type { ClassKey } from '../../src/calc/classes.js';
import { modelOf, type SeriesModel } from '../../src/calc/model.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters, Series } from '../../src/calc/series.js';
import { type Picture, type PictureOptions, pictureOf } from '../../src/picture/picture.js';
import { picturePlane } from '../../src/picture/picture-plane.js';
import type { PlacedObject, PlacedShape } from '../../src/picture/placed-object.js';
import type { ObjectShape } from '../../src/study/object-file.js';
import { seriesOf } from '../calc/series-of.js';

/** An ellipse in its place, alone in the dark unless it takes the place of a tissue. */
export function placed(tissue: string, shape: Omit<ObjectShape, 'id' | 'tissue'>, insteadOf: string | null = null): PlacedShape {
  return { tissue, insteadOf, shape: { id: tissue, tissue, ...shape } };
}

/** An object of shapes, without a body around them. */
export function objectOf(shapes: readonly PlacedShape[], bodyMm: readonly [number, number] = [10, 10]): PlacedObject {
  return { shapes, bodyMm, enlarged: false, tissues: [...new Set(shapes.map(({ tissue }) => tissue))] };
}

/** Model of an invented series, its own baseline, at 1.5 T unless another is given. */
export function model(key: ClassKey, given: GivenParameters = {}, besides: Partial<Series> = {}, fieldT = 1.5): SeriesModel {
  return modelOf(seriesOf(key, given, besides), plainScanner(fieldT), null);
}

/** A picture, or the reason why there is none as a failure of the test. */
export function draw(of: SeriesModel, object: PlacedObject, options: Partial<PictureOptions> = {}): Picture {
  const plane = picturePlane(of.series.plane, of.series.parameters.phaseDirection);
  const picture = pictureOf({ model: of, object, plane }, { noise: 0, seed: 1, fineness: 1, ...options });
  if (!picture.ok) throw new Error(picture.problems[0]?.message);
  return picture.value;
}

/** Values along the column (or row) nearest to a place. */
export function line(picture: Picture, along: 'down' | 'across', atMm: number): { mm: number[]; values: number[] } {
  const { columns, rows, columnMm, rowMm, leftMm, topMm, values } = picture;
  if (along === 'down') {
    const column = Math.round((atMm - leftMm) / columnMm);
    return {
      mm: Array.from({ length: rows }, (_, j) => topMm + j * rowMm),
      values: Array.from({ length: rows }, (_, j) => values[j * columns + column] as number),
    };
  }
  const row = Math.round((atMm - topMm) / rowMm);
  return {
    mm: Array.from({ length: columns }, (_, i) => leftMm + i * columnMm),
    values: Array.from({ length: columns }, (_, i) => values[row * columns + i] as number),
  };
}

/** Mean and deviation of the values in a circle. */
export function inCircle(
  picture: Picture,
  atMm: readonly [number, number],
  radiusMm: number,
): { mean: number; deviation: number; count: number } {
  const found: number[] = [];
  for (let j = 0; j < picture.rows; j += 1) {
    for (let i = 0; i < picture.columns; i += 1) {
      const x = picture.leftMm + i * picture.columnMm - atMm[0];
      const y = picture.topMm + j * picture.rowMm - atMm[1];
      if (Math.hypot(x, y) <= radiusMm) found.push(picture.values[j * picture.columns + i] as number);
    }
  }
  const mean = found.reduce((sum, value) => sum + value, 0) / found.length;
  const deviation = Math.sqrt(found.reduce((sum, value) => sum + (value - mean) ** 2, 0) / Math.max(1, found.length - 1));
  return { mean, deviation, count: found.length };
}

/** Where a rising or falling run of values passes a level, between two places by a straight line. */
export function crossings({ mm, values }: { mm: readonly number[]; values: readonly number[] }, level: number): number[] {
  const found: number[] = [];
  for (let i = 1; i < values.length; i += 1) {
    const [a, b] = [values[i - 1] as number, values[i] as number];
    if (a < level === b < level) continue;
    found.push((mm[i - 1] as number) + ((level - a) / (b - a)) * ((mm[i] as number) - (mm[i - 1] as number)));
  }
  return found;
}
