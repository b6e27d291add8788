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
const escapes = new RegExp(`${esc}\\[[0-9:;<=>?]*[ -/]*[@-~]|${esc}[\\]PX^_][^${bel}${esc}]*(?:${bel}|${esc}\\\\)?|${esc}[ -~]?`, 'y');

/** Where the parameters of the style sequence that begins at `at` end; -1 where something else begins there. */
function parametersEnd(source: string, at: number): number {
  if (source[at + 1] !== '[') return -1;
  let end = at + 2;
  // Digits, colon and semicolon.
  for (let code = source.charCodeAt(end); code >= 0x30 && code <= 0x3b; code = source.charCodeAt(end)) end += 1;
  return source[end] === 'm' ? end : -1;
}

/** Where what is no style sequence ends. */
function otherEnd(source: string, at: number): number {
  escapes.lastIndex = at;
  return at + (escapes.exec(source)?.[0].length ?? 1);
}

/** Cells of a plain text; control characters and characters of no width are left out, a tab is one blank. */
function pushCells(cells: Cell[], text: string, style: Style, columns: number): void {
  const plain = isPlainText(text);
  let blankCell: Cell | null = null;
  for (const character of plain ? text : graphemesOf(text)) {
    if (cells.length >= columns) return;
    if (character === ' ' || character === '\t') {
      blankCell ??= blankIsPlain(style) ? blank : { text: ' ', width: 1, style };
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
  // A picture has a style sequence for every cell: they are not searched for with the pattern of all sequences.
  for (let at = source.indexOf(esc); at >= 0; at = source.indexOf(esc, from)) {
    if (at > from) pushCells(cells, source.slice(from, at), style, columns);
    const end = parametersEnd(source, at);
    from = end < 0 ? otherEnd(source, at) : end + 1;
    if (end < 0) continue;
    const parameters = source.slice(at + 2, end);
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
