import { sayTime } from '../session/say-time.js';
import type { State } from '../session/state.js';
import { timeline } from '../session/timeline.js';
import { fitText } from '../terminal/text-width.js';
import { type Line, type Span, span } from './line.js';
import type { Look } from './look.js';

/** Everything still to do on one drawn line, each series as long as its time, with the point where the patient's time ends. */
export function timeLine(state: State, look: Look, columns: number): Line[] {
  const { glyphs } = look;
  const { rows, totalS, leftS } = timeline(state);
  const todo = rows.filter(({ takesS }) => takesS > 0);
  if (todo.length === 0) return [];
  const wholeS = Math.max(totalS, leftS ?? 0, 1);
  const at = (seconds: number) => Math.round((seconds / wholeS) * columns);
  const end = leftS === null ? null : Math.min(columns - 1, at(Math.max(0, leftS)));
  const names: Span[] = [];
  const bar: Span[] = [];
  todo.forEach(({ series, takesS, endsS }, index) => {
    const from = at(endsS - takesS);
    const length = Math.max(1, at(endsS) - from);
    names.push(
      span(fitText(series.id, Math.max(0, length - 1), glyphs.ellipsis), series.id === state.place.seriesId ? 'bold' : 'quiet'),
      span(' '),
    );
    const sign = index % 2 === 0 ? glyphs.barFull : glyphs.barTrack;
    const cells = Array.from({ length }, (_, cell) => (end !== null && from + cell === end ? glyphs.marker : sign)).join('');
    bar.push(span(cells, end !== null && from >= end ? 'trouble' : 'plain'));
  });
  const rest = columns - at(totalS);
  if (rest > 0)
    bar.push(span(Array.from({ length: rest }, (_, cell) => (end !== null && at(totalS) + cell === end ? glyphs.marker : ' ')).join('')));
  const words = leftS === null ? `0:00 to ${sayTime(totalS)}` : `0:00 to ${sayTime(wholeS)}; ${glyphs.marker} the patient's time ends`;
  return [names, bar, [span(words, 'quiet')]];
}
