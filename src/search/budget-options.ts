import type { Figures } from '../calc/figures.js';
import { atMost } from '../calc/rounding.js';
import { pausesOf } from '../calc/time.js';
import type { StudySeries } from '../study/study.js';
import type { Bands } from './bands.js';
import { Bests, bestsWithin } from './bests.js';
import type { BudgetProblem, PlannedSeries } from './budget-problem.js';
import { grain } from './candidate.js';
import { Pulse, type SearchControl } from './control.js';
import type { FrontPoint } from './front.js';
import { judgePoint } from './judge.js';
import type { PlanOption } from './knapsack.js';
import { changesOf, pointParameters } from './lattice.js';
import { verdictsOf, worstRank } from './limits.js';
import type { SearchProblem } from './problem-to-solve.js';
import { tablesOf } from './search-tables.js';
import { type SearchSetting, settingOf } from './setting.js';
import { sideEffectBands } from './side-effects.js';
import { type Change, type Way, wayOf } from './way.js';
import { WholeLatticeSearch } from './whole-lattice.js';

/** One choice for a group of series that change together. */
export interface GroupOption extends PlanOption {
  readonly ids: readonly string[];
  readonly choice: PlannedSeries['choice'];
  /** What becomes of each series of the group, where so much time is to spare, s: it may go into changing fewer settings. */
  readonly planned: (spareS: number) => readonly PlannedSeries[];
}

/** What is kept of a series: 1 as it is, falling with the root of its balanced loss. */
function keptQuality(loss: number): number {
  return Math.exp(-Math.sqrt(loss));
}

const microseconds = (seconds: number) => Math.round(seconds * 1e6);

