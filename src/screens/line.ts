import { fitText, textWidth } from '../terminal/text-width.js';

/** How a stretch of text looks. Meaning is never in the style alone. */
export type Style = 'plain' | 'bold' | 'quiet' | 'inverse' | 'attention' | 'trouble' | 'first' | 'second';

/** A stretch of text in one style. */
export interface Span {
  readonly text: string;
  readonly style: Style;
  /** Greys of a picture, 0 to 1: of the characters, and behind them. They need 256 colours or more. */
  readonly greys?: readonly [number, number];
  /** The terminal's own cursor stands on its first character. */
  readonly cursor?: true;
}

/** One line of a screen. */
export type Line = readonly Span[];

export function span(text: string, style: Style = 'plain'): Span {
  return { text, style };
}

/** A line of one stretch. */
export function line(text: string, style: Style = 'plain'): Line {
  return [span(text, style)];
}

export const blank: Line = [];

/** The text of a line without its styles. */
export function lineText(given: Line): string {
  return given.map(({ text }) => text).join('');
}

export function lineWidth(given: Line): number {
  return textWidth(lineText(given));
}

/** A line in exactly so many columns: cut with an ellipsis, or filled with blanks. */
export function fitLine(given: Line, columns: number, ellipsis: string): Line {
  const width = lineWidth(given);
  if (width === columns) return given;
  if (width < columns) return [...given, span(' '.repeat(columns - width))];
  const kept: Span[] = [];
  let left = columns;
  for (const part of given) {
    const partWidth = textWidth(part.text);
    if (partWidth < left || (partWidth === left && part === given.at(-1))) {
      kept.push(part);
      left -= partWidth;
      continue;
    }
    kept.push({ ...part, text: fitText(partWidth <= left ? `${part.text} ` : part.text, left, ellipsis) });
    return kept;
  }
  return kept;
}

/** Two columns of lines beside each other. */
export function beside(left: readonly Line[], right: readonly Line[], leftColumns: number, between: string, ellipsis: string): Line[] {
  const rows = Math.max(left.length, right.length);
  return Array.from({ length: rows }, (_, row) => [
    ...fitLine(left[row] ?? blank, leftColumns, ellipsis),
    span(between, 'quiet'),
    ...(right[row] ?? blank),
  ]);
}

/** As many lines as there are rows: cut, or filled with blank ones. */
export function fill(lines: readonly Line[], rows: number): Line[] {
  return Array.from({ length: Math.max(0, rows) }, (_, row) => lines[row] ?? blank);
}

/** The part of a list that is shown, so that the chosen one is in it and does not stand at an edge while there is more. */
export function windowOf<T>(items: readonly T[], chosen: number, rows: number): { readonly items: readonly T[]; readonly from: number } {
  const from = Math.max(0, Math.min(items.length - rows, chosen - Math.floor(rows / 2)));
  return { items: items.slice(from, from + rows), from };
}

/** Text broken into lines at blanks; what has no blank is cut. */
export function wrap(text: string, columns: number): string[] {
  const lines: string[] = [];
  let current = '';
  for (const word of text.split(' ')) {
    const next = current === '' ? word : `${current} ${word}`;
    if (textWidth(next) <= columns) {
      current = next;
      continue;
    }
    if (current !== '') lines.push(current);
    current = textWidth(word) <= columns ? word : fitText(word, columns, '~');
  }
  return current === '' && lines.length > 0 ? lines : [...lines, current];
}
