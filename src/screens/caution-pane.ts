import { sessionCautions } from '../session/session-cautions.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { fill, fitLine, type Line, line, span, windowOf, wrap } from './line.js';
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

/** Columns before the text: hand and level. */
const signColumns = 9;

/**
 * The cautions of a series, worst first. Each has a line while there are lines; what was picked and a must-keep that is crossed are said
 * whole, with numbers and source, before others get one.
 */
export function cautionPane(state: State, { glyphs }: Look, columns: number, rows: number): Line[] {
  const { seriesId, pane, caution } = state.place;
  const cautions = sessionCautions(state, seriesId);
  if (cautions.length === 0) return fill([line('No cautions', 'quiet')], rows);
  const focused = pane === 'cautions';
  const chosen = focused ? Math.min(caution, cautions.length - 1) : -1;
  const from = focused ? windowOf(cautions, chosen, rows).from : 0;
  const listed = cautions.slice(from).map(({ level, code, text }, at) => ({
    level,
    code,
    text,
    here: from + at === chosen,
    words: wrap(text, columns - signColumns),
  }));
  const given = linesFor(
    listed.map(({ words, here, code, level }) => ({ needs: words.length, whole: here || code === 'must-keep', first: level === 'error' })),
    rows,
  );
  const shown = listed.flatMap((one, at) => ((given[at] ?? 0) > 0 ? [{ ...one, lines: given[at] ?? 0 }] : []));
  const hidden = cautions.length - shown.length;
  const lines = shown.flatMap(({ level, text, here, words, lines: count }) =>
    Array.from({ length: count }, (_, row): Line => {
      const style = here ? 'inverse' : level === 'error' ? 'trouble' : level === 'caution' ? 'attention' : 'quiet';
      const rest =
        row === count - 1 && count < words.length ? text.slice(words.slice(0, row).join(' ').length).trimStart() : (words[row] ?? '');
      return [
        span(`${here && row === 0 ? glyphs.pointer : ' '}${(row === 0 ? level : '').padEnd(8)}`, style),
        span(fitText(rest, columns - signColumns, glyphs.ellipsis), here ? 'inverse' : 'plain'),
      ];
    }),
  );
  const last = lines.at(-1);
  if (hidden > 0 && !focused && last !== undefined) {
    const tail = ` (${hidden} more: Tab)`;
    lines[lines.length - 1] = [...fitLine(last, columns - tail.length, glyphs.ellipsis), span(tail, 'quiet')];
  }
  return fill(lines, rows);
}

/** How many of some lines each caution gets: errors one, then what is to be said whole, then one for each, then what is left over. */
function linesFor(
  cautions: readonly { readonly needs: number; readonly whole: boolean; readonly first: boolean }[],
  rows: number,
): readonly number[] {
  const given = cautions.map(() => 0);
  let left = rows;
  const give = (at: number, lines: number) => {
    const more = Math.max(0, Math.min(lines - (given[at] ?? 0), left));
    given[at] = (given[at] ?? 0) + more;
    left -= more;
  };
  for (const [at, { first }] of cautions.entries()) if (first) give(at, 1);
  for (const [at, { whole, needs }] of cautions.entries()) if (whole) give(at, needs);
  for (const [at] of cautions.entries()) give(at, 1);
  for (const [at, { needs }] of cautions.entries()) give(at, needs);
  return given;
}
