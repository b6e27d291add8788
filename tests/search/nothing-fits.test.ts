import { describe, expect, it } from 'vitest';
import { type ClassKey, classKeys } from '../../src/calc/classes.js';
import { judgePoint } from '../../src/search/judge.js';
import { latticeSize } from '../../src/search/lattice.js';
import { bindersOf, crossedBy, without } from '../../src/search/limit-sets.js';
import { limitedValue } from '../../src/search/limits.js';
import { nothingFits } from '../../src/search/nothing-fits.js';
import type { SearchProblem } from '../../src/search/problem-to-solve.js';
import { search } from '../../src/search/search.js';
import { settingOf } from '../../src/search/setting.js';
import { liverProblem } from '../scenarios-search/problems.js';
import { Random } from './random.js';
import { randomProblem } from './random-problem.js';

function pointsOf(problem: SearchProblem): number[][] {
  let points: number[][] = [[]];
  for (const { values } of settingOf(problem).variables) points = points.flatMap((point) => values.map((_, i) => [...point, i]));
  return points;
}

/** The smallest sets of what stands in the way whose removal gives a way, by going through every point with everything removed. */
function byEnumeration(problem: SearchProblem): readonly string[] {
  const setting = settingOf(problem);
  const binders = bindersOf(setting);
  const free = settingOf(without(problem, binders));
  const sets = new Map<string, number>();
  for (const point of pointsOf(problem)) {
    const judged = judgePoint(free, point);
    if (!judged.isWay) continue;
    const crossed = crossedBy(binders, setting, judged).map(({ name }) => name);
    sets.set(crossed.join(' + '), crossed.length);
  }
  const smallest = Math.min(...sets.values());
  return smallest > 3 ? [] : [...sets].filter(([, size]) => size === smallest).map(([names]) => names);
}

/** A small random problem of a class whose limits are drawn tight until nothing fits; null where something always does. */
function tightProblem(key: ClassKey, seed: number): SearchProblem | null {
  const random = new Random(seed);
  let problem = randomProblem(key, random, 300);
  const { limits } = problem;
  for (let share = 1; share > 0.01; share *= 0.6) {
    problem = { ...problem, limits: Object.fromEntries(Object.entries(limits).map(([name, value]) => [name, value * share])) };
    if (latticeSize(settingOf(problem).variables) > 2000) return null;
    if (search(problem).ways.length === 0) return problem;
  }
  return null;
}

describe('what binds where nothing fits', () => {
  it.each(classKeys)('%s: the smallest sets, as going through every point finds them', (key) => {
    let seen = 0;
    for (let seed = 1; seed <= 8 && seen < 2; seed += 1) {
      const problem = tightProblem(key, seed * 31 + classKeys.indexOf(key));
      if (problem === null) continue;
      const { bindings, proven } = nothingFits(problem, {}, search(problem).nearest);
      const found = bindings.map(({ binders }) => binders.map(({ name }) => name).join(' + '));
      const expected = byEnumeration(problem);
      expect([...found].sort(), `seed ${seed}`).toEqual([...expected].sort());
      if (expected.length > 0) expect(proven).toBe(true);
      for (const { binders, way } of bindings) {
        const setting = settingOf(without(problem, binders));
        const { isWay, candidate } = judgePoint(setting, way.point);
        expect([isWay, candidate.rank < 2], `seed ${seed}`).toEqual([true, true]);
      }
      seen += 1;
    }
    expect(seen).toBeGreaterThan(0);
  });

  it('one limit alone: what is needed is the least that any point within the bands needs, however many settings it changes', () => {
    const problem = liverProblem({ holdS: 2 });
    const { bindings } = nothingFits(problem, {}, search(problem).nearest);
    const needs = bindings.find(({ binders }) => binders.length === 1 && binders[0]?.name === 'holdS')?.needs['holdS'];
    const setting = settingOf(problem);
    // The front runs along the time of a hold: its first point is the shortest way of the whole lattice.
    const [first] = search(problem).fronts.timeSnr;
    expect(needs).toBe(limitedValue('holdS', judgePoint(setting, first?.point ?? []).figures, {}));
  });

  it('tells how far it is, never backwards', () => {
    const shares: number[] = [];
    nothingFits(liverProblem({ holdS: 2 }), { progress: (share) => shares.push(share) });
    expect(shares.length).toBeGreaterThan(3);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(Math.max(...shares)).toBeLessThan(1);
  });

  it.each([0, 1, 40])('stopped at its question %d it gives what it has, not proven', (questions) => {
    let asked = 0;
    const stopped = () => {
      asked += 1;
      return asked > questions;
    };
    const { proven, bindings } = nothingFits(liverProblem({ holdS: 2 }), { stopped });
    expect(proven).toBe(false);
    for (const { binders } of bindings) expect(binders.map(({ name }) => name)).toContain('holdS');
  });

  it('says with proof that nothing helps where no limit is what stands in the way', () => {
    // The body is wider than what is encoded: unfolding fails, whatever is allowed.
    const problem = liverProblem({ holdS: 11 }, { body: { frontBackMm: 900, leftRightMm: 900 } });
    expect(search(problem).ways).toEqual([]);
    expect(nothingFits(problem)).toEqual({ bindings: [], proven: true });
  });
});
