import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import type { StudySeries } from '../study/study.js';
import type { SeriesField } from './series-fields.js';

/** Which way and how far a key goes. */
export interface StepKind {
  readonly direction: -1 | 1;
  readonly big: boolean;
}

/** Fields whose values stand on a grid of their step: off it, the next grid value comes first. */
const onGrid: readonly ParameterKey[] = [
  'matrixRead',
  'matrixPhase',
  'displayMatrix',
  'partialFourierPhase',
  'partialFourierSlice',
  'averages',
];

/**
 * How far one key goes: values a scanner accepts (matrices by 16, 3D phase by 8; slices by 1, 3D by 2; mm by 0.5, by 0.1 under 2 mm;
 * short times by less). Common practice, no source.
 */
export function stepSize(field: SeriesField, value: number, series: Pick<StudySeries, 'acquisition'>, big: boolean): number {
  if (field.inner !== null) return field.unit === 'ms' ? (big ? 500 : 100) : big ? 4 : 1;
  const row = parameterRow(field.key);
  if (row.kind !== 'number') return 1;
  const volume = series.acquisition === '3D';
  if (field.key === 'matrixPhase' && volume) return big ? 32 : 8;
  if (field.key === 'sliceCount' && volume) return big ? 8 : 2;
  if (field.key === 'sliceThicknessMm') return value <= 2 ? (big ? 0.5 : 0.1) : big ? 1 : 0.5;
  if (field.unit === 'ms') return timeStep(value, big);
  return big ? row.bigStep : row.step;
}

/** Times step by about a hundredth, in round numbers. */
function timeStep(valueMs: number, big: boolean): number {
  const small = valueMs < 2 ? 0.05 : valueMs < 20 ? 0.1 : valueMs < 100 ? 1 : valueMs < 1000 ? 10 : valueMs < 5000 ? 50 : 100;
  return small * (big ? 10 : 1);
}

/** Smallest value that keys reach; typing goes on to the end of the range. */
function keyMinimum(field: SeriesField): number {
  if (field.key === 'averages' || field.key === 'rfPulseStretch') return 1;
  if (field.key === 'partialFourierPhase' || field.key === 'partialFourierSlice') return 0.625;
  if (field.key === 'matrixRead' || field.key === 'matrixPhase') return 32;
  return field.min;
}

/**
 * The value one step on, or null where there is none: at the end of the range, or where there is no value to step from.
 */
export function stepValue(
  field: SeriesField,
  value: unknown,
  series: Pick<StudySeries, 'acquisition'>,
  { direction, big }: StepKind,
): number | string | boolean | null {
  if (field.kind === 'flag') return value === true ? (direction < 0 ? false : null) : direction > 0 ? true : null;
  if (field.kind === 'choice') return stepChoice(field, value, direction);
  if (field.kind === 'numbers' || typeof value !== 'number') return null;
  // Under 2 mm a step up must not jump: from 1.9 on by 0.1.
  const probe = field.key === 'sliceThicknessMm' && direction < 0 ? value - 1e-9 : direction > 0 ? value + 1e-9 : value;
  const size = stepSize(field, field.key === 'sliceThicknessMm' ? probe : value, series, big);
  const raw = onGrid.includes(field.key) ? nextOnGrid(value, size, direction) : value + direction * size;
  const next = Math.min(field.max, Math.max(Math.min(keyMinimum(field), value), Number(raw.toFixed(6))));
  return Math.abs(next - value) < 1e-9 ? null : next;
}

function nextOnGrid(value: number, size: number, direction: -1 | 1): number {
  const places = value / size;
  return direction > 0 ? Math.floor(places + 1e-9) * size + size : Math.ceil(places - 1e-9) * size - size;
}

function stepChoice(field: SeriesField, value: unknown, direction: -1 | 1): string | null {
  const at = field.choices.indexOf(String(value));
  if (at === -1) return field.choices[0] ?? null;
  return field.choices[at + direction] ?? null;
}

/**
 * A typed number as a scanner would take it: whole where only whole numbers stand, matrices even, else to the digits that are shown.
 * Common practice, no source.
 */
export function snapValue(field: SeriesField, value: number): number {
  if (field.key === 'matrixRead' || field.key === 'matrixPhase' || field.key === 'displayMatrix') return Math.round(value / 2) * 2;
  if (field.whole) return Math.round(value);
  return Number(value.toFixed(field.inner === null ? Math.max(field.digits, field.unit === 'mm' ? 2 : 0) : 0));
}
