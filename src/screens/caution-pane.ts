import { sessionCautions } from '../session/session-cautions.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';

/** The cautions of a series in a high and narrow pane: the whole text of each, worst first. */
export function wholeCautions(state: State, { glyphs }: Look, columns: number, rows: number): Line[] {
  const { seriesId, pane, caution } = state.place;
  const cautions = sessionCautions(state, seriesId);
  if (cautions.length === 0) return [line('No cautions', 'quiet')];
  const chosen = pane === 'cautions' ? Math.min(caution, cautions.length - 1) : -1;
  const lines = cautions.flatMap(({ level, text }, at) =>
    wrap(text, columns - 9).map((words, row): Line => {
      const here = at === chosen;
      const sign = `${here && row === 0 ? glyphs.pointer : ' '}${(row === 0 ? level : '').padEnd(8)}`;
      return [
        span(sign, here ? 'inverse' : level === 'error' ? 'trouble' : level === 'caution' ? 'attention' : 'quiet'),
        span(words, here ? 'inverse' : 'plain'),
      ];
    }),
  );
  const from = Math.max(
    0,
    Math.min(
      lines.length - rows,
      lines.findIndex((each) => each[0]?.style === 'inverse'),
    ),
  );
  return fill(lines.slice(from), rows);
}

/** The cautions of a series, worst first, one line each. */
export function cautionPane(state: State, { glyphs }: Look, columns: number, rows: number): Line[] {
  const { seriesId, pane, caution } = state.place;
  const cautions = sessionCautions(state, seriesId);
  if (cautions.length === 0) return fill([line('No cautions', 'quiet')], rows);
  const focused = pane === 'cautions';
  const chosen = Math.min(caution, cautions.length - 1);
  const shown = windowOf(cautions, focused ? chosen : 0, rows);
  const lines = shown.items.map(({ level, text }, at): Line => {
    const here = focused && shown.from + at === chosen;
    const last = at === shown.items.length - 1;
    const hidden = cautions.length - shown.items.length;
    const tail = last && hidden > 0 && !focused ? ` (${hidden} more: Tab)` : '';
    const style = here ? 'inverse' : level === 'error' ? 'trouble' : level === 'caution' ? 'attention' : 'quiet';
    return [
      span(`${here ? glyphs.pointer : ' '}${level.padEnd(8)}`, style),
      span(fitText(text, columns - 9 - tail.length, glyphs.ellipsis), here ? 'inverse' : 'plain'),
      span(tail, 'quiet'),
    ];
  });
  return fill(lines, rows);
}
