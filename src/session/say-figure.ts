import { type FigureKey, figureRow } from '../calc/figures.js';
import { sayRatio } from './say-ratio.js';
import { sayTime } from './say-time.js';

/** Lengths of a voxel: two digits below a millimetre, one above. */
const voxelLengths: readonly FigureKey[] = ['voxelReadMm', 'voxelPhaseMm', 'voxelSliceMm', 'displayedVoxelReadMm', 'displayedVoxelPhaseMm'];

/**
 * A figure with its unit, in the digits the trade uses; a dash where it does not apply.
 *
 * @example sayFigure('scanTimeS', 230.4) //=> '3:50'
 * @example sayFigure('voxelReadMm', 0.9766) //=> '0.98 mm'
 */
export function sayFigure(key: FigureKey, value: number | null): string {
  if (value === null) return '-';
  const { unit, digits, ratio } = figureRow(key);
  if (unit === 's') return sayTime(value);
  if (ratio === true) return sayRatio(value);
  if (key === 'contrastRatioChange') return sayChange(value);
  const shown = voxelLengths.includes(key) && value >= 1 ? value.toFixed(1) : value.toFixed(digits);
  return unit === '' ? shown : `${shown} ${unit}`;
}

/** A relative change in whole percent, always with its sign: `+27 %`, `-9 %`, `0 %`. */
export function sayChange(change: number): string {
  const percent = Math.round(change * 100);
  return percent === 0 ? '0 %' : `${percent > 0 ? '+' : ''}${percent} %`;
}
