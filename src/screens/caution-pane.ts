import { sessionCautions } from '../session/session-cautions.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { fill, type Line, line, span, windowOf } from './line.js';
import type { Look } from './look.js';

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