function problemFor(budget: BudgetProblem, series: StudySeries, bands: Bands): SearchProblem {
  const { scanner, body, rules, readings, study } = budget;
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

/** Settings of the series of a group, searched along the first. */
type GroupSettings = readonly [SearchSetting, ...SearchSetting[]];

/** A point of one series, judged for a plan; null where it is none. */
interface Priced {
  readonly setting: SearchSetting;
  readonly point: readonly number[];
  readonly timeS: number;
  readonly scanTimeS: number;
  readonly loss: number;
  /** Settings changed beyond what was set by hand. */
  readonly changes: number;
}

const startOf = ({ variables }: SearchSetting): number[] => variables.map(() => 0);

/** True where a held series is within what this patient holds. */
function isHeldLongEnough({ holdS }: BudgetProblem, { problem, margins }: SearchSetting, figures: Figures): boolean {
  if (holdS === undefined || holdS === null || figures.holdTimeS === null) return true;
  return worstRank(verdictsOf({ holdS }, figures, problem.readings, margins)) < 2;
}

function priced(budget: BudgetProblem, setting: SearchSetting, point: readonly number[], asItIs: boolean): Priced | null {
  const { figures, isWay, candidate } = judgePoint(setting, point);
  const { tableTimeS, scanTimeS } = figures;
  if (tableTimeS === null || scanTimeS === null || (!asItIs && !isWay) || !isHeldLongEnough(budget, setting, figures)) return null;
  const timeS = tableTimeS - pausesOf(budget.scanner).preparationS;
  if (budget.longestS !== null && !atMost(timeS, budget.longestS)) return null;
  const split = setting.problem.set.rounds !== budget.asSet?.[setting.problem.series.id]?.set.rounds;
  return { setting, point, timeS, scanTimeS, loss: asItIs ? 0 : candidate.loss, changes: changesOf(point) + (split ? 1 : 0) };
}

function asPlanned({ setting, point, timeS, loss }: Priced, choice: 'as it is' | 'shortened'): PlannedSeries {
  const { problem, variables } = setting;
  const way: Way | null = choice === 'as it is' ? null : wayOf(setting, 'shortest', point);
  return {
    series: problem.series,
    choice,
    changes: (way?.changes ?? {}) as Record<string, Change>,
    given: pointParameters(variables, point, problem.set),
    gives: way?.gives ?? [],
    timeS,
    loss,
  };
}

/** All series of a group at the values that a point of the first one sets; null where one of them cannot be acquired so. */
function pricedGroup(budget: BudgetProblem, settings: GroupSettings, point: readonly number[], asItIs: boolean): Priced[] | null {
  const all = settings.map((setting) => priced(budget, setting, sameChanges(settings[0], point, setting), asItIs));
  return all.every((one) => one !== null) ? all : null;
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

/** Parts of a plan tell no progress of their own. */
function stopOnly({ stopped }: SearchControl): SearchControl {
  return stopped === undefined ? {} : { stopped };
}

/** The front of scan time against balanced loss. */
function timeLossFront(setting: SearchSetting, control: SearchControl): readonly FrontPoint[] {
  const whole = new WholeLatticeSearch(tablesOf(setting), new Pulse(stopOnly(control)), { fronts: true, nearest: false, count: false });
  whole.run();
  return whole.result().timeLoss.points;
}

/**
 * Settings whose fronts hold every choice worth having. Rests between breath-holds count for the plan and not for the scan time that a front runs
 * along: where a series may be split into more holds, each split has a front of its own.
 */
function settingsPerSplit(budget: BudgetProblem, group: readonly StudySeries[], bands: Bands): GroupSettings[] {
  const settings = group.map((series) => settingOf(problemFor(budget, series, bands))) as unknown as GroupSettings;
  const splits = settings[0].variables.find(({ key }) => key === 'rounds');
  if (splits === undefined) return [settings];
  return splits.values.map((rounds, i) => {
    const fixed = settings.map(({ problem, variables }) => {
      const splits = variables.some(({ key, values }) => key === 'rounds' && values.indexOf(rounds) > 0);
      const locked = [...problem.series.locked, 'rounds' as const];
      return settingOf(
        i > 0 && splits
          ? { ...problem, set: { ...problem.set, rounds: rounds as number } }
          : { ...problem, series: { ...problem.series, locked } },
      );
    });
    return fixed as unknown as GroupSettings;
  });
}

/** True where a step can move what the bounds of side effects look at. */
function canGrow({ presetFigures, variables }: SearchSetting): boolean {
  return presetFigures.distortionPxPer100Hz !== null || variables.some(({ key }) => key === 'pixelBandwidthHz');
}

/** The choices of one group of series. What shortening gives is worked out when it is asked for: where everything fits nobody does. */
export interface GroupChoices {
  readonly ids: readonly string[];
  /** Null where the series, as they stand, are longer than any may be or than this patient holds. */
  readonly asItIs: GroupOption | null;
  readonly skipped: GroupOption;
  readonly shortened: () => readonly GroupOption[];
}

/** The choices of one group: as it is, along the time fronts of its first series, skipped. Paired series take the same changes. */
export function choicesOf(
  budget: BudgetProblem,
  group: readonly StudySeries[],
  weights: ReadonlyMap<string, number>,
  control: SearchControl,
): GroupChoices {
  const ids = group.map(({ id }) => id);
  const optionOf = (all: readonly Priced[], choice: GroupOption['choice'], planned: GroupOption['planned']): GroupOption => ({
    ids,
    choice,
    planned,
    kept: true,
    timeUs: all.reduce((sum, { timeS }) => sum + microseconds(timeS) + microseconds(budget.overheadS), 0),
    value: all.reduce((sum, { setting, loss }) => sum + (weights.get(setting.problem.series.id) ?? 0) * keptQuality(loss), 0),
    changes: all.reduce((sum, { changes }) => sum + changes, 0),
  });
  const start = group.map((series) => settingOf(problemFor(budget, series, budget.bands))) as unknown as GroupSettings;
  const unchanged = pricedGroup(budget, start, startOf(start[0]), true);
  const asItIsS = unchanged?.[0]?.timeS ?? Number.POSITIVE_INFINITY;
  const skipped = group.map(
    (series): PlannedSeries => ({ series, choice: 'skipped', changes: {}, given: {}, gives: [], timeS: 0, loss: 0 }),
  );
  return {
    ids,
    asItIs: unchanged === null ? null : optionOf(unchanged, 'as it is', () => unchanged.map((one) => asPlanned(one, 'as it is'))),
    skipped: { ids, choice: 'skipped', planned: () => skipped, kept: false, timeUs: 0, value: 0, changes: 0 },
    shortened: () =>
      shorterOnes(budget, group, asItIsS, canGrow(start[0]), control).map(({ settings, all }) =>
        optionOf(all, 'shortened', (spareS) =>
          fewestChanges(budget, settings, all, spareS, control).map((one) => asPlanned(one, 'shortened')),
        ),
      ),
  };
}

/** A point of the fronts, with the settings it belongs to. */
interface Shorter {
  readonly settings: GroupSettings;
  readonly all: readonly Priced[];
}

/** Points of the fronts shorter than a time. One that lets a side effect grow past its bound is there only where none without it is as short. */
function shorterOnes(
  budget: BudgetProblem,
  group: readonly StudySeries[],
  thanS: number,
  grows: boolean,
  control: SearchControl,
): readonly Shorter[] {
  const along = (bands: Bands, underS: number): Shorter[] =>
    settingsPerSplit(budget, group, bands).flatMap((settings) =>
      timeLossFront(settings[0], control).flatMap(({ point }) => {
        const all = pricedGroup(budget, settings, point, false);
        return all !== null && (all[0]?.timeS ?? underS) < underS ? [{ settings, all }] : [];
      }),
    );
  if (!grows) return along(budget.bands, thanS);
  const bounded = along({ ...sideEffectBands, ...budget.bands }, thanS);
  const shortestS = Math.min(thanS, ...bounded.map(({ all }) => all[0]?.timeS ?? thanS));
  return [...bounded, ...along(budget.bands, shortestS)];
}

/** A choice with as few changed settings as any that loses no more in this time: looked for among those of up to three changes. */
function fewestChanges(
  budget: BudgetProblem,
  settings: GroupSettings,
  found: readonly Priced[],
  spareS: number,
  control: SearchControl,
): readonly Priced[] {
  const [first] = found as [Priced];
  const timeS = (all: readonly Priced[]) => all.reduce((sum, one) => sum + one.timeS, 0);
  const atMostS = timeS(found) + spareS;
  const tables = tablesOf(settingOf({ ...settings[0].problem, limits: { timeS: first.scanTimeS + spareS } }));
  const pulse = new Pulse(stopOnly(control));
  for (let most = 1; most <= 3 && most < changesOf(first.point); most += 1) {
    const bests = new Bests();
    bestsWithin(tables, most, bests, pulse);
    for (const rank of [0, 1] as const) {
      const best = bests.best('closest', rank);
      if (best === null || grain(best.loss) > grain(first.loss)) continue;
      const all = pricedGroup(budget, settings, best.point, false);
      if (all !== null && timeS(all) <= atMostS && all.every(({ loss }, i) => grain(loss) <= grain((found[i] as Priced).loss))) return all;
    }
  }
  return found;
}
