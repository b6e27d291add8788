import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { isRemembered } from './known-values.js';
import { type RecordedLimits, recordVersion } from './record.js';
import { holdStates, outcomeWords, qualityWords, recommendationWords } from './record-words.js';

/** Where a record has not the shape of the format, and what was expected there. */
export interface ShapeFault {
  readonly path: string;
  readonly expected: string;
}

/** What is wrong with a value, its path counted from the value itself; null when nothing is. Paths are only put together on a fault. */
type Check = (value: unknown) => ShapeFault | null;

const text: Check = (value) => (typeof value === 'string' ? null : { path: '', expected: 'text' });
const number: Check = (value) => (typeof value === 'number' ? null : { path: '', expected: 'a number' });
const flag: Check = (value) => (typeof value === 'boolean' ? null : { path: '', expected: 'true or false' });

function exactly(wanted: string | number): Check {
  return (value) => (value === wanted ? null : { path: '', expected: JSON.stringify(wanted) });
}

function wordOf(words: readonly string[]): Check {
  return (value) => (typeof value === 'string' && words.includes(value) ? null : { path: '', expected: `one of ${words.join(', ')}` });
}

function orNull(check: Check): Check {
  return (value) => (value === null ? null : check(value));
}

/** A fault inside a value, its path counted from the value that holds it. */
function within(key: string | number, { path, expected }: ShapeFault): ShapeFault {
  return { path: path === '' ? String(key) : `${key}.${path}`, expected };
}

function listOf(check: Check): Check {
  return (value) => {
    if (!Array.isArray(value)) return { path: '', expected: 'a list' };
    for (let index = 0; index < value.length; index += 1) {
      const fault = check(value[index]);
      if (fault !== null) return within(index, fault);
    }
    return null;
  };
}

/** An object with at least these keys; more are left alone, so that a later program may add some. */
function withKeys(checks: Readonly<Record<string, Check>>): Check {
  const keys = Object.keys(checks);
  const wanted = Object.values(checks);
  return (value) => {
    if (!isObject(value)) return { path: '', expected: 'an object' };
    const given = Object.keys(value);
    const inners = Object.values(value);
    for (let i = 0; i < keys.length; i += 1) {
      const key = keys[i] as string;
      // Records are written in this order: only others are looked up.
      const fault = (wanted[i] as Check)(given[i] === key ? inners[i] : value[key]);
      if (fault !== null) return within(key, fault);
    }
    return null;
  };
}

/** An object that may have these keys and others. Walked is what is there, as lists: to look for each key takes several times as long. */
function withSomeKeys(checks: Readonly<Record<string, Check>>): Check {
  const known = new Map(Object.entries(checks));
  return (value) => {
    if (!isObject(value)) return { path: '', expected: 'an object' };
    const keys = Object.keys(value);
    const inners = Object.values(value);
    for (let i = 0; i < keys.length; i += 1) {
      const key = keys[i] as string;
      const inner = inners[i];
      const check = known.get(key);
      // Most are numbers: no call for these.
      if (check === undefined || (check === number && typeof inner === 'number')) continue;
      const fault = check(inner);
      if (fault !== null) return within(key, fault);
    }
    return null;
  };
}

function both(first: Check, second: Check): Check {
  return (value) => first(value) ?? second(value);
}

/** An object of numbers, each perhaps null. */
const numbersOrNull: Check = (value) => {
  if (!isObject(value)) return { path: '', expected: 'an object' };
  const inners = Object.values(value);
  for (let i = 0; i < inners.length; i += 1) {
    if (typeof inners[i] !== 'number' && inners[i] !== null) return { path: Object.keys(value)[i] as string, expected: 'a number' };
  }
  return null;
};

const anything: Check = () => null;

const day: Check = (value) => (typeof value === 'string' && isDay(value) ? null : { path: '', expected: 'a day as YYYY-MM-DD, or null' });

const listOfNumbers = listOf(number);

