import stringWidth from 'string-width';
import { boundedCache } from './bounded-cache.js';

/** Columns and lines that a text takes. */
export interface TextSize {
  readonly width: number;
  readonly height: number;
}

const cache = boundedCache<TextSize>(1000);

/**
 * The same as ink's `measure-text`, but what it remembers is bounded.
 *
 * @example measureText('ab\nc') //=> { width: 2, height: 2 }
 */
export function measureText(text: string): TextSize {
  if (text === '') return { width: 0, height: 0 };
  const known = cache.get(text);
  if (known !== undefined) return known;
  const lines = text.split('\n');
  const size = { width: Math.max(...lines.map((line) => stringWidth(line))), height: lines.length };
  cache.set(text, size);
  return size;
}
