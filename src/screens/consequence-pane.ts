import { consequences, figureLabel, scaleFigures } from '../session/consequences.js';
import { fieldHere } from '../session/hands/series-commands.js';
import { movedFigures, nextStep, type StepPreview } from '../session/next-step.js';
import { resultNow } from '../session/results.js';
import { sayField } from '../session/say-field.js';
import { sayFigure } from '../session/say-figure.js';
import { sayVerdict } from '../session/say-verdict.js';
import type { State } from '../session/state.js';
import { seriesVerdicts } from '../session/verdicts.js';
import { fitText } from '../terminal/text-width.js';
import { type Line, line, span, wrap } from './line.js';
import type { Look } from './look.js';
import { alignPoint, figureParts } from './say-aligned.js';
import { strip } from './strip.js';

/** Columns besides the strip: hand, label, number, unit, change, and blanks. */
const fixedColumns = 1 + 11 + 1 + 1 + 7 + 1 + 2 + 1 + 5;

/** Every consequence on one scale whose middle is the preset. */
export function consequencePane(state: State, look: Look, columns: number, rows: number): Line[] {
  const { seriesId, pane, figure } = state.place;
  const { glyphs } = look;
  const room = Math.max(7, columns - fixedColumns);
  const stripColumns = Math.min(25, room % 2 === 1 ? room : room - 1);
  const list = consequences(state, seriesId);
  const here = pane === 'consequences' ? (figure ?? list[0]?.key) : null;
  const at = Math.max(
    0,
    list.findIndex(({ key }) => key === here),
  );
  const from = Math.max(0, Math.min(at - (rows - 2), list.length - (rows - 1)));
  const scale = `half${'x2'.padStart(stripColumns - 4)}`;
  const head: Line = [
    span(`${'Consequences'.padEnd(13)}`, pane === 'consequences' ? 'bold' : 'quiet'),
    span(`${scale}  ${'now'.padStart(4)} ${'change'.padStart(11)}`, 'quiet'),
  ];
  const lines = list.slice(from, from + rows - 1).map((row): Line => {
    const isHere = row.key === here;
    const { number, unit } = figureParts(row.key, resultNow(state, seriesId).evaluation.figures[row.key]);
    const style = isHere ? 'inverse' : row.over ? 'trouble' : 'plain';
    if (row.value === 'not known') {
      const empty = strip(null, row.limitRatio, false, stripColumns, look);
      return [
        span(`${isHere ? glyphs.pointer : ' '}${fitText(row.label, 11, glyphs.ellipsis)} `, style),
        ...empty,
        span('   not known', style),
      ];
    }
    const tail = row.over ? 'over' : row.change === '0 %' ? '' : row.change.replace(' ', '');
    return [
      span(`${isHere ? glyphs.pointer : ' '}${fitText(row.label, 11, glyphs.ellipsis)} `, style),
      ...strip(row.ratio, row.limitRatio, row.over, stripColumns, look),
      span(` ${alignPoint(number, 4, 3)} ${unit.padEnd(2)} ${tail.padStart(unit.length > 2 ? 4 : 5)}`, style),
      span(row.fromReading ? ' r' : '', 'quiet'),
    ];
  });
  return [head, ...lines];
}

/** What one step down and one step up would do, before it is pressed. */
export function nextStepPane(state: State, look: Look, columns: number, rows: number): Line[] {
  const { seriesId } = state.place;
  const { glyphs } = look;
  const field = fieldHere(state);
  const next = nextStep(state, seriesId, field);
  const column = Math.floor((columns - 13) / 2);
  const cells = (label: string, down: string, up: string, style: 'plain' | 'quiet' | 'bold' = 'plain'): Line => [
    span(fitText(label, 13, glyphs.ellipsis), style === 'plain' ? 'quiet' : style),
    span(fitText(down, column, glyphs.ellipsis), style),
    span(fitText(up, column, glyphs.ellipsis), style),
  ];
  const head = cells('Next step', headOf('-', field, next.down), headOf('+', field, next.up), 'bold');
  if (next.down === null && next.up === null)
    return [head, line(field.kind === 'numbers' || field.kind === 'number' ? 'Enter or a digit begins typing' : 'Enter turns it', 'quiet')];
  const now = resultNow(state, seriesId).evaluation.figures;
  const shownKeys = rows < 14 ? scaleFigures.filter((key) => key !== 'tableTimeS' && key !== 'voxelVolumeMm3') : scaleFigures;
  const moved = shownKeys.filter((key) =>
    [next.down, next.up].some((step) => step !== null && movedFigures(now, step.result.evaluation.figures, [key]).length > 0),
  );
  const verdicts = [next.down, next.up].map((step) => (step === null ? '' : verdictWords(state, step)));
  const lines: Line[] = [
    ...(verdicts.some((words) => words !== '') ? [cells('verdict', verdicts[0] ?? '', verdicts[1] ?? '', 'plain')] : []),
    ...moved.map((key) => cells(figureLabel(key), figureOf(next.down, key), figureOf(next.up, key))),
  ];
  if (moved.length === 0) lines.push(line('nothing here changes', 'quiet'));
  const sentences = next.sentences.flatMap((sentence) => wrap(sentence, columns)).map((sentence) => line(sentence));
  const roomForLines = Math.max(2, rows - 1 - Math.min(sentences.length, 2));
  const cut =
    lines.length > roomForLines
      ? [...lines.slice(0, roomForLines - 1), line(`and ${lines.length - roomForLines + 1} more: w says why`, 'quiet')]
      : lines;
  return [head, ...cut, ...sentences].slice(0, rows);
}

function headOf(sign: string, field: ReturnType<typeof fieldHere>, step: StepPreview | null): string {
  return step === null ? `${sign} -` : `${sign} ${sayField(field, step.value)}`;
}

function figureOf(step: StepPreview | null, key: (typeof scaleFigures)[number]): string {
  return step === null ? '' : sayFigure(key, step.result.evaluation.figures[key]);
}

function verdictWords(state: State, step: StepPreview): string {
  const judged = seriesVerdicts(state, state.place.seriesId, step.result)[0];
  return judged === undefined ? '' : sayVerdict(judged.verdict).replace('OVER by', 'OVER').replace(' to spare', '').replace(',', '');
}
