import { type ParameterKey, type ParameterRow, parameterKeys, parameterRow } from '../calc/parameters.js';
import type { Outcome, Problem } from '../calc/problem.js';
import type { GivenParameters, Series } from '../calc/series.js';
import { readQuantity } from '../formulas/read-quantity.js';
import { cleanText } from './clean-text.js';
import { type InnerRow, innerKeys, mostBValues } from './inner-keys.js';
import { nearestWord } from './nearest-word.js';
import { parameterClashes } from './parameter-checks.js';
import { suggestParameter } from './suggest-key.js';

type Bounds = { readonly min: number; readonly max: number; readonly aboveMin?: true; readonly whole?: true };

function refused(code: string, path: string, message: string, hint: string): { ok: false; problems: Problem[] } {
  return { ok: false, problems: [{ code, path, message: `${path}: ${message}.`, hint }] };
}

const rangeInWords = (row: Bounds, unit: string) =>
  `${row.whole ? 'a whole number' : 'a number'} from ${row.aboveMin ? 'more than ' : ''}${row.min} to ${row.max}${unit === '' ? '' : ` ${unit}`}`;

/** A number within the bounds of its row. */
function readNumber(path: string, text: string, row: Bounds & { readonly unit: string }): Outcome<number> {
  const given = `"${cleanText(text, 40)}" was given`;
  const range = rangeInWords(row, row.unit);
  const read = readQuantity(text, row.unit);
  if (!read.ok) {
    const hint = /^[+-]?\d+,\d+/.test(text.trim())
      ? 'Write decimals with a point.'
      : 'Write a number such as 1.5, alone or with one of these units.';
    return refused('not-a-quantity', path, `${given}; expected ${read.expected}, ${range}`, hint);
  }
  const { value } = read;
  const inside = value <= row.max && (row.aboveMin ? value > row.min : value >= row.min) && (!row.whole || Number.isInteger(value));
  return inside ? read : refused('out-of-range', path, `${given}; expected ${range}`, 'Give a number within the range.');
}

function readFlag(path: string, text: string): Outcome<boolean> {
  if (text === 'true' || text === 'yes') return { ok: true, value: true };
  if (text === 'false' || text === 'no') return { ok: true, value: false };
  return refused('wrong-type', path, `"${cleanText(text, 40)}" was given; expected true or false`, 'Write true or false.');
}

function readChoice(path: string, text: string, choices: readonly string[]): Outcome<string> {
  const exact = choices.find((choice) => choice.toLowerCase() === text.toLowerCase());
  if (exact !== undefined) return { ok: true, value: exact };
  const near = nearestWord(text, choices);
  const hint = near === null ? 'Use one of these words.' : `Did you mean "${near}"?`;
  return refused('unknown-word', path, `"${cleanText(text, 40)}" was given; expected ${choices.join(', ')}`, hint);
}

/** `0,1000` or `[0, 1000]`: a list of numbers. */
function readNumbers(path: string, text: string, row: Extract<InnerRow, { min: number }>): Outcome<readonly number[]> {
  const items = text.replace(/^\[(.*)\]$/, '$1').split(',');
  if (items.length > mostBValues)
    return refused('wrong-length', path, `${items.length} numbers were given; expected at most ${mostBValues}`, 'Give fewer.');
  const values: number[] = [];
  for (const item of items) {
    const read = readNumber(path, item, row);
    if (!read.ok) return read;
    values.push(read.value);
  }
  return { ok: true, value: values };
}

function readInner(path: string, text: string, row: InnerRow): Outcome<unknown> {
  if (row.kind === 'flag') return readFlag(path, text);
  if (row.kind === 'choice') return readChoice(path, text, row.choices);
  return row.kind === 'number' ? readNumber(path, text, row) : readNumbers(path, text, row);
}

function readOuter(path: string, text: string, row: ParameterRow): Outcome<unknown> {
  if (row.kind === 'number') return readNumber(path, text, row);
  if (row.kind === 'flag') return readFlag(path, text);
  if (row.kind === 'choice') return readChoice(path, text, row.choices);
  return refused(
    'wrong-type',
    path,
    'one value was given for several; expected a key inside it, such as diffusion.directions',
    'Reach inside with a dot.',
  );
}

