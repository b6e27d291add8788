import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { parameterWords } from '../study/record-changes.js';

/**
 * A parameter's value with its unit, with no more digits than a person types: two after the point, more only where the table has them, and no trailing zeros.
 *
 * @example sayParameter('repetitionTimeMs', 3.19526) //=> '3.2 ms'
 */
export function sayParameter(key: ParameterKey, value: unknown): string {
  const row = parameterRow(key);
  const digits = row.kind === 'number' ? Math.max(2, row.digits) : 0;
  return parameterWords(key, typeof value === 'number' ? Number(value.toFixed(digits)) : value);
}
