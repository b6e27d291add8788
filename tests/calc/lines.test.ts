import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { acquiredLines, bladeCount, ellipticalShare } from '../../src/calc/lines.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { parametersOf } from './series-of.js';

const linesOf = (key: ClassKey, given: GivenParameters) => acquiredLines(key, parametersOf(key, given));

describe('acquiredLines in 2D', () => {
  it.each<[string, GivenParameters, number]>([
    // computed from: L0 = round(matrix x phase field x (1 + oversampling)), Lp = ceil(f L0), L = ceil((Lp - ref) / R) + ref
    ['all lines', { matrixPhase: 256 }, 256],
    ['a rectangular field drops lines', { matrixPhase: 256, phaseFieldOfViewPercent: 75 }, 192],
    ['oversampling adds lines', { matrixPhase: 256, phaseOversamplingPercent: 50 }, 384],
    ['a half line is rounded up', { matrixPhase: 250, phaseFieldOfViewPercent: 81 }, 203],
    ['0.55 x 100 lines are 55 in spite of the binary fraction', { matrixPhase: 100, phaseFieldOfViewPercent: 55 }, 55],
    ['6/8 partial Fourier', { matrixPhase: 256, partialFourierPhase: 0.75 }, 192],
    ['partial Fourier is rounded up', { matrixPhase: 101, partialFourierPhase: 0.75 }, 76],
    ['R 2', { matrixPhase: 256, parallelFactorPhase: 2 }, 128],
    ['R 3 is rounded up', { matrixPhase: 256, parallelFactorPhase: 3 }, 86],
    ['a broken R', { matrixPhase: 85, parallelFactorPhase: 1.5 }, 57],
    ['R 2 with 24 reference lines', { matrixPhase: 448, parallelFactorPhase: 2, referenceLines: 24 }, 236],
    ['reference lines without acceleration change nothing', { matrixPhase: 256, referenceLines: 24 }, 256],
    ['more reference lines than lines: all lines', { matrixPhase: 32, parallelFactorPhase: 2, referenceLines: 64 }, 32],
  ])('%s', (_what, given, phase) => {
    const lines = linesOf('fast-spin-echo/2D', given);
    expect(lines.phase).toBe(phase);
    expect(lines.total).toBe(phase);
    expect(lines.slice).toBe(1);
  });

  it('keeps the counts before acceleration', () => {
    const lines = linesOf('spin-echo/2D', {
      matrixPhase: 200,
      phaseFieldOfViewPercent: 80,
      partialFourierPhase: 0.75,
      parallelFactorPhase: 2,
      referenceLines: 20,
    });
    expect(lines).toMatchObject({ fullPhase: 160, encodedPhase: 120, phase: 70, reference: 20, fullSlice: 1, encodedSlice: 1 });
  });

  it('counts reference lines only where there is acceleration', () => {
    expect(linesOf('spin-echo/2D', { referenceLines: 24 }).reference).toBe(0);
    expect(linesOf('spin-echo/2D', { referenceLines: 24, parallelFactorPhase: 2 }).reference).toBe(24);
  });

  it('never encodes less than one line', () => {
    expect(linesOf('spin-echo/2D', { matrixPhase: 8, phaseFieldOfViewPercent: 5 }).fullPhase).toBe(1);
  });
});

