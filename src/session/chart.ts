import { classRow } from '../calc/classes.js';
import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import { classOf } from '../calc/series.js';
import { consequences, scaleFigures } from './consequences.js';
import { setWith } from './next-step.js';
import { resultNow, resultWith, studySeries } from './results.js';
import { fieldValue, type SeriesField, seriesFields } from './series-fields.js';
import type { State } from './state.js';
import { stepValue } from './step-value.js';
import { seriesVerdicts } from './verdicts.js';

/** One value of the parameter and what it gives. */
export interface ChartPoint {
  readonly value: number;
  readonly figures: Figures;
  readonly over: boolean;
}

/** A parameter run through its range. */
export interface RangeChart {
  readonly field: SeriesField;
  readonly points: readonly ChartPoint[];
  /** Index of the present value among the points, and of the cursor. */
  readonly now: number;
  readonly cursor: number;
  readonly figures: readonly [FigureKey, FigureKey];
  /** Limits of the two figures, in the figures' own unit; null where there is none. */
  readonly limits: readonly [number | null, number | null];
}

/** Points on each side of the present value. */
const reach = 24;

/** Figures that can be charted for a series. */
export function chartFigures(state: State, id: string): readonly FigureKey[] {
  const has = classRow(classOf(studySeries(state, id))).figures;
  const { figures } = resultNow(state, id).evaluation;
  return scaleFigures.filter((key) => has.includes(key) && figures[key] !== null);
}

/** The two figures that trade: the hold or the time, and SNR. */
export function usualFigures(state: State, id: string): readonly [FigureKey, FigureKey] {
  const keys = chartFigures(state, id);
  return [keys.includes('holdTimeS') ? 'holdTimeS' : 'scanTimeS', keys.includes('relativeSnr') ? 'relativeSnr' : 'voxelVolumeMm3'];
}

/** The chart of the place where the hand is; null where a parameter has no numbers to run through. */
export function rangeChart(state: State): RangeChart | null {
  const { chart, seriesId } = state.place;
  if (chart === null) return null;
  const now = resultNow(state, seriesId);
  const field = seriesFields(studySeries(state, seriesId), now.parameters).find(({ path }) => path === chart.path);
  const value = field === undefined ? undefined : fieldValue(field, now.parameters);
  if (field === undefined || field.kind !== 'number' || typeof value !== 'number') return null;
  const values = [...walk(state, field, value, -1).reverse(), value, ...walk(state, field, value, 1)];
  const points = values.map((each): ChartPoint => {
    const result = resultWith(state, seriesId, setWith(state, seriesId, field, each));
    return {
      value: each,
      figures: result.evaluation.figures,
      over: seriesVerdicts(state, seriesId, result).some(({ verdict }) => verdict.word === 'OVER'),
    };
  });
  const at = values.indexOf(value);
  const cursor = Math.min(points.length - 1, Math.max(0, at + chart.position));
  return {
    field,
    points,
    now: at,
    cursor,
    figures: chart.figures,
    limits: [limitOf(state, chart.figures[0]), limitOf(state, chart.figures[1])],
  };
}

function walk(state: State, field: SeriesField, from: number, direction: -1 | 1): number[] {
  const series = studySeries(state, state.place.seriesId);
  const values: number[] = [];
  let value = from;
  while (values.length < reach) {
    const next = stepValue(field, value, series, { direction, big: false });
    if (typeof next !== 'number') break;
    values.push(next);
    value = next;
  }
  return values;
}

function limitOf(state: State, key: FigureKey): number | null {
  const { seriesId } = state.place;
  const row = consequences(state, seriesId).find((consequence) => consequence.key === key);
  const value = resultNow(state, seriesId).evaluation.figures[key];
  if (row?.limitRatio == null || row.ratio === null || row.ratio === 0 || value === null) return null;
  return (row.limitRatio * value) / row.ratio;
}

/** A figure and its unit, as an axis is labelled. */
export function axisLabel(key: FigureKey): string {
  const { label, unit } = figureTable[key];
  return unit === '' ? label : `${label}, ${unit}`;
}
