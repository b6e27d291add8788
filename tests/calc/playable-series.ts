import fc from 'fast-check';
import { type ClassKey, classKeys, classRow } from '../../src/calc/classes.js';
import type { GivenParameters, Series } from '../../src/calc/series.js';
import { seriesOf } from './series-of.js';

/** Fixed, so that a failure can be repeated; it stands in the names of the tests. */
export const seed = 20240517;

/** Invented timing that each class can play, with room for edits. */
export const timing: Readonly<Record<ClassKey, GivenParameters>> = {
  'spin-echo/2D': { repetitionTimeMs: 900, echoTimeMs: 15 },
  'spin-echo/3D': { repetitionTimeMs: 300, echoTimeMs: 15 },
  'fast-spin-echo/2D': { repetitionTimeMs: 4000, echoTimeMs: 80, echoTrainLength: 16 },
  'fast-spin-echo/3D': { repetitionTimeMs: 2000, echoTimeMs: 80, echoTrainLength: 60 },
  'single-shot-fast-spin-echo/2D': { repetitionTimeMs: 1500, echoTimeMs: 80, averages: 2, echoTrainLength: 160 },
  'rotating-strip-fast-spin-echo/2D': { repetitionTimeMs: 4000, echoTimeMs: 100, echoTrainLength: 20 },
  'spoiled-gradient-echo/2D': { repetitionTimeMs: 180, echoTimeMs: 3 },
  'spoiled-gradient-echo/3D': { repetitionTimeMs: 12, echoTimeMs: 3 },
  'balanced-steady-state/2D': { repetitionTimeMs: 5, echoTimeMs: 2.5 },
  'balanced-steady-state/3D': { repetitionTimeMs: 6, echoTimeMs: 3 },
  'inversion-prepared-gradient-echo/3D': { repetitionTimeMs: 2600, inversionTimeMs: 1000, echoTimeMs: 3 },
  'echo-planar-gradient-echo/2D': { repetitionTimeMs: 3000, echoTimeMs: 60, volumes: 20 },
  'echo-planar-spin-echo/2D': { repetitionTimeMs: 4000, echoTimeMs: 110, dummyShots: 1 },
};

/** Invented grid and slices to go with it. */
export const pace: GivenParameters = {
  matrixRead: 128,
  matrixPhase: 160,
  sliceCount: 12,
  sliceThicknessMm: 5,
  fieldOfViewMm: 240,
  pixelBandwidthHz: 300,
};

/** A series of any class with a few of its values drawn. */
export const anySeries: fc.Arbitrary<{ key: ClassKey; series: Series }> = fc
  .record({
    key: fc.constantFrom(...classKeys),
    averages: fc.integer({ min: 1, max: 4 }),
    matrixPhase: fc.integer({ min: 96, max: 160 }),
    partialFourierPhase: fc.constantFrom(1, 0.875, 0.75),
    parallelFactorPhase: fc.constantFrom(1, 2),
  })
  .map(({ key, ...drawn }) => {
    const own = Object.fromEntries(
      Object.entries(drawn).filter(([name]) => (classRow(key).parameters as readonly string[]).includes(name)),
    );
    return { key, series: seriesOf(key, { ...pace, ...timing[key], ...own }) };
  });
