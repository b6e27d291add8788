import { type Verdict, verdictMargin, verdictOf } from '../calc/verdict.js';
import { runningOrder } from '../study/running-order.js';
import type { Study, StudySeries } from '../study/study.js';
import { choicesOf, type GroupChoices, type GroupOption } from './budget-options.js';
import type { BudgetProblem, PlannedSeries } from './budget-problem.js';
import type { SearchControl } from './control.js';
import { bestPlan } from './knapsack.js';

export type { BudgetProblem, PlannedSeries } from './budget-problem.js';

export interface Budget {
  /** In running order; what is done is left out. */
  readonly plan: readonly PlannedSeries[];
  readonly totalS: number;
  /** What was counted for each planned series beside its own time, s. */
  readonly overheadS: number;
  readonly verdict: Verdict;
  /** Items of the minimum set that the plan leaves out. */
  readonly missing: readonly (string | readonly string[])[];
  /** Another plan that keeps nearly as much, where giving up a series and shortening are close; else null. */
  readonly alternative: { readonly plan: readonly PlannedSeries[]; readonly totalS: number } | null;
}

/** Kept quality under which two plans are close: 5 % (common practice, no source). */
const closeShare = 0.05;

const microseconds = (seconds: number) => Math.round(seconds * 1e6);

/** Series that change together, each group at the place of its first. */
function groupsOf(series: readonly StudySeries[]): StudySeries[][] {
  const groups: StudySeries[][] = [];
  for (const one of series) {
    const group = groups.find((others) => others.some((other) => other.pairedWith.includes(one.id) || one.pairedWith.includes(other.id)));
    if (group === undefined) groups.push([one]);
    else group.push(one);
  }
  return groups;
}

/** Items of the minimum set that are not served by what is kept or done. */
function missingOf(study: Study, kept: ReadonlySet<string>): (string | readonly string[])[] {
  return study.minimumSet.filter((item) => (typeof item === 'string' ? !kept.has(item) : !item.some((id) => kept.has(id))));
}

/** Weight of each series: the first of the running order counts most, each next one step less. */
function weightsOf(order: readonly StudySeries[]): Map<string, number> {
  const ranks = [...new Set(order.map(({ priority }) => priority))].sort((a, b) => a - b);
  return new Map(order.map(({ id, priority }) => [id, ranks.length - ranks.indexOf(priority)]));
}

interface Plan {
  readonly options: readonly GroupOption[];
  readonly totalUs: number;
  readonly value: number;
}

function totalOf(options: readonly GroupOption[]): Plan {
  return {
    options,
    totalUs: options.reduce((sum, { timeUs }) => sum + timeUs, 0),
    value: options.reduce((sum, { value }) => sum + value, 0),
  };
}

/** Everything as it stands; null where that is not allowed for some group, or takes too long. */
function allAsItIs(choices: readonly GroupChoices[], limitUs: number): Plan | null {
  const options = choices.map(({ asItIs }) => asItIs);
  if (!options.every((option) => option !== null)) return null;
  const plan = totalOf(options);
  return plan.totalUs > limitUs ? null : plan;
}

/** As everything stands, without one redundant group: what the study marks so is all that the minimum set does not need. */
function dropOne(choices: readonly GroupChoices[], budget: BudgetProblem, limitUs: number): Plan | null {
  if (budget.study.minimumSet.length === 0) return null;
  let best: Plan | null = null;
  for (const dropped of choices) {
    const options = choices.map((group) => (group === dropped ? group.skipped : group.asItIs));
    if (!options.every((option) => option !== null)) continue;
    const plan = totalOf(options);
    if (plan.totalUs > limitUs || missingOf(budget.study, keptIds(options, budget)).length > 0) continue;
    if (best === null || plan.value > best.value || (plan.value === best.value && plan.totalUs < best.totalUs)) best = plan;
  }
  return best;
}

function keptIds(options: readonly GroupOption[], budget: BudgetProblem): Set<string> {
  return new Set([...budget.done, ...options.filter(({ kept }) => kept).flatMap(({ ids }) => ids)]);
}

/**
 * Plans a session into the minutes that are left: of each series as it is, shortened along its time front within its bands, or skipped,
 * the choices that keep the minimum set and then most priority-weighted quality; exact over whole microseconds. Of plans that keep as much the one
 * with the better verdict, then with fewer changed settings. Where everything fits as it is nothing is changed, and where dropping one redundant
 * series is enough nothing is shortened.
 */
export function planBudget(budget: BudgetProblem, control: SearchControl = {}): Budget {
  const { study, minutes, done, overheadS } = budget;
  const order = runningOrder(study.series).filter(({ id }) => !done.includes(id));
  const weights = weightsOf(order);
  const groups = groupsOf(order);
  const choices = groups.map((group) => choicesOf(budget, group, weights, control));
  const limitS = minutes * 60;
  const limitUs = microseconds(limitS);
  const margins = { modelErrorPercent: budget.scanner.modelErrorPercent, hasTimeReading: false };
  const roomyUs = limitUs - microseconds(verdictMargin('session', limitS, margins));
  const solve = (): Plan => {
    const items = choices.map(({ ids, asItIs, shortened, skipped }, i) => {
      control.progress?.(i / choices.length);
      return { ids, options: [...(asItIs === null ? [] : [asItIs]), ...shortened(), skipped] };
    });
    const chosen = bestPlan(items, { limitUs, roomyUs }, study.minimumSet, new Set(done));
    return totalOf(chosen.map((at, i) => items[i]?.options[at] as GroupOption));
  };
  const unchanged = allAsItIs(choices, limitUs);
  const dropped = unchanged === null ? dropOne(choices, budget, limitUs) : null;
  const plan = unchanged ?? dropped ?? solve();
  const other = dropped === null ? null : solve();
  const close = other !== null && Math.abs(other.value - plan.value) <= closeShare * plan.value ? other : null;
  // Enough to spare stays enough.
  const settle = (chosen: Plan) => settled(chosen, order, overheadS, chosen.totalUs > roomyUs ? limitUs : roomyUs);
  const settledPlan = settle(plan);
  const { totalS } = settledPlan;
  return {
    ...settledPlan,
    overheadS,
    verdict: verdictOf('session', totalS, limitS, margins),
    missing: missingOf(study, keptIds(plan.options, budget)),
    alternative: close === null ? null : settle(close),
  };
}

/** A plan series by series. Time that is to spare goes into changing fewer settings, first things first. */
function settled(
  { options, totalUs }: Plan,
  order: readonly StudySeries[],
  overheadS: number,
  limitUs: number,
): NonNullable<Budget['alternative']> {
  let nowUs = totalUs;
  const all = options.flatMap((option) => {
    const series = option.planned((limitUs - nowUs) / 1e6);
    if (option.kept) nowUs += series.reduce((sum, { timeS }) => sum + microseconds(timeS) + microseconds(overheadS), 0) - option.timeUs;
    return series;
  });
  const plan = order.map((series) => ({ ...(all.find((one) => one.series.id === series.id) as PlannedSeries), series }));
  return { plan, totalS: nowUs / 1e6 };
}
