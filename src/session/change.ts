import type { Effect, KeyPress } from './message.js';
import type { Session } from './session.js';
import type { Notice, Place, ScreenName, State } from './state.js';

/** What a message makes of a state, and what it asks of the world outside. */
export type Change = readonly [State, readonly Effect[]];

/** What a key does. */
export type Command = (state: State, key: KeyPress) => Change;

/** A change that asks for nothing. */
export function only(state: State): Change {
  return [state, []];
}

/** Says one line. */
export function say(state: State, words: string, level: Notice['level'] = 'note'): State {
  return { ...state, notice: { words, level } };
}

/** Steps of undo that are kept. */
const mostSteps = 1000;

/** Changes the session as one step that can be undone, and says what was done. The same session means nothing was done. */
export function edit(state: State, words: string, change: (session: Session) => Session): State {
  if (state.session === null) return state;
  const session = change(state.session);
  if (session === state.session) return state;
  const past = [...state.past.slice(-mostSteps + 1), { session: state.session, words }];
  return say({ ...state, session: session.saved && state.session.saved ? { ...session, saved: false } : session, past, future: [] }, words);
}

/** Moves hands and eyes. */
export function move(state: State, place: Partial<Place>): State {
  return { ...state, place: { ...state.place, ...place } };
}

/** Opens a screen; one that Escape would come back to anyway is gone back to. */
export function open(state: State, screen: ScreenName): State {
  const { place } = state;
  if (place.screen === screen) return state;
  const at = place.back.indexOf(screen);
  const back = at === -1 ? [...place.back, place.screen] : place.back.slice(0, at);
  return { ...state, notice: null, place: { ...place, screen, back } };
}

/** Goes back one screen; the running order is the last. */
export function goBack(state: State): State {
  const { place } = state;
  const screen = place.back.at(-1);
  if (screen === undefined) return state;
  return { ...state, notice: null, place: { ...place, screen, back: place.back.slice(0, -1) } };
}

/** Puts the hand on a field of the present screen. */
export function pointAt(state: State, field: string): State {
  const { place } = state;
  return { ...state, place: { ...place, fields: { ...place.fields, [place.screen]: field } } };
}

/** The next of some rows, no further than the ends. */
export function neighbour<T>(rows: readonly T[], isHere: (row: T) => boolean, by: number): T | undefined {
  const at = rows.findIndex(isHere);
  if (at === -1) return rows[0];
  return rows[Math.min(rows.length - 1, Math.max(0, at + by))];
}
