import { readSetValues } from '../../study/set-values.js';
import type { Change } from '../change.js';
import { only, say } from '../change.js';
import type { KeyPress } from '../message.js';
import { resultNow } from '../results.js';
import { sayField } from '../say-field.js';
import { fieldValue, type SeriesField, withField } from '../series-fields.js';
import { setField } from '../set-field.js';
import type { Entry, State } from '../state.js';
import { snapValue } from '../step-value.js';
import { takeCarryField } from './carry-commands.js';
import { commitRow } from './form-commands.js';
import { commitPath } from './header-commands.js';
import { commitHeaderValue, takeHeaderExpression } from './header-value-commands.js';
import { commitRelease } from './release-commands.js';
import { fieldsHere } from './series-commands.js';

/** A path may be longer than any value. */
const longestEntry = ({ field }: Entry) => (field === 'path' ? 4096 : 160);

/** A key while something is typed. */
export function typeKey(state: State, entry: Entry, key: KeyPress): Change {
  const close = (next: State): State => ({ ...next, entry: null });
  if (key.name === 'escape') return only(say(close(state), 'Not changed'));
  if (entry.ask !== null) return only(say(state, 'The expression is being read; Escape leaves it'));
  if (key.name === 'enter') return commit(state, entry);
  if (key.name === 'backspace') {
    const text = [...entry.text].slice(0, -1).join('');
    return only({ ...state, notice: null, entry: { ...entry, text } });
  }
  if (key.name !== 'text' && key.name !== 'paste') return only(state);
  const text = (entry.text + (key.text ?? '').replace(/[\p{Cc}\p{Cf}]+/gu, ' ')).slice(0, longestEntry(entry));
  return only({ ...state, notice: null, entry: { ...entry, text } });
}

/** Takes what was typed. */
function commit(state: State, entry: Entry): Change {
  if (state.place.screen === 'release') return commitRelease(state, entry.field, entry.text);
  if (state.place.screen === 'carry') return only(takeCarryField(state, entry.text));
  if (state.place.screen === 'headers') return commitPath(state, entry.text);
  if (state.place.screen === 'header-values') return commitHeaderValue(state, entry);
  if (state.place.screen !== 'series') return only(commitRow(state, entry.field, entry.text));
  const field = fieldsHere(state).find(({ path }) => path === entry.field);
  if (field === undefined || entry.text.trim() === '') return only({ ...state, entry: null });
  const { parameters } = resultNow(state, state.place.seriesId);
  const read = isExpression(entry.text) ? null : readSetValues([`${field.path}=${entry.text}`], { parameters });
  if (read?.ok) return only(takeTyped(state, field, read.value));
  const problem = read?.problems[0];
  // Unreadable as a number: it may be an expression. Out of range or a wrong unit is said at once.
  if (field.kind !== 'number' || (problem !== undefined && problem.code !== 'not-a-quantity'))
    return only(say(state, problem?.message.replace(`${field.path}: `, '') ?? 'Not understood', 'trouble'));
  const ask = state.asks + 1;
  const value = fieldValue(field, parameters);
  const own = { name: field.path, unit: field.unit, value: typeof value === 'number' ? value : null };
  return [
    { ...state, asks: ask, open: { ...state.open, expression: ask }, entry: { ...entry, ask } },
    [{ kind: 'read-expression', ask, text: entry.text, own }],
  ];
}

/** Starts with an operator, so it goes on from the present value; everything else with operators shows as no quantity. */
function isExpression(text: string): boolean {
  return /^\s*[-+*/^]/.test(text);
}

/** The number that an expression gave. */
export function takeExpression(state: State, entry: Entry, value: number): State {
  if (state.place.screen === 'header-values') return takeHeaderExpression(state, entry, value);
  const field = fieldsHere(state).find(({ path }) => path === entry.field);
  if (field === undefined) return { ...state, entry: null };
  const read = readSetValues([`${field.path}=${plainNumber(snapValue(field, value))}`], {
    parameters: resultNow(state, state.place.seriesId).parameters,
  });
  if (!read.ok)
    return say({ ...state, entry: { ...entry, ask: null } }, (read.problems[0]?.message ?? '').replace(`${field.path}: `, ''), 'trouble');
  const typed = withField(field, value, resultNow(state, state.place.seriesId).parameters);
  return takeTyped(state, field, typed as never);
}

function plainNumber(value: number): string {
  return Number.isInteger(value) && Math.abs(value) < 1e15 ? String(value) : String(Number(value.toPrecision(12)));
}

function takeTyped(state: State, field: SeriesField, values: Readonly<Record<string, unknown>>): State {
  const outer = values[field.key];
  const typed = field.inner === null ? outer : (Object(outer) as Record<string, unknown>)[field.inner];
  const value = typeof typed === 'number' ? snapValue(field, typed) : typed;
  const next = setField({ ...state, entry: null }, state.place.seriesId, field, value);
  if (typeof typed !== 'number' || typeof value !== 'number' || Math.abs(typed - value) < 1e-9 || next.notice?.level === 'trouble')
    return next;
  const shown = sayField(field, value);
  return say(next, `${next.notice?.words ?? ''} (${Number(typed.toPrecision(6))} is taken as ${shown}: the nearest that is accepted)`);
}
