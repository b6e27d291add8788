import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../../src/calc/classes.js';
import { geometryOf } from '../../../src/calc/geometry.js';
import { acquiredLines } from '../../../src/calc/lines.js';
import { diffusionLobeMs, minimumTiming } from '../../../src/calc/minimum-timing.js';
import { slotPulses } from '../../../src/calc/pulses.js';
import { plainScanner } from '../../../src/calc/scanner.js';
import type { GivenParameters } from '../../../src/calc/series.js';
import { parametersOf } from '../series-of.js';

const scanner = plainScanner(1.5);

function fastest(key: ClassKey, given: GivenParameters) {
  const p = parametersOf(key, given);
  return minimumTiming(
    key,
    p,
    acquiredLines(key, p),
    geometryOf(key.endsWith('3D') ? '3D' : '2D', p),
    slotPulses(key, p, scanner),
    scanner,
  );
}

const planar: GivenParameters = {
  fieldOfViewMm: 220,
  matrixRead: 64,
  matrixPhase: 64,
  pixelBandwidthHz: 2000,
  sliceThicknessMm: 4,
  echoSpacingMs: 0.6,
};

/**
 * Readout prephasing of these lines as a triangle of half the readout's area: 2000 x 64 / (42.577 x 220) = 13.665 mT/m for
 * 0.5 ms with a ramp of 0.0911 ms, half the area 4.0387 mT/m ms, 2 sqrt(4.0387 / 150) ms (added up by hand).
 */
const prephaseMs = 0.328173;

describe('flow compensation adds one more prephasing lobe (common practice, no source)', () => {
  it('before the echo-planar lines of a gradient echo', () => {
    const more = fastest('echo-planar-gradient-echo/2D', { ...planar, flowCompensation: true }).echoTimeMs;
    expect(more - fastest('echo-planar-gradient-echo/2D', planar).echoTimeMs).toBeCloseTo(prephaseMs, 5);
  });

  it('in the first half of an echo-planar spin echo: twice in TE where that half is the longer one, else not at all', () => {
    const early = { ...planar, partialFourierPhase: 0.51, parallelFactorPhase: 2 };
    const difference = (given: GivenParameters) =>
      fastest('echo-planar-spin-echo/2D', { ...given, flowCompensation: true }).echoTimeMs -
      fastest('echo-planar-spin-echo/2D', given).echoTimeMs;
    expect(difference(early)).toBeCloseTo(2 * prephaseMs, 5);
    expect(difference(planar)).toBeCloseTo(0, 9);
  });
});

describe('diffusion weighting in an echo-planar spin echo', () => {
  it('puts a lobe on either side of the refocusing pulse: TE grows by two, whichever half is the longer one', () => {
    // 4 ms is the refocusing pulse of this class; the lobe itself is held by Stejskal & Tanner, J Chem Phys 1965;42:288.
    const lobe = diffusionLobeMs(1000, 4, scanner);
    const diffusion = { bValuesSPerMm2: [0, 1000], directions: 3, averages: [1, 1] };
    for (const lines of [planar, { ...planar, partialFourierPhase: 0.51, parallelFactorPhase: 2 }]) {
      const more =
        fastest('echo-planar-spin-echo/2D', { ...lines, diffusion }).echoTimeMs - fastest('echo-planar-spin-echo/2D', lines).echoTimeMs;
      expect(more).toBeCloseTo(2 * lobe, 9);
    }
  });
});

describe('the shortest cycle of an inversion-prepared gradient echo', () => {
  const cycle = (given: GivenParameters) =>
    fastest('inversion-prepared-gradient-echo/3D', { sliceCount: 160, sliceThicknessMm: 1, ...given }).repetitionTimeMs;

  it('is TI and the readouts after the centre: 80 of 160 at 7 ms', () => {
    expect(cycle({ inversionTimeMs: 900 })).toBeCloseTo(900 + 80 * 7, 9);
    expect(cycle({ inversionTimeMs: undefined })).toBeCloseTo(80 * 7, 9);
  });

  it('is never shorter than TI, even where a file says fewer readouts than lie before the centre', () => {
    expect(cycle({ inversionTimeMs: 900, echoTrainLength: 10 })).toBeCloseTo(900, 9);
  });
});
