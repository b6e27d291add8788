import { type Bands, usualBands } from '../search/bands.js';
import type { Budget } from '../search/budget.js';
import { latticeOf, pointParameters } from '../search/lattice.js';
import type { Binding, NothingFits } from '../search/nothing-fits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import type { SearchResult } from '../search/search.js';
import type { Way } from '../search/way.js';
import { resultWith, sessionSeries } from './results.js';
import type { Session } from './session.js';
import { eachSeries } from './set-field.js';
import type { State } from './state.js';

/** What a search gave: the ways, and where nothing fits what binds. */
export interface WaysAnswer {
  readonly result: SearchResult;
  readonly nothing: NothingFits | null;
}

/** The newest search of a series. */
export interface WaysSearch {
  readonly seriesId: string;
  readonly problem: SearchProblem;
  /** What it was asked with, to see whether it still stands. */
  readonly key: string;
  readonly ask: number;
  /** Share of the work done, 0 to 1; null while it is too young to be shown. */
  readonly share: number | null;
  readonly answer: WaysAnswer | null;
  readonly trouble: string | null;
}

/** The newest plan of the session into the minutes left. */
export interface SessionPlan {
  readonly key: string;
  readonly ask: number;
  readonly answer: Budget | null;
  readonly trouble: string | null;
  /** The other plan is looked at, where one keeps nearly as much. */
  readonly other: boolean;
}

/** One line of the list of ways: the same changes stand once, with all the questions they answer. */
export interface ListedWay {
  readonly kinds: readonly Way['kind'][];
  readonly way: Way;
  /** Where nothing fits: what this way needs; empty for the nearest of all. */
  readonly binding: Binding | null;
}

/** The bands of a session: how much of each figure every way keeps. */
export function bandsOf(session: Session | null): Bands {
  return session?.keep ?? usualBands;
}

const verdictOrder = ['FITS', 'TOO CLOSE', 'OVER'] as const;

const lists = new WeakMap<WaysAnswer, readonly ListedWay[]>();

/** The ways of an answer, numbered by their place: first what fits. Where nothing does, the ways that need least of what binds. */
export function listedWays(answer: WaysAnswer): readonly ListedWay[] {
  let list = lists.get(answer);
  if (list === undefined) {
    list = listOf(answer);
    lists.set(answer, list);
  }
  return list;
}

function listOf({ result, nothing }: WaysAnswer): ListedWay[] {
  if (result.ways.length === 0) {
    const needing = (nothing?.bindings ?? []).map((binding): ListedWay => ({ kinds: [], way: binding.way, binding }));
    return needing.length > 0 || result.nearest === null ? needing : [{ kinds: [], way: result.nearest, binding: null }];
  }
  const groups = new Map<string, Way[]>();
  for (const way of result.ways) {
    const key = JSON.stringify(way.changes);
    groups.set(key, [...(groups.get(key) ?? []), way]);
  }
  return [...groups.values()]
    .map((same): ListedWay => ({ kinds: [...new Set(same.map(({ kind }) => kind))], way: same[0] as Way, binding: null }))
    .sort((a, b) => verdictOrder.indexOf(a.way.verdict) - verdictOrder.indexOf(b.way.verdict));
}

/** How many ways are shown before the rest is asked for. */
export const firstWays = 3;

/** The ways that are shown now. */
export function shownWays(state: State): readonly ListedWay[] {
  const { search, allWays } = state;
  if (search?.answer == null || search.seriesId !== state.place.seriesId) return [];
  const list = listedWays(search.answer);
  return allWays ? list : list.slice(0, firstWays);
}

/** The way under the hand: one of the list, or the one looked at last that was called back. */
export function wayHere(state: State): { readonly number: number | null; readonly listed: ListedWay } | null {
  const { lastWay, place } = state;
  if (place.fields.ways === 'last' && lastWay !== null && lastWay.seriesId === place.seriesId)
    return { number: null, listed: lastWay.listed };
  const shown = shownWays(state);
  const at = Math.min(Math.max(0, shown.length - 1), Number(place.fields.ways ?? 0) || 0);
  const listed = shown[at];
  return listed === undefined ? null : { number: at + 1, listed };
}

/** The state as it would be with other values set on a series: every screen's selectors say what that gives. */
export function stateWith(state: State, id: string, set: SearchProblem['set']): State {
  const { session } = state;
  if (session === null) return state;
  return { ...state, session: eachSeries(session, new Set([id]), (series) => ({ ...series, set })) };
}

/** The points of the front that is looked at, and which of them. */
export function frontHere(state: State): {
  readonly points: SearchResult['fronts']['timeSnr'];
  readonly at: number;
  readonly which: 'timeSnr' | 'timeLoss';
} | null {
  const { search, front } = state;
  if (search?.answer == null || search.seriesId !== state.place.seriesId) return null;
  const points = search.answer.result.fronts[front.which];
  if (points.length === 0) return null;
  return { points, at: Math.min(points.length - 1, Math.max(0, front.at)), which: front.which };
}

/** The limit of the time that a front runs along, s; null where there is none. */
export function frontLimitS({ search }: State): number | null {
  return search?.problem.limits.holdS ?? search?.problem.limits.timeS ?? null;
}

/** What the point of the front under the hand sets. */
export function frontSet(state: State): SearchProblem['set'] | null {
  const here = frontHere(state);
  const point = here?.points[here.at];
  if (point === undefined || state.search === null) return null;
  const { problem } = state.search;
  return pointParameters(latticeOf(problem), point.point, problem.set);
}

/** True when the values of a series are those of a way that was taken and nothing else: its search still stands. */
export function baseSet(state: State, id: string): SearchProblem['set'] {
  const { set } = sessionSeries(state, id);
  const { taken } = state;
  return taken !== null && taken.seriesId === id && JSON.stringify(taken.given) === JSON.stringify(set) ? taken.base : set;
}

/** The figures of a series with some values set. */
export function figuresWith(state: State, id: string, set: SearchProblem['set']) {
  return resultWith(state, id, set).evaluation.figures;
}
