import { sayRatio } from '../session/say-ratio.js';
import { sayTime } from '../session/say-time.js';
import type { State } from '../session/state.js';
import { frontHere, frontLimitS } from '../session/ways.js';
import { fitText } from '../terminal/text-width.js';
import { axisColumns } from './chart-pane.js';
import { type Line, line, span } from './line.js';
import type { Look } from './look.js';
import { Plot } from './plot.js';

/** What a front shows, and its value in words. */
export const frontWords = {
  timeSnr: { title: 'most SNR', say: (value: number) => `SNR ${sayRatio(value)}`, axis: (value: number) => sayRatio(value) },
  timeLoss: {
    title: 'least loss',
    say: (value: number) => `loss ${value.toFixed(3)}`,
    axis: (value: number) => value.toFixed(2),
  },
} as const;

/** What the time of a front is: of one hold where holds are limited. */
export function frontTime({ search }: State): string {
  return search?.problem.limits.holdS === undefined ? 'scan time' : 'breath-hold';
}

interface Room {
  readonly columns: number;
  readonly rows: number;
  /** Whether the point under the hand is marked. */
  readonly cursor: boolean;
}

/** The front as a chart: time along, what is reached in it upwards. */
export function frontPane(state: State, look: Look, { columns, rows, cursor }: Room): Line[] {
  const front = frontHere(state);
  if (front === null) return [line('No front: no way keeps what must be kept', 'quiet')];
  const { points, at, which } = front;
  const words = frontWords[which];
  const width = columns - axisColumns - 2;
  const height = Math.max(4, rows - 2);
  const [fromS, toS] = [points[0]?.timeS ?? 0, points.at(-1)?.timeS ?? 0];
  const values = points.map(({ value }) => value);
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const plot = new Plot(width, height, look);
  const column = (timeS: number, cells: number) => (toS === fromS ? 0 : Math.round(((timeS - fromS) / (toS - fromS)) * (cells - 1)));
  const dot = (value: number) => (high === low ? height * 2 : Math.round(((value - low) / (high - low)) * (height * 4 - 1)));
  // Between two points nothing better is reached than by the one before: a stair.
  points.forEach(({ timeS, value }, i) => {
    const [x, y] = [column(timeS, width * 2), dot(value)];
    const next = points[i + 1];
    const [toX, toY] = next === undefined ? [x, y] : [column(next.timeS, width * 2), dot(next.value)];
    for (let along = x; along <= toX; along += 1) plot.dot(along, y, 0);
    for (let up = Math.min(y, toY); up <= Math.max(y, toY); up += 1) plot.dot(toX, up, 0);
  });
  const limitS = frontLimitS(state);
  if (limitS !== null && limitS >= fromS && limitS <= toS) plot.upright(column(limitS, width), look.glyphs.marker);
  if (cursor) plot.upright(column(points[at]?.timeS ?? fromS, width));
  const lines = plot.lines();
  const body = lines.map((cells, row): Line => {
    const shown = row === 0 || row === height - 1 || row === Math.floor((height - 1) / 2);
    const label = shown ? words.axis(high - (row / Math.max(1, height - 1)) * (high - low)) : '';
    return [span(label.padStart(axisColumns), 'first'), span('|', 'quiet'), ...cells];
  });
  const [from, to] = [sayTime(fromS), sayTime(toS)];
  return [
    line(
      fitText(
        `Front: ${words.title} in each ${frontTime(state)}${limitS === null ? '' : `; ${look.glyphs.marker} limit ${sayTime(limitS)}`}`,
        columns,
        look.glyphs.ellipsis,
      ),
      'first',
    ),
    ...body,
    line(`${' '.repeat(axisColumns + 1)}${from}${to.padStart(Math.max(1, width - from.length))}`, 'quiet'),
  ];
}
