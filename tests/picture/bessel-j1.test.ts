import { describe, expect, it } from 'vitest';
import { ballTransform, besselJ1, discTransform } from '../../src/picture/bessel-j1.js';
import { ballTable, discTable, tableSteps } from '../../src/picture/radial-table.js';

/** Bessel's integral (1824): J1(x) = 1/pi times the integral of cos(t - x sin t) over 0 to pi; the rule of rectangles is exact to rounding for it. */
function byIntegral(x: number): number {
  const steps = 4000;
  let sum = 0;
  for (let i = 0; i < steps; i += 1) {
    const t = (Math.PI * (i + 0.5)) / steps;
    sum += Math.cos(t - x * Math.sin(t));
  }
  return sum / steps;
}

describe('besselJ1', () => {
  it.each([0, 0.01, 0.5, 1, 1.8411838, 2.999, 3.001, 5, 10, 33.3, 100, 700])("agrees with Bessel's integral at %f", (x) => {
    // Abramowitz & Stegun 9.4.4 and 9.4.6 promise 1.3e-8 of J1/x, 4e-8 of the amplitude and 9e-8 of the phase.
    expect(Math.abs(besselJ1(x) - byIntegral(x))).toBeLessThan(1.5e-7);
  });

  it.each([3.83170597, 7.01558667, 10.17346814, 13.32369194])('is 0 at %f (zeros of J1: Abramowitz & Stegun, table 9.5)', (x) => {
    expect(Math.abs(besselJ1(x))).toBeLessThan(1e-7);
  });
});

describe('transforms of a disc and a ball', () => {
  it('are 1 at 0, and the disc is 2 J1(x) / x', () => {
    expect(discTransform(0)).toBe(1);
    expect(ballTransform(0)).toBe(1);
    expect(discTransform(5)).toBeCloseTo((2 * byIntegral(5)) / 5, 7);
  });

  it.each([0.05, 0.0999, 0.1001, 1, 4.493, 20])(
    'the ball agrees with numerical integration over its sections at %f (closed form: Koay 2007)',
    (x) => {
      const steps = 20000;
      let sum = 0;
      for (let i = 0; i < steps; i += 1) {
        const z = (i + 0.5) / steps;
        // A plane wave along x through the ball: sections across it have the area pi (1 - z^2).
        sum += (1 - z * z) * Math.cos(x * z);
      }
      expect(ballTransform(x)).toBeCloseTo((1.5 * sum) / steps, 7);
    },
  );

  it('the table lies within 4e-5 of the function', () => {
    const { values } = discTable();
    for (let x = 0.005; x < 200; x += 0.377) {
      const place = x * tableSteps;
      const index = Math.floor(place);
      const straight = (values[index] as number) + (place - index) * ((values[index + 1] as number) - (values[index] as number));
      expect(Math.abs(straight - discTransform(x))).toBeLessThan(4e-5);
    }
  });

  it('a ball that the slice cuts gives the mean over the slice of its sections', () => {
    // Half axis 4 mm, slice 3 mm: by a fine sum over heights.
    const table = ballTable(4, 3, 30);
    for (const x of [0, 2, 7.5, 20]) {
      let sum = 0;
      for (let i = 0; i < 3000; i += 1) {
        const height = -1.5 + (3 * (i + 0.5)) / 3000;
        const square = 1 - (height / 4) ** 2;
        sum += square * discTransform(x * Math.sqrt(square));
      }
      expect(table.values[x * tableSteps]).toBeCloseTo(sum / 3000, 6);
    }
  });

  it('closed form and quadrature meet where the ball just fits the slice', () => {
    const inside = ballTable(2, 4.0001, 20).values;
    const cut = ballTable(2, 3.9999, 20).values;
    expect(Math.max(...inside.map((value, i) => Math.abs(value - (cut[i] as number))))).toBeLessThan(1e-3);
  });
});
