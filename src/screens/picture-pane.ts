import { diffused, type FieldView, pictureField } from '../picture/picture-field.js';
import type { DrawnPictures } from '../picture/picture-problem.js';
import { type PictureWindow, wholeWindow } from '../picture/picture-window.js';
import { extentOf } from '../picture/sample-picture.js';
import { chartDotBit, chartDots } from '../terminal/chart-dots.js';
import type { Line, Span } from './line.js';
import type { Look } from './look.js';

/** Dark to light, for terminals that show neither greys nor dots. */
const ramp = ' .:-=+*#%@';

/** How many squares a cell holds, across and down: two greys, eight dots, or one sign for its two halves. */
function squaresOf({ colourLevel, set }: Look): readonly [number, number] {
  if (set === 'ascii') return [1, 2];
  return colourLevel >= 2 ? [1, 2] : [2, 4];
}

/** Which part of the pictures is shown in a pane of cells, and how bright: the same for both. */
export function pictureView(
  { pair, look, voxelMm, squareWindow }: DrawnPictures,
  close: boolean,
  columns: number,
  rows: number,
  terminal: Look,
): { readonly view: FieldView; readonly window: PictureWindow } {
  const [across, down] = squaresOf(terminal);
  const size = { columns: columns * across, rows: rows * down };
  if (close) {
    // One acquired voxel takes two cells or more.
    const squareMm = Math.min(voxelMm / 2 / across, look.zoom.sideMm / Math.min(size.columns, size.rows));
    return { view: { ...size, squareMm, middleMm: look.zoom.atMm }, window: squareWindow };
  }
  const extents = [extentOf(pair.preset), extentOf(pair.now)];
  const squareMm = Math.max(...extents.map(([x, y]) => Math.max(x / size.columns, y / size.rows)));
  return { view: { ...size, squareMm, middleMm: [0, 0] }, window: wholeWindow(pair) };
}

/** Panes of the pictures that are shown: every key draws the screen again, and few change what these show. */
const panesOf = new WeakMap<DrawnPictures, Map<string, Line[]>>();
const mostPanes = 8;

/** A pane of cells: preset to the left of `from` columns, the series now from there on. */
export function picturePane(
  drawn: DrawnPictures,
  seen: ReturnType<typeof pictureView>,
  which: 'preset' | 'now' | { readonly from: number },
  columns: number,
  rows: number,
  look: Look,
): Line[] {
  const panes = panesOf.get(drawn) ?? new Map<string, Line[]>();
  panesOf.set(drawn, panes);
  const key = JSON.stringify([seen, which, columns, rows, squaresOf(look), look.set]);
  const known = panes.get(key);
  if (known !== undefined) return known;
  if (panes.size >= mostPanes) panes.clear();
  const lines = drawPane(drawn, seen, which, columns, rows, look);
  panes.set(key, lines);
  return lines;
}

function drawPane(...[drawn, seen, which, columns, rows, look]: Parameters<typeof picturePane>): Line[] {
  const { view, window } = seen;
  const [across, down] = squaresOf(look);
  const fieldOf = (name: 'preset' | 'now') => pictureField(drawn.pair[name], view, window);
  const left = which === 'now' ? null : fieldOf('preset');
  const right = which === 'preset' ? null : fieldOf('now');
  const from = which === 'preset' ? columns : which === 'now' ? 0 : which.from;
  const field = Float64Array.from({ length: view.columns * view.rows }, (_, i) => {
    const side = i % view.columns < from * across ? left : right;
    return side?.[i] ?? 0;
  });
  const dots = across === 2 ? diffused(field, view.columns) : null;
  return Array.from({ length: rows }, (_, row) =>
    joined(
      Array.from({ length: columns }, (_cell, column): Span => {
        if (dots !== null) return { text: dotCell(dots, view.columns, column, row), style: 'plain' };
        const at = row * down * view.columns + column;
        const [upper, lower] = [field[at] ?? 0, field[at + view.columns] ?? 0];
        if (look.set === 'ascii') return { text: ramp[Math.round(((upper + lower) / 2) * (ramp.length - 1))] ?? ' ', style: 'plain' };
        return { text: '\u2580', style: 'plain', greys: greysOf(upper, lower) };
      }),
    ),
  );
}

/** Few enough greys that neighbours are often equal, which keeps a frame short; enough that the grain is seen. */
const greys = 40;

/** All pairs of greys, each of them one thing: what looks the same is the same. */
const pairs: readonly (readonly [number, number])[] = Array.from({ length: (greys + 1) ** 2 }, (_, at) => [
  Math.floor(at / (greys + 1)) / greys,
  (at % (greys + 1)) / greys,
]);

function greysOf(upper: number, lower: number): NonNullable<Span['greys']> {
  return pairs[Math.round(upper * greys) * (greys + 1) + Math.round(lower * greys)] as NonNullable<Span['greys']>;
}

function dotCell(dots: Uint8Array, columns: number, column: number, row: number): string {
  let bits = 0;
  for (const y of [0, 1, 2, 3] as const) {
    for (const x of [0, 1] as const) {
      if (dots[(row * 4 + y) * columns + column * 2 + x] === 1) bits |= chartDotBit(x, y);
    }
  }
  return chartDots(bits, 'unicode');
}

/** Neighbours that look the same become one stretch. */
function joined(cells: readonly Span[]): Line {
  const spans: { text: string; style: Span['style']; greys?: Span['greys'] }[] = [];
  for (const cell of cells) {
    const last = spans.at(-1);
    if (last !== undefined && last.greys === cell.greys) last.text += cell.text;
    else spans.push({ ...cell });
  }
  return spans as Line;
}
