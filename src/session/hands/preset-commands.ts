import { type Command, neighbour, only, open, pointAt, say } from '../change.js';
import { comparedWith, presetRow, presetRows, revisionRow, revisionRows } from '../preset-rows.js';
import type { State } from '../state.js';
import { back } from './common-commands.js';
import { saveAsPreset } from './record-commands.js';
import { openPreset } from './start-commands.js';

/** Opens the list of presets and reads it anew; the hand is on the open session where there is one. */
export const showPresets: Command = (state) => {
  const whole = { ...state, shelf: { ...state.shelf, narrowing: '' } };
  return [pointAt(open(whole, 'presets'), presetRows(whole)[0]?.field ?? ''), [{ kind: 'list-presets' }]];
};

export const moveInPresets =
  (by: number): Command =>
  (state) => {
    const here = presetRow(state)?.field;
    return only(pointAt({ ...state, notice: null }, neighbour(presetRows(state), ({ field }) => field === here, by)?.field ?? ''));
  };

function narrowed(state: State, narrowing: string): State {
  const next = { ...state, notice: null, shelf: { ...state.shelf, narrowing: narrowing.replace(/^\s+/, '').slice(0, 40) } };
  return pointAt(next, presetRows(next)[0]?.field ?? '');
}

export const narrowPresets: Command = (state, key) => only(narrowed(state, state.shelf.narrowing + (key.text ?? '')));

export const widenPresets: Command = (state) => only(narrowed(state, [...state.shelf.narrowing].slice(0, -1).join('')));

/** Forgets what was typed; with nothing typed, goes back. */
export const clearPresets: Command = (state, key) => (state.shelf.narrowing === '' ? back(state, key) : only(narrowed(state, '')));

/** Asks for the revisions of a preset. */
export function readRevisions(state: State, id: string): ReturnType<Command> {
  const ask = state.asks + 1;
  const known = state.shelf.revisions?.id === id ? state.shelf.revisions : { id, presets: null, notes: [] };
  const shelf = { ...state.shelf, revisions: known };
  return [{ ...state, asks: ask, open: { ...state.open, revisions: ask }, shelf }, [{ kind: 'read-revisions', ask, id }]];
}

/** The revisions of the preset under the hand. */
export const showRevisions: Command = (state) => {
  const row = presetRow(state);
  if (row === undefined)
    return only(say(state, state.presets.length === 0 ? 'The presets are being read' : 'Nothing matches: take a letter back', 'trouble'));
  const opened = pointAt(open(state, 'revisions'), row.field);
  return readRevisions(opened, row.study.id);
};

export const moveInRevisions =
  (by: number): Command =>
  (state) => {
    const here = revisionRow(state)?.field;
    return only(pointAt({ ...state, notice: null }, neighbour(revisionRows(state), ({ field }) => field === here, by)?.field ?? ''));
  };

/** Marks a revision; comparing then compares with it, of whatever preset. */
export const markRevision: Command = (state) => {
  const row = revisionRow(state);
  if (row === undefined) return only(state);
  const isMarked = state.shelf.marked === row.study;
  const next = { ...state, shelf: { ...state.shelf, marked: isMarked ? null : row.study } };
  return only(
    say(
      next,
      isMarked ? 'Not marked any more' : `${row.study.id} revision ${row.study.revision} marked: Enter on another one compares the two`,
    ),
  );
};

/** Parameters and figures of two revisions side by side: the marked one, else the one before. */
export const compareRevisions: Command = (state) => {
  const row = revisionRow(state);
  if (row === undefined) return only(say(state, 'The revisions are being read'));
  const from = comparedWith(state, row);
  if (from === undefined)
    return only(say(state, `Nothing stands before revision ${row.study.revision}: Space marks one, Enter on another compares`, 'trouble'));
  return only(pointAt(open({ ...state, shelf: { ...state.shelf, compared: { from, to: row.study } } }, 'compare'), '0'));
};

/** Begins a session on the revision under the hand: its series are the place to change it. */
export const editAsDraft: Command = (state) => {
  const row = revisionRow(state);
  if (row === undefined) return only(say(state, 'The revisions are being read'));
  if (row.choice === null) return only(say(state, 'This is the open session: its series are changed in the running order (o)'));
  if (state.session !== null && !state.session.saved && state.past.length > 0)
    return only(say(state, 'Save the record first (e, then s): this program keeps one session at a time', 'trouble'));
  const [next, effects] = openPreset(state, row.choice);
  return [say(next, `Draft of revision ${row.study.revision}: change its series, then m compares, saves and releases it`), effects];
};

/** Saves the open session's values as a draft preset of this user. */
export const saveDraft: Command = (state, key) => {
  const row = revisionRow(state);
  if (row?.origin !== 'session') return only(say(state, 'Only what the open session changed is saved as a draft: d begins one', 'trouble'));
  return saveAsPreset(state, key);
};
