import { type ClassKey, classKeys } from '../../calc/classes.js';
import type { ParameterKey } from '../../calc/parameters.js';
import type { GivenParameters } from '../../calc/series.js';
import type { SeriesToDraft } from '../../headers/draft-of-headers.js';
import { readSetValues } from '../../study/set-values.js';
import { type Change, type Command, neighbour, only, pointAt, say } from '../change.js';
import { type HeaderRow, headerLines, headerRow, parametersRead } from '../header-rows.js';
import { seriesHere } from '../header-view.js';
import type { Answer } from '../message.js';
import { fieldValue, type SeriesField } from '../series-fields.js';
import type { Entry, State } from '../state.js';
import { lackNow, takeHeaderField } from './header-commands.js';

export const moveInValues =
  (by: number): Command =>
  (state) => {
    const here = headerRow(state)?.field;
    return only(pointAt({ ...state, notice: null }, neighbour(headerLines(state), ({ field }) => field === here, by)?.field ?? ''));
  };

const nothingHere = 'Nothing to type on this line';

function begin(state: State, row: HeaderRow, text: string): State {
  const isText = row.of !== null && row.of.kind !== 'number';
  return { ...pointAt(state, row.field), notice: null, entry: { field: row.field, text, ask: null, isText } };
}

/** A digit begins to type the value of the line. */
export const typeValue: Command = (state, key) => {
  const row = headerRow(state);
  if (row?.kind === 'info' || row === undefined)
    return only(say(state, undecided(state) ? 'Choose the class first: left and right' : nothingHere));
  if (row.kind === 'class') return only(say(state, 'left and right choose the class'));
  if (row.of?.kind === 'flag' || row.of?.kind === 'choice') return only(say(state, 'left and right change this line'));
  return only(begin(state, row, key.text ?? ''));
};

function undecided(state: State): boolean {
  return seriesHere(state)?.read.decision.key === null;
}

/** Enter begins to type; turns the class, a choice, yes or no. */
export const enterValue: Command = (state, key) => {
  const row = headerRow(state);
  if (row === undefined || row.kind === 'info') return typeValue(state, key);
  const turns = row.kind === 'class' || row.of?.kind === 'flag' || row.of?.kind === 'choice';
  return turns ? turn(state, row, 1, true) : only(begin(state, row, ''));
};

/** Left and right: the class, a choice, yes or no. */
export const turnValue =
  (by: -1 | 1): Command =>
  (state) => {
    const row = headerRow(state);
    return row === undefined ? only(state) : turn(state, row, by, false);
  };

function turn(state: State, row: HeaderRow, by: -1 | 1, goesRound: boolean): Change {
  const one = seriesHere(state);
  if (one === undefined) return only(state);
  if (row.kind === 'class') return askClass(state, one.read.id, nextOf(classKeys, one.read.decision.key, by, goesRound));
  const { of } = row;
  const known = parametersRead(one);
  if (of === null || known === null || (of.kind !== 'flag' && of.kind !== 'choice'))
    return only(say(state, row.of === null ? nothingHere : 'Enter begins typing'));
  const words = of.kind === 'flag' ? ['no', 'yes'] : of.choices;
  const value = fieldValue(of, known.parameters);
  const now = of.kind === 'flag' ? (value === true ? 'yes' : 'no') : String(value);
  return only(takeText(state, of, nextOf(words, now, by, goesRound)));
}

function nextOf<T>(all: readonly T[], now: T | null, by: -1 | 1, goesRound: boolean): T {
  const at = now === null ? (by > 0 ? -1 : all.length) : all.indexOf(now);
  const next = at + by;
  return (goesRound ? all[(next + all.length) % all.length] : all[Math.min(all.length - 1, Math.max(0, next))]) as T;
}

/** Has the series read as of a class; null: as its headers say. */
function askClass(state: State, id: string, key: ClassKey | null): Change {
  const ask = state.asks + 1;
  return [
    { ...pointAt(state, 'class'), notice: null, asks: ask, open: { ...state.open, headerClass: ask } },
    [{ kind: 'class-headers', ask, id, key }],
  ];
}

/** Takes a series that was read anew. */
export function takeHeaderClass(state: State, answer: Answer, failed: string | null): State {
  const { found } = state.headers;
  if (answer.kind !== 'header-series' || found === null) return say(state, failed ?? 'The class could not be taken', 'trouble');
  const series = found.series.map((one) => (one.id === answer.series.id ? answer.series : one));
  const next = { ...state, headers: { ...state.headers, found: { ...found, series } } };
  return state.entry === null && state.place.screen === 'header-values' ? say(next, `${answer.series.id}: ${lackNow(next)}`) : next;
}

