import { Bests, bestsWithin } from './bests.js';
import { type Candidate, comparePoints, outdoes, type WayKind, wayKinds } from './candidate.js';
import { Pulse, type SearchControl, SearchStopped } from './control.js';
import { fewerSlices } from './fewer-slices.js';
import type { Front, FrontPoint } from './front.js';
import { latticeSize } from './lattice.js';
import type { SearchProblem } from './problem-to-solve.js';
import { withBoundRules } from './rules-bound.js';
import { tablesOf } from './search-tables.js';
import { type SearchSetting, settingOf } from './setting.js';
import { type Way, wayOf } from './way.js';
import { WholeLatticeSearch } from './whole-lattice.js';

/*
 * How a search works.
 *
 * A lattice is the product of the values that a series' parameters may take (`lattice`, `lattice-values`). What makes one of its points a way is
 * stated once, by `resolveParameters` and `evaluate` (`judge`). Everything else here is a quicker path to the same numbers, held to it by a proof:
 * on random lattices of every class, equal to going through all points, to the last bit.
 *
 * Variables fall into three groups (`groups`). Lines (voxel, lines along phase and slice, averages) give a count of lines, which time follows, and an
 * SNR without signal. Signal (TR, angles, trains, pulses) gives the signals, contrast, blur, RF and the time of one shot. Shared variables touch both
 * (slices in 2D, bandwidth, read matrix) and are gone through one by one. A must-keep or band that ties lines to signal in a way no bound knows makes
 * all line variables shared: slower, and still exact. Trains that read all their lines in one go (single-shot, echo-planar, inversion-prepared) tell the
 * signal what it needs to know of the lines by the `train` of a bucket.
 *
 * `line-states` and `signal-states` compute each part once; `join` puts two parts together by the functions and in the order of `evaluate`.
 * A bucket holds line states with one voxel, one number of averages and one train: they differ in lines and noise alone. Phase and slice directions
 * are gone through apart (`line-parts`) and paired (`line-pairs`). Time never falls and noise never rises with lines, so a bucket needs its skyline
 * only; buckets whose lines come from the same parts share it, whatever their voxel (`line-shapes`).
 *
 * Bests (`bests`) go through all points that change at most three settings; where none of those fits, four, five... Fronts, the nearest way and the
 * count (`whole-lattice`) go over everything. Buckets and signals that can be played together are put together (`signal-groups`). Time against SNR needs
 * the envelope of all their lines (`snr-front`). Time against loss goes down a tree of buckets (`loss-front`, `bucket-tree`) and leaves out stretches of
 * lines of many buckets that the front already beats. Points are counted by sorting; the count is null where that would take too long.
 *
 * Order among equals: what fits before what is too close; the kind's own number, to a billionth; fewer changes; less balanced loss; then the first
 * variable, in the order of the table of parameters, on which two points differ: its earlier value. On a front, of ways with equal time and value the
 * one formed first stands.
 */

/** What a search answers. */
export interface SearchResult {
  /** Best of each kind: first those that fit, then those that are too close and better on their own question. */
  readonly ways: readonly Way[];
  readonly lattice: number;
  readonly formed: number;
  readonly fitting: number | null;
  /** False when the search was stopped before it was through. */
  readonly proven: boolean;
  readonly fronts: { readonly timeSnr: readonly FrontPoint[]; readonly timeLoss: readonly FrontPoint[] };
  /** Where nothing fits: the way that is over its limits by the smallest ratio. */
  readonly nearest: Way | null;
}

/** Settings that a way changes at most, unless nothing smaller fits. */
export const mostChanges = 3;

/**
 * Finds the exact best ways of a series within what a technologist may touch.
 *
 * @example search(problem).ways.map(({ kind }) => kind) //=> ['closest', 'best-signal', ...]
 */
