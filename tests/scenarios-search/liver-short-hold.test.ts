import { describe, expect, it } from 'vitest';
import { same } from '../../src/calc/rounding.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { judgePoint } from '../../src/search/judge.js';
import { search } from '../../src/search/search.js';
import { type SearchSetting, settingOf } from '../../src/search/setting.js';
import { liverProblem } from './problems.js';

const problem = liverProblem({ holdS: 11 });
const setting = settingOf(problem);
const result = search(problem);

/** The point of the lattice that sets these values, or null where one of them is no step of it. */
function pointOf({ variables }: SearchSetting, given: GivenParameters): number[] | null {
  const point = variables.map(({ key, values }) =>
    given[key] === undefined ? 0 : values.findIndex((value) => same(value as number, given[key] as number)),
  );
  return point.includes(-1) ? null : point;
}

/** True when a way or a point of the front is as quick and has as much signal. */
function matched(timeS: number, snr: number): boolean {
  return result.fronts.timeSnr.some((point) => point.timeS <= timeS * (1 + 1e-9) && point.value >= snr * (1 - 1e-9));
}

describe('3 T liver, arterial phase of 17 s, a patient who holds 11 s: ways', () => {
  it('finds ways of every kind, each within the hold, and proves them', () => {
    expect(result.proven).toBe(true);
    expect(new Set(result.ways.map(({ kind }) => kind))).toEqual(
      new Set(['closest', 'best-signal', 'sharpest', 'shortest', 'best-contrast', 'fewest-changes']),
    );
    for (const { figures, verdict, changed } of result.ways) {
      expect(figures.holdTimeS).toBeLessThanOrEqual(11);
      expect(verdict).toBe((figures.holdTimeS as number) <= 11 * 0.95 ? 'FITS' : 'TOO CLOSE');
      expect(changed).toBeLessThanOrEqual(3);
    }
  });

  it.each<[string, GivenParameters]>([
    ['4 mm and 6/8 along phase', { sliceThicknessMm: 4, partialFourierPhase: 0.75 }],
    ['5 mm, as thick as may be', { sliceThicknessMm: 5 }],
  ])('%s is a way, and the front is at least as good', (_words, given) => {
    const point = pointOf(setting, given);
    expect(point).not.toBeNull();
    const { isWay, candidate } = judgePoint(setting, point as number[]);
    expect([isWay, candidate.rank < 2]).toEqual([true, true]);
    expect(matched(candidate.timeS, candidate.snr as number)).toBe(true);
  });

  it('5 mm alone stands among the ways that change one setting, too close, with 44 slices', () => {
    const way = result.ways.find(({ changes }) => changes.sliceThicknessMm?.to === 5 && Object.keys(changes).length === 2);
    expect([way?.changes.sliceCount?.to, way?.verdict, way?.changed]).toEqual([44, 'TOO CLOSE', 1]);
  });

  it('slices follow thickness at constant coverage: 54, 48 and 44', () => {
    const thickness = setting.variables.find(({ key }) => key === 'sliceThicknessMm');
    const counts = new Map(thickness?.values.map((mm, i) => [mm, thickness.sliceCounts?.[i]]));
    expect([counts.get(4), counts.get(4.5), counts.get(5)]).toEqual([54, 48, 44]);
  });

  it.each<[string, GivenParameters]>([
    ['R 3 alone: 11.5 s', { parallelFactorPhase: 3 }],
    ['4.5 mm alone: 11.4 s', { sliceThicknessMm: 4.5 }],
    ['6 mm: thicker than must be kept', { sliceThicknessMm: 6 }],
  ])('the trap %s is not offered', (_words, given) => {
    const point = pointOf(setting, given);
    if (point !== null) {
      const { isWay, candidate } = judgePoint(setting, point);
      expect(isWay && candidate.rank < 2).toBe(false);
    }
    const keys = Object.keys(given);
    const offered = result.ways.some(
      ({ changes }) =>
        Object.keys(changes)
          .filter((key) => key !== 'sliceCount')
          .join() === keys.join() && keys.every((key) => changes[key as 'sliceThicknessMm']?.to === given[key as 'sliceThicknessMm']),
    );
    expect(offered).toBe(false);
  });

  it('never splits the timed phase, and says that all phases change together and what may restore the preset', () => {
    for (const { parameters, changes, cautions } of result.ways) {
      expect([parameters.rounds, changes.rounds]).toEqual([1, undefined]);
      expect(cautions.some(({ code, text }) => code === 'phases-must-match' && /oxygen/i.test(text))).toBe(true);
    }
  });

  it('partial Fourier in two directions says what it leaves out', () => {
    for (const { parameters: p, cautions } of result.ways) {
      const both = p.partialFourierPhase < 1 && p.partialFourierSlice < 1;
      expect(cautions.some(({ code }) => code === 'partial-fourier-two-directions')).toBe(both);
    }
  });
});
