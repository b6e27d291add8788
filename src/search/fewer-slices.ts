import { classRow } from '../calc/classes.js';
import { classOf } from '../calc/series.js';
import { Bests, bestsWithin } from './bests.js';
import type { Pulse } from './control.js';
import { isOpened } from './lattice.js';
import { hasRfCap } from './limits.js';
import type { SearchProblem } from './problem-to-solve.js';
import { tablesOf } from './search-tables.js';
import { settingOf } from './setting.js';
import { type Way, wayOf } from './way.js';

/**
 * Under an RF cap fewer slices in each TR are a way of their own, offered apart with the coverage they lose: the most slices that fit,
 * and the most that are too close. Not where coverage is opened (then they are part of the lattice), nor where slices do not share TR.
 */
export function fewerSlices(problem: SearchProblem, pulse: Pulse): Way[] {
  const { series, set, frozen } = problem;
  const row = classRow(classOf(series));
  const n = series.parameters.sliceCount;
  const apart = hasRfCap(problem.limits) && row.interleaving === 'interleaved' && !isOpened('sliceCount', problem);
  if (!apart || frozen || n < 2 || set.sliceCount !== undefined || series.locked.includes('sliceCount')) return [];
  const locked = row.parameters.filter((key) => key !== 'sliceCount');
  const counts = Array.from({ length: Math.floor(n / 2) }, (_, i) => n - 1 - i);
  const alone: SearchProblem = { ...problem, series: { ...series, locked, ranges: { sliceCount: counts } }, opened: ['sliceCount'] };
  const setting = settingOf(alone);
  const bests = new Bests();
  bestsWithin(tablesOf(setting), 1, bests, pulse);
  const ways: Way[] = [];
  for (const rank of [0, 1] as const) {
    const best = bests.best('closest', rank);
    // Nothing changed is no way of its own.
    if (best !== null && best.changes > 0) ways.push(wayOf(setting, 'fewest-changes', best.point));
  }
  return ways;
}
