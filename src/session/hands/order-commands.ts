import { type Change, type Command, edit, move, neighbour, only, open, pointAt, say } from '../change.js';
import { resultNow } from '../results.js';
import { holdClock, runningSeries } from '../running.js';
import type { Session, SessionSeries } from '../session.js';
import { eachSeries } from '../set-field.js';
import type { State } from '../state.js';

/** The series under the hand in the running order. */
export function orderRow(state: State): SessionSeries | undefined {
  const series = state.session?.series ?? [];
  return series.find(({ id }) => id === state.place.seriesId) ?? series[0];
}

export const moveInOrder =
  (by: number): Command =>
  (state) => {
    const next = neighbour(state.session?.series ?? [], ({ id }) => id === orderRow(state)?.id, by);
    return only(move({ ...state, notice: null }, { seriesId: next?.id ?? '' }));
  };

/** Opens the series under the hand, on its first parameter. */
export const openSeries: Command = (state) =>
  only(move(open(state, 'series'), { seriesId: orderRow(state)?.id ?? '', pane: 'main', figure: null, caution: 0 }));

/** Opens the next or previous series of the running order. */
export const turnSeries =
  (by: number): Command =>
  (state) => {
    const series = state.session?.series ?? [];
    const at = series.findIndex(({ id }) => id === state.place.seriesId);
    const next = series[(at + by + series.length) % series.length];
    return only(move({ ...state, notice: null }, { seriesId: next?.id ?? '', figure: null, caution: 0 }));
  };

const onRow =
  (words: (series: SessionSeries) => string, change: (state: State, series: SessionSeries) => Partial<SessionSeries> | string): Command =>
  (state) => {
    const row = orderRow(state);
    if (row === undefined) return only(state);
    const values = change(state, row);
    if (typeof values === 'string') return only(say(state, values, 'trouble'));
    return only(edit(state, words(row), (session) => eachSeries(session, new Set([row.id]), (series) => ({ ...series, ...values }))));
  };

/** Moves a series one place, past those that keep theirs. */
export const reorder =
  (by: -1 | 1): Command =>
  (state) => {
    const row = orderRow(state);
    if (row === undefined || state.session === null) return only(state);
    if (row.placeLocked) return only(say(state, `${row.id} keeps its place: l lets it go`, 'trouble'));
    const { series } = state.session;
    const from = series.findIndex(({ id }) => id === row.id);
    let to = from + by;
    while (series[to]?.placeLocked === true) to += by;
    if (series[to] === undefined) return only(say(state, `${row.id} is ${by < 0 ? 'first' : 'last'} already`));
    return only(
      edit(state, `${row.id} ${by < 0 ? 'earlier' : 'later'}`, (session) => ({ ...session, series: swapped(session.series, from, to) })),
    );
  };

function swapped(series: readonly SessionSeries[], from: number, to: number): SessionSeries[] {
  const next = [...series];
  const [a, b] = [next[from], next[to]];
  if (a === undefined || b === undefined) return next;
  next[from] = b;
  next[to] = a;
  return next;
}

export const lockPlace = onRow(
  ({ id, placeLocked }) => (placeLocked ? `${id} may move` : `${id} keeps its place`),
  (_state, { placeLocked }) => ({ placeLocked: !placeLocked }),
);

/** Skips a series, or takes it back in. */
export const skip = onRow(
  ({ id, state }) => (state === 'not-done' ? `${id} is to do again` : `${id} skipped`),
  (_state, { state }) =>
    state === 'not-done'
      ? { state: 'to-do', run: null }
      : state === 'to-do'
        ? { state: 'not-done', run: null }
        : 'Only a series that is still to do can be skipped',
);

export const markDone = onRow(
  ({ id, run }) => `${id} ${run?.again === true ? 'repeated' : 'done'}`,
  (_state, { state, run }) =>
    state === 'done' || state === 'repeated'
      ? 'This series is done already: s does it again'
      : { state: run?.again === true ? 'repeated' : 'done', run: null },
);

export const stopEarly = onRow(
  ({ id }) => `${id} stopped early`,
  (_state, { run }) => (run === null ? 'This series does not run' : { state: 'stopped-early', run: null }),
);

/** Starts a series or its next breath-hold; while a hold counts, ends it. */
export const startOrNext: Command = (state) => {
  const row = orderRow(state);
  if (row === undefined || state.session === null) return only(state);
  const busy = runningSeries(state);
  if (busy !== null && busy.id !== row.id) return only(say(state, `${busy.id} runs: d done, c stopped early`, 'trouble'));
  return row.run === null ? start(state, row) : nextHold(state, row);
};

function start(state: State, row: SessionSeries): Change {
  const again = row.state === 'done' || row.state === 'repeated';
  const held = resultNow(state, row.id).evaluation.figures.holdTimeS !== null;
  const run = { holdsDone: 0, sinceMs: held ? null : state.nowMs, again };
  const words = `${row.id} ${again ? 'again' : 'started'}${held ? ': s starts each breath-hold' : ''}`;
  const begin = (session: Session): Session => ({ ...session, clockFromMs: session.clockFromMs ?? state.nowMs });
  return only(
    edit(state, words, (session) => eachSeries(begin(session), new Set([row.id]), (series) => ({ ...series, state: 'running', run }))),
  );
}

function nextHold(state: State, row: SessionSeries): Change {
  const clock = holdClock(state, row);
  const { run } = row;
  if (clock === null || run === null) return only(state);
  const set = (values: Partial<SessionSeries>, words: string) =>
    only(edit(state, words, (session) => eachSeries(session, new Set([row.id]), (series) => ({ ...series, ...values }))));
  if (clock.hold === null || clock.holds === null) return only(say(state, `${row.id} runs: d done, c stopped early`));
  if (clock.counting) return only(say(state, `breath-hold ${clock.hold} of ${clock.holds} is counting; c stops the series early`));
  if (run.sinceMs === null) return set({ run: { ...run, sinceMs: state.nowMs } }, `breath-hold ${clock.hold} of ${clock.holds}`);
  const holdsDone = run.holdsDone + 1;
  if (holdsDone >= clock.holds)
    return set({ state: run.again ? 'repeated' : 'done', run: null }, `${row.id} ${run.again ? 'repeated' : 'done'}, ${clock.holds} holds`);
  return set({ run: { ...run, holdsDone, sinceMs: state.nowMs } }, `breath-hold ${holdsDone + 1} of ${clock.holds}`);
}

/** Back to the list of presets: only with nothing that would be lost from sight. */
export const anotherSession: Command = (state) => {
  const { session } = state;
  const untouched = state.past.length === 0;
  if (session !== null && !session.saved && !untouched)
    return only(say(state, 'Save the record first (e, then s): this program keeps one session at a time', 'trouble'));
  return [
    pointAt(
      { ...state, opened: null, session: null, past: [], future: [], notice: null, place: { ...state.place, screen: 'start', back: [] } },
      '',
    ),
    [{ kind: 'drop-draft' }],
  ];
};
