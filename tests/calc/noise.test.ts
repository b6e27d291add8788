import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { acquiredLines } from '../../src/calc/lines.js';
import { highestB, noiseAverages, noiseAveragingLines, signalFreeSnr } from '../../src/calc/noise.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { parametersOf } from './series-of.js';

const countOf = (key: ClassKey, given: GivenParameters, g = 1) => {
  const p = parametersOf(key, given);
  return noiseAveragingLines(key, p, acquiredLines(key, p), g);
};

describe('samples that average noise: S^2 / (C + g^2 R (S - C))', () => {
  it.each<[string, ClassKey, GivenParameters, number, number]>([
    // values computed by hand
    ['all lines', 'spin-echo/2D', { matrixPhase: 256 }, 1, 256],
    ['oversampled lines count', 'spin-echo/2D', { matrixPhase: 256, phaseOversamplingPercent: 100 }, 1, 512],
    ['partial Fourier counts what is encoded', 'spin-echo/2D', { matrixPhase: 256, partialFourierPhase: 0.75 }, 1, 192],
    ['R 2 with g 1.1', 'spin-echo/2D', { matrixPhase: 256, parallelFactorPhase: 2 }, 1.1, 256 / (2 * 1.21)],
    [
      'reference lines are free of g',
      'spin-echo/2D',
      { matrixPhase: 256, parallelFactorPhase: 2, referenceLines: 56 },
      1.1,
      256 ** 2 / (56 + 1.21 * 2 * 200),
    ],
    ['3D takes both directions', 'spoiled-gradient-echo/3D', { matrixPhase: 200, sliceCount: 80 }, 1, 16000],
    [
      '3D, R along phase, reference lines in every partition',
      'spoiled-gradient-echo/3D',
      { matrixPhase: 200, sliceCount: 80, parallelFactorPhase: 2, referenceLines: 20 },
      1.1,
      16000 ** 2 / (1600 + 2.42 * 14400),
    ],
    [
      '3D, R in both, a block of reference lines',
      'spoiled-gradient-echo/3D',
      { matrixPhase: 200, sliceCount: 80, parallelFactorPhase: 2, parallelFactorSlice: 2, referenceLines: 20 },
      1.1,
      16000 ** 2 / (400 + 4.84 * 15600),
    ],
    [
      '3D, R along partitions only: no reference lines',
      'spoiled-gradient-echo/3D',
      { matrixPhase: 200, sliceCount: 80, parallelFactorSlice: 2, referenceLines: 20 },
      1.1,
      16000 / 2.42,
    ],
    [
      'elliptical sampling keeps pi/4',
      'spoiled-gradient-echo/3D',
      { matrixPhase: 200, sliceCount: 80, ellipticalSampling: true },
      1,
      4000 * Math.PI,
    ],
    [
      'rotating strips: three quarters of blades x train',
      'rotating-strip-fast-spin-echo/2D',
      { matrixPhase: 320, echoTrainLength: 20 },
      1,
      0.75 * 26 * 20,
    ],
    [
      'inversion-prepared: partitions count too',
      'inversion-prepared-gradient-echo/3D',
      { matrixPhase: 224, sliceCount: 160, partialFourierSlice: 0.75 },
      1,
      224 * 120,
    ],
  ])('%s', (_what, key, given, g, count) => {
    expect(countOf(key, given, g)).toBeCloseTo(count, 6);
  });

  it('more reference lines than lines cost nothing and gain nothing', () => {
    expect(countOf('spin-echo/2D', { matrixPhase: 32, parallelFactorPhase: 2, referenceLines: 64 }, 1.2)).toBe(32);
  });
});

describe('noiseAverages', () => {
  const averages = (given: GivenParameters) => noiseAverages(parametersOf('echo-planar-spin-echo/2D', given));

  it("are the series' own", () => {
    expect(averages({ averages: 2.5 })).toBe(2.5);
  });

  it('in diffusion those of the highest b-value, times its directions, wherever it stands in the list', () => {
    expect(averages({ diffusion: { bValuesSPerMm2: [0, 50, 800], directions: 3, averages: [1, 2, 4] } })).toBe(12);
    expect(averages({ diffusion: { bValuesSPerMm2: [800, 0], directions: 6, averages: [5, 2] } })).toBe(30);
    expect(averages({ diffusion: { bValuesSPerMm2: [0], directions: 6, averages: [2] } })).toBe(2);
    expect(averages({ diffusion: { bValuesSPerMm2: [0, 1000], directions: 6, averages: [] } })).toBe(6);
  });

  it('knows the highest b-value', () => {
    expect(
      highestB(
        parametersOf('echo-planar-spin-echo/2D', { diffusion: { bValuesSPerMm2: [50, 1400, 800], directions: 3, averages: [1, 1, 1] } }),
      ),
    ).toBe(1400);
    expect(highestB(parametersOf('echo-planar-spin-echo/2D'))).toBe(0);
  });
});

describe('signalFreeSnr', () => {
  it('is voxel x sqrt(lines x averages / bandwidth) x B0 / g (Macovski, Magn Reson Med 1996;36:494; Edelstein 1986; value from memory)', () => {
    const p = parametersOf('spin-echo/2D', { averages: 2, pixelBandwidthHz: 200 });
    expect(signalFreeSnr(5, 256, p, 1.5, 1)).toBeCloseTo(5 * Math.sqrt(2.56) * 1.5, 12);
    expect(signalFreeSnr(5, 256, p, 3, 1.25)).toBeCloseTo((5 * 1.6 * 3) / 1.25, 12);
  });
});
