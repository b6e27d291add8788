import cliTruncate from 'cli-truncate';
import wrapAnsi from 'wrap-ansi';
import { boundedCache } from './bounded-cache.js';

/** Ink's values of `textWrap`. */
export type TextWrap = 'wrap' | 'end' | 'middle' | 'truncate' | 'truncate-end' | 'truncate-middle' | 'truncate-start';

const cache = boundedCache<string>(1000);

function wrapped(text: string, maxWidth: number, wrapType: TextWrap): string {
  if (wrapType === 'wrap') return wrapAnsi(text, maxWidth, { trim: false, hard: true });
  if (!wrapType.startsWith('truncate')) return text;
  const position = wrapType === 'truncate-middle' ? 'middle' : wrapType === 'truncate-start' ? 'start' : 'end';
  return cliTruncate(text, maxWidth, { position });
}

/** The same as ink's `wrap-text`, but what it remembers is bounded. */
export function wrapText(text: string, maxWidth: number, wrapType: TextWrap): string {
  const key = `${maxWidth} ${wrapType} ${text}`;
  const known = cache.get(key);
  if (known !== undefined) return known;
  const result = wrapped(text, maxWidth, wrapType);
  cache.set(key, result);
  return result;
}
