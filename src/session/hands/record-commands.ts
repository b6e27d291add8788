import { type Command, move, only, say } from '../change.js';
import { recordOfSession, studyOfSession } from '../record-of-session.js';

/** Between the record and its reasons. */
export const turnRecordPane: Command = (state) =>
  only(move({ ...state, notice: null }, { pane: state.place.pane === 'main' ? 'consequences' : 'main' }));

/** Saves the record: one line at the end of the file of records. */
export const saveRecord: Command = (state) => {
  const record = recordOfSession(state);
  if (record === null) return only(state);
  if (state.session?.saved === true) return only(say(state, 'This record is saved already; nothing was changed since'));
  if (state.open.record !== undefined) return only(say(state, 'The record is being saved'));
  if (record.series.length === 0)
    return only(say(state, 'No series to record yet: change one, or mark one as done (left and right on its line)', 'trouble'));
  const ask = state.asks + 1;
  const next = say({ ...state, asks: ask, open: { ...state.open, record: ask }, saving: state.session }, 'Saving the record');
  return [next, [{ kind: 'save-record', ask, record, again: state.recordFailed }]];
};

/** Saves the values of this session as a preset of its own, status draft. */
export const saveAsPreset: Command = (state) => {
  const study = studyOfSession(state);
  if (study === null) return only(state);
  const ask = state.asks + 1;
  return [
    say({ ...state, asks: ask, open: { ...state.open, preset: ask } }, 'Saving a draft preset'),
    [{ kind: 'save-preset', ask, study }],
  ];
};

/** Writes the one-page printout beside the records. */
export const savePage: Command = (state) => {
  const record = recordOfSession(state);
  if (record === null) return only(state);
  const ask = state.asks + 1;
  return [say({ ...state, asks: ask, open: { ...state.open, page: ask } }, 'Writing the page'), [{ kind: 'save-page', ask, record }]];
};
