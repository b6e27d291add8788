import { type Command, goBack, move, only, open, pointAt, say } from '../change.js';
import { changesInWords } from '../say-way.js';
import type { State } from '../state.js';
import { takeSet } from '../take-way.js';
import { firstWays, frontHere, frontLimitS, frontSet, type ListedWay, listedWays, shownWays, wayHere } from '../ways.js';
import { orderRow } from './order-commands.js';

/** Opens the ways of the series that is looked at; in the running order of the one under the hand. */
export const showWays: Command = (state) => {
  const seriesId = state.place.screen === 'order' ? (orderRow(state)?.id ?? state.place.seriesId) : state.place.seriesId;
  const opened = pointAt(move(open(state, 'ways'), { seriesId }), '0');
  return only(seen(opened));
};

/** The way under the hand is the one looked at last. */
function seen(state: State): State {
  const here = wayHere(state);
  return here === null ? state : { ...state, wayScroll: 0, lastWay: { seriesId: state.place.seriesId, listed: here.listed } };
}

export const moveInWays =
  (by: number): Command =>
  (state) => {
    const { fields } = state.place;
    const last = shownWays(state).length - 1;
    const at = fields.ways === 'last' ? (by > 0 ? -1 : 1) : Number(fields.ways ?? 0) || 0;
    return only(seen(pointAt({ ...state, notice: null }, String(Math.min(Math.max(0, last), Math.max(0, at + by))))));
  };

/** Scrolls what is said of the way under the hand. */
export const scrollWay =
  (by: number): Command =>
  (state) =>
    only({ ...state, notice: null, wayScroll: Math.min(40, Math.max(0, state.wayScroll + by)) });

/** Shows the rest, or the first ones alone. */
export const moreWays: Command = (state) => {
  const count = state.search?.answer == null ? 0 : listedWays(state.search.answer).length;
  if (count <= firstWays) return only(say(state, count === 0 ? 'No ways yet' : `These ${count} are all`));
  const next = { ...state, allWays: !state.allWays, notice: null };
  const here = Number(next.place.fields.ways ?? 0) || 0;
  return only(next.allWays || here < firstWays ? next : seen(pointAt(next, '0')));
};

function taken(state: State, { way, kinds }: ListedWay, number: number | null): State {
  const { seriesId } = state.place;
  const which = number === null ? 'The way looked at last' : `Way ${number}`;
  const marked = { ...state, lastWay: { seriesId, listed: { way, kinds, binding: null } } };
  const next = takeSet(marked, seriesId, way.given, `${which} taken: ${changesInWords(way)}`);
  return next.session === state.session ? next : { ...onSeries(next), notice: next.notice };
}

/** From the ways back to the series, which shows what is now set. */
function onSeries(state: State): State {
  const { back } = state.place;
  if (back.at(-1) === 'series') return goBack(state);
  return move(open(state, 'series'), { pane: 'main', figure: null, caution: 0 });
}

/** Takes the way under the hand. */
export const takeWay: Command = (state) => {
  const here = wayHere(state);
  return only(here === null ? say(state, 'No way to take yet', 'trouble') : taken(state, here.listed, here.number));
};

/** Takes a way by its number. */
export const takeNumbered: Command = (state, key) => {
  const number = Number(key.text);
  const list = state.search?.answer == null || state.search.seriesId !== state.place.seriesId ? [] : listedWays(state.search.answer);
  const listed = list[number - 1];
  return only(listed === undefined ? say(state, `There is no way ${number}`, 'trouble') : taken(state, listed, number));
};

/** Calls back the way looked at last, of whatever series. */
export const recallWay: Command = (state) => {
  const { lastWay, search } = state;
  if (lastWay === null) return only(say(state, 'No way was looked at yet: f searches'));
  const there = move(open(state, 'ways'), { seriesId: lastWay.seriesId });
  const list = search?.answer == null || search.seriesId !== lastWay.seriesId ? [] : listedWays(search.answer);
  const given = JSON.stringify(lastWay.listed.way.given);
  const at = list.findIndex(({ way }) => JSON.stringify(way.given) === given);
  const next = at < firstWays ? there : { ...there, allWays: true };
  return only(pointAt({ ...next, notice: null }, at === -1 ? 'last' : String(at)));
};

/** While a search runs: ends it with what it has. Else one screen back. */
export const stopOrBack: Command = (state) => {
  const { search, open: asked, place } = state;
  if (search === null || search.seriesId !== place.seriesId || asked.search !== search.ask) return only(goBack(state));
  return [say(state, 'Stopped: what was found so far'), [{ kind: 'stop-search' }]];
};

/** The front as a chart. */
export const showFront: Command = (state) => {
  if (state.search?.answer == null) return only(say(state, 'The front is drawn when the search is through'));
  if (frontHere(state) === null) return only(say(state, 'There is no front: no way keeps what must be kept'));
  const limitS = frontLimitS(state);
  const points = state.search.answer.result.fronts[state.front.which];
  // The hand begins where it is wanted: at the most that the limit allows.
  const last = limitS === null ? 0 : points.findLastIndex(({ timeS }) => timeS <= limitS);
  const at = state.front.at > 0 ? state.front.at : Math.max(0, last);
  return only({ ...open(state, 'front'), front: { ...state.front, at } });
};

export const moveOnFront =
  (by: number): Command =>
  (state) => {
    const here = frontHere(state);
    if (here === null) return only(state);
    const at = Math.min(here.points.length - 1, Math.max(0, here.at + by));
    return only({ ...state, notice: null, front: { ...state.front, at } });
  };

/** Time against SNR, or against everything that is lost. */
export const turnFront: Command = (state) => {
  const which = state.front.which === 'timeSnr' ? ('timeLoss' as const) : ('timeSnr' as const);
  const now = frontHere(state);
  const timeS = now?.points[now.at]?.timeS ?? 0;
  const points = state.search?.answer?.result.fronts[which] ?? [];
  const at = Math.max(
    0,
    points.findLastIndex((point) => point.timeS <= timeS),
  );
  return only({ ...state, notice: null, front: { which, at } });
};

/** Takes the point of the front under the hand, with all its changes. */
export const takeFront: Command = (state) => {
  const set = frontSet(state);
  if (set === null) return only(say(state, 'No point to take', 'trouble'));
  const next = takeSet(state, state.place.seriesId, set, 'A point of the front taken');
  if (next.session === state.session) return only(next);
  const { place } = next;
  const back = place.back.filter((screen) => screen !== 'ways');
  return only({ ...onSeries({ ...next, place: { ...place, back } }), notice: next.notice });
};
