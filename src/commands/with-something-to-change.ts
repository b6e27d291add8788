import { latticeOf } from '../search/lattice.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { type Attempt, refuse, wrongUse } from './attempt.js';
import { exitCodes } from './exit-codes.js';

/**
 * A problem in which a search may change something, or the reason why it may not: a preset that locks every value is bad data (65), values set
 * by hand that leave nothing are wrong use (64).
 */
export function withSomethingToChange(problem: SearchProblem): Attempt<SearchProblem> {
  if (latticeOf(problem).length > 0) return { ok: true, value: problem };
  const { series, set } = problem;
  const keys = Object.keys(set);
  if (keys.length > 0 && latticeOf({ ...problem, set: {} }).length > 0)
    return wrongUse(
      '--set',
      `--set gives every value that may change in ${series.id} (${keys.join(', ')}): nothing is left to search.`,
      'Leave one of them out, or name a parameter that may change with --open.',
    );
  return refuse(exitCodes.badData, {
    code: 'nothing-to-change',
    path: `series.${series.id}`,
    message: `Nothing may change in ${series.id}: its "locked" and "ranges" leave each parameter one value.`,
    hint: 'Unlock a parameter or widen a range in the preset, or name one with --open that is not locked.',
  });
}
