import type { Emphasis } from '../session/text-page.js';

/** Codes of ECMA-48 (SGR): named colours alone, so that they follow the terminal's own theme. */
const codes: Readonly<Record<Emphasis, number>> = { heading: 1, fits: 32, close: 33, over: 31, quiet: 2 };

/**
 * Marks text by its meaning, or leaves it as it is where there is no colour.
 *
 * @example emphasise(false)('over', 'OVER') //=> 'OVER'
 */
export function emphasise(coloured: boolean): (kind: Emphasis, text: string) => string {
  return coloured ? (kind, text) => `\u001b[${codes[kind]}m${text}\u001b[0m` : (_kind, text) => text;
}