describe('acquiredLines in 3D', () => {
  it('accelerated in both directions the product is taken once: 213 x 147 at 2 x 2 are 7828 lines, not 107 x 74 (computed)', () => {
    const lines = linesOf('spoiled-gradient-echo/3D', {
      matrixPhase: 213,
      sliceCount: 147,
      parallelFactorPhase: 2,
      parallelFactorSlice: 2,
    });
    expect(lines.total).toBe(7828);
    expect(lines.phase * lines.slice).toBe(7918);
  });

  it('accelerated in both directions a block of reference lines is sampled fully: ceil((200 x 100 - 24 x 24) / 4) + 576 (computed)', () => {
    const lines = linesOf('spoiled-gradient-echo/3D', {
      matrixPhase: 200,
      sliceCount: 100,
      parallelFactorPhase: 2,
      parallelFactorSlice: 2,
      referenceLines: 24,
    });
    expect(lines.total).toBe(5432);
    expect(lines.reference).toBe(576);
    expect([lines.phase, lines.slice]).toEqual([112, 62]);
  });

  it('the block is never larger than the lines present', () => {
    const lines = linesOf('spoiled-gradient-echo/3D', {
      matrixPhase: 200,
      sliceCount: 10,
      parallelFactorPhase: 2,
      parallelFactorSlice: 2,
      referenceLines: 24,
    });
    expect(lines.reference).toBe(240);
    expect(lines.total).toBe(680);
  });

  it('accelerated along phase only, reference lines hold for every partition', () => {
    const lines = linesOf('spoiled-gradient-echo/3D', {
      matrixPhase: 256,
      sliceCount: 22,
      sliceOversamplingPercent: 18.2,
      parallelFactorPhase: 2,
      referenceLines: 32,
    });
    expect([lines.phase, lines.slice, lines.total, lines.reference]).toEqual([144, 26, 3744, 832]);
  });

  it('accelerated along partitions only, reference lines (which lie along phase) change nothing', () => {
    const lines = linesOf('spoiled-gradient-echo/3D', { matrixPhase: 256, sliceCount: 100, parallelFactorSlice: 2, referenceLines: 32 });
    expect([lines.phase, lines.slice, lines.total, lines.reference]).toEqual([256, 50, 12800, 0]);
  });

  it('partitions take oversampling, then partial Fourier: 72 with 11 % and 6/8 are 60 (computed)', () => {
    const lines = linesOf('spoiled-gradient-echo/3D', { sliceCount: 72, sliceOversamplingPercent: 11, partialFourierSlice: 0.75 });
    expect([lines.fullSlice, lines.encodedSlice, lines.slice]).toEqual([80, 60, 60]);
  });

  it('an inversion-prepared cycle takes one ceiling over partial Fourier and R of its partitions', () => {
    const lines = linesOf('inversion-prepared-gradient-echo/3D', {
      sliceCount: 99,
      partialFourierSlice: 0.75,
      parallelFactorSlice: 2,
      parallelFactorPhase: 2,
      referenceLines: 24,
    });
    // ceil(0.75 x 99 / 2) = 38 readouts; ceil((256 - 24) / 2) + 24 = 140 cycles
    expect(lines.slice).toBe(38);
    expect(lines.phase).toBe(140);
    expect(lines.total).toBe(5320);
    const few = linesOf('inversion-prepared-gradient-echo/3D', { sliceCount: 5, partialFourierSlice: 0.61, parallelFactorSlice: 3.1 });
    // 3.05 / 3.1: one readout, where two ceilings would count 4 / 3.1: two
    expect(few.slice).toBe(1);
  });
});

describe('rotating strips', () => {
  it.each([
    // computed: ceil(pi/2 x matrix / (train x R))
    [256, 16, 1, 26],
    [320, 20, 1, 26],
    [320, 20, 2, 13],
    [384, 24, 2, 13],
  ])('a matrix of %d with a train of %d and R %d takes %d blades', (matrix, train, r, blades) => {
    expect(bladeCount(matrix, train, r)).toBe(blades);
  });

  it('covers the full field: phase field, oversampling and partial Fourier count for nothing', () => {
    const lines = linesOf('rotating-strip-fast-spin-echo/2D', {
      matrixPhase: 256,
      echoTrainLength: 16,
      phaseFieldOfViewPercent: 50,
      phaseOversamplingPercent: 100,
      partialFourierPhase: 0.75,
    });
    expect(lines).toMatchObject({ phase: 416, fullPhase: 256, encodedPhase: 256, total: 416, reference: 0 });
  });
});

describe('ellipticalShare', () => {
  it('is an ellipse in its rectangle, or all', () => {
    expect(ellipticalShare({ ellipticalSampling: true })).toBeCloseTo(0.7853981634, 10);
    expect(ellipticalShare({ ellipticalSampling: false })).toBe(1);
  });
});
