import { type Command, edit, move, neighbour, only, open, pointAt, say } from '../change.js';
import { consequences } from '../consequences.js';
import { nextStep } from '../next-step.js';
import { resultNow, studySeries } from '../results.js';
import { fieldValue, type SeriesField, seriesFields } from '../series-fields.js';
import { sessionCautions } from '../session-cautions.js';
import { eachSeries, isLocked, setField, unsetField } from '../set-field.js';
import { panes, type State } from '../state.js';
import { stepValue } from '../step-value.js';

/** The parameter lines of the series that is looked at. */
export function fieldsHere(state: State): readonly SeriesField[] {
  const { seriesId } = state.place;
  return seriesFields(studySeries(state, seriesId), resultNow(state, seriesId).parameters);
}

/** The parameter under the hand. */
export function fieldHere(state: State): SeriesField {
  const fields = fieldsHere(state);
  return fields.find(({ path }) => path === state.place.fields.series) ?? (fields[0] as SeriesField);
}

/** Moves the hand in the pane that has it. */
export const moveInSeries =
  (by: number): Command =>
  (state) => {
    const { pane, seriesId, figure, caution } = state.place;
    const quiet = { ...state, notice: null };
    if (pane === 'main')
      return only(pointAt(quiet, neighbour(fieldsHere(state), ({ path }) => path === fieldHere(state).path, by)?.path ?? ''));
    if (pane === 'consequences') {
      const rows = consequences(state, seriesId);
      const here = figure ?? rows[0]?.key;
      return only(move(quiet, { figure: neighbour(rows, ({ key }) => key === here, by)?.key ?? null }));
    }
    const last = Math.max(0, sessionCautions(state, seriesId).length - 1);
    return only(move(quiet, { caution: Math.min(last, Math.max(0, caution + by)) }));
  };

/** Goes from pane to pane. */
export const turnPane =
  (by: -1 | 1): Command =>
  (state) => {
    const at = panes.indexOf(state.place.pane);
    return only(move({ ...state, notice: null }, { pane: panes[(at + by + panes.length) % panes.length] ?? 'main' }));
  };

/** One step, or a big one, of the parameter under the hand. */
export const step =
  (direction: -1 | 1, big: boolean): Command =>
  (state) => {
    const { seriesId } = state.place;
    const field = fieldHere(state);
    if (isLocked(state, seriesId, field.key)) return only(say(state, `${field.label} is locked in the preset: l opens it`, 'trouble'));
    const value = fieldValue(field, resultNow(state, seriesId).parameters);
    const next = stepValue(field, value, studySeries(state, seriesId), { direction, big });
    if (next === null) return only(say(state, noStep(field, value)));
    return only(setField(state, seriesId, field, next));
  };

function noStep(field: SeriesField, value: unknown): string {
  if (value === undefined) return `${field.label} is not set in the preset: type a value`;
  if (field.kind === 'numbers') return `${field.label}: Enter, then type the list, with commas`;
  return `${field.label}: no further this way by keys`;
}

/** Turns a choice on; begins typing everywhere else. */
export const enterField: Command = (state) => {
  const { seriesId } = state.place;
  const field = fieldHere(state);
  if (field.kind === 'number' || field.kind === 'numbers') return only(begin(state, ''));
  const value = fieldValue(field, resultNow(state, seriesId).parameters);
  if (field.kind === 'flag') return only(setField(state, seriesId, field, value !== true));
  const at = field.choices.indexOf(String(value));
  return only(setField(state, seriesId, field, field.choices[(at + 1) % field.choices.length]));
};

/** Begins typing a value with the key that was pressed. */
export const typeField: Command = (state, key) => {
  const field = fieldHere(state);
  if (field.kind !== 'number' && field.kind !== 'numbers') return only(say(state, `${field.label} is chosen with left and right`));
  return only(begin(state, key.text ?? ''));
};

function begin(state: State, text: string): State {
  const field = fieldHere(state);
  if (isLocked(state, state.place.seriesId, field.key)) return say(state, `${field.label} is locked in the preset: l opens it`, 'trouble');
  return { ...state, notice: null, entry: { field: field.path, text, ask: null, isText: false } };
}

/** Back to the preset's value. */
export const backToPreset: Command = (state) => only(unsetField(state, state.place.seriesId, fieldHere(state)));

/** Opens a parameter that the preset locks, or closes it again. */
export const openLock: Command = (state) => {
  const { seriesId } = state.place;
  const field = fieldHere(state);
  if (!studySeries(state, seriesId).locked.includes(field.key)) return only(say(state, `${field.label} is not locked`));
  const locked = isLocked(state, seriesId, field.key);
  return only(
    edit(state, `${field.label} ${locked ? 'opened by hand' : 'locked again'}`, (session) =>
      eachSeries(session, new Set([seriesId]), (series) => ({
        ...series,
        opened: locked ? [...series.opened, field.key] : series.opened.filter((key) => key !== field.key),
      })),
    ),
  );
};

/** Jumps to the next value at which time changes. */
export const jump: Command = (state) => {
  const { seriesId } = state.place;
  const field = fieldHere(state);
  const { jump: to } = nextStep(state, seriesId, field);
  return only(to === null ? say(state, 'One step changes the time already: nothing to jump over') : setField(state, seriesId, field, to));
};

/** Explains what the hand is on. */
export const why: Command = (state) => only(open(state, 'why'));

/** Opens the scanner readings; a cap that waits for one has the hand on it. */
export const openReadings: Command = (state) => {
  const { b1rmsCapUt = null, sarCapWkg = null } = state.session?.limits ?? {};
  const field = b1rmsCapUt !== null ? 'before b1rmsUt' : sarCapWkg !== null ? 'before sarWkg' : 'before timeS';
  return only(pointAt(open(state, 'readings'), field));
};
