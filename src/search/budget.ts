import type { Body } from '../calc/body.js';
import type { Readings } from '../calc/reading.js';
import { atMost } from '../calc/rounding.js';
import type { Scanner } from '../calc/scanner.js';
import type { GivenParameters } from '../calc/series.js';
import { preparationS } from '../calc/time.js';
import { type Verdict, verdictOf } from '../calc/verdict.js';
import type { Rules } from '../study/must-keep.js';
import { runningOrder } from '../study/running-order.js';
import type { Study, StudySeries } from '../study/study.js';
import { balancedLoss } from './balanced-loss.js';
import type { Bands } from './bands.js';
import { Pulse, type SearchControl } from './control.js';
import { judgePoint } from './judge.js';
import { bestPlan, type PlanItem, type PlanOption } from './knapsack.js';
import { pointParameters } from './lattice.js';
import type { SearchProblem } from './problem-to-solve.js';
import { tablesOf } from './search-tables.js';
import { type SearchSetting, settingOf } from './setting.js';
import { type Change, wayOf } from './way.js';
import { WholeLatticeSearch } from './whole-lattice.js';

/** What a session is planned with. */
export interface BudgetProblem {
  readonly study: Study;
  readonly scanner: Scanner;
  readonly body: Body;
  readonly rules: Rules;
  readonly minutes: number;
  /** No series longer than this, s. */
  readonly longestS: number | null;
  /** Counted once for each planned series, s. */
  readonly overheadS: number;
  /** Ids that are done and take no more time. */
  readonly done: readonly string[];
  readonly bands: Bands;
  readonly readings: Readings;
  /** Values set by hand, and the scanner's numbers, of single series; from these the plan starts. */
  readonly asSet?: Readonly<Record<string, { readonly set: GivenParameters; readonly readings: Readings; readonly frozen: boolean }>>;
}

export type Choice = 'as it is' | 'shortened' | 'skipped';

/** What becomes of one series. */
export interface PlannedSeries {
  readonly series: StudySeries;
  readonly choice: Choice;
  readonly changes: Readonly<Record<string, Change>>;
  readonly given: GivenParameters;
  /** Time of the series with the rests between its breath-holds, without overhead, s; 0 when skipped. */
  readonly timeS: number;
  /** Balanced loss against its preset; 0 as it is, what was set by hand included: that was decided already. */
  readonly loss: number;
}

export interface Budget {
  /** In running order; what is done is left out. */
  readonly plan: readonly PlannedSeries[];
  readonly totalS: number;
  readonly verdict: Verdict;
  /** Items of the minimum set that the plan leaves out. */
  readonly missing: readonly (string | readonly string[])[];
  /** Another plan that keeps nearly as much, where giving up a series and shortening are close; else null. */
  readonly alternative: { readonly plan: readonly PlannedSeries[]; readonly totalS: number } | null;
}

/** Kept quality under which two plans are close: 5 % (common practice, no source). */
const closeShare = 0.05;

/** What is kept of a series: 1 as it is, falling with the root of its balanced loss. */
function keptQuality(loss: number): number {
  return Math.exp(-Math.sqrt(loss));
}

const microseconds = (seconds: number) => Math.round(seconds * 1e6);

/** One choice for a group of series that change together. */
interface GroupOption extends PlanOption {
  readonly planned: readonly PlannedSeries[];
}

function problemFor(budget: BudgetProblem, series: StudySeries): SearchProblem {
  const { scanner, body, rules, bands, readings, study } = budget;
  const own = budget.asSet?.[series.id];
  return {
    series,
    presetFieldT: study.fieldT,
    scanner,
    body,
    rules,
    limits: {},
    readings: own?.readings ?? readings,
    bands,
    set: own?.set ?? {},
    opened: [],
    frozen: own?.frozen ?? false,
  };
}

function planned(setting: SearchSetting, choice: 'as it is' | 'shortened', point: readonly number[]): PlannedSeries | null {
  const judged = judgePoint(setting, point);
  const { figures } = judged;
  if (choice === 'shortened' && !judged.isWay) return null;
  const timeS = (figures.tableTimeS ?? Number.POSITIVE_INFINITY) - preparationS;
  if (!Number.isFinite(timeS)) return null;
  const changes = choice === 'as it is' ? {} : (wayOf(setting, 'shortest', point).changes as Record<string, Change>);
  const loss = balancedLoss(figures, setting.presetFigures, false);
  return {
    series: setting.problem.series,
    choice,
    changes,
    given: pointParameters(setting.variables, point, setting.problem.set),
    timeS,
    loss: choice === 'as it is' ? 0 : loss,
  };
}

