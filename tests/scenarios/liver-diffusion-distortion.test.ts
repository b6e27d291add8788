import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { expectRatio } from './judge.js';

/** An invented preset: 3 T liver diffusion, 0.6 ms spacing, 128 lines, R 2; liver with T2 80. */
const preset = (given: GivenParameters = {}) =>
  seriesOf(
    'echo-planar-spin-echo/2D',
    {
      repetitionTimeMs: 4800,
      echoTimeMs: 90,
      echoSpacingMs: 0.6,
      sliceCount: 20,
      sliceThicknessMm: 6,
      sliceGapMm: 1,
      fieldOfViewMm: 380,
      matrixRead: 128,
      matrixPhase: 128,
      pixelBandwidthHz: 2000,
      parallelFactorPhase: 2,
      diffusion: { bValuesSPerMm2: [50, 800], directions: 3, averages: [1, 4] },
      ...given,
    },
    { tissueOverrides: { liver: { t2Ms: 80 } } },
  );
const before = edit(preset(), {}, { fieldT: 3 });
const after = edit(preset(), { parallelFactorPhase: 3 }, { fieldT: 3 });

describe('3 T liver diffusion, distorted: R 2 to 3', () => {
  it('cuts the shift of 100 Hz from 3.8 to 2.6 px, of fat from 16.7 to 11.1 (33.4 at R 1)', () => {
    expect(before.figures.distortionPxPer100Hz).toBeCloseTo(3.84, 2);
    expect(after.figures.distortionPxPer100Hz).toBeCloseTo(2.56, 2);
    expect(before.figures.chemicalShiftPx).toBeCloseTo(16.7, 1);
    expect(after.figures.chemicalShiftPx).toBeCloseTo(11.1, 1);
    expect(Math.abs((edit(preset({ parallelFactorPhase: 1 }), {}, { fieldT: 3 }).figures.chemicalShiftPx as number) - 33.4)).toBeLessThan(
      0.1,
    );
  });

  it('shortens the train from 38 to 26 ms, and TE by 12.8 ms', () => {
    expect(before.parameters.echoTrainLength * 0.6).toBeCloseTo(38.4, 6);
    expect(Math.round(after.parameters.echoTrainLength * 0.6)).toBe(26);
    expect(after.parameters.echoTimeMs).toBeCloseTo(77.2, 6);
  });

  it('TE 90 to 77 gives 17 % more signal at T2 80', () => {
    expect((after.signals[0]?.signal as number) / (before.signals[0]?.signal as number)).toBeCloseTo(1.17, 2);
  });

  it('costs sqrt(2/3) over the ratio of g, less what TE gives back', () => {
    expectRatio((after.figures.relativeSnr as number) / 1.173, Math.sqrt(2 / 3) * (1.05 / 1.2));
    expectRatio(after.figures.relativeSnr, 0.84);
  });
});
