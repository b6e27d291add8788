import { plannedHere } from '../session/hands/budget-commands.js';
import { planInWords, plannedInWords, planRows } from '../session/plan-words.js';
import { sayTime } from '../session/say-time.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { blank, fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';

/** The session in the minutes left: of each series what becomes of it, and what that comes to. */
export function budgetScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const list = planRows(state);
  const here = plannedHere(state);
  const summary = planInWords(state).flatMap(({ words, level }) =>
    wrap(words, columns).map((each) => line(each, level === 'plain' ? 'plain' : level)),
  );
  const limits = limitLine(state);
  const about = here === undefined ? [] : wrap(plannedInWords(here), columns).map((each) => line(each));
  const fixed = [
    line(limits, 'quiet'),
    line(`  ${'series'.padEnd(14)}${'choice'.padEnd(11)}${'now'.padStart(8)}${'planned'.padStart(9)}${'total'.padStart(9)}`, 'quiet'),
  ];
  const room = Math.max(3, rows - fixed.length - summary.length - about.length - 2);
  const chosen = Math.max(
    0,
    list.findIndex(({ planned }) => planned.series.id === here?.series.id),
  );
  const shown = windowOf(list, chosen, room);
  const body = shown.items.map(({ planned, nowS, totalS }): Line => {
    const { series, choice, timeS } = planned;
    const isHere = series.id === here?.series.id;
    const now = sayTime(nowS);
    const text = `${isHere ? look.glyphs.pointer : ' '}${choice === 'skipped' ? look.glyphs.cross : ' '}${fitText(series.id, 14, look.glyphs.ellipsis)}${choice.padEnd(11)}${now.padStart(8)}${(totalS === null ? '-' : sayTime(timeS)).padStart(9)}${(totalS === null ? '-' : sayTime(totalS)).padStart(9)}`;
    const wide = columns >= 120 && choice === 'shortened' ? `  ${plannedInWords(planned).replace(/^[^:]*: /, '')}` : '';
    return [
      span(text, isHere ? 'inverse' : choice === 'skipped' ? 'quiet' : choice === 'shortened' ? 'bold' : 'plain'),
      span(wide === '' ? '' : fitText(wide, columns - text.length, look.glyphs.ellipsis)),
    ];
  });
  return fill([...fixed, ...body, blank, ...about, blank, ...summary], rows);
}

function limitLine({ session }: State): string {
  const limits = session?.limits;
  const longest = limits?.longestSeriesS == null ? '' : `, no series longer than ${sayTime(limits.longestSeriesS)}`;
  const hold = limits?.holdS == null ? '' : `, no breath-hold over ${sayTime(limits.holdS)}`;
  return `Minimum set first${longest}${hold}; preparation and rests count`;
}
