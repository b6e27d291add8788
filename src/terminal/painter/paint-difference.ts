import { isSureWidth } from '../text-width.js';
import { blank, type Cell, type Grid } from './frame-grid.js';
import { blankIsPlain, type Style } from './sgr.js';

/** Unchanged cells between two changed ones are written again if that is shorter than moving the cursor over them. */
const longestBridge = 3;

const same = (a: Cell | undefined, b: Cell | undefined) =>
  a === b || (a?.text === b?.text && a?.style === b?.style && a?.width === b?.width);
const isPlainBlank = (cell: Cell) => cell.text === ' ' && cell.style === '';

/** The shorter of going on by so many columns and going to a column, within one line (ECMA-48 8.3.20 and 8.3.9). */
function withinLine(from: number, to: number): string {
  const forward = to - from === 1 ? '\u001b[C' : `\u001b[${to - from}C`;
  const absolute = `\u001b[${to + 1}G`;
  return to > from && forward.length < absolute.length ? forward : absolute;
}

/** Writes cells one after the other, keeping account of where the terminal's cursor is and which style it has. */
class Pen {
  #text = '';
  #style: Style = '';
  #x = -1;
  #y = -1;

  put(x: number, y: number, cell: Cell): void {
    this.#moveTo(x, y);
    // A blank shows nothing of a text colour: it is written in whatever style is on, if that has no background.
    if (!isPlainBlank(cell) || !blankIsPlain(this.#style)) this.#wear(cell.style);
    this.#text += cell.text;
    // Behind a character on whose width terminals disagree, nobody knows where the cursor is.
    this.#x = isSureWidth(cell.text) ? x + cell.width : -1;
  }

  eraseToEndOfLine(x: number, y: number): void {
    this.#moveTo(x, y);
    if (!blankIsPlain(this.#style)) this.#wear('');
    this.#text += '\u001b[K';
  }

  finish(): string {
    this.#wear('');
    return this.#text;
  }

  #moveTo(x: number, y: number): void {
    if (x === this.#x && y === this.#y) return;
    this.#text += y === this.#y && this.#x >= 0 ? withinLine(this.#x, x) : `\u001b[${y + 1};${x + 1}H`;
    this.#x = x;
    this.#y = y;
  }

  #wear(style: Style): void {
    if (style === this.#style) return;
    // From another style, everything is turned off first: how to turn off one thing is not the same everywhere.
    this.#text += `\u001b[${this.#style === '' || style === '' ? style : `0;${style}`}m`;
    this.#style = style;
  }
}

/** Column from which the whole rest of the line is blank. */
function blankFrom(cells: readonly Cell[]): number {
  let x = cells.length;
  while (x > 0 && isPlainBlank(cells[x - 1] as Cell)) x--;
  return x;
}

/** Whether to write this unchanged cell rather than jump: a change follows closely and it looks like its neighbours. */
function bridges(before: readonly Cell[], after: readonly Cell[], x: number, style: Style): boolean {
  for (let next = x; next <= x + longestBridge && next < after.length; next++) {
    const cell = after[next] as Cell;
    if (!same(before[next], cell)) return next > x;
    if (cell.width !== 1 || (cell.style !== style && !(isPlainBlank(cell) && blankIsPlain(style)))) return false;
  }
  return false;
}

/** A character that some terminals draw over the next cell too: when it comes or goes, that cell must be written again. */
const mayOverlap = (cell: Cell | undefined) => cell !== undefined && cell.width === 1 && !isSureWidth(cell.text);

function paintRow(pen: Pen, before: readonly Cell[], after: readonly Cell[], y: number): void {
  const restBlank = blankFrom(after);
  let last: { readonly x: number; readonly style: Style } | null = null;
  let overlapped = false;
  for (let x = 0; x < after.length; x++) {
    const cell = after[x] as Cell;
    if (same(before[x], cell) && !overlapped) {
      const bridge: boolean = last !== null && last.x === x - 1 && bridges(before, after, x, last.style);
      if (!bridge) continue;
    }
    if (x >= restBlank && after.length - x > longestBridge) {
      pen.eraseToEndOfLine(x, y);
      return;
    }
    if (cell.width > 0) pen.put(x, y, cell);
    overlapped = mayOverlap(cell) || mayOverlap(before[x]);
    last = { x, style: isPlainBlank(cell) && last !== null && blankIsPlain(last.style) ? last.style : cell.style };
  }
}

/**
 * What to write so that a screen showing `before` shows `after`: the cells that differ, addressed absolutely, the style plain at
 * the end. The cursor is left anywhere.
 *
 * @param before What the screen shows, or null when that is not known: then it is cleared first.
 */
export function paintDifference(before: Grid | null, after: Grid): string {
  const pen = new Pen();
  after.rows.forEach((row, y) => {
    const old = before?.rows[y];
    if (old === row) return;
    paintRow(pen, old?.cells ?? row.cells.map(() => blank), row.cells, y);
  });
  return (before === null ? '\u001b[m\u001b[H\u001b[2J' : '') + pen.finish();
}
