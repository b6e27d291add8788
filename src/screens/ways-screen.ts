import { keptInWords } from '../session/keep-form.js';
import { sayFigure } from '../session/say-figure.js';
import { sayTime } from '../session/say-time.js';
import { changesInWords, searchInWords } from '../session/say-way.js';
import type { State } from '../session/state.js';
import { figuresWith, frontHere, type ListedWay, shownWays, stateWith, wayHere } from '../session/ways.js';
import { otherMovesInWords, searchNotes, searchStatus, wayParagraphs, wayTitle, wayVerdict } from '../session/ways-words.js';
import { fitText } from '../terminal/text-width.js';
import { consequencePane } from './consequence-pane.js';
import { frontPane } from './front-pane.js';
import { beside, blank, fill, type Line, line, type Style, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';

/** The ways to make a series fit: a list, and what the one under the hand does, on the strips of the series screen. */
export function waysScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const wide = columns >= 150 && rows >= 36;
  const here = wayHere(state);
  const list = shownWays(state);
  const status = searchStatus(state);
  const head = [
    line(status.words, status.level === 'plain' ? 'bold' : status.level),
    ...searchNotes(state)
      .slice(0, wide ? 4 : 2)
      .map((words) => line(fitText(words, columns, look.glyphs.ellipsis), 'attention')),
    ...progressLine(state, look, columns),
  ];
  const foot = footLines(state, columns, rows, list.length === 0);
  const recalled = here !== null && here.number === null ? [wayLine(state, here.listed, 'last', true, look, columns)] : [];
  const listRows = Math.min(list.length, wide ? 16 : Math.max(3, rows - head.length - foot.length - recalled.length - 13));
  const chosen = here?.number == null ? 0 : here.number - 1;
  const shown = windowOf(list, chosen, listRows);
  const lines = shown.items.map((listed, at) =>
    wayLine(state, listed, String(shown.from + at + 1), here?.number === shown.from + at + 1, look, columns),
  );
  const top = [...head, ...lines, ...recalled, blank];
  const detailRows = rows - top.length - foot.length;
  const detail =
    here === null ? [] : wide ? wideDetail(state, here, look, columns, detailRows) : narrowDetail(state, here, look, columns, detailRows);
  return fill([...top, ...fill(detail, detailRows), ...foot], rows);
}

type Here = NonNullable<ReturnType<typeof wayHere>>;

/** How far the search is, once it has run for a while. */
function progressLine({ search, place }: State, { glyphs }: Look, columns: number): Line[] {
  if (search === null || search.seriesId !== place.seriesId || search.answer !== null || search.share === null) return [];
  const width = Math.min(columns, 60);
  const full = Math.round(search.share * width);
  return [line(`${glyphs.barFull.repeat(full)}${glyphs.barTrack.repeat(width - full)}`)];
}

/** Columns of the mark beside a number that comes from a reading. */
const markColumns = 2;

/** `TOO CLOSE, 0.03 W/kg to spare`. */
const verdictColumns = 29;

const verdictStyles: Readonly<Record<string, Style>> = { OVER: 'trouble', 'TOO CLOSE': 'attention', FITS: 'bold' };

/** One way in one line: number, what it is best at, verdict, time, SNR. */
function wayLine(state: State, listed: ListedWay, number: string, here: boolean, { glyphs }: Look, columns: number): Line {
  const { seriesId } = state.place;
  const { given } = listed.way;
  const figures = figuresWith(state, seriesId, given);
  const verdict = wayVerdict(state, listed);
  const style = verdictStyles[verdict.word ?? ''] ?? 'plain';
  if (listed.binding !== null) {
    const text = `${here ? glyphs.pointer : ' '}${number.padStart(2)} ${fitText(wayTitle(state, listed), columns - 34, glyphs.ellipsis)} `;
    return [span(text, here ? 'inverse' : 'plain'), span(fitText(verdict.text, verdictColumns, glyphs.ellipsis), style)];
  }
  const time = sayTime(figures.holdTimeS ?? figures.scanTimeS ?? 0);
  const titleColumns = Math.min(columns - 53, 34);
  const rest = columns - titleColumns - verdictColumns - 28;
  const changes = rest > 20 ? `  ${fitText(changesInWords(listed.way), rest, glyphs.ellipsis)}` : '';
  return [
    span(
      `${here ? glyphs.pointer : ' '}${number.padStart(2)} ${fitText(wayTitle(state, listed), titleColumns, glyphs.ellipsis)} `,
      here ? 'inverse' : 'plain',
    ),
    span(fitText(verdict.text, verdictColumns, glyphs.ellipsis), style),
    span(`${time.padStart(8)}  SNR ${sayFigure('relativeSnr', figures.relativeSnr).padStart(5)}`),
    span(changes),
  ];
}

