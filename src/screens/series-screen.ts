import { rangeChart, usualFigures } from '../session/chart.js';
import { consequences } from '../session/consequences.js';
import { fieldHere } from '../session/hands/series-commands.js';
import type { State } from '../session/state.js';
import { cautionPane } from './caution-pane.js';
import { chartPane } from './chart-pane.js';
import { consequencePane, nextStepPane } from './consequence-pane.js';
import { beside, blank, fill, type Line } from './line.js';
import type { Look } from './look.js';
import { parameterPane } from './parameter-pane.js';

/** One series is adjusted: parameters, consequences, the next step, cautions; wide screens show the range chart too. */
export function seriesScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const wide = columns >= 150 && rows >= 40;
  const roomy = columns >= 98;
  const cautionRows = wide ? 8 : rows >= 26 ? 5 : 3;
  const upper = rows - cautionRows;
  const leftColumns = roomy ? 47 : 39;
  const left = parameterPane(state, look, { columns: leftColumns, labelColumns: roomy ? 23 : 16, headings: rows >= 40 }, upper);
  const middleColumns = wide ? 54 : columns - leftColumns - 1;
  const scaleRows = Math.min(consequences(state, state.place.seriesId).length + 1, wide ? 18 : roomy ? 12 : 9);
  const middle = [...consequencePane(state, look, middleColumns, scaleRows), ...(upper - scaleRows > 8 ? [blank] : [])];
  const below = nextStepPane(state, look, middleColumns, upper - middle.length);
  const two = beside(left, [...middle, ...below], leftColumns, look.glyphs.verticalRule, look.glyphs.ellipsis);
  const body = wide
    ? beside(
        two,
        sideChart(state, look, columns - leftColumns - middleColumns - 2, upper),
        leftColumns + 1 + middleColumns,
        look.glyphs.verticalRule,
        look.glyphs.ellipsis,
      )
    : two;
  return [...fill(body, upper), ...cautionPane(state, look, columns, cautionRows)];
}

/** The range chart of the parameter under the hand, beside the rest. */
function sideChart(state: State, look: Look, columns: number, rows: number): Line[] {
  const field = fieldHere(state);
  const figures = state.place.chart?.figures ?? usualFigures(state, state.place.seriesId);
  const chart = rangeChart({ ...state, place: { ...state.place, chart: { path: field.path, figures, position: 0 } } });
  return chart === null ? [] : chartPane(chart, look, columns, Math.min(rows, 24));
}
