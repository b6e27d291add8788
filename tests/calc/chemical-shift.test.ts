import { describe, expect, it } from 'vitest';
import { phaseTimesMs } from '../../src/calc/chemical-shift.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, seriesOf } from './series-of.js';

const planar = (given: GivenParameters) =>
  edit(
    seriesOf('echo-planar-spin-echo/2D', {
      repetitionTimeMs: 4000,
      echoTimeMs: 90,
      matrixPhase: 128,
      fieldOfViewMm: 384,
      matrixRead: 96,
      echoSpacingMs: 0.6,
      ...given,
    }),
    {},
    { fieldT: 3 },
  ).figures;

describe('displacement along readout', () => {
  it('fat moves by its shift over the bandwidth: 0.987 px at 1.5 T and 220 Hz/px, 1 mm each (computed)', () => {
    const { figures } = edit(seriesOf('spin-echo/2D', { pixelBandwidthHz: 220, matrixRead: 128 }));
    expect(figures.chemicalShiftPx).toBeCloseTo(0.98702, 4);
    expect(figures.chemicalShiftMm).toBeCloseTo(1.97404, 4);
    expect(figures.distortionPxPer100Hz).toBeCloseTo(0.454545, 6);
  });
});

describe('displacement along phase in echo-planar classes (Mansfield 1977; values computed)', () => {
  it.each([
    [1, 7.7],
    [2, 3.8],
    [3, 2.6],
  ])('R %d: 100 Hz move by %d px with 0.6 ms and 128 lines', (parallelFactorPhase, px) => {
    expect(planar({ parallelFactorPhase }).distortionPxPer100Hz).toBeCloseTo(px, 1);
  });

  it('fat moves by 33.4 px at 3 T and R 1, in mm of the phase voxel', () => {
    expect(planar({}).chemicalShiftPx).toBeCloseTo(33.35, 2);
    expect(planar({}).chemicalShiftMm).toBeCloseTo(3 * 33.3535, 2);
  });

  it('counts full lines: partial Fourier changes nothing, oversampling does', () => {
    expect(planar({ partialFourierPhase: 0.75 }).distortionPxPer100Hz).toBeCloseTo(7.68, 9);
    expect(planar({ phaseOversamplingPercent: 50 }).distortionPxPer100Hz).toBeCloseTo(11.52, 9);
  });

  it('holds for the gradient-echo kind too', () => {
    const series = seriesOf('echo-planar-gradient-echo/2D', {
      repetitionTimeMs: 3000,
      echoTimeMs: 60,
      matrixPhase: 64,
      echoSpacingMs: 0.5,
    });
    expect(edit(series).figures.distortionPxPer100Hz).toBeCloseTo(3.2, 9);
  });
});

describe('phaseTimesMs (Dixon, Radiology 1984;153:189)', () => {
  it.each([
    // computed from 3.4 ppm
    [1.5, 2303, 4605, 1],
    [3, 1151, 2303, 1],
    [0.55, 6280, 12560, 10],
  ])('at %d T: opposed %d, in phase %d us', (fieldT, opposedUs, inPhaseUs, withinUs) => {
    expect(Math.abs(1000 * phaseTimesMs(fieldT).opposedPhaseMs - opposedUs)).toBeLessThan(withinUs);
    expect(Math.abs(1000 * phaseTimesMs(fieldT).inPhaseMs - inPhaseUs)).toBeLessThan(withinUs);
  });

  it('agrees with published opposed-phase lists of 2.3, 6.9, 11.5 ms at 1.5 T (read in a secondary page), which 3.5 ppm does not', () => {
    const opposed = phaseTimesMs(1.5).opposedPhaseMs;
    [2.3, 6.9, 11.5].forEach((ms, i) => {
      expect((2 * i + 1) * opposed).toBeCloseTo(ms, 1);
    });
    expect(5 * opposed * (3.4 / 3.5)).toBeLessThan(11.3);
  });

  it('is a figure of every class', () => {
    expect(edit(seriesOf('spin-echo/2D')).figures).toMatchObject({
      inPhaseMs: phaseTimesMs(1.5).inPhaseMs,
      opposedPhaseMs: phaseTimesMs(1.5).opposedPhaseMs,
    });
  });
});
