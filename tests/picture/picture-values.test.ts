import fc from 'fast-check';
import FFT from 'fft.js';
import { describe, expect, it } from 'vitest';
import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { evaluate } from '../../src/calc/evaluate.js';
import { modelOf, weightedSignal } from '../../src/calc/model.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { pictureOf } from '../../src/picture/picture.js';
import { noiseDeviation } from '../../src/picture/picture-pair.js';
import { picturePlane } from '../../src/picture/picture-plane.js';
import { drawFrom, drawScanner, drawSeries } from '../calc/any-series.js';
import { seriesOf } from '../calc/series-of.js';
import { draw, inCircle, model, objectOf, placed } from './plain-object.js';

const scanner = plainScanner(1.5);

/** Two plain places side by side, target to the left, comparison to the right. */
const pair = objectOf([
  placed('liver', { atMm: [-60, 0], halfAxesMm: [45, 45] }),
  placed('spleen', { atMm: [60, 0], halfAxesMm: [45, 45] }),
]);

describe('noise', () => {
  const baseline = baselineOf(
    seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 180, echoTimeMs: 2.3, flipAngleDeg: 60, matrixRead: 64, matrixPhase: 64 }),
    scanner,
  );
  const preset = baseline.model.series.parameters;

  /** Signal to noise in target and comparison over a hundred seeds: mean over deviation from seed to seed, averaged over the pixels of a circle. */
  function measured(set: Partial<typeof preset>): { target: number; comparison: number; expected: number; comparisonExpected: number } {
    const parameters = { ...preset, ...set };
    const series = { ...baseline.model.series, parameters };
    const now = modelOf(series, scanner, baseline.model.slotFactor);
    const { figures } = evaluate(series, scanner, unknownBody, baseline);
    const noise = noiseDeviation(now, baseline, 20) as number;
    const sums = { target: [0, 0, 0], comparison: [0, 0, 0] };
    const noiseless = draw(now, pair);
    for (let seed = 1; seed <= 100; seed += 1) {
      const picture = draw(now, pair, { noise, seed });
      for (const [name, x] of [
        ['target', -60],
        ['comparison', 60],
      ] as const) {
        const sum = sums[name];
        for (let j = 0; j < picture.rows; j += 1) {
          for (let i = 0; i < picture.columns; i += 1) {
            const at = j * picture.columns + i;
            if (Math.hypot(picture.leftMm + i * picture.columnMm - x, picture.topMm + j * picture.rowMm) > 25) continue;
            sum[0] = (sum[0] as number) + (noiseless.values[at] as number);
            sum[1] = (sum[1] as number) + ((picture.values[at] as number) - (noiseless.values[at] as number)) ** 2;
            sum[2] = (sum[2] as number) + 1;
          }
        }
      }
    }
    const snr = ([mean, square, count]: readonly number[]) =>
      (mean as number) / (count as number) / Math.sqrt((square as number) / (count as number));
    const ratio = (weightedSignal(now.comparison) as number) / (weightedSignal(now.target) as number);
    const expected = 20 * (figures.relativeSnr as number);
    return { target: snr(sums.target), comparison: snr(sums.comparison), expected, comparisonExpected: expected * ratio };
  }

  // The unit of relativeSnr is the preset's target, assumed to have 20.
  it.each([
    ['the preset', {}],
    ['half the slice', { sliceThicknessMm: 2.5 }],
    ['four averages', { averages: 4 }],
    ['twice the bandwidth', { pixelBandwidthHz: 400 }],
    ['partial Fourier 6/8', { partialFourierPhase: 0.75 }],
    ['R 2', { parallelFactorPhase: 2 }],
    ['twice the matrix', { matrixRead: 128, matrixPhase: 128, averages: 4 }],
    ['oversampling', { phaseOversamplingPercent: 100 }],
    ['another angle', { flipAngleDeg: 25 }],
  ])('%s: signal to noise in two regions follows relativeSnr within 3 percent over 100 seeds', (_name, set) => {
    const { target, comparison, expected, comparisonExpected } = measured(set);
    expect(Math.abs(target / expected - 1)).toBeLessThan(0.03);
    expect(Math.abs(comparison / comparisonExpected - 1)).toBeLessThan(0.03);
  });

  it('is the same for the same seed, and another for another', () => {
    const noise = { noise: 0.01, seed: 5 };
    expect(draw(baseline.model, pair, noise).values).toEqual(draw(baseline.model, pair, noise).values);
    expect(draw(baseline.model, pair, noise).values).not.toEqual(draw(baseline.model, pair, { ...noise, seed: 6 }).values);
  });

  it('alone it is Rayleigh: mean 1.2533 of the deviation (Gudbjartsson & Patz, Magn Reson Med 1995;34:910; value from memory)', () => {
    const { mean } = inCircle(draw(baseline.model, objectOf([]), { noise: 1, seed: 3 }), [0, 0], 120);
    expect(mean).toBeCloseTo(Math.sqrt(Math.PI / 2), 1);
  });
});

