import type { FigureKey } from '../calc/figures.js';
import { axisLabel, type RangeChart } from '../session/chart.js';
import { sayField } from '../session/say-field.js';
import { sayFigure } from '../session/say-figure.js';
import { fitText } from '../terminal/text-width.js';
import { type Line, line, span } from './line.js';
import type { Look } from './look.js';
import { Plot } from './plot.js';

export const axisColumns = 8;

interface Scale {
  readonly low: number;
  readonly high: number;
}

/** A parameter through its range: two curves, their limits, the cursor that reads both axes. */
export function chartPane(chart: RangeChart, look: Look, columns: number, rows: number): Line[] {
  const { points, cursor, now, field, figures } = chart;
  const width = columns - 2 * axisColumns - 2;
  const height = Math.max(4, rows - 5);
  const xs = points.map(({ value }) => value);
  const first = scaleOf(chart, 0);
  const second = scaleOf(chart, 1);
  const plot = new Plot(width, height, look);
  curve(plot, chart, 0, first, xs);
  curve(plot, chart, 1, second, xs);
  plot.upright(columnOf(xs, cursor, width));
  const limit = chart.limits[0];
  if (limit !== null && limit >= first.low && limit <= first.high) plot.level(heightOf(limit, first, height * 4), look.glyphs.barTrack);
  const head: Line = [
    span(fitText(`1 ${axisLabel(figures[0])}`, Math.floor(columns / 2), look.glyphs.ellipsis), 'first'),
    span(fitText(`2 ${axisLabel(figures[1])}`, columns - Math.floor(columns / 2), look.glyphs.ellipsis, 'right'), 'second'),
  ];
  const body = plot
    .lines()
    .map(
      (cells, row): Line => [
        span(axisText(figures[0], first, row, height).padStart(axisColumns), 'first'),
        span('|', 'quiet'),
        ...cells,
        span('|', 'quiet'),
        span(axisText(figures[1], second, row, height), 'second'),
      ],
    );
  const from = sayField(field, xs[0]);
  const to = sayField(field, xs.at(-1));
  const under = `${' '.repeat(axisColumns + 1)}${from}${to.padStart(Math.max(1, width - from.length))}`;
  const point = points[cursor];
  const read =
    point === undefined
      ? ''
      : // What must not be cut where the pane is narrow comes first.
        `${point.over ? 'OVER  ' : ''}${field.label} ${sayField(field, point.value)}: ${wordsOf(figures[0], point.figures[figures[0]])}, ${wordsOf(figures[1], point.figures[figures[1]])}${cursor === now ? ' (as now)' : ''}`;
  return [
    head,
    ...body,
    line(under, 'quiet'),
    [span(fitText(read, columns, look.glyphs.ellipsis), point?.over ? 'trouble' : 'bold')],
    limitLine(chart),
  ];
}

function limitLine({ limits, figures }: RangeChart): Line {
  const parts = limits.flatMap((limit, at) =>
    limit === null ? [] : [`limit of ${axisLabel(figures[at as 0 | 1]).replace(/,.*/, '')}: ${sayFigure(figures[at as 0 | 1], limit)}`],
  );
  return line(parts.join('; '), 'quiet');
}

const wordsOf = (key: FigureKey, value: number | null) => `${axisLabel(key).replace(/,.*/, '')} ${sayFigure(key, value)}`;

function scaleOf({ points, figures, limits }: RangeChart, which: 0 | 1): Scale {
  const values = points.map((point) => point.figures[figures[which]]).filter((value): value is number => value !== null);
  // A figure without a value anywhere has no axis.
  if (values.length === 0) return { low: Number.NaN, high: Number.NaN };
  const low = Math.min(...values);
  const high = Math.max(...values);
  const limit = limits[which];
  // A limit within reach of the curve is drawn; one far away must not flatten it.
  const span = Math.max(high - low, Math.abs(high) * 0.02, 1e-9);
  const near = limit !== null && limit > low - span && limit < high + span;
  const [bottom, top] = near ? [Math.min(low, limit), Math.max(high, limit)] : [low, high];
  // A flat curve lies in the middle of an axis that is wide enough for its marks to differ.
  const air = Math.max((top - bottom) * 0.05, top === bottom ? Math.abs(top) * 0.1 : Math.abs(top) * 0.005, 1e-9);
  // Figures are never below zero: neither is their axis.
  return { low: bottom >= 0 ? Math.max(0, bottom - air) : bottom - air, high: top + air };
}

function heightOf(value: number, { low, high }: Scale, dots: number): number {
  return Math.round(((value - low) / (high - low)) * (dots - 1));
}

function columnOf(xs: readonly number[], at: number, width: number): number {
  const [from, to, x] = [xs[0] ?? 0, xs.at(-1) ?? 0, xs[at] ?? 0];
  return to === from ? 0 : Math.round(((x - from) / (to - from)) * (width - 1));
}

function axisText(key: FigureKey, { low, high }: Scale, row: number, height: number): string {
  const share = height === 1 ? 0 : row / (height - 1);
  if (Number.isNaN(low)) return row === 0 ? 'no value' : '';
  const shown = row === 0 || row === height - 1 || row === Math.floor((height - 1) / 2);
  return shown
    ? sayFigure(key, high - share * (high - low))
        .replace(/ (mm|s|px|uT|ms|mm3)$/, '')
        .padEnd(1)
    : '';
}

/** Draws a curve through the points; the second one is dotted, so that they differ without colour. */
function curve(plot: Plot, { points, figures }: RangeChart, which: 0 | 1, scale: Scale, xs: readonly number[]): void {
  const [from, to] = [xs[0] ?? 0, xs.at(-1) ?? 0];
  const dots = plot.width * 2;
  let before: { x: number; y: number } | null = null;
  points.forEach((point) => {
    const value = point.figures[figures[which]];
    if (value === null) {
      before = null;
      return;
    }
    const x = to === from ? 0 : Math.round(((point.value - from) / (to - from)) * (dots - 1));
    const y = heightOf(value, scale, plot.height * 4);
    const start = before ?? { x, y };
    const length = Math.max(Math.abs(x - start.x), Math.abs(y - start.y), 1);
    for (let i = 0; i <= length; i += 1) {
      const [px, py] = [Math.round(start.x + ((x - start.x) * i) / length), Math.round(start.y + ((y - start.y) * i) / length)];
      if (which === 0 || (px + py) % 4 < 2) plot.dot(px, py, which);
    }
    before = { x, y };
  });
}
