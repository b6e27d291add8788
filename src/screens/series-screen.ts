import { rangeChart, usualFigures } from '../session/chart.js';
import { consequences } from '../session/consequences.js';
import { fieldHere } from '../session/hands/series-commands.js';
import { showsPictures } from '../session/keep-drawing.js';
import { residualsOf } from '../session/residuals.js';
import type { State } from '../session/state.js';
import { cautionPane, wholeCautions } from './caution-pane.js';
import { chartPane } from './chart-pane.js';
import { consequencePane, nextStepPane } from './consequence-pane.js';
import { beside, blank, fill, type Line, line } from './line.js';
import type { Look } from './look.js';
import { parameterPane } from './parameter-pane.js';
import { besidePane } from './picture-screen.js';
import { typeTheseScreen } from './text-screen.js';
import { wholeItems } from './whole-items.js';

/** One series is adjusted: parameters, consequences, the next step, cautions; wide screens show the range chart and what to type too. */
export function seriesScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const wide = columns >= 150 && rows >= 36;
  const roomy = columns >= 98;
  const cautionRows = wide ? 0 : rows >= 26 ? 5 : 3;
  const off = residualLine(state, columns, look);
  const upper = rows - cautionRows - off.length;
  const leftColumns = roomy ? 47 : 39;
  const rule = look.glyphs.verticalRule;
  const { ellipsis } = look.glyphs;
  const left = parameterPane(state, look, { columns: leftColumns, labelColumns: roomy ? 23 : 16, headings: rows >= 36 }, upper);
  const middleColumns = wide ? 54 : columns - leftColumns - 1;
  const scaleRows = Math.min(consequences(state, state.place.seriesId).length + 1, wide ? 18 : roomy ? 12 : 9);
  const middle = [...consequencePane(state, look, middleColumns, scaleRows), ...(upper - scaleRows > 8 ? [blank] : [])];
  const stepRows = wide ? 14 : upper - middle.length;
  const below = fill(nextStepPane(state, look, middleColumns, stepRows), stepRows);
  const typed = wide ? [blank, ...typeTheseScreen(state, look, middleColumns - 1, upper - middle.length - stepRows - 1)] : [];
  const two = beside(left, [...middle, ...below, ...typed], leftColumns, rule, ellipsis);
  if (!wide) return [...fill(two, upper), ...off, ...cautionPane(state, look, columns, cautionRows)];
  const rightColumns = columns - leftColumns - middleColumns - 2;
  const chartRows = Math.min(upper - 12, 24);
  const right = [
    ...fill(
      showsPictures(state) ? besidePane(state, look, rightColumns, chartRows) : sideChart(state, look, rightColumns, chartRows),
      chartRows,
    ),
    blank,
    line('Cautions, worst first', 'quiet'),
    ...wholeCautions(state, look, rightColumns, upper - chartRows - 2),
  ];
  return [...fill(beside(two, right, leftColumns + 1 + middleColumns, rule, ellipsis), upper), ...off];
}

/** How far predictions have been off on this scanner for this class: as many as fit whole, the rest counted. No line where nothing was read. */
function residualLine(state: State, columns: number, { glyphs }: Look): Line[] {
  const texts = residualsOf(state, state.place.seriesId);
  if (texts.length === 0) return [];
  return [line(wholeItems('Off so far here: ', texts, '', { columns, key: 'd', ellipsis: glyphs.ellipsis }), 'quiet')];
}

/** The range chart of the parameter under the hand, beside the rest. */
function sideChart(state: State, look: Look, columns: number, rows: number): Line[] {
  const field = fieldHere(state);
  const figures = state.place.chart?.figures ?? usualFigures(state, state.place.seriesId);
  const chart = rangeChart({ ...state, place: { ...state.place, chart: { path: field.path, figures, position: 0 } } });
  return chart === null ? [line('No range of numbers to chart here', 'quiet')] : chartPane(chart, look, columns, rows);
}
