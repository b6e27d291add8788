import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { shownValue } from './clean-text.js';
import type { Range } from './study.js';

/** Steps of one range: more would never be looked through. */
const mostSteps = 10_000;

/** What is wrong with the range of a parameter, or null: a search may only offer values that the table allows. */
export function rangeFault(key: ParameterKey, range: Range): { readonly given: string; readonly expected: string } | null {
  const row = parameterRow(key);
  if (row.kind === 'object') return { given: `a range for "${key}"`, expected: 'ranges of single values' };
  if ('step' in range) {
    if (row.kind !== 'number') return { given: 'steps were given', expected: 'a list of values' };
    if (range.min > range.max) return { given: `min ${range.min} is above max ${range.max}`, expected: 'min first' };
    if ((range.max - range.min) / range.step > mostSteps) return { given: `more than ${mostSteps} steps`, expected: 'a larger step' };
  }
  const values: readonly unknown[] = 'step' in range ? [range.min, range.max] : range;
  for (const value of values) {
    const given = `${shownValue(value)} was given`;
    if (row.kind === 'number') {
      const low = row.aboveMin === true ? 'more than ' : '';
      const inside = typeof value === 'number' && value <= row.max && (low === '' ? value >= row.min : value > row.min);
      if (!inside || (row.whole === true && !Number.isInteger(value))) {
        return { given, expected: `${row.whole === true ? 'whole numbers' : 'numbers'} from ${low}${row.min} to ${row.max}` };
      }
    } else if (row.kind === 'flag' ? typeof value !== 'boolean' : !row.choices.includes(value as string)) {
      return { given, expected: row.kind === 'flag' ? 'true and false' : row.choices.join(', ') };
    }
  }
  return null;
}
