import headless, { type IBufferCell, type Terminal } from '@xterm/headless';

/** One cell of the screen as a terminal holds it. Colours: `default`, a number of the palette, or `#rrggbb`. */
export interface ScreenCell {
  readonly text: string;
  readonly width: number;
  readonly foreground: string;
  readonly background: string;
  readonly bold: boolean;
  readonly dim: boolean;
  readonly italic: boolean;
  readonly underline: boolean;
  readonly inverse: boolean;
  readonly strikethrough: boolean;
}

/** A terminal without a window: bytes in, cells out. */
export interface VirtualScreen {
  readonly terminal: Terminal;
  /** Resolves when the bytes have been carried out. */
  readonly write: (bytes: string | Uint8Array) => Promise<void>;
  /** The visible lines, blanks at their ends left out, joined by `\n`. */
  readonly text: () => string;
  /** Counted from 0. */
  readonly cell: (x: number, y: number) => ScreenCell;
  /** Every cell of the screen as one string each, line by line. */
  readonly cells: () => readonly (readonly string[])[];
  readonly cursor: () => { readonly x: number; readonly y: number; readonly visible: boolean };
  readonly onAlternateScreen: () => boolean;
  /** Lines that have left the screen at the top. */
  readonly scrolledLines: () => number;
}

function colourOf(cell: IBufferCell, which: 'Fg' | 'Bg'): string {
  if (cell[`is${which}Default`]()) return 'default';
  const colour = cell[`get${which}Color`]();
  return cell[`is${which}RGB`]() ? `#${colour.toString(16).padStart(6, '0')}` : String(colour);
}

const noCell: ScreenCell = {
  text: ' ',
  width: 1,
  foreground: 'default',
  background: 'default',
  bold: false,
  dim: false,
  italic: false,
  underline: false,
  inverse: false,
  strikethrough: false,
};

function readCell(cell: IBufferCell): ScreenCell {
  return {
    // A cell that was never written and one that holds a blank look the same.
    text: cell.getWidth() === 0 ? '' : cell.getChars() || ' ',
    width: cell.getWidth(),
    foreground: colourOf(cell, 'Fg'),
    background: colourOf(cell, 'Bg'),
    bold: cell.isBold() !== 0,
    dim: cell.isDim() !== 0,
    italic: cell.isItalic() !== 0,
    underline: cell.isUnderline() !== 0,
    inverse: cell.isInverse() !== 0,
    strikethrough: cell.isStrikethrough() !== 0,
  };
}

/** A virtual screen of that size, with 1000 lines above it. */
export function createVirtualScreen(columns: number, rows: number): VirtualScreen {
  const terminal = new headless.Terminal({ cols: columns, rows, scrollback: 1000, allowProposedApi: true });
  let cursorVisible = true;
  const watchCursor = (visible: boolean) => (parameters: (number | number[])[]) => {
    if (parameters.includes(25)) cursorVisible = visible;
    return false;
  };
  terminal.parser.registerCsiHandler({ prefix: '?', final: 'h' }, watchCursor(true));
  terminal.parser.registerCsiHandler({ prefix: '?', final: 'l' }, watchCursor(false));

  const lineAt = (y: number) => terminal.buffer.active.getLine(terminal.buffer.active.viewportY + y);
  const cell = (x: number, y: number): ScreenCell => {
    const found = lineAt(y)?.getCell(x);
    return found === undefined ? noCell : readCell(found);
  };
  const plain = JSON.stringify(noCell);
  return {
    terminal,
    write: (bytes) => new Promise((resolve) => terminal.write(bytes, resolve)),
    text: () =>
      Array.from({ length: terminal.rows }, (_, y) => lineAt(y)?.translateToString(true).trimEnd() ?? '')
        .join('\n')
        .trimEnd(),
    cell,
    cells: () =>
      Array.from({ length: terminal.rows }, (_row, y) =>
        Array.from({ length: terminal.cols }, (_column, x) => {
          const text = JSON.stringify(cell(x, y));
          return text === plain ? ' ' : text;
        }),
      ),
    cursor: () => ({ x: terminal.buffer.active.cursorX, y: terminal.buffer.active.cursorY, visible: cursorVisible }),
    onAlternateScreen: () => terminal.buffer.active.type === 'alternate',
    scrolledLines: () => terminal.buffer.active.baseY,
  };
}

/** Places where two screens differ, as `x,y`. */
export function changedCells(before: readonly (readonly string[])[], after: readonly (readonly string[])[]): readonly string[] {
  const changes: string[] = [];
  after.forEach((row, y) => {
    row.forEach((cell, x) => {
      if (cell !== before[y]?.[x]) changes.push(`${x},${y}`);
    });
  });
  return changes;
}
