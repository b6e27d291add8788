import { type Command, edit, move, neighbour, only, pointAt, say } from '../change.js';
import type { FormRow } from '../form-row.js';
import { keepForm } from '../keep-form.js';
import { patientForm } from '../patient-form.js';
import { readingsForm } from '../readings-form.js';
import { reasonRows, recordForm } from '../record-form.js';
import type { State } from '../state.js';

/** The lines of the form on the present screen. */
export function formRows(state: State): readonly FormRow[] {
  const { screen, seriesId, pane } = state.place;
  if (screen === 'patient') return patientForm(state);
  if (screen === 'keep') return keepForm(state);
  if (screen === 'readings') return readingsForm(state, seriesId);
  if (screen === 'record') return pane === 'main' ? recordForm(state) : reasonRows(state);
  return [];
}

const canStand = ({ kind }: FormRow) => kind !== 'heading' && kind !== 'note';

/** The line that the hand is on. */
export function formRow(state: State): FormRow | undefined {
  const rows = formRows(state).filter(canStand);
  return rows.find(({ field }) => field === fieldHere(state)) ?? rows[0];
}

/** The two panes of the record remember a line each. */
function fieldHere({ place }: State): string | undefined {
  return place.screen === 'record' && place.pane !== 'main' ? (place.reason ?? undefined) : place.fields[place.screen];
}

export const moveInForm =
  (by: number): Command =>
  (state) => {
    const rows = formRows(state).filter(canStand);
    const here = formRow(state)?.field;
    const next = neighbour(rows, ({ field }) => field === here, by)?.field ?? '';
    return only(stand({ ...state, notice: null }, next));
  };

function stand(state: State, field: string): State {
  return state.place.screen === 'record' && state.place.pane !== 'main' ? move(state, { reason: field }) : pointAt(state, field);
}

export const turnRow =
  (direction: -1 | 1): Command =>
  (state) => {
    const row = formRow(state);
    if (row?.turn === undefined || state.session === null)
      return only(say(state, row?.kind === 'text' ? 'Enter begins typing' : 'Nothing to change on this line'));
    const session = row.turn(state.session, direction);
    if (session === state.session) return only(say(state, `${row.label.trim()}: no further this way`));
    const after = formRows({ ...state, session }).find(({ field }) => field === row.field);
    return only(edit(state, `${row.label.trim()}: ${after?.shown.trim() || 'no'}`, () => session));
  };

/** Ticks and unticks; opens typing where a line is typed. */
export const enterRow: Command = (state, key) => {
  const row = formRow(state);
  if (row === undefined) return only(state);
  if (row.kind === 'number' || row.kind === 'text') return only(beginRow(state, row, ''));
  if (row.turn === undefined || state.session === null) return only(state);
  const forward = turnRow(1)(state, key)[0];
  return only(forward.session === state.session ? turnRow(-1)(state, key)[0] : forward);
};

/** A digit on a line with a number begins typing there. */
export const typeRow: Command = (state, key) => {
  const row = formRow(state);
  if (row?.kind !== 'number') return only(say(state, row?.kind === 'text' ? 'Enter begins typing' : 'No number belongs on this line'));
  return only(beginRow(state, row, key.text ?? ''));
};

function beginRow(state: State, row: FormRow, text: string): State {
  const begin = row.kind === 'text' && row.shown !== '-' ? row.shown : text;
  return { ...state, notice: null, entry: { field: row.field, text: begin, ask: null, isText: row.kind === 'text' } };
}

export const clearRow: Command = (state) => {
  const row = formRow(state);
  if (row?.clear === undefined || state.session === null) return only(say(state, 'Nothing to clear on this line'));
  const session = row.clear(state.session);
  return only(
    session === state.session ? say(state, 'This line is blank already') : edit(state, `${row.label.trim()} emptied`, () => session),
  );
};

/** Takes what was typed on a line of a form. */
export function commitRow(state: State, field: string, text: string): State {
  const row = formRows(state).find((candidate) => candidate.field === field);
  const closed = { ...state, entry: null };
  if (row?.write === undefined) return closed;
  const written = row.write(state, text);
  if ('problem' in written) return say(state, written.problem, 'trouble');
  return edit(closed, written.words, () => written.session);
}
