import { Bests, bestsWithin } from './bests.js';
import type { WayKind } from './candidate.js';
import { Pulse, type SearchControl, SearchStopped } from './control.js';
import { judgePoint } from './judge.js';
import { changesOf } from './lattice.js';
import { type Binder, bindersOf, crossedBy, without } from './limit-sets.js';
import { limitedValue } from './limits.js';
import type { SearchProblem } from './problem-to-solve.js';
import { mostChanges } from './search.js';
import { tablesOf } from './search-tables.js';
import { type SearchSetting, settingOf } from './setting.js';
import { type Way, wayOf } from './way.js';
import { WholeLatticeSearch } from './whole-lattice.js';

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

/** Sets of more limits than this are not tried. */
const largestSet = 3;

/** Share of what is left that each search again is taken to be: how many there will be is not known before. */
const shareOfRest = 0.2;

/**
 * Whether removing some of what stands in the way gives a way, by searching again. What is known is not asked twice: more removed never forbids what
 * less allows, and a way that was found says exactly what it crosses.
 */
class Removals {
  readonly #allows: (readonly Binder[])[] = [];
  readonly #forbids: (readonly Binder[])[] = [];
  #done = 0;

  constructor(
    readonly setting: SearchSetting,
    readonly binders: readonly Binder[],
    private readonly control: SearchControl,
  ) {}

  /** Of what is removed, what a way that this allows crosses; null where nothing is allowed. */
  crossed(removed: readonly Binder[]): readonly Binder[] | null {
    const known = this.#allows.find((crossed) => isWithin(crossed, removed));
    if (known !== undefined) return known;
    if (this.#forbids.some((others) => isWithin(removed, others))) return null;
    const crossed = this.#search(removed);
    if (crossed === null) this.#forbids.push(removed);
    else this.#allows.push(crossed);
    return crossed;
  }

  /** What the first way that is found crosses of everything; null where there is none. */
  #search(removed: readonly Binder[]): readonly Binder[] | null {
    const setting = settingOf(without(this.setting.problem, removed));
    let seen: readonly number[] | null = null;
    let crossed: readonly Binder[] | null = null;
    const look = () => {
      const point = whole.result().nearest?.point ?? null;
      if (point === seen || point === null) return;
      seen = point;
      const judged = judgePoint(setting, point);
      if (judged.candidate.rank < 2) crossed = crossedBy(this.binders, this.setting, judged);
    };
    const { control } = this;
    const pulse = new Pulse({
      stopped: () => {
        look();
        return crossed !== null || control.stopped?.() === true;
      },
      progress: (share) => {
        this.report(share);
      },
    });
    const whole: WholeLatticeSearch = new WholeLatticeSearch(tablesOf(setting), pulse, { fronts: false, nearest: true, count: false });
    try {
      whole.run();
      look();
    } catch (error) {
      if (!(error instanceof SearchStopped) || crossed === null) throw error;
    }
    this.#done += 1;
    this.report(0);
    return crossed;
  }

