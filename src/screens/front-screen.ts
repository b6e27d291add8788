import { sayTime } from '../session/say-time.js';
import type { State } from '../session/state.js';
import { frontHere, frontSet, stateWith } from '../session/ways.js';
import { movedInWords, setInWords, verdictWith } from '../session/ways-words.js';
import { consequencePane } from './consequence-pane.js';
import { frontPane, frontTime, frontWords } from './front-pane.js';
import { beside, blank, fill, type Line, line, span, wrap } from './line.js';
import type { Look } from './look.js';

/** The front as a chart, with a point under the hand and everything it changes. */
export function frontScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const said = frontPoint(state);
  if (said === null) return fill([line('No front is known: f searches', 'quiet')], rows);
  const { seriesId } = state.place;
  const roomy = columns >= 98 && rows >= 26;
  const words = [
    ...wrap(`Change: ${said.changes}`, columns).map((each) => line(each)),
    ...(roomy ? [] : wrap(`Against the preset: ${said.moved}`, columns).map((each) => line(each))),
  ];
  const read: Line = [
    span(said.words, 'bold'),
    span(`  ${said.verdict.text}`, said.verdict.word === 'OVER' ? 'trouble' : said.verdict.word === 'TOO CLOSE' ? 'attention' : 'bold'),
    span(`  point ${said.at + 1} of ${said.count}`, 'quiet'),
  ];
  // The chart keeps its height, however much there is to say.
  const below = [read, ...fill(words, Math.max(roomy ? 3 : 6, words.length))];
  const chartRows = Math.max(6, Math.min(rows - below.length - 1, 34));
  if (!roomy) return fill([...frontPane(state, look, { columns, rows: chartRows, cursor: true }), blank, ...below], rows);
  // Two columns are for the mark of a number that comes from a reading.
  const rightColumns = columns >= 120 ? 50 : 46;
  const right = consequencePane(asIf(state, seriesId, said.set), look, rightColumns - 2, Math.min(chartRows, 19));
  const leftColumns = columns - rightColumns - 1;
  const chart = frontPane(state, look, { columns: leftColumns, rows: chartRows, cursor: true });
  return fill([...beside(chart, right, leftColumns, look.glyphs.verticalRule, look.glyphs.ellipsis), blank, ...below], rows);
}

function asIf(state: State, id: string, set: Parameters<typeof stateWith>[2]): State {
  const copy = stateWith(state, id, set);
  return { ...copy, place: { ...copy.place, pane: 'main' } };
}

/** The point under the hand in words; null where there is none. */
export function frontPoint(state: State) {
  const front = frontHere(state);
  const set = frontSet(state);
  const point = front?.points[front.at];
  if (front === null || set === null || point === undefined) return null;
  const { seriesId } = state.place;
  return {
    set,
    at: front.at,
    count: front.points.length,
    words: `${frontTime(state)} ${sayTime(point.timeS)}, ${frontWords[front.which].say(point.value)}`,
    verdict: verdictWith(state, seriesId, set),
    changes: setInWords(state, seriesId, set),
    moved: movedInWords(state, seriesId, set),
  };
}
