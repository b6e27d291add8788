import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../../src/calc/classes.js';
import type { GivenParameters } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';

/**
 * A train or an echo under 180 degrees leaves longitudinal magnetisation z0 > 0 behind. With a TI that takes all the time that TR
 * leaves, fluid recovers to 1 - e^(-TI/T1) (1 + z0): still below zero where TI is short against T1, so that no TI nulls it
 * (inversion recovery; Bydder & Young 1985). A longer TR makes room for one, within what TR leaves.
 */
describe('the null of fluid in a cycle without room for it', () => {
  it.each<[string, ClassKey, GivenParameters, number, number]>([
    [
      'a train of 1000 ms',
      'fast-spin-echo/3D',
      { echoTimeMs: 100, echoTrainLength: 100, echoSpacingMs: 10, refocusingAngleDeg: 120, inversionTimeMs: 50 },
      1100,
      3000,
    ],
    ['an echo at 1000 ms', 'spin-echo/3D', { echoTimeMs: 1000, refocusingAngleDeg: 60, inversionTimeMs: 50 }, 1100, 4000],
    [
      '1400 ms of readouts',
      'inversion-prepared-gradient-echo/3D',
      { echoTimeMs: 3, inversionTimeMs: 730, sliceCount: 200, flipAngleDeg: 4 },
      1450,
      2450,
    ],
  ])('%s: none, and one when TR is longer', (_what, key, given, short, long) => {
    const nullOf = (repetitionTimeMs: number) =>
      edit(seriesOf(key, { ...given, repetitionTimeMs }, { nullTissue: 'CSF' })).figures.nullTimeMs;
    expect(nullOf(short)).toBeNull();
    expect(nullOf(long)).toBeGreaterThan(given.inversionTimeMs as number);
    expect(nullOf(long)).toBeLessThan(long);
  });
});