  /** Tells how far all of it is, with this share of the search on its way. */
  report(share: number): void {
    this.control.progress?.(1 - (1 - shareOfRest) ** (this.#done + share));
  }
}

function isWithin(some: readonly Binder[], all: readonly Binder[]): boolean {
  return some.every((one) => all.includes(one));
}

/**
 * All sets of so many of `rest` that give a way together with `chosen`, where no smaller ones do. Where not even all of `rest` give one, none of its
 * sets is tried; else what the way that was found crosses is taken out and asked for apart, and the rest together.
 */
function setsThatGive(removals: Removals, chosen: readonly Binder[], rest: readonly Binder[], size: number): (readonly Binder[])[] {
  if (rest.length < size) return [];
  const crossed = removals.crossed([...chosen, ...(size === 0 ? [] : rest)]);
  if (crossed === null) return [];
  if (rest.length === size || size === 0) return [[...chosen, ...rest.slice(0, size)]];
  const first = rest.find((one) => crossed.includes(one)) ?? (rest[0] as Binder);
  const others = rest.filter((one) => one !== first);
  return [...setsThatGive(removals, [...chosen, first], others, size - 1), ...setsThatGive(removals, chosen, others, size)];
}

/** Sets in the order of what stands in the way: limits of the patient first. */
function inOrder(sets: readonly (readonly Binder[])[], binders: readonly Binder[]): readonly (readonly Binder[])[] {
  const places = (set: readonly Binder[]) => set.map((one) => binders.indexOf(one)).sort((a, b) => a - b);
  return sets
    .map((set) => places(set))
    .sort((a, b) => a.map((place, i) => place - (b[i] as number)).find((difference) => difference !== 0) ?? 0)
    .map((set) => set.map((place) => binders[place] as Binder));
}

/** The question whose best way needs least of what was removed. */
function questionFor(binder: Binder): WayKind {
  if (binder.kind === 'limit') return binder.key === 'holdS' || binder.key === 'timeS' ? 'shortest' : 'least-rf';
  if (binder.kind === 'band' && binder.figure === 'relativeSnr') return 'best-signal';
  return binder.kind === 'band' && binder.figure === 'relativeContrast' ? 'best-contrast' : 'closest';
}

/** Best way of a problem for a question: of up to three changes, where none of those fits of the smallest number that does. */
function bestFor(problem: SearchProblem, kind: WayKind, mostAtAll: number, control: SearchControl): readonly number[] | null {
  const setting = settingOf(problem);
  const tables = tablesOf(setting);
  const pulse = new Pulse(control.stopped === undefined ? {} : { stopped: control.stopped });
  const bests = new Bests();
  for (let most = Math.min(mostChanges, mostAtAll); !bests.any && most <= mostAtAll; most += 1) bestsWithin(tables, most, bests, pulse);
  const best = bests.best(kind, 0) ?? bests.best(kind, 1) ?? bests.best('closest', 0) ?? bests.best('closest', 1);
  return best?.point ?? null;
}

/**
 * The way that needs least of the removed limits. Where they are all limits of the patient and no other is left, that is exact over the whole lattice:
 * the nearest way says how far every limit has to be raised; one of up to three changes that needs no more is shown in its place.
 */
function wayNeedingLeast(original: SearchSetting, removed: readonly Binder[], nearest: Way | null, control: SearchControl): Way | null {
  const { problem } = original;
  const kind = questionFor(removed[0] as Binder);
  const limits = bindersOf(original).filter((binder) => binder.kind === 'limit');
  const onlyLimits = removed.every((binder) => binder.kind === 'limit') && removed.length === limits.length;
  if (onlyLimits && nearest !== null) {
    const excess = Math.max(
      ...limits.map(({ key }) => {
        const value = limitedValue(key, nearest.figures, problem.readings);
        return (value ?? Number.POSITIVE_INFINITY) / (problem.limits[key] as number);
      }),
    );
    const raised = Object.fromEntries(limits.map(({ key }) => [key, (problem.limits[key] as number) * excess]));
    const point = Number.isFinite(excess)
      ? bestFor({ ...problem, limits: raised }, kind, Math.min(mostChanges, changesOf(nearest.point)), control)
      : null;
    return wayOf(original, kind, point ?? nearest.point);
  }
  const point = bestFor(without(problem, removed), kind, original.variables.length, control);
  // What is to spare, and by how much it is over, is said of the limits as they were given.
  return point === null ? null : wayOf(original, kind, point);
}

/** What the way needs of each removed limit. */
function needsOf(way: Way, binders: readonly Binder[], { problem }: SearchSetting): Record<string, number | null> {
  const { figures, parameters } = way;
  return Object.fromEntries(
    binders.map((binder) => {
      if (binder.kind === 'limit') return [binder.name, limitedValue(binder.key, figures, problem.readings)];
      if (binder.kind === 'band') return [binder.name, figures[binder.figure]];
      const { figure, parameter } = binder.mustKeep;
      const value = figure !== undefined ? figures[figure] : parameter !== undefined ? parameters[parameter] : null;
      return [binder.name, typeof value === 'number' ? value : null];
    }),
  );
}

/**
 * Where nothing fits: the smallest sets of limits whose removal gives a way, each by searching again, with the way that needs least of them.
 * Limits of the patient come first, then bands, then must-keeps. `nearest` is what the search that found nothing came nearest to.
 * Without bindings and proven: no way exists even without all of them.
 */
export function nothingFits(problem: SearchProblem, control: SearchControl = {}, nearest: Way | null = null): NothingFits {
  const original = settingOf(problem);
  const binders = bindersOf(original);
  const removals = new Removals(original, binders, control);
  const bindings: Binding[] = [];
  try {
    if (removals.crossed(binders) === null) return { bindings, proven: true };
    for (let size = 1; size <= Math.min(largestSet, binders.length) && bindings.length === 0; size += 1) {
      for (const set of inOrder(setsThatGive(removals, [], binders, size), binders)) {
        const way = wayNeedingLeast(original, set, nearest, control);
        if (way !== null) bindings.push({ binders: set, way, needs: needsOf(way, set, original) });
      }
    }
  } catch (error) {
    if (!(error instanceof SearchStopped)) throw error;
    return { bindings, proven: false };
  }
  return { bindings, proven: bindings.length > 0 };
}