function unknownKey(path: string, near: string | null, known: string): { ok: false; problems: Problem[] } {
  return refused(
    'unknown-key',
    path,
    `no such parameter; expected ${near === null ? known : `"${near}"`}`,
    near === null ? 'See "holdfast figures --help" for the keys.' : `Did you mean "${near}"?`,
  );
}

/** One `KEY=VALUE` into the values collected so far. */
function readOne(entry: string, series: Pick<Series, 'parameters'>, values: Record<string, unknown>): Outcome<null> {
  const equals = entry.indexOf('=');
  const path = cleanText(equals === -1 ? entry : entry.slice(0, equals), 60);
  const text = equals === -1 ? '' : entry.slice(equals + 1).trim();
  if (equals === -1 || path === '' || text === '') {
    return refused(
      'set-form',
      path === '' ? 'value to set' : path,
      `"${cleanText(entry, 60)}" was given; expected KEY=VALUE`,
      'Write for example averages=2 or "fieldOfViewMm=38 cm".',
    );
  }
  const [outer = '', ...rest] = path.split('.');
  if (!(parameterKeys as readonly string[]).includes(outer)) return unknownKey(path, suggestParameter(outer), 'a parameter key');
  const key = outer as ParameterKey;
  if (rest.length === 0 && key === 'pacing') {
    // `pacing=breath-hold` is short for the kind with nothing else.
    const read = readInner('pacing', text, innerKeys.pacing.kind);
    if (!read.ok) return read;
    values[key] = { kind: read.value };
    return { ok: true, value: null };
  }
  if (rest.length === 0) {
    const read = readOuter(path, text, parameterRow(key));
    if (!read.ok) return read;
    values[key] = read.value;
    return { ok: true, value: null };
  }
  if (key !== 'pacing' && key !== 'diffusion') return unknownKey(path, key, 'a key without a dot');
  const inner = rest.join('.');
  const row = Object.hasOwn(innerKeys[key], inner) ? innerKeys[key][inner] : undefined;
  if (row === undefined) {
    const near = nearestWord(inner, Object.keys(innerKeys[key]));
    return unknownKey(path, near === null ? null : `${key}.${near}`, Object.keys(innerKeys[key]).join(', '));
  }
  const read = readInner(path, text, row);
  if (!read.ok) return read;
  values[key] = { ...((values[key] ?? series.parameters[key] ?? {}) as object), [inner]: read.value };
  return { ok: true, value: null };
}

/** What is still missing or contradictory once everything is set. */
function problemsOfWhole(values: GivenParameters, series: Pick<Series, 'parameters'>): Problem[] {
  const { diffusion } = values;
  if (diffusion !== undefined) {
    const missing = Object.keys(innerKeys.diffusion).filter((key) => (diffusion as unknown as Record<string, unknown>)[key] === undefined);
    if (missing.length > 0) {
      return [
        {
          code: 'missing-key',
          path: 'diffusion',
          message: `diffusion: ${missing.join(' and ')} missing; expected all of ${Object.keys(innerKeys.diffusion).join(', ')}.`,
          hint: 'This series has no diffusion yet: set the others too.',
        },
      ];
    }
  }
  return parameterClashes({ ...series.parameters, ...values } as GivenParameters).map(({ path, given, expected, hint }) => ({
    code: 'values-clash',
    path: path.join('.'),
    message: `${path.join('.')}: ${given}; expected ${expected}.`,
    hint,
  }));
}

/**
 * Reads what a person wants to set (`--set`, typed entry): `KEY=VALUE` with units, dots into `pacing` and `diffusion`, lists with
 * commas. Later entries win. Every entry is read, so that all problems are told at once. Values are checked against the table's
 * ranges; keys that the class does not use are taken (the model says that they have no effect).
 *
 * @example readSetValues(['fieldOfViewMm=38 cm', 'averages=2'], series) //=> { ok: true, value: { fieldOfViewMm: 380, averages: 2 } }
 */
export function readSetValues(entries: readonly string[], series: Pick<Series, 'parameters'>): Outcome<GivenParameters> {
  const values: Record<string, unknown> = {};
  const problems: Problem[] = [];
  for (const entry of entries) {
    const read = readOne(entry, series, values);
    if (!read.ok) problems.push(...read.problems);
  }
  if (problems.length === 0) problems.push(...problemsOfWhole(values as GivenParameters, series));
  return problems.length > 0 ? { ok: false, problems } : { ok: true, value: values as GivenParameters };
}
