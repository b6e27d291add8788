import { classRow } from '../calc/classes.js';
import type { FigureKey, Figures } from '../calc/figures.js';
import { figureRow } from '../calc/figures.js';
import { parameterKeys, parameterRow } from '../calc/parameters.js';
import { same } from '../calc/rounding.js';
import { classOf, type Parameters, type Series } from '../calc/series.js';
import { sayFigure } from './say-figure.js';
import { sayParameter } from './say-parameter.js';

/** Figures that a picture shows, in the order they are seen: what stands beside it in numbers. */
const pictureFigures: readonly FigureKey[] = [
  'relativeSnr',
  'relativeContrast',
  'voxelReadMm',
  'voxelPhaseMm',
  'voxelSliceMm',
  'blurFwhmPx',
  'chemicalShiftMm',
  'scanTimeS',
];

/** A parameter that differs, in full (`slice thickness 3 mm to 5 mm`) and in short (`slice thickness 5 mm`). */
export interface ChangedWords {
  readonly full: string;
  readonly short: string;
}

/** Parameters that differ, in table order. */
export function changedWords(before: Parameters, now: Parameters): ChangedWords[] {
  return parameterKeys
    .filter((key) => sayParameter(key, before[key]) !== sayParameter(key, now[key]))
    .map((key) => {
      const [label, value] = [parameterRow(key).label, sayParameter(key, now[key])];
      return { full: `${label} ${sayParameter(key, before[key])} to ${value}`, short: `${label} ${value}` };
    });
}

/** One line for each figure that a picture shows: `voxel, slice: 3.0 mm to 5.0 mm`; what did not move is said once. */
export function pictureFigureWords(series: Series, before: Figures, now: Figures): string[] {
  const has = classRow(classOf(series)).figures;
  return pictureFigures
    .filter((key) => has.includes(key) && now[key] !== null)
    .map((key) => {
      const { label, ratio } = figureRow(key);
      const value = sayFigure(key, now[key]);
      if (ratio === true) return `${label}: ${value} of the preset's`;
      const moved = before[key] !== null && !same(before[key], now[key] as number);
      return moved ? `${label}: ${sayFigure(key, before[key])} to ${value}` : `${label}: ${value}, as in the preset`;
    });
}
