import type { Size } from '../size.js';
import { graphemesOf, isPlainText, textWidth } from '../text-width.js';
import { cursorMarkCode } from './cursor-mark.js';
import { blankIsPlain, type Style, styleAfter } from './sgr.js';

/** One cell of the screen. A wide character stands in its first cell; the second has width 0 and no text. */
export interface Cell {
  readonly text: string;
  readonly width: 0 | 1 | 2;
  readonly style: Style;
}

/** One line of the screen, and the text it was read from. */
export interface Row {
  readonly source: string;
  /** The style that the line above left behind. */
  readonly styleBefore: Style;
  readonly cells: readonly Cell[];
  /** Column of the cursor mark, counted from 0. */
  readonly cursor: number | null;
  /** The style at the end of the source, with which the next line begins. */
  readonly styleAfter: Style;
}

/** A whole screen of cells. */
export interface Grid {
  readonly size: Size;
  readonly rows: readonly Row[];
  /** Where the frame asks for the terminal's cursor, counted from 0. */
  readonly cursor: { readonly x: number; readonly y: number } | null;
}

/** A cell in which nothing stands. */
export const blank: Cell = { text: ' ', width: 1, style: '' };
const esc = '\u001b';
const bel = '\u0007';
/** ESC with a control sequence, a string sequence, or a single character. What is not SGR is left out of the frame. */
const escapes = new RegExp(`${esc}\\[([0-9:;<=>?]*)[ -/]*([@-~])|${esc}[\\]PX^_][^${bel}${esc}]*(?:${bel}|${esc}\\\\)?|${esc}[ -~]?`, 'g');

/** Cells of a plain text; control characters and characters of no width are left out, a tab is one blank. */
function pushCells(cells: Cell[], text: string, style: Style, columns: number): void {
  const plain = isPlainText(text);
  const blankCell: Cell = blankIsPlain(style) ? blank : { text: ' ', width: 1, style };
  for (const character of plain ? text : graphemesOf(text)) {
    if (cells.length >= columns) return;
    if (character === ' ' || character === '\t') {
      cells.push(blankCell);
      continue;
    }
    const width = plain ? 1 : Math.min(2, textWidth(character));
    if (width === 0) continue;
    if (width === 1) {
      cells.push({ text: character, width: 1, style });
    } else if (cells.length + 2 <= columns) {
      cells.push({ text: character, width: 2, style }, { text: '', width: 0, style });
    } else {
      cells.push(blank);
    }
  }
}

function readRow(source: string, styleBefore: Style, columns: number): Row {
  const cells: Cell[] = [];
  let style = styleBefore;
  let cursor: number | null = null;
  let from = 0;
  for (const match of source.matchAll(escapes)) {
    pushCells(cells, source.slice(from, match.index), style, columns);
    from = match.index + match[0].length;
    if (match[2] !== 'm') continue;
    const parameters = match[1] ?? '';
    style = styleAfter(style, parameters);
    if (cursor === null && cells.length < columns && parameters === String(cursorMarkCode)) cursor = cells.length;
  }
  pushCells(cells, source.slice(from), style, columns);
  while (cells.length < columns) cells.push(blank);
  return { source, styleBefore, cells, cursor, styleAfter: style };
}

/**
 * Reads a frame, as ink writes it, into cells. What does not fit on the screen is cut off. Lines that the frame before had in the
 * same place are taken from it.
 *
 * @param frame Lines joined by `\n`, with SGR sequences.
 */
export function readFrame(frame: string, size: Size, before?: Grid): Grid {
  const sources = frame.split('\n');
  const rows: Row[] = [];
  let style: Style = '';
  let cursor: Grid['cursor'] = null;
  const keptRows = before?.size.columns === size.columns ? before.rows : [];
  for (let y = 0; y < size.rows; y++) {
    const source = sources[y] ?? '';
    const kept = keptRows[y];
    const row: Row = kept?.source === source && kept.styleBefore === style ? kept : readRow(source, style, size.columns);
    style = row.styleAfter;
    if (cursor === null && row.cursor !== null) cursor = { x: row.cursor, y };
    rows.push(row);
  }
  return { size, rows, cursor };
}
