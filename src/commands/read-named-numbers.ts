import type { Body } from '../calc/body.js';
import { type Readings, readingKeys } from '../calc/reading.js';
import { readQuantity } from '../formulas/read-quantity.js';
import { shownValue } from '../study/clean-text.js';
import { presetLimits } from '../study/limits.js';
import { nearestWord } from '../study/nearest-word.js';
import { type Attempt, wrongUse } from './attempt.js';

/** Largest number that is still no slip of the keyboard: common practice, no source. */
const bounds: Readonly<Record<string, { readonly unit: string; readonly max: number }>> = {
  AP: { unit: 'mm', max: 2000 },
  RL: { unit: 'mm', max: 2000 },
  timeS: { unit: 's', max: 36_000 },
  b1rmsUt: { unit: 'uT', max: 100 },
  sarWkg: { unit: 'W/kg', max: 100 },
};

/** Reads `NAME=NUMBER` for one of the names; numbers are above 0. */
function readNamed(option: string, text: string, names: readonly string[], example: string): Attempt<readonly [string, number]> {
  const [name = '', value, ...more] = text.split('=').map((part) => part.trim());
  if (value === undefined || more.length > 0)
    return wrongUse(option, `${option} takes NAME=NUMBER; ${shownValue(text)} was given.`, `Write ${option} ${example}.`);
  if (!names.includes(name)) {
    const near = nearestWord(name, names);
    return wrongUse(
      option,
      `${option} knows ${names.join(', ')}; ${shownValue(name)} was given.`,
      near === null ? `Write ${option} ${example}.` : `Did you mean ${near}?`,
    );
  }
  const { unit, max } = bounds[name] as { unit: string; max: number };
  const read = readQuantity(value, unit);
  if (!read.ok)
    return wrongUse(option, `${option} ${name} takes ${read.expected}; ${shownValue(value)} was given.`, `Write ${option} ${example}.`);
  if (read.value <= 0 || read.value > max)
    return wrongUse(
      option,
      `${option} ${name} takes more than 0 and at most ${max} ${unit}; ${shownValue(value)} was given.`,
      'Check the number.',
    );
  return { ok: true, value: [name, read.value] };
}

/** Reads `AP=MM,RL=MM`: one or both extents. */
export function readBody(text: string | undefined): Attempt<Body> {
  const extents: Record<string, number> = {};
  for (const part of text === undefined ? [] : text.split(',')) {
    const read = readNamed('--body', part, ['AP', 'RL'], 'AP=250,RL=430');
    if (!read.ok) return read;
    const [name, value] = read.value;
    if (name in extents) return wrongUse('--body', `--body names ${name} twice.`, 'Write --body AP=250,RL=430.');
    extents[name] = value;
  }
  return { ok: true, value: { frontBackMm: extents.AP ?? null, leftRightMm: extents.RL ?? null } };
}

/** Reads what the scanner displays for the preset. */
export function readReadings(texts: readonly string[]): Attempt<Readings> {
  const readings: Record<string, number> = {};
  for (const text of texts) {
    const read = readNamed('--reading', text, readingKeys, 'b1rmsUt=2.8');
    if (!read.ok) return read;
    const [name, value] = read.value;
    if (name in readings) return wrongUse('--reading', `--reading names ${name} twice.`, 'Give it once.');
    readings[name] = value;
  }
  return { ok: true, value: readings };
}

/** Reads a field strength in tesla; null when none was given. */
export function readField(text: string | undefined, option = '--field'): Attempt<number | null> {
  if (text === undefined) return { ok: true, value: null };
  const read = readQuantity(text, 'T');
  const { min, max } = presetLimits.fieldT;
  if (!read.ok || read.value < min || read.value > max) {
    return wrongUse(
      option,
      `${option} takes a field strength from ${min} to ${max} T; ${shownValue(text)} was given.`,
      `Write ${option} 1.5.`,
    );
  }
  return { ok: true, value: read.value };
}