export function search(problem: SearchProblem, control: SearchControl = {}): SearchResult {
  // Rules that no step can cross are not asked at every point.
  const setting = settingOf(withBoundRules(problem));
  const tables = tablesOf(setting);
  const pulse = new Pulse(control);
  const bests = new Bests();
  let whole = new WholeLatticeSearch(tables, pulse);
  let proven = true;
  let apart: Way[] = [];
  try {
    apart = fewerSlices(problem, pulse);
    const smallest = Math.min(mostChanges, setting.variables.length);
    bestsWithin(tables, smallest, bests, pulse);
    // The nearest way is asked for only where few changes do not do.
    whole = new WholeLatticeSearch(tables, pulse, { fronts: true, nearest: !bests.any, count: true });
    whole.run();
    for (let most = smallest + 1; !bests.any && canFit(whole, setting) && most <= setting.variables.length; most += 1)
      bestsWithin(tables, most, bests, pulse);
  } catch (error) {
    if (!(error instanceof SearchStopped)) throw error;
    proven = false;
  }
  const { timeSnr, timeLoss, fitting, nearest } = whole.result();
  return {
    ways: [...waysOf(setting, bests), ...apart],
    lattice: latticeSize(setting.variables),
    formed: pulse.formed,
    fitting: proven ? fitting : null,
    proven,
    fronts: { timeSnr: pointsOf(timeSnr), timeLoss: pointsOf(timeLoss) },
    nearest: bests.any || apart.length > 0 || nearest === null ? null : wayOf(setting, 'closest', nearest.point),
  };
}

/** True when some point of the whole lattice is within its limits. */
function canFit(whole: WholeLatticeSearch, setting: SearchSetting): boolean {
  const { nearest } = whole.result();
  return nearest !== null && wayOf(setting, 'closest', nearest.point).verdict !== 'OVER';
}

function pointsOf(front: Front): readonly FrontPoint[] {
  return front.points;
}

/** Further ways that change as few settings as any does, one for each set of settings: at most so many of each verdict. */
const mostRoutes = 6;

/**
 * Ways of all kinds: what fits, then what is too close where it answers its own question better. After each the other routes of fewest changes,
 * so that lowering an angle and lengthening TR stand side by side.
 */
function waysOf(setting: SearchSetting, bests: Bests): Way[] {
  const chosen: { kind: WayKind; candidate: Candidate }[] = [];
  for (const rank of [0, 1] as const) {
    for (const kind of kindsOf(setting)) {
      const candidate = bests.best(kind, rank);
      const better = rank === 0 ? null : bests.best(kind, 0);
      if (candidate !== null && (better === null || outdoes(kind, candidate, better))) chosen.push({ kind, candidate });
    }
    if (rank === 1 && !outdoesInChanges(bests)) continue;
    const routes = bests
      .routes(rank)
      .filter(({ changes, point }) => changes > 0 && !chosen.some(({ candidate }) => comparePoints(candidate.point, point) === 0))
      .filter(({ point }) => !(setting.rfCapped && addsSlices(setting, point)));
    chosen.push(...routes.slice(0, mostRoutes).map((candidate) => ({ kind: 'fewest-changes' as const, candidate })));
  }
  return chosen.map(({ kind, candidate }) => wayOf(setting, kind, candidate.point));
}

/**
 * Thinner slices at constant coverage are more of them, which only a second acquisition holds: that lowers RF in each TR, and balanced loss does not
 * count its time. As the best of its own question such a way stands; as one more route to less RF nobody asks for it.
 */
function addsSlices({ variables }: SearchSetting, point: readonly number[]): boolean {
  return variables.some(({ sliceCounts }, i) => sliceCounts !== null && (sliceCounts[point[i] as number] ?? 0) > (sliceCounts[0] ?? 0));
}

/** True when what is too close changes fewer settings than anything that fits. */
function outdoesInChanges(bests: Bests): boolean {
  const fits = bests.best('fewest-changes', 0);
  const close = bests.best('fewest-changes', 1);
  return close !== null && (fits === null || close.changes <= fits.changes);
}

/** Least RF is a question only where RF is capped. */
function kindsOf(setting: SearchSetting): readonly WayKind[] {
  return wayKinds.filter((kind) => kind !== 'least-rf' || setting.rfCapped);
}
