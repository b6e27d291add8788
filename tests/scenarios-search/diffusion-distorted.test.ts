import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../src/calc/scanner.js';
import { usualBands } from '../../src/search/bands.js';
import { search } from '../../src/search/search.js';
import { inventedSeries, problemOf } from './problems.js';

/** Liver diffusion at 3 T: 128 lines, spacing 0.6 ms, R 2; liver T2 taken as 80 ms. */
const dwi = inventedSeries(
  'echo-planar-spin-echo/2D',
  {
    repetitionTimeMs: 4800,
    echoTimeMs: 90,
    echoSpacingMs: 0.6,
    sliceCount: 20,
    sliceThicknessMm: 6,
    fieldOfViewMm: 380,
    matrixRead: 128,
    matrixPhase: 128,
    pixelBandwidthHz: 2000,
    parallelFactorPhase: 2,
    diffusion: { bValuesSPerMm2: [50, 800], directions: 3, averages: [1, 4] },
  },
  { tissueOverrides: { liver: { t2Ms: 80 } }, locked: ['sliceThicknessMm'] },
);
const straight = { ...usualBands, distortionPxPer100Hz: 0.7 };

describe('3 T liver diffusion, distorted: distortion at most 0.7 of the preset', () => {
  it('acceleration 3 is found: 2.6 px at 100 Hz, TE falls by itself, signal pays for noise', () => {
    const { ways } = search(problemOf(dwi, 3, {}, { bands: { ...straight, relativeContrast: 0.5 } }));
    const way = ways.find(({ changes }) => Object.keys(changes).join() === 'parallelFactorPhase');
    expect(way?.changes.parallelFactorPhase).toEqual({ from: 2, to: 3 });
    expect(way?.figures.distortionPxPer100Hz).toBeCloseTo(2.6, 1);
    expect(way?.carried.find(({ key }) => key === 'echoTimeMs')?.to).toBeCloseTo(77.2, 1);
  });

  it('a coil with too few elements along phase does not accelerate further', () => {
    const coil = {
      name: 'flat',
      elements: { AP: 2, RL: 8, HF: 4 },
      g: [
        { phase: 2, slice: 1, g: 1.1 },
        { phase: 3, slice: 1, g: 1.3 },
      ],
    };
    const { ways } = search(
      problemOf(dwi, 3, {}, { bands: { ...straight, relativeContrast: 0.5 }, scanner: { ...plainScanner(3), coil } }),
    );
    expect(ways.every(({ changes }) => changes.parallelFactorPhase === undefined)).toBe(true);
  });
});