/** The line back to what the header says. */
export const clearValue: Command = (state) => {
  const row = headerRow(state);
  const one = seriesHere(state);
  if (row === undefined || one === undefined) return only(state);
  if (row.kind === 'class')
    return one.read.decision.reason === 'typed' ? askClass(state, one.read.id, null) : only(say(state, 'The class is as the header says'));
  if (row.kind === 'fieldT') return only(say({ ...state, headers: { ...state.headers, fieldT: null } }, 'The field is as the headers say'));
  const key = row.of?.key;
  if (key === undefined || one.typed[key] === undefined) return only(say(state, 'Nothing was typed on this line'));
  const { [key]: _gone, ...rest } = one.typed;
  return only(say(withTyped(state, one, rest as GivenParameters), `${row.label}: as the header says`));
};

function withTyped(state: State, { read }: SeriesToDraft, typed: GivenParameters): State {
  return { ...state, headers: { ...state.headers, typed: { ...state.headers.typed, [read.id]: typed } } };
}

/** Takes what was typed on a line; what is no number may be an expression. */
export function commitHeaderValue(state: State, entry: Entry): Change {
  const row = headerLines(state).find(({ field }) => field === entry.field);
  if (row === undefined || entry.text.trim() === '') return only({ ...state, entry: null });
  if (row.kind === 'fieldT') return only(takeHeaderField(state, entry.text));
  if (row.of === null) return only({ ...state, entry: null });
  const taken = takeText(state, row.of, entry.text);
  if (taken.entry === null || row.of.kind !== 'number' || !isExpression(state, row.of, entry.text)) return only(taken);
  const ask = state.asks + 1;
  const known = seriesHere(state);
  const value = known === undefined ? undefined : fieldValue(row.of, parametersRead(known)?.parameters as never);
  const own = { name: row.of.path, unit: row.of.unit, value: typeof value === 'number' && Number.isFinite(value) ? value : null };
  return [
    { ...state, asks: ask, open: { ...state.open, expression: ask }, entry: { ...entry, ask } },
    [{ kind: 'read-expression', ask, text: entry.text, own }],
  ];
}

function isExpression(state: State, field: SeriesField, text: string): boolean {
  const read = readField(state, field, text);
  return read !== null && !read.ok && read.problems[0]?.code === 'not-a-quantity';
}

/** The number that an expression gave. */
export function takeHeaderExpression(state: State, entry: Entry, value: number): State {
  const field = headerLines(state).find((row) => row.field === entry.field)?.of;
  if (field == null) return { ...state, entry: null };
  const taken = takeText(state, field, String(Number(value.toPrecision(12))));
  return taken.entry === null ? taken : { ...taken, entry: { ...entry, ask: null } };
}

function readField(state: State, field: SeriesField, text: string) {
  const one = seriesHere(state);
  const known = one === undefined ? null : parametersRead(one);
  if (known === null) return null;
  return readSetValues([`${field.path}=${text}`, ...averagesFor(field, text, known.parameters.diffusion?.averages)], {
    parameters: known.parameters,
  });
}

/** Another number of b-values brings averages for each: the last one is repeated. */
function averagesFor(field: SeriesField, text: string, averages: readonly number[] | undefined): string[] {
  if (field.path !== 'diffusion.bValuesSPerMm2' || averages === undefined) return [];
  const count = text.split(',').length;
  if (count === averages.length) return [];
  return [`diffusion.averages=${Array.from({ length: Math.min(count, 64) }, (_, at) => averages[at] ?? averages.at(-1) ?? 1).join(',')}`];
}

/** Sets one line of the series that is reviewed, within its unit and range; what cannot be taken is said and stays typed. */
function takeText(state: State, field: SeriesField, text: string): State {
  const one = seriesHere(state);
  const read = readField(state, field, text);
  if (one === undefined || read === null) return say(state, 'Choose the class first: left and right on its line', 'trouble');
  if (field.key === 'diffusion' && field.inner !== 'bValuesSPerMm2' && !hasDiffusion(one))
    return say(state, 'Type the b-values first', 'trouble');
  if (!read.ok) return say(state, (read.problems[0]?.message ?? 'Not understood').replace(`${field.path}: `, ''), 'trouble');
  const next = withTyped({ ...state, entry: null }, one, { ...one.typed, ...read.value });
  return say(next, `${field.label}: ${lackNow(next)}`);
}

function hasDiffusion({ read, typed }: SeriesToDraft): boolean {
  const key: ParameterKey = 'diffusion';
  return typed[key] !== undefined || read.values.some((value) => value.key === key && value.value !== undefined);
}
