import { orderRow } from '../session/hands/order-commands.js';
import { resultNow, studySeries } from '../session/results.js';
import { holdClock } from '../session/running.js';
import { sayFigure } from '../session/say-figure.js';
import { sayTime } from '../session/say-time.js';
import type { SeriesState } from '../session/session.js';
import type { State } from '../session/state.js';
import { minimumSet, type Timeline, type TimelineRow, timeline } from '../session/timeline.js';
import { seriesVerdicts } from '../session/verdicts.js';
import { fitText } from '../terminal/text-width.js';
import { blank, fill, type Line, line, span, windowOf } from './line.js';
import type { Look } from './look.js';
import { timeLine } from './time-line.js';

const stateWords: Readonly<Record<SeriesState, string>> = {
  'to-do': 'to do',
  running: 'running',
  done: 'done',
  repeated: 'repeated',
  'stopped-early': 'stopped',
  'not-done': 'skipped',
};

/** The series in order on one timeline, with the point where the patient's time ends. */
export function orderScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const order = timeline(state);
  const chosen = Math.max(
    0,
    order.rows.findIndex(({ series }) => series.id === orderRow(state)?.id),
  );
  const barColumns = columns >= 120 ? 30 : columns >= 100 ? 18 : 0;
  const head = `  ${'series'.padEnd(12)}${'state'.padEnd(9)}${'time'.padStart(7)}  ${'holds'.padEnd(11)}${'on table'.padStart(8)}${'total'.padStart(8)}${barColumns > 0 ? '  '.padEnd(barColumns + 2) : ''}  verdict`;
  const foot = footLines(state, order, look, columns);
  const shown = windowOf(order.rows, chosen, rows - foot.length - 2);
  const body: Line[] = [];
  shown.items.forEach((row, at) => {
    const index = shown.from + at;
    const before = order.rows[index - 1];
    if (row.beyond && before?.beyond !== true) body.push(endLine(order, look, columns));
    body.push(rowLine(state, row, order, index === chosen, barColumns, look, columns));
  });
  if (order.leftS !== null && !order.rows.some(({ beyond }) => beyond)) body.push(endLine(order, look, columns));
  return fill([line(head, 'quiet'), ...fill(body, rows - foot.length - 1), ...foot], rows);
}

/** The point where the patient's time ends, drawn through the list. */
function endLine({ leftS, totalS }: Timeline, { glyphs }: Look, columns: number): Line {
  const left = leftS ?? 0;
  const words = ` the patient's time ends here: ${sayTime(Math.max(0, left))}${totalS > left ? `, ${sayTime(totalS - left)} short` : `, ${sayTime(left - totalS)} to spare`} `;
  const rule = glyphs.horizontalRule;
  return [span(`${rule.repeat(4)}${words}${rule.repeat(Math.max(0, columns - 4 - words.length))}`, totalS > left ? 'trouble' : 'bold')];
}

function rowLine(state: State, row: TimelineRow, order: Timeline, here: boolean, barColumns: number, look: Look, columns: number): Line {
  const { glyphs } = look;
  const { series } = row;
  const { figures } = resultNow(state, series.id).evaluation;
  const holds = figures.holdTimeS === null ? '' : `${figures.holds} x ${sayFigure('holdTimeS', figures.holdTimeS)}`;
  const over = row.takesS === 0;
  const clock = holdClock(state, series);
  const word = clock === null ? stateWords[series.state] : clock.hold === null ? 'running' : `hold ${clock.hold}/${clock.holds}`;
  const sign =
    series.state === 'done' || series.state === 'repeated'
      ? glyphs.tick
      : series.state === 'to-do' || series.state === 'running'
        ? ' '
        : glyphs.cross;
  const judged = seriesVerdicts(state, series.id)[0];
  const beyond = row.beyond ? 'beyond the time' : '';
  const verdict = judged === undefined ? beyond : judged.verdict.word === 'FITS' && row.beyond ? beyond : judged.verdict.word;
  const text = `${here ? glyphs.pointer : ' '}${series.placeLocked ? '=' : ' '}${fitText(series.id, 12, glyphs.ellipsis)}${sign}${word.padEnd(8)}${sayTime(figures.scanTimeS ?? 0).padStart(7)}  ${holds.padEnd(11)}${(over ? '' : sayTime(row.takesS)).padStart(8)}${(over ? '' : sayTime(row.endsS)).padStart(8)}`;
  const changes = Object.keys(series.set).length;
  const tail = `  ${verdict}${changes > 0 ? `${verdict === '' ? '' : ', '}${changes} changed` : ''}`;
  const style = here ? 'inverse' : series.state === 'not-done' ? 'quiet' : 'plain';
  const bar = barColumns > 0 ? `  ${timeBar(row, order, barColumns, look)}` : '';
  return [
    span(text, style),
    span(bar),
    span(
      fitText(tail, columns - text.length - bar.length, glyphs.ellipsis),
      judged?.verdict.word === 'OVER' || row.beyond ? 'trouble' : here ? 'bold' : 'plain',
    ),
  ];
}

/** The stretch of time that a series takes, on the line of all of them. */
function timeBar({ takesS, endsS }: TimelineRow, { totalS, leftS }: Timeline, columns: number, { glyphs }: Look): string {
  const wholeS = Math.max(totalS, leftS ?? 0, 1);
  const at = (seconds: number) => Math.round((seconds / wholeS) * columns);
  const from = at(endsS - takesS);
  const to = takesS === 0 ? from : Math.max(from + 1, at(endsS));
  const end = leftS === null ? -1 : Math.min(columns - 1, at(Math.max(0, leftS)));
  return Array.from({ length: columns }, (_, column) =>
    column >= from && column < to ? glyphs.barFull : column === end ? glyphs.verticalRule : glyphs.barTrack,
  ).join('');
}

function footLines(state: State, order: Timeline, look: Look, columns: number): Line[] {
  const minimum = minimumSet(state);
  const items = minimum.map(({ ids, complete }) => `${complete ? look.glyphs.tick : '-'} ${ids.join(' or ')}`).join('   ');
  const complete = minimum.length > 0 && minimum.every((item) => item.complete);
  const here = orderRow(state);
  const about =
    here === undefined ? blank : line(fitText(`${here.id}: ${studySeries(state, here.id).title}`, columns, look.glyphs.ellipsis));
  return [
    blank,
    ...timeLine(state, look, columns),
    blank,
    about,
    ...(minimum.length === 0 ? [] : [line(`Minimum set${complete ? ', complete' : ''}:  ${items}`, complete ? 'bold' : 'plain')]),
    line(`Still to do ${sayTime(order.totalS)}, preparation and rests between holds included`, 'quiet'),
  ];
}
