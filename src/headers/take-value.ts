import { type Attributes, attributeRow, type Keyword } from './attribute-table.js';

/** Values of one attribute beyond this are dropped: none of the list has more. */
const mostValues = 16;

function areFinite(values: readonly unknown[]): values is readonly number[] {
  for (const value of values) if (typeof value !== 'number' || !Number.isFinite(value)) return false;
  return true;
}

/**
 * Puts the values of one attribute among those that were taken, if they are what the allow-list says: finite numbers, or words that the
 * standard lists (any other word is dropped, the listed ones beside it stay).
 *
 * @example takeValue(taken, 'ScanningSequence', ['GR', 'my own note']) // taken.ScanningSequence is ['GR']
 */
export function takeValue(into: Attributes, keyword: Keyword, values: readonly unknown[]): void {
  if (values.length === 0 || values.length > mostValues) return;
  const row = attributeRow(keyword);
  const target = into as Record<string, readonly unknown[]>;
  if (row.kind === 'numbers') {
    if (areFinite(values)) target[keyword] = values;
    return;
  }
  const words = values.filter((value): value is string => typeof value === 'string' && row.words.includes(value));
  if (words.length > 0) target[keyword] = words;
  const unlisted = values.length - words.length - values.filter((value) => value === '').length;
  if (keyword === 'ScanOptions' && unlisted > 0) target['UnlistedScanOptions'] = [unlisted];
}
