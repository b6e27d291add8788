import type { PlannedSeries } from '../../search/budget.js';
import { type Change, type Command, edit, move, neighbour, only, open, say } from '../change.js';
import { budgetKey, budgetProblemOf } from '../search-problem.js';
import type { State } from '../state.js';

/** Opens the plan of the session into the minutes left, and asks for it where it is not known yet. */
export const showBudget: Command = (state) => {
  const problem = budgetProblemOf(state);
  if (problem === null) return only(say(state, 'No minutes are said: p, then time left', 'trouble'));
  if (problem.minutes <= 0) return only(say(state, "The patient's time is over: nothing is left to plan", 'trouble'));
  if (problem.study.series.length === problem.done.length) return only(say(state, 'No series is still to do'));
  const shown = open(state, 'budget');
  const key = budgetKey(problem);
  if (state.plan?.key === key && state.plan.trouble === null) return only(shown);
  const ask = state.asks + 1;
  // One worker serves both: a search that is on its way gives way.
  const { search: searching, carry: _carrying, ...others } = state.open;
  const next: State = {
    ...shown,
    asks: ask,
    open: { ...others, plan: ask },
    search: searching === undefined ? state.search : null,
    plan: { key, ask, answer: null, trouble: null, other: false },
  };
  return [next, [{ kind: 'plan', ask, problem }]] satisfies Change;
};

/** The plan that is looked at. */
export function planHere({ plan }: State): readonly PlannedSeries[] {
  if (plan?.answer == null) return [];
  return plan.other && plan.answer.alternative !== null ? plan.answer.alternative.plan : plan.answer.plan;
}

/** The line of the plan under the hand. */
export function plannedHere(state: State): PlannedSeries | undefined {
  const rows = planHere(state);
  return rows.find(({ series }) => series.id === state.place.seriesId) ?? rows[0];
}

export const moveInBudget =
  (by: number): Command =>
  (state) => {
    const here = plannedHere(state)?.series.id;
    const next = neighbour(planHere(state), ({ series }) => series.id === here, by);
    return only(next === undefined ? state : move({ ...state, notice: null }, { seriesId: next.series.id }));
  };

/** The other plan, where one keeps nearly as much. */
export const otherPlan: Command = (state) => {
  const { plan } = state;
  if (plan?.answer?.alternative == null) return only(say(state, 'No other plan keeps nearly as much'));
  return only({ ...state, notice: null, plan: { ...plan, other: !plan.other } });
};

/** Takes the plan: what it shortens is set, what it gives up is skipped; one step that can be undone. */
export const takePlan: Command = (state) => {
  const rows = planHere(state);
  if (rows.length === 0) return only(say(state, 'No plan to take yet', 'trouble'));
  const shortened = rows.filter(({ choice }) => choice === 'shortened');
  const skipped = rows.filter(({ choice }) => choice === 'skipped');
  if (shortened.length + skipped.length === 0) return only(say(state, 'Everything fits as it is: nothing to take'));
  const parts = [
    ...(shortened.length === 0 ? [] : [`${shortened.map(({ series }) => series.id).join(', ')} shortened`]),
    ...(skipped.length === 0 ? [] : [`${skipped.map(({ series }) => series.id).join(', ')} skipped`]),
  ];
  const next = edit(state, `Plan taken: ${parts.join('; ')}`, (session) => ({
    ...session,
    series: session.series.map((series) => {
      const row = rows.find(({ series: { id } }) => id === series.id);
      if (row === undefined || series.state !== 'to-do') return series;
      if (row.choice === 'skipped') return { ...series, state: 'not-done' as const, run: null };
      return row.choice === 'shortened' ? { ...series, set: row.given } : series;
    }),
  }));
  return only({ ...open(next, 'order'), notice: next.notice });
};

/** Leaves the plan; one that is still worked out is ended. */
export const leaveBudget: Command = (state) => {
  const back = open(state, 'order');
  const { plan, open: asked } = state;
  if (plan === null || asked.plan !== plan.ask) return only(back);
  const { plan: _gone, ...rest } = asked;
  return [{ ...back, plan: null, open: rest }, [{ kind: 'stop-search' }]];
};