function paragraphLines({ search }: State, listed: ListedWay, columns: number): Line[] {
  return wayParagraphs(listed, search?.problem ?? null).flatMap(({ words, level }) =>
    wrap(words, columns - 2).map((each, at) =>
      line(`${at === 0 ? '' : '  '}${each}`, level === 'error' ? 'trouble' : level === 'caution' ? 'attention' : 'plain'),
    ),
  );
}

/** As many of the lines as there is room for, from where they are scrolled to. */
function cut(lines: readonly Line[], scroll: number, rows: number): Line[] {
  if (lines.length <= rows) return [...lines];
  const from = Math.min(scroll, lines.length - rows);
  const shown = lines.slice(from, from + rows);
  const rest = lines.length - from - rows;
  return rest === 0 ? shown : [...shown.slice(0, -1), line(`${rest + 1} more lines: PgDn`, 'quiet')];
}

function narrowDetail(state: State, { listed }: Here, look: Look, columns: number, rows: number): Line[] {
  const leftColumns = columns >= 98 ? 46 : 42;
  const rightColumns = columns - leftColumns - 2;
  const copy = asIf(state, listed);
  const words = paragraphLines(state, listed, rightColumns);
  return beside(
    fill(consequencePane(copy, look, leftColumns - markColumns, rows), rows),
    cut(words, state.wayScroll, rows).map((each) => [span(' '), ...each]),
    leftColumns,
    look.glyphs.verticalRule,
    look.glyphs.ellipsis,
  );
}

/** On a wide screen the front stands beside, with its own cursor. */
function wideDetail(state: State, { listed }: Here, look: Look, columns: number, rows: number): Line[] {
  const leftColumns = 50;
  const middleColumns = 48;
  const rightColumns = columns - leftColumns - middleColumns - 3;
  const copy = asIf(state, listed);
  const front = frontHere(state);
  const right =
    front === null
      ? [line('No front', 'quiet')]
      : frontPane(state, look, { columns: rightColumns, rows: Math.min(rows, 26), cursor: false });
  const two = beside(
    fill(consequencePane(copy, look, leftColumns - markColumns, Math.min(rows, 19)), rows),
    cut(paragraphLines(state, listed, middleColumns - 1), state.wayScroll, rows).map((each) => [span(' '), ...each]),
    leftColumns,
    look.glyphs.verticalRule,
    look.glyphs.ellipsis,
  );
  return beside(two, right, leftColumns + 1 + middleColumns, look.glyphs.verticalRule, look.glyphs.ellipsis);
}

/** The series as this way makes it, without a hand in the consequences. */
function asIf(state: State, { way }: ListedWay): State {
  const copy = stateWith(state, state.place.seriesId, way.given);
  return { ...copy, place: { ...copy.place, pane: 'main' } };
}

function footLines(state: State, columns: number, rows: number, noList: boolean): Line[] {
  const nothing = state.search?.answer?.result.ways.length === 0;
  const moves = otherMovesInWords(state);
  const result = state.search?.seriesId === state.place.seriesId ? state.search.answer?.result : undefined;
  return [
    ...(moves !== null && (nothing || rows >= 26) ? wrap(moves, columns).map((words) => line(words)) : []),
    ...(result !== undefined && rows >= 26 && !noList ? wrap(searchInWords(result), columns).map((words) => line(words, 'quiet')) : []),
    ...wrap(keptLine(keptInWords(state), rows >= 26 ? 3 * columns - 20 : columns), columns).map((words) => line(words, 'quiet')),
  ];
}

/** What every way keeps, as many bands as there is room for; the rest is counted, and its key shows all. */
function keptLine(kept: readonly string[], room: number): string {
  for (let count = kept.length; count > 0; count -= 1) {
    const rest = kept.length - count;
    const words = `k keeps ${kept.slice(0, count).join(', ')}${rest === 0 ? '' : `, ${rest} more`}`;
    if (words.length <= room) return words;
  }
  return `k: ${kept.length} figures are kept`;
}