/** The choices of one group: as it is, along the time front of its first series, skipped. Paired series take the same changes. */
function optionsOf(
  budget: BudgetProblem,
  group: readonly StudySeries[],
  weights: ReadonlyMap<string, number>,
  control: SearchControl,
): GroupOption[] {
  const settings = group.map((series) => settingOf(problemFor(budget, series)));
  const first = settings[0] as SearchSetting;
  const options: GroupOption[] = [];
  const add = (all: readonly (PlannedSeries | null)[]) => {
    const series = all.filter((one): one is PlannedSeries => one !== null);
    if (series.length < all.length) return;
    if (budget.longestS !== null && series.some(({ timeS }) => !atMost(timeS, budget.longestS as number))) return;
    const value = series.reduce((sum, one) => sum + (weights.get(one.series.id) ?? 0) * keptQuality(one.loss), 0);
    const timeUs = series.reduce((sum, { timeS }) => sum + microseconds(timeS) + microseconds(budget.overheadS), 0);
    options.push({ timeUs, value, kept: true, planned: series });
  };
  add(
    settings.map((setting) =>
      planned(
        setting,
        'as it is',
        setting.variables.map(() => 0),
      ),
    ),
  );
  const whole = new WholeLatticeSearch(tablesOf(first), new Pulse(control.stopped === undefined ? {} : { stopped: control.stopped }), {
    fronts: true,
    nearest: false,
    count: false,
  });
  whole.run();
  const start = first.variables.map(() => 0);
  const asItIsS = judgePoint(first, start).figures.scanTimeS ?? Number.POSITIVE_INFINITY;
  for (const { point, timeS } of whole.result().timeLoss.points) {
    if (timeS >= asItIsS) continue;
    add(settings.map((setting) => planned(setting, 'shortened', sameChanges(first, point, setting))));
  }
  options.push({
    timeUs: 0,
    value: 0,
    kept: false,
    planned: group.map((series) => ({ series, choice: 'skipped', changes: {}, given: {}, timeS: 0, loss: 0 })),
  });
  return options;
}

/** The point of a paired series that sets what a point of the first one sets; where its lattice has no such value, the series stays as it is there. */
function sameChanges(first: SearchSetting, point: readonly number[], other: SearchSetting): number[] {
  if (first === other) return [...point];
  return other.variables.map(({ key, values }) => {
    const at = first.variables.findIndex((variable) => variable.key === key);
    const index = at < 0 ? 0 : (point[at] as number);
    return index === 0 ? 0 : Math.max(0, values.indexOf(first.variables[at]?.values[index] as never));
  });
}

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

/** As everything stands, without one redundant group: what the study marks so is all that the minimum set does not need. */
function dropOne(choices: readonly (readonly GroupOption[])[], budget: BudgetProblem, limitUs: number): Plan | null {
  if (budget.study.minimumSet.length === 0) return null;
  const asItIs = choices.map((options) => options.find(({ planned: series }) => series.every(({ choice }) => choice === 'as it is')));
  if (asItIs.includes(undefined)) return null;
  let best: Plan | null = null;
  for (let i = -1; i < choices.length; i += 1) {
    const options = asItIs.map((option, j) => (i === j ? (choices[j] as readonly GroupOption[]).at(-1) : option) as GroupOption);
    const plan = totalOf(options);
    if (plan.totalUs > limitUs || missingOf(budget.study, keptIds(options, budget)).length > 0) continue;
    if (i < 0) return plan;
    if (best === null || plan.value > best.value || (plan.value === best.value && plan.totalUs < best.totalUs)) best = plan;
  }
  return best;
}

function keptIds(options: readonly GroupOption[], budget: BudgetProblem): Set<string> {
  return new Set([
    ...budget.done,
    ...options.filter(({ kept }) => kept).flatMap(({ planned: series }) => series.map(({ series: one }) => one.id)),
  ]);
}

/**
 * Plans a session into the minutes that are left: of each series as it is, shortened along its time front within its bands, or skipped,
 * the choices that keep the minimum set and then most priority-weighted quality; exact over whole microseconds.
 * Where dropping one redundant series is enough nothing is shortened.
 */
export function planBudget(budget: BudgetProblem, control: SearchControl = {}): Budget {
  const { study, minutes, done } = budget;
  const order = runningOrder(study.series).filter(({ id }) => !done.includes(id));
  const weights = weightsOf(order);
  const groups = groupsOf(order);
  const choices = groups.map((group, i) => {
    control.progress?.(i / groups.length);
    return optionsOf(budget, group, weights, control);
  });
  const limitUs = microseconds(minutes * 60);
  const items: PlanItem[] = choices.map((options, i) => ({ options, ids: (groups[i] as StudySeries[]).map(({ id }) => id) }));
  const solve = (usable: readonly PlanItem[]): Plan => {
    const chosen = bestPlan(usable, limitUs, study.minimumSet, new Set(done));
    return totalOf(chosen.map((at, i) => (usable[i] as PlanItem).options[at] as GroupOption));
  };
  const dropped = dropOne(choices, budget, limitUs);
  const free = dropped?.options.every(({ kept }) => kept) ? dropped : solve(items);
  const plan = dropped ?? free;
  const other = dropped !== null && dropped !== free ? free : null;
  const close = other !== null && Math.abs(other.value - plan.value) <= closeShare * plan.value ? other : null;
  const totalS = plan.totalUs / 1e6;
  return {
    plan: inOrder(plan, order),
    totalS,
    verdict: verdictOf('session', totalS, minutes * 60, { modelErrorPercent: budget.scanner.modelErrorPercent, hasTimeReading: false }),
    missing: missingOf(study, keptIds(plan.options, budget)),
    alternative: close === null ? null : { plan: inOrder(close, order), totalS: close.totalUs / 1e6 },
  };
}

function inOrder({ options }: Plan, order: readonly StudySeries[]): PlannedSeries[] {
  const all = options.flatMap(({ planned: series }) => series);
  return order.map((series) => all.find((one) => one.series === series) as PlannedSeries);
}
