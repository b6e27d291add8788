import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { type InnerRow, innerKeys, mostBValues } from '../study/inner-keys.js';
import { type Found, missingFor } from './found.js';

/** True for a number that a row allows. */
function allows(
  row: { readonly min: number; readonly max: number; readonly aboveMin?: true; readonly whole?: true },
  value: unknown,
): boolean {
  if (typeof value !== 'number' || (row.whole === true && !Number.isInteger(value))) return false;
  return value <= row.max && (row.aboveMin === true ? value > row.min : value >= row.min);
}

function allowsInner(row: InnerRow | undefined, value: unknown): boolean {
  if (row === undefined) return false;
  if (row.kind === 'number') return allows(row, value);
  if (row.kind !== 'numbers') return true;
  return Array.isArray(value) && value.length <= mostBValues && value.every((item) => allows(row, item));
}

/**
 * What was found, if a preset may hold it: a value out of its range is named and counts as missing. Counts that lie within a
 * hundredth of a whole number become it.
 *
 * @example withinRange('repetitionTimeMs', readAs(0, 'RepetitionTime')).origin //=> 'missing'
 */
export function withinRange(key: ParameterKey, found: Found): Found {
  const row = parameterRow(key);
  if (found.value === undefined) return found;
  if (row.kind === 'number') {
    const given = found.value as number;
    const value = row.whole === true && Math.abs(Math.round(given) - given) < 0.01 ? Math.round(given) : given;
    return allows(row, value) ? { ...found, value } : missingFor(`${found.words} gives ${given}, which no series here may have`);
  }
  if (key !== 'pacing' && key !== 'diffusion') return found;
  const inside = Object.entries(found.value as object).every(([name, value]) => allowsInner(innerKeys[key][name], value));
  return inside ? found : missingFor(`${found.words}: a value that no series here may have`);
}
