import type { FigureKey } from '../calc/figures.js';
import type { MustKeep } from '../study/study.js';
import { Bests, bestsWithin } from './bests.js';
import type { WayKind } from './candidate.js';
import { Pulse, type SearchControl, SearchStopped } from './control.js';
import { judgePoint } from './judge.js';
import { type LimitKey, limitedValue, limitKeys } from './limits.js';
import type { SearchProblem } from './problem-to-solve.js';
import { mostChanges } from './search.js';
import { tablesOf } from './search-tables.js';
import { type SearchSetting, settingOf } from './setting.js';
import { type Way, wayOf } from './way.js';
import { WholeLatticeSearch } from './whole-lattice.js';

/** Something that may stand in the way: a limit of the patient, a band, or a must-keep. */
export type Binder =
  | { readonly kind: 'limit'; readonly key: LimitKey; readonly name: string }
  | { readonly kind: 'band'; readonly figure: FigureKey; readonly name: string }
  | { readonly kind: 'must keep'; readonly mustKeep: MustKeep; readonly name: string };

/** A smallest set of limits whose removal gives a way. */
export interface Binding {
  readonly binders: readonly Binder[];
  /** The way that needs least of what was removed. */
  readonly way: Way;
  /** What the way needs of each removed limit, in its own unit; null for a must-keep that is a rule. */
  readonly needs: Readonly<Record<string, number | null>>;
}

export interface NothingFits {
  readonly bindings: readonly Binding[];
  /** False where the search was stopped, or larger sets than three would have to be tried. */
  readonly proven: boolean;
}

/** A limit so high that it never binds, while what only a cap opens stays open. */
const never = 1e9;

/** Sets of more limits than this are not tried. */
const largestSet = 3;

function mustKeepName({ figure, parameter, rule, atMost, atLeast, between }: MustKeep): string {
  const name = figure ?? parameter;
  if (name === undefined) return rule ?? '';
  const parts = [
    ...(atMost === undefined ? [] : [`<= ${atMost}`]),
    ...(atLeast === undefined ? [] : [`>= ${atLeast}`]),
    ...(between === undefined ? [] : [`between ${between[0]} and ${between[1]}`]),
  ];
  return `${name} ${parts.join(' and ')}`;
}

/** Everything that may stand in the way of a problem, limits of the patient first. */
function bindersOf(problem: SearchProblem): Binder[] {
  return [
    ...limitKeys.filter((key) => problem.limits[key] !== undefined).map((key): Binder => ({ kind: 'limit', key, name: key })),
    ...(Object.keys(problem.bands) as FigureKey[]).map((figure): Binder => ({ kind: 'band', figure, name: figure })),
    ...problem.series.mustKeep.map((mustKeep): Binder => ({ kind: 'must keep', mustKeep, name: mustKeepName(mustKeep) })),
  ];
}

/** The problem without some of what stands in the way. */
function without(problem: SearchProblem, binders: readonly Binder[]): SearchProblem {
  const limits: Record<string, number | undefined> = { ...problem.limits };
  const bands: Record<string, number | undefined> = { ...problem.bands };
  let { mustKeep } = problem.series;
  for (const binder of binders) {
    if (binder.kind === 'limit') limits[binder.key] = never;
    else if (binder.kind === 'band') delete bands[binder.figure];
    else mustKeep = mustKeep.filter((one) => one !== binder.mustKeep);
  }
  return {
    ...problem,
    limits: limits as SearchProblem['limits'],
    bands: bands as SearchProblem['bands'],
    series: { ...problem.series, mustKeep },
  };
}

/** All sets of so many of these, in order. */
function setsOf<T>(items: readonly T[], size: number): T[][] {
  if (size === 0) return [[]];
  return items.flatMap((item, i) => setsOf(items.slice(i + 1), size - 1).map((rest) => [item, ...rest]));
}

/** True when some point of the whole lattice is within all limits. */
function hasWay(setting: SearchSetting, control: SearchControl): boolean {
  const whole = new WholeLatticeSearch(tablesOf(setting), new Pulse(stopOnly(control)), { fronts: false, nearest: true, count: false });
  whole.run();
  const { nearest } = whole.result();
  return nearest !== null && judgePoint(setting, nearest.point).candidate.rank < 2;
}

function stopOnly({ stopped }: SearchControl): SearchControl {
  return stopped === undefined ? {} : { stopped };
}

/** The question whose best way needs least of what was removed. */
function questionFor(binder: Binder): WayKind {
  if (binder.kind === 'limit') return binder.key === 'holdS' || binder.key === 'timeS' ? 'shortest' : 'least-rf';
  if (binder.kind === 'band' && binder.figure === 'relativeSnr') return 'best-signal';
  return binder.kind === 'band' && binder.figure === 'relativeContrast' ? 'best-contrast' : 'closest';
}

function wayWithout(setting: SearchSetting, original: SearchSetting, binders: readonly Binder[], control: SearchControl): Way | null {
  const tables = tablesOf(setting);
  const pulse = new Pulse(stopOnly(control));
  const bests = new Bests();
  for (let most = Math.min(mostChanges, setting.variables.length); !bests.any && most <= setting.variables.length; most += 1)
    bestsWithin(tables, most, bests, pulse);
  const kind = questionFor(binders[0] as Binder);
  const best = bests.best(kind, 0) ?? bests.best(kind, 1) ?? bests.best('closest', 0) ?? bests.best('closest', 1);
  // What is to spare, and by how much it is over, is said of the limits as they were given.
  return best === null ? null : wayOf(original, kind, best.point);
}

/** What the way needs of each removed limit. */
function needsOf(way: Way, binders: readonly Binder[], setting: SearchSetting): Record<string, number | null> {
  const { figures, parameters } = way;
  return Object.fromEntries(
    binders.map((binder) => {
      if (binder.kind === 'limit') return [binder.name, limitedValue(binder.key, figures, setting.problem.readings)];
      if (binder.kind === 'band') return [binder.name, figures[binder.figure]];
      const { figure, parameter } = binder.mustKeep;
      const value = figure !== undefined ? figures[figure] : parameter !== undefined ? parameters[parameter] : null;
      return [binder.name, typeof value === 'number' ? value : null];
    }),
  );
}

/**
 * Where nothing fits: the smallest sets of limits whose removal gives a way, each by searching again, with the way that needs least of them.
 * Limits of the patient come first, then bands, then must-keeps.
 */
export function nothingFits(problem: SearchProblem, control: SearchControl = {}): NothingFits {
  const binders = bindersOf(problem);
  const bindings: Binding[] = [];
  const original = settingOf(problem);
  try {
    for (let size = 1; size <= Math.min(largestSet, binders.length) && bindings.length === 0; size += 1) {
      const sets = setsOf(binders, size);
      sets.forEach((set, i) => {
        control.progress?.(i / sets.length);
        const setting = settingOf(without(problem, set));
        if (!hasWay(setting, control)) return;
        const way = wayWithout(setting, original, set, control);
        if (way !== null) bindings.push({ binders: set, way, needs: needsOf(way, set, setting) });
      });
    }
  } catch (error) {
    if (!(error instanceof SearchStopped)) throw error;
    return { bindings, proven: false };
  }
  return { bindings, proven: bindings.length > 0 || binders.length <= largestSet };
}
