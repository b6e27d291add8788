import { type Command, goBack, move, only, open, say } from '../change.js';
import { chartFigures, rangeChart, usualFigures } from '../chart.js';
import { resultNow } from '../results.js';
import { fieldValue } from '../series-fields.js';
import { setField } from '../set-field.js';
import type { State } from '../state.js';
import { fieldHere } from './series-commands.js';

/** Opens the range chart of the parameter under the hand. */
export const openChart: Command = (state) => {
  const { seriesId } = state.place;
  const field = fieldHere(state);
  if (field.kind !== 'number') return only(say(state, `${field.label} has no range of numbers to chart`, 'trouble'));
  if (fieldValue(field, resultNow(state, seriesId).parameters) === undefined)
    return only(say(state, `${field.label} is not set: type a value first`, 'trouble'));
  const chart = { path: field.path, figures: state.place.chart?.figures ?? usualFigures(state, seriesId), position: 0 };
  const known = chartFigures(state, seriesId);
  const figures = chart.figures.every((key) => known.includes(key)) ? chart.figures : usualFigures(state, seriesId);
  return only(move(open(state, 'chart'), { chart: { ...chart, figures } }));
};

/** Moves the cursor along the parameter. */
export const moveCursor =
  (by: number): Command =>
  (state) => {
    const drawn = rangeChart(state);
    const { chart } = state.place;
    if (drawn === null || chart === null) return only(state);
    const cursor = Math.min(drawn.points.length - 1, Math.max(0, drawn.cursor + by));
    return only(move({ ...state, notice: null }, { chart: { ...chart, position: cursor - drawn.now } }));
  };

/** Another figure on one of the two curves. */
export const turnFigure =
  (which: 0 | 1, by: -1 | 1): Command =>
  (state) => {
    const { chart, seriesId } = state.place;
    if (chart === null) return only(state);
    const keys = chartFigures(state, seriesId);
    const other = chart.figures[1 - which];
    let at = keys.indexOf(chart.figures[which]);
    do at = (at + by + keys.length) % keys.length;
    while (keys[at] === other && keys.length > 1);
    const next = keys[at] ?? chart.figures[which];
    return only(move(state, { chart: { ...chart, figures: which === 0 ? [next, chart.figures[1]] : [chart.figures[0], next] } }));
  };

/** Takes the value under the cursor and goes back. */
export const takeValue: Command = (state) => {
  const drawn = rangeChart(state);
  const point = drawn?.points[drawn.cursor];
  if (drawn === null || point === undefined) return only(goBack(state));
  return only(taken(state, drawn.field.path, point.value));
};

function taken(state: State, path: string, value: number): State {
  const back = goBack(state);
  const field = fieldHere({ ...back, place: { ...back.place, fields: { ...back.place.fields, series: path } } });
  return setField(back, back.place.seriesId, field, value);
}
