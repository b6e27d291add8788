import { isMeantRecord } from '../study/record-meant.js';
import type { RecordRow } from './shelf.js';
import type { State } from './state.js';

const known = new WeakMap<readonly RecordRow[], { readonly typed: string; readonly rows: readonly RecordRow[] }>();

/** The records that were read and are meant by what was typed, newest first. */
export function recordRows({ shelf }: State): readonly RecordRow[] {
  const all = shelf.list?.read?.rows ?? [];
  if (shelf.typed === '') return all;
  const last = known.get(all);
  if (last?.typed === shelf.typed) return last.rows;
  const rows = all.filter((row) => isMeantRecord(row, shelf.typed));
  known.set(all, { typed: shelf.typed, rows });
  return rows;
}

export function fieldOfRecord({ file, line }: RecordRow): string {
  return `${line} ${file}`;
}

/** The record that the hand is on: the newest where none was chosen. */
export function recordRow(state: State): RecordRow | undefined {
  const rows = recordRows(state);
  return rows.find((row) => fieldOfRecord(row) === state.place.fields.records) ?? rows[0];
}

/** What the first line says of the records. */
export function recordsHeadline(state: State): string {
  const { list } = state.shelf;
  if (list === null) return 'Records';
  if (list.trouble !== null) return list.trouble;
  if (list.read === null) return `Reading the records${list.share === null ? '' : `: ${Math.round(list.share * 100)} %`}`;
  const { records, meant, damaged, stopped, rows, typed } = list.read;
  const shown = recordRows(state).length;
  const newest = meant > rows.length ? `, the newest ${rows.length} of ${meant}` : '';
  const among = state.shelf.typed === typed ? meant : shown;
  const skipped = damaged === 0 ? '' : `, ${damaged} damaged ${damaged === 1 ? 'line' : 'lines'} skipped`;
  return `${among} of ${records} ${records === 1 ? 'record' : 'records'}${newest}${skipped}${stopped ? '; stopped before the end' : ''}`;
}
