import { type FigureKey, figureKeys, figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import type { Diffusion, Pacing } from '../calc/series.js';
import type { RecordedSeries } from './record.js';

/** Parameters whose planned and used value differ, in table order. */
export function changedParameters({ planned, used }: RecordedSeries): ParameterKey[] {
  if (planned === used) return [];
  return parameterKeys.filter((key) => JSON.stringify(planned.parameters[key]) !== JSON.stringify(used.parameters[key]));
}

/** Figures that differ in the digits that are shown, in column order. */
export function changedFigures({ planned, used }: RecordedSeries): FigureKey[] {
  return figureKeys.filter((key) => figureWords(key, planned.figures[key] ?? null) !== figureWords(key, used.figures[key] ?? null));
}

/**
 * A parameter's value with its unit, as a person reads it.
 *
 * @example parameterWords('sliceThicknessMm', 3.5) //=> '3.5 mm'
 */
export function parameterWords(key: ParameterKey, value: unknown): string {
  const row = parameterRow(key);
  if (value === undefined || value === null) return 'none';
  if (key === 'pacing') return pacingWords(value as Pacing);
  if (key === 'diffusion') return diffusionWords(value as Diffusion);
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (row.kind !== 'number' || typeof value !== 'number') return typeof value === 'string' ? value : JSON.stringify(value);
  return withUnit(plainNumber(value), row.unit);
}

/**
 * A figure's value with its unit; scan times above a minute in minutes and seconds.
 *
 * @example figureWords('scanTimeS', 148) //=> '2:28 min'
 */
export function figureWords(key: FigureKey, value: number | null): string {
  if (value === null) return 'none';
  const { unit, digits } = figureTable[key];
  if (unit === 's' && Math.abs(value) >= 60) {
    const seconds = Math.round(value);
    return `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')} min`;
  }
  return withUnit(value.toFixed(digits), unit);
}

function pacingWords({ kind, periodMs, windowMs, breathHold }: Pacing): string {
  const parts = [kind.replace('-', ' ')];
  if (periodMs !== undefined) parts.push(`${plainNumber(periodMs)} ms`);
  if (windowMs !== undefined) parts.push(`window ${plainNumber(windowMs)} ms`);
  if (breathHold === true) parts.push('in breath-holds');
  return parts.join(' ');
}

function diffusionWords({ bValuesSPerMm2, directions, averages }: Diffusion): string {
  return `b ${bValuesSPerMm2.join('/')}, ${directions} directions, averages ${averages.join('/')}`;
}

/** As many digits as the value has, the last binary ones left out: a change must never look like none. */
function plainNumber(value: number): string {
  return String(Number(value.toPrecision(6)));
}

function withUnit(number: string, unit: string): string {
  return unit === '' ? number : `${number} ${unit}`;
}