describe('contrast', () => {
  it.each([
    ['spin-echo/2D', { repetitionTimeMs: 500 }],
    ['fast-spin-echo/2D', { repetitionTimeMs: 4000, echoTimeMs: 80, echoTrainLength: 16 }],
    ['spoiled-gradient-echo/2D', { repetitionTimeMs: 180, echoTimeMs: 4.6, flipAngleDeg: 70 }],
    ['echo-planar-spin-echo/2D', { repetitionTimeMs: 4000, echoTimeMs: 70, echoSpacingMs: 0.5, matrixRead: 96, matrixPhase: 96 }],
    ['balanced-steady-state/2D', { repetitionTimeMs: 4, echoTimeMs: 2, flipAngleDeg: 50 }],
  ] as const)('%s: difference and ratio of target and comparison are those of evaluate within 2 percent', (key, given) => {
    const of = model(key, given);
    const { figures, signals } = evaluate(of.series, scanner, unknownBody, baselineOf(of.series, scanner));
    const picture = draw(of, pair);
    const [target, comparison] = [inCircle(picture, [-60, 0], 20).mean, inCircle(picture, [60, 0], 20).mean];
    const [wanted, other] = signals.map((signal) => weightedSignal(signal) as number) as [number, number];
    expect(Math.abs(target / comparison / (figures.contrastRatio as number) - 1)).toBeLessThan(0.02);
    expect(Math.abs((target - comparison) / (wanted - other) - 1)).toBeLessThan(0.02);
  });
});

