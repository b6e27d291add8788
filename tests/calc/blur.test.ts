import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { blurFwhmPx, type LineOrder } from '../../src/calc/blur.js';
import { edit, seriesOf } from './series-of.js';

const seed = 20240517;

/** Full width at half maximum of the magnitude of a summed point spread: 2,000 decaying lines, searched outwards from the middle. */
function byLines(trainOverT2: number, order: LineOrder): number {
  const lines = 2000;
  const magnitude = (x: number) => {
    let [re, im] = [0, 0];
    for (let i = 0; i < lines; i += 1) {
      const k = (i + 0.5) / lines - 0.5;
      const weight = Math.exp(-trainOverT2 * (order === 'linear' ? k + 0.5 : 2 * Math.abs(k)));
      re += weight * Math.cos(2 * Math.PI * k * x);
      im += weight * Math.sin(2 * Math.PI * k * x);
    }
    return Math.hypot(re, im);
  };
  const half = magnitude(0) / 2;
  let x = 0.3;
  while (magnitude(x + 0.01) > half) x += 0.01;
  const [a, b] = [magnitude(x), magnitude(x + 0.01)];
  return 2 * (x + (0.01 * (a - half)) / (a - b));
}

describe('blurFwhmPx', () => {
  it.each<[number, number, number]>([
    // computed from the point spread of an exponential decay (Constable & Gore, Magn Reson Med 1992;28:9)
    [0, 1.207, 1.207],
    [1, 1.254, 1.413],
    [2, 1.405, 1.7],
    [4, 2.218, 2.584],
  ])('T/T2 %d: %d linear, %d centric', (ratio, linear, centric) => {
    expect(blurFwhmPx(ratio, 'linear')).toBeCloseTo(linear, 3);
    expect(blurFwhmPx(ratio, 'centric')).toBeCloseTo(centric, 3);
  });

  it('comes to (sqrt 3 / pi) T/T2 and (2 / pi) T/T2 for long trains', () => {
    expect(blurFwhmPx(60, 'linear') / 60).toBeCloseTo(Math.sqrt(3) / Math.PI, 3);
    expect(blurFwhmPx(60, 'centric') / 60).toBeCloseTo(2 / Math.PI, 3);
  });

  it(`agrees with a point spread summed line by line (fast-check seed ${seed})`, () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 8, noNaN: true }), fc.constantFrom<LineOrder>('linear', 'centric'), (ratio, order) => {
        expect(blurFwhmPx(ratio, order) / byLines(ratio, order)).toBeCloseTo(1, 3);
      }),
      { seed, numRuns: 20 },
    );
  });

  it('is given for trains only: T is echoes x spacing, T2 that of the target; centric when the contrast echo is among the first two', () => {
    const overrides = { tissueOverrides: { liver: { t2Ms: 80 } } };
    const train = (echoTimeMs: number) =>
      edit(seriesOf('fast-spin-echo/2D', { echoTimeMs, echoTrainLength: 16, echoSpacingMs: 10 }, overrides)).figures.blurFwhmPx;
    expect(train(80)).toBeCloseTo(blurFwhmPx(2, 'linear'), 9);
    expect(train(30)).toBeCloseTo(blurFwhmPx(2, 'linear'), 9);
    expect(train(20)).toBeCloseTo(blurFwhmPx(2, 'centric'), 9);
    expect(train(10)).toBeCloseTo(blurFwhmPx(2, 'centric'), 9);
    expect(edit(seriesOf('spin-echo/2D')).figures.blurFwhmPx).toBeNull();
  });
});
