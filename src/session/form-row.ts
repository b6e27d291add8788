import { readQuantity } from '../formulas/read-quantity.js';
import { freeText, identifierHint } from '../study/record-text.js';
import type { Session } from './session.js';
import type { State } from './state.js';

/** What typing a value makes of a session: the session and what was done, or why not. */
export type Written = { readonly session: Session; readonly words: string } | { readonly problem: string };

/** One line of a form: what it shows and what keys do to it. What a line cannot do is left out. */
export interface FormRow {
  readonly field: string;
  readonly label: string;
  /** What stands there now; a dash where nothing does. */
  readonly shown: string;
  readonly help: string;
  /** `number`: digits begin typing. `text`: Enter does, and every letter goes in. `info`: nothing can be done here. `note`: the hand passes over it. */
  readonly kind: 'number' | 'text' | 'choice' | 'flag' | 'action' | 'info' | 'note' | 'heading';
  readonly write?: (state: State, text: string) => Written;
  /** Left and right, minus and plus. */
  readonly turn?: (session: Session, direction: -1 | 1) => Session;
  readonly clear?: (session: Session) => Session;
  /** Stands out: something is missing here. */
  readonly attention?: true;
}

/** How a number of a form is read, stepped and kept. */
export interface NumberRow {
  readonly field: string;
  readonly label: string;
  readonly help: string;
  readonly value: number | null;
  readonly unit: 's' | '' | 'mm' | 'uT' | 'W/kg';
  readonly shown: string;
  readonly min: number;
  readonly max: number;
  readonly step: number;
  readonly whole?: true;
  /** Where stepping up begins when nothing is there. */
  readonly first: number;
  readonly keep: (session: Session, value: number | null) => Session;
  /** A word that may be typed after the number and means nothing more. */
  readonly also?: RegExp;
}

/** A line with a number. */
export function numberRow(row: NumberRow): FormRow {
  const { min, max, unit } = row;
  const range = `${min} to ${max}${unit === '' ? '' : ` ${unit}`}`;
  return {
    field: row.field,
    label: row.label,
    shown: row.shown,
    help: row.help,
    kind: 'number',
    write: (state, text) => {
      const { session } = state;
      if (session === null) return { problem: 'no session' };
      const read = readQuantity(row.also === undefined ? text : text.replace(row.also, ''), unit);
      if (!read.ok) return { problem: `${row.label}: "${freeText(text, 30)}" was given, expected ${read.expected}, ${range}` };
      const value = row.whole ? Math.round(read.value) : read.value;
      if (value < min || value > max) return { problem: `${row.label}: ${freeText(text, 30)} was given, expected ${range}` };
      return { session: row.keep(session, value), words: `${row.label} ${text}` };
    },
    turn: (session, direction) => {
      const next = row.value === null ? (direction > 0 ? row.first : null) : Math.min(max, Math.max(min, row.value + direction * row.step));
      return next === row.value ? session : row.keep(session, next === null ? null : Number(next.toFixed(4)));
    },
    clear: (session) => (row.value === null ? session : row.keep(session, null)),
  };
}

/** A line of free text, 80 characters, with the reminder that nothing may point to a patient. */
export function textRow(
  field: string,
  label: string,
  value: string | null,
  help: string,
  keep: (session: Session, text: string) => Session,
  longest = 80,
): FormRow {
  return {
    field,
    label,
    shown: value === null || value === '' ? '-' : value,
    help,
    kind: 'text',
    write: ({ session }, text) => {
      if (session === null) return { problem: 'no session' };
      const clean = freeText(text, longest);
      const hint = identifierHint(clean);
      return { session: keep(session, clean), words: hint ?? `${label}: ${clean === '' ? 'left blank' : clean}` };
    },
    clear: (session) => (value === null || value === '' ? session : keep(session, '')),
  };
}

/** A line with one of some words, or none of them. */
export function choiceRow<T extends string>(
  row: { readonly field: string; readonly label: string; readonly help: string; readonly attention?: true },
  value: T | null,
  words: Readonly<Record<T, string>>,
  keep: (session: Session, value: T | null) => Session,
): FormRow {
  const choices: readonly (T | null)[] = [null, ...(Object.keys(words) as T[])];
  const at = choices.indexOf(value);
  return {
    ...row,
    shown: value === null ? '-' : words[value],
    kind: 'choice',
    turn: (session, direction) => {
      const next = choices[at + direction];
      return next === undefined ? session : keep(session, next);
    },
    clear: (session) => (value === null ? session : keep(session, null)),
  };
}