describe('the closed form', () => {
  it('gives the picture of a finely sampled object within 1 percent of its energy', () => {
    // 64 voxels of 3 mm; the object sampled at 16 times that in each direction, each sample a mean over 4 x 4 points.
    const matrix = 64;
    const fieldMm = 192;
    const fine = 1024;
    const of = model('spin-echo/2D', { fieldOfViewMm: fieldMm, matrixRead: matrix, matrixPhase: matrix });
    const shapes = [
      placed('liver', { atMm: [3, -5], halfAxesMm: [70, 50], turnDeg: 20 }),
      placed('spleen', { atMm: [20, 5], halfAxesMm: [14, 9], turnDeg: -35 }, 'liver'),
      placed('CSF', { atMm: [-30, -10], halfAxesMm: [2, 11], repeat: { count: 4, stepMm: [6, 1] } }, 'liver'),
    ];
    const signals = new Map(
      shapes.map(({ tissue }) => [
        tissue,
        weightedSignal(model('spin-echo/2D', of.series.parameters, { target: tissue }).target) as number,
      ]),
    );
    const density = (x: number, y: number): number => {
      let value = 0;
      for (const { tissue, insteadOf, shape } of shapes) {
        const turn = ((shape.turnDeg ?? 0) * Math.PI) / 180;
        for (let k = 0; k < (shape.repeat?.count ?? 1); k += 1) {
          const dx = x - shape.atMm[0] - k * (shape.repeat?.stepMm[0] ?? 0);
          const dy = y - shape.atMm[1] - k * (shape.repeat?.stepMm[1] ?? 0);
          const u = (dx * Math.cos(turn) + dy * Math.sin(turn)) / (shape.halfAxesMm[0] as number);
          const v = (dy * Math.cos(turn) - dx * Math.sin(turn)) / (shape.halfAxesMm[1] as number);
          if (u * u + v * v <= 1) value += (signals.get(tissue) as number) - (insteadOf === null ? 0 : (signals.get(insteadOf) as number));
        }
      }
      return value;
    };
    const step = fieldMm / fine;
    const fft = new FFT(fine);
    const rowsOfK: Float64Array[] = [];
    for (let j = 0; j < fine; j += 1) {
      const row = new Float64Array(2 * fine);
      for (let i = 0; i < fine; i += 1) {
        let sum = 0;
        for (let s = 0; s < 4; s += 1)
          sum += density((i - fine / 2 + (s % 2 === 0 ? -0.25 : 0.25)) * step, (j - fine / 2 + (s < 2 ? -0.25 : 0.25)) * step);
        row[2 * ((i + fine / 2) % fine)] = sum / 4;
      }
      const out = new Float64Array(2 * fine);
      fft.transform(out, row);
      rowsOfK.push(out);
    }
    // Columns of the sampled frequencies only, then the picture back from them.
    const half = matrix / 2;
    const k = new Map<number, Float64Array>();
    for (let n = -half; n < half; n += 1) {
      const column = new Float64Array(2 * fine);
      for (let j = 0; j < fine; j += 1) {
        const from = 2 * ((n + fine) % fine);
        column[2 * ((j + fine / 2) % fine)] = rowsOfK[j]?.[from] as number;
        column[2 * ((j + fine / 2) % fine) + 1] = rowsOfK[j]?.[from + 1] as number;
      }
      const out = new Float64Array(2 * fine);
      fft.transform(out, column);
      k.set(n, out);
    }
    const picture = draw(of, objectOf(shapes));
    expect([picture.columns, picture.rows]).toEqual([matrix, matrix]);
    let off = 0;
    let energy = 0;
    for (let j = 0; j < matrix; j += 1) {
      for (let i = 0; i < matrix; i += 1) {
        let [re, im] = [0, 0];
        for (let n = -half; n < half; n += 1) {
          const column = k.get(n) as Float64Array;
          for (let m = -half; m < half; m += 1) {
            const angle = (2 * Math.PI * (n * (i - half) + m * (j - half))) / matrix;
            const at = 2 * ((m + fine) % fine);
            re += (column[at] as number) * Math.cos(angle) - (column[at + 1] as number) * Math.sin(angle);
            im += (column[at] as number) * Math.sin(angle) + (column[at + 1] as number) * Math.cos(angle);
          }
        }
        const value = Math.hypot(re, im) / (fine * fine);
        energy += value * value;
        off += (value - (picture.values[j * matrix + i] as number)) ** 2;
      }
    }
    expect(Math.sqrt(off / energy)).toBeLessThan(0.01);
  }, 60_000);
});

describe('any valid series', () => {
  it('has a picture of finite values, or a reason why there is none (seed 20240517)', () => {
    const reasons = new Set<string>();
    let drawn = 0;
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 2 ** 31 - 1 }), (start) => {
        const random = drawFrom(start);
        const series = drawSeries(random, { extremeShare: 0.2, longestTrain: 300 });
        const of = modelOf(series, drawScanner(random), null);
        // Small enough for a test: the size alone is no matter of right or wrong.
        if (of.lines.fullPhase * series.parameters.matrixRead > 2 ** 15) return;
        const plane = picturePlane(series.plane, series.parameters.phaseDirection);
        const tissues = [series.target, series.comparison, 'subcutaneous fat'];
        const object = objectOf(
          [
            placed('subcutaneous fat', { atMm: [0, 0], halfAxesMm: [150, 100] }),
            ...tissues.map((name, i) => placed(name, { atMm: [20 * i, 0], halfAxesMm: [8, 8, 3] }, 'subcutaneous fat')),
          ],
          [300, 200],
        );
        const picture = pictureOf({ model: of, object, plane }, { noise: 0.01, seed: 1, fineness: 1 });
        if (!picture.ok) {
          reasons.add(picture.problems[0]?.code ?? '');
          return;
        }
        drawn += 1;
        const { columns, rows, values } = picture.value;
        expect(values.length).toBe(columns * rows);
        expect(values.every((value) => Number.isFinite(value) && value >= 0)).toBe(true);
      }),
      { seed: 20240517, numRuns: 150 },
    );
    expect(drawn).toBeGreaterThan(30);
    expect([...reasons].every((code) => ['nothing-to-draw', 'picture-too-fine'].includes(code))).toBe(true);
  }, 60_000);
});
