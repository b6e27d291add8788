import { textWidth } from '../terminal/text-width.js';
import { type Line, line } from './line.js';

/** Rows of words in columns as wide as their longest word, the titles first; the last column is cut where there is no room. */
export function tableLines(table: readonly (readonly string[])[], columns: number): Line[] {
  const widths = (table[0] ?? []).map((_, at) => Math.max(...table.map((row) => textWidth(row[at] ?? ''))));
  const gap = widths.reduce((sum, width) => sum + width + 2, -2) > columns ? ' ' : '  ';
  return table.map((row, at) => {
    const text = row.map((word, column) => word + ' '.repeat((widths[column] ?? 0) - textWidth(word))).join(gap);
    return line(text.trimEnd(), at === 0 ? 'quiet' : 'plain');
  });
}
