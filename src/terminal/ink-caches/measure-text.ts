import { textWidth } from '../text-width.js';
import { boundedCache } from './bounded-cache.js';

/** Columns and lines that a text takes. */
export interface TextSize {
  readonly width: number;
  readonly height: number;
}

/** The program draws whole screens as one text: a few are enough, and many would be large. */
const cache = boundedCache<TextSize>(16);

/** SGR sequences, which take no column. */
const esc = '\u001b';
const styles = new RegExp(`${esc}\\[[0-9;:]*m`, 'g');

/**
 * The same as ink's `measure-text`, but what it remembers is bounded, and plain characters are counted without a look at each.
 *
 * @example measureText('ab\nc') //=> { width: 2, height: 2 }
 */
export function measureText(text: string): TextSize {
  if (text === '') return { width: 0, height: 0 };
  const known = cache.get(text);
  if (known !== undefined) return known;
  const lines = (text.includes(esc) ? text.replace(styles, '') : text).split('\n');
  let width = 0;
  for (const line of lines) width = Math.max(width, textWidth(line));
  const size = { width, height: lines.length };
  cache.set(text, size);
  return size;
}

/** The same as the package that ink asks for the width of a text. */
export function widestLine(text: string): number {
  return measureText(text).width;
}
