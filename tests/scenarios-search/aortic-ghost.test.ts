import { describe, expect, it } from 'vitest';
import { judgePoint } from '../../src/search/judge.js';
import { search } from '../../src/search/search.js';
import { settingOf } from '../../src/search/setting.js';
import { inventedSeries, problemOf } from './problems.js';

/** Axial 3D of 17 s with phase along AP, 300 mm of 400: an aortic ghost lies over the left lobe. */
const axial = inventedSeries(
  'spoiled-gradient-echo/3D',
  {
    repetitionTimeMs: 3.55,
    echoTimeMs: 1.2,
    flipAngleDeg: 10,
    pixelBandwidthHz: 635,
    fieldOfViewMm: 400,
    phaseFieldOfViewPercent: 75,
    matrixRead: 320,
    matrixPhase: 212,
    sliceCount: 72,
    sliceThicknessMm: 3,
    sliceOversamplingPercent: 11,
    partialFourierSlice: 0.75,
    parallelFactorPhase: 2,
    pacing: { kind: 'breath-hold' },
  },
  {},
);

describe('an aortic ghost: phase swapped by hand from AP to RL', () => {
  const swapped = { phaseDirection: 'RL', phaseFieldOfViewPercent: 100 } as const;

  it.each([11, 15])('the swap alone, 22.7 s, is over a hold of %d s', (holdS) => {
    const setting = settingOf(problemOf(axial, 3, { holdS }, { set: swapped }));
    const { figures, candidate } = judgePoint(
      setting,
      setting.variables.map(() => 0),
    );
    expect(figures.holdTimeS).toBeCloseTo(22.6, 0);
    expect(candidate.rank).toBe(2);
  });

  it('a search never swaps phase by itself, and keeps what was set by hand in every way', () => {
    const free = search(problemOf(axial, 3, { holdS: 15 }));
    expect(free.ways.every(({ changes }) => changes.phaseDirection === undefined)).toBe(true);
    const { ways } = search(problemOf(axial, 3, { holdS: 15 }, { set: swapped }));
    expect(ways.length).toBeGreaterThan(0);
    for (const { changes, changed } of ways) {
      expect(changes.phaseDirection).toEqual({ from: 'AP', to: 'RL' });
      expect(changed).toBeLessThanOrEqual(3);
    }
  });
});