/** Parameters that are objects; what a list or a period holds is read by code that expects numbers there. */
const objectParameters: Readonly<Record<string, Check>> = {
  pacing: both(withKeys({ kind: text }), withSomeKeys({ periodMs: number, windowMs: number, breathHold: flag })),
  diffusion: withKeys({ bValuesSPerMm2: listOfNumbers, directions: number, averages: listOfNumbers }),
};

const parameterChecks = Object.fromEntries(parameterKeys.map((key) => [key, parameterCheck(key)]));

function parameterCheck(key: ParameterKey): Check {
  const row = parameterRow(key);
  if (row.kind === 'number') return number;
  if (row.kind === 'flag') return flag;
  // A choice of a later program is no damage.
  return row.kind === 'choice' ? text : (objectParameters[key] ?? anything);
}

const values = withKeys({ parameters: withSomeKeys(parameterChecks), figures: numbersOrNull });

/** Remembered planned values that were found right: a reader of many records meets the same objects again and again. */
const rightPlans = new WeakSet<object>();

const plannedValues: Check = (value) => {
  if (isObject(value) && rightPlans.has(value)) return null;
  const fault = values(value);
  if (fault === null && isRemembered(value as object)) rightPlans.add(value as object);
  return fault;
};

const usedValues: Check = (value) => (isObject(value) && rightPlans.has(value) ? null : values(value));

const conditions = withKeys({ coil: orNull(text), fieldT: number, frontBackMm: orNull(number), leftRightMm: orNull(number) });

const comparedReading = withKeys({ predicted: number, read: number, ratio: number });
const comparedNumbers = withSomeKeys({ timeS: comparedReading, b1rmsUt: comparedReading, sarWkg: comparedReading });
const compared = withKeys({ before: comparedNumbers, after: comparedNumbers });

const reading = withSomeKeys({
  conditions,
  timeS: number,
  b1rmsUt: number,
  sarWkg: number,
  operatingMode: text,
  changedByScanner: text,
  notModelled: listOf(text),
});

const limitChecks: Readonly<Record<keyof RecordedLimits, Check>> = {
  holdS: orNull(number),
  holdsAvailable: orNull(number),
  holdState: orNull(wordOf(holdStates)),
  minutesLeft: orNull(number),
  longestSeriesS: orNull(number),
  b1rmsCapUt: orNull(number),
  b1rmsReadFrom: orNull(text),
  sarCapWkg: orNull(number),
  sarReadFrom: orNull(text),
  labelConditions: listOf(text),
  frontBackMm: orNull(number),
  leftRightMm: orNull(number),
  contrastGiven: orNull(flag),
};

const record = withKeys({
  format: exactly('holdfast record'),
  version: exactly(recordVersion),
  id: text,
  tool: text,
  model: text,
  day: orNull(day),
  preset: withKeys({ id: text, revision: number, hash: text }),
  region: text,
  fieldT: number,
  scanner: text,
  coil: orNull(text),
  role: text,
  initials: orNull(text),
  reasons: listOf(text),
  limits: withKeys(limitChecks),
  series: listOf(
    both(
      withSomeKeys({ class: text }),
      withKeys({
        id: text,
        outcome: wordOf(Object.keys(outcomeWords)),
        reason: text,
        quality: orNull(wordOf(Object.keys(qualityWords))),
        planned: plannedValues,
        used: usedValues,
        crossed: listOf(withKeys({ rule: text, role: orNull(text) })),
        readings: both(withKeys({ before: orNull(reading), after: orNull(reading) }), withSomeKeys({ compared })),
      }),
    ),
  ),
  recommendation: orNull(wordOf(Object.keys(recommendationWords))),
});

/** The first place where a value read from a file is no record, or null when it is one. */
export function faultOfRecord(value: unknown): ShapeFault | null {
  return record(value);
}

/**
 * True for a day of the calendar written YYYY-MM-DD, without a time.
 *
 * `2026-02-29` is none.
 */
function isDay(given: string): boolean {
  const parts = /^(\d{4})-(\d{2})-(\d{2})$/.exec(given);
  if (parts === null) return false;
  const [year, month, date] = [Number(parts[1]), Number(parts[2]), Number(parts[3])];
  const leap = year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
  const days = [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31][month - 1];
  return days !== undefined && date >= 1 && date <= days;
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
