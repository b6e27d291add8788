import { eastAsianWidthType } from 'get-east-asian-width';
import stringWidth from 'string-width';

/**
 * Printable ASCII, Latin-1 signs, Greek letters, box drawing, blocks, braille and the signs of `glyphs.ts`: one column each, one
 * character each. Nearly all that is drawn, and counted without a look at every character.
 */
const plainText =
  /^[\x20-\x7e\u00a1-\u00a8\u00aa-\u00ac\u00af-\u00ff\u0391-\u03a1\u03a3-\u03c9\u2212\u22ef\u2500-\u259f\u25b4\u25b8\u25be\u25ca\u2713\u2717\u2800-\u28ff]*$/;

/** True where every UTF-16 unit of a text is one character of one column. */
export function isPlainText(text: string): boolean {
  return plainText.test(text);
}

/**
 * Columns that a text takes on the screen; escape sequences take none, East Asian wide characters and emoji two.
 *
 * @example textWidth('\u6f22a') //=> 3
 */
export function textWidth(text: string): number {
  return plainText.test(text) ? text.length : stringWidth(text);
}

/**
 * True if every terminal agrees on the width of these characters. Not so for those whose width depends on the font or on a
 * setting (Unicode calls it ambiguous: box drawing, blocks, arrows, Greek), nor for emoji and combining marks.
 *
 * @example isSureWidth('\u28ff') //=> true
 * @example isSureWidth('\u00b1') //=> false
 */
export function isSureWidth(text: string): boolean {
  const known = sureWidths.get(text);
  if (known !== undefined) return known;
  const sure = isEachSure(text);
  if (sureWidths.size >= mostKeptWidths) sureWidths.clear();
  sureWidths.set(text, sure);
  return sure;
}

const sureWidths = new Map<string, boolean>();
const mostKeptWidths = 2000;

function isEachSure(text: string): boolean {
  for (const character of text) {
    const code = character.codePointAt(0) ?? 0;
    if (code >= 0x20 && code < 0x7f) continue;
    const type = eastAsianWidthType(code);
    if (type === 'ambiguous' || code < 0xa0 || /\p{Emoji}|\p{Mark}|\p{Format}/u.test(character)) return false;
  }
  return true;
}

/** Made at its first use: that reads tables of the system, which the start need not wait for. */
let graphemes: Intl.Segmenter | null = null;

/** The characters of a text as people count them: a letter with its accents is one. */
export function graphemesOf(text: string): readonly string[] {
  graphemes ??= new Intl.Segmenter(undefined, { granularity: 'grapheme' });
  return Array.from(graphemes.segment(text), ({ segment }) => segment);
}

/**
 * A plain text (no escape sequences) in exactly so many columns: cut with an ellipsis, or filled with blanks.
 *
 * @param columns At least 0.
 * @param ellipsis One column wide; `glyphs.ellipsis`.
 * @param align Where a text that is too short stands.
 * @example fitText('breath-hold', 7, '~') //=> 'breath~'
 * @example fitText('17.0', 6, '~', 'right') //=> '  17.0'
 */
export function fitText(text: string, columns: number, ellipsis: string, align: 'left' | 'right' = 'left'): string {
  const width = textWidth(text);
  if (width <= columns) return align === 'left' ? text + ' '.repeat(columns - width) : ' '.repeat(columns - width) + text;
  if (columns <= 0) return '';
  if (plainText.test(text)) return text.slice(0, columns - 1) + ellipsis;
  let kept = '';
  let keptWidth = 0;
  for (const grapheme of graphemesOf(text)) {
    const next = keptWidth + textWidth(grapheme);
    if (next > columns - 1) break;
    kept += grapheme;
    keptWidth = next;
  }
  return kept + ellipsis + ' '.repeat(columns - 1 - keptWidth);
}
