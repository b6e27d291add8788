import { ballTransform, discTransform } from './bessel-j1.js';

/** A function of a distance from 0 upwards, tabled: straight between entries a 64th apart, by itself beyond the table. */
export interface RadialTable {
  readonly values: Float64Array;
  readonly beyond: (x: number) => number;
}

/** Entries per unit: a straight line between them errs by less than 4e-5 of the function's height near by. */
export const tableSteps = 64;

function tabled(reach: number, beyond: (x: number) => number): RadialTable {
  return { values: Float64Array.from({ length: Math.ceil(reach * tableSteps) + 2 }, (_, i) => beyond(i / tableSteps)), beyond };
}

let disc: RadialTable | null = null;

/** Transform of an ellipse over its area, tabled once as far as usual series reach. */
export function discTable(): RadialTable {
  disc ??= tabled(1024, discTransform);
  return disc;
}

/** Nodes and weights of Gauss-Legendre quadrature with eight points on -1 to 1 (Abramowitz & Stegun, Handbook of Mathematical Functions, 1964, table 25.4). */
const nodes = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975363];
const weights = [0.362683783378362, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763];

/**
 * Transform of an ellipsoid as a slice sees it, over the area of its largest section: the mean over the slice of what each height shows.
 * Wholly inside the slice in closed form, else by quadrature over the slice.
 *
 * @param halfAxisMm Half axis along the slice, its middle in the middle of the slice.
 * @param reach How far the function is needed.
 */
export function ballTable(halfAxisMm: number, sliceMm: number, reach: number): RadialTable {
  if (2 * halfAxisMm <= sliceMm) {
    const share = (4 * halfAxisMm) / 3 / sliceMm;
    return tabled(reach, (x) => share * ballTransform(x));
  }
  return tabled(reach, (x) => {
    let sum = 0;
    for (let i = 0; i < nodes.length; i += 1) {
      for (const side of [1 - (nodes[i] as number), 1 + (nodes[i] as number)]) {
        // Heights of the upper half of the slice: the lower half is the same.
        const height = (side * sliceMm) / 4;
        const square = Math.max(0, 1 - (height / halfAxisMm) ** 2);
        sum += ((weights[i] as number) / 2) * square * discTransform(x * Math.sqrt(square));
      }
    }
    return sum;
  });
}
