import type { PresetNow } from '../../study/record-report-suggestion.js';
import type { Study } from '../../study/study.js';
import { type Change, type Command, goBack, neighbour, only, open, pointAt, say } from '../change.js';
import { fieldOfRecord, recordRow, recordRows } from '../record-rows.js';
import type { Shelf } from '../shelf.js';
import type { ShelfEffect } from '../shelf-messages.js';
import type { State } from '../state.js';
import { back } from './common-commands.js';

type Read = 'list' | 'record' | 'report';

/** Which ask of the world belongs to which reading. */
const askOf = { list: 'list', record: 'one-record', report: 'report' } as const;

/** One reading at a time: a new one takes the place of the one that runs. */
function read(state: State, which: Read, effect: (ask: number) => ShelfEffect): Change {
  const ask = state.asks + 1;
  const { list: _list, 'one-record': _record, report: _report, ...others } = state.open;
  const shelf: Shelf = { ...ended(state.shelf), [which]: { ask, share: null, read: null, trouble: null } };
  return [{ ...state, asks: ask, open: { ...others, [askOf[which]]: ask }, shelf }, [effect(ask)]];
}

/** What was still being read when another reading took its place is asked for again when it is wanted. */
function ended(shelf: Shelf): Shelf {
  const whole = <T extends Shelf['list'] | Shelf['record'] | Shelf['report']>(reading: T): T | null =>
    reading !== null && reading.read === null && reading.trouble === null ? null : reading;
  return { ...shelf, list: whole(shelf.list), record: whole(shelf.record), report: whole(shelf.report) };
}

function readList(state: State): Change {
  return read(state, 'list', (ask) => ({ kind: 'list-records', ask, typed: state.shelf.typed }));
}

/** Opens the list of records, and reads it. */
export const showRecords: Command = (state) => readList(open(state, 'records'));

export const moveInRecords =
  (by: number): Command =>
  (state) => {
    const row = recordRow(state);
    const next = neighbour(recordRows(state), (candidate) => candidate === row, by);
    return only(pointAt({ ...state, notice: null }, next === undefined ? '' : fieldOfRecord(next)));
  };

/** Whether a longer text means fewer records: it does, unless a period is being typed, whose end widens it. */
function isNarrower(typed: string, before: string): boolean {
  return typed.startsWith(before) && !/\.\S*$/.test(typed);
}

function narrowed(state: State, text: string): Change {
  const typed = text.replace(/^\s+/, '').slice(0, 60);
  const next = pointAt({ ...state, notice: null, shelf: { ...state.shelf, typed } }, '');
  const list = state.shelf.list?.read ?? null;
  // Among all of them the others are found here; where only the newest are here, or fewer were asked for, they are read anew.
  const isHere = list !== null && list.meant <= list.rows.length && (list.typed === '' || isNarrower(typed, list.typed));
  return isHere ? only(next) : readList(next);
}

export const narrowRecords: Command = (state, key) => narrowed(state, state.shelf.typed + (key.text ?? ''));

export const widenRecords: Command = (state) => narrowed(state, [...state.shelf.typed].slice(0, -1).join(''));

function isReading({ open: asked }: State): boolean {
  return asked.list !== undefined || asked['one-record'] !== undefined || asked.report !== undefined;
}

/** Ends the reading that runs and shows what there is; else forgets what was typed; else goes back. */
export const stopReading: Command = (state, key) => {
  if (isReading(state)) return [say(state, 'Stopped: what was read so far'), [{ kind: 'stop-reading' }]];
  if (state.place.screen === 'records' && state.shelf.typed !== '') return narrowed(state, '');
  if (state.place.back.length === 0) return back(state, key);
  const before = goBack(state);
  // A list that gave way to another reading is read again.
  return before.place.screen === 'records' && before.shelf.list === null ? readList(before) : only(before);
};

/** One record: its page, and planned against used. */
export const showRecord: Command = (state) => {
  const row = recordRow(state);
  if (row === undefined) return only(say(state, isReading(state) ? 'The records are being read' : 'No record here'));
  const { file, line } = row;
  return read(pointAt(open(state, 'past-record'), '0'), 'record', (ask) => ({ kind: 'read-record', ask, file, line }));
};

/** The report over the records that are meant by what was typed. */
export const showReport: Command = (state) =>
  read(pointAt(open(state, 'report'), '0'), 'report', (ask) => ({ kind: 'report-records', ask, typed: state.shelf.typed }));

/** The variants that the report suggests, as draft presets. */
export function suggestedStudies({ shelf }: State): readonly Study[] {
  const now = shelf.report?.read?.shown.now ?? new Map<string, PresetNow>();
  return [...now.values()].flatMap(({ suggestions }) =>
    suggestions.flatMap((one) => (one.kind === 'variant' ? [one.suggestion.study] : [])),
  );
}

/** Saves every suggestion as a draft preset of this user, with its evidence in its notes; nothing else ever comes of one. */
export const saveSuggestions: Command = (state) => {
  const studies = suggestedStudies(state);
  const last = state.asks + studies.length;
  const saving = say({ ...state, asks: last, open: { ...state.open, preset: last } }, `Saving ${studies.length} drafts to review`);
  return [saving, studies.map((study, at) => ({ kind: 'save-preset', ask: state.asks + 1 + at, study }) as const)];
};
