import type { SeriesField } from './series-fields.js';

/** Eighths are written as the trade writes partial Fourier. */
export function isEighths(field: SeriesField, value: unknown): boolean {
  const partial = field.key === 'partialFourierPhase' || field.key === 'partialFourierSlice';
  return partial && typeof value === 'number' && value < 1 && Number.isInteger(value * 8);
}

/** A number of a field without its unit: the digits a person types, at most two after the point. */
export function sayFieldNumber(field: SeriesField, value: number): string {
  if (isEighths(field, value)) return `${value * 8}/8`;
  const exact = Number(value.toFixed(field.unit === 'ms' && value >= 1000 ? 1 : 2));
  const least = field.unit === 'mm' && field.key !== 'fieldOfViewMm' ? 1 : field.unit === 'ms' && exact < 20 ? 2 : 0;
  return exact.toFixed(Math.max(least, decimalsOf(exact)));
}

function decimalsOf(value: number): number {
  const text = String(value);
  const point = text.indexOf('.');
  return point === -1 ? 0 : text.length - point - 1;
}

/** A value of a field in words where it is no number: a choice, yes or no, a list; null where it is one. */
export function sayFieldWords(field: SeriesField, value: unknown): string | null {
  if (value === undefined || value === null) return '-';
  if (field.kind === 'flag') return value === true ? 'yes' : 'no';
  if (Array.isArray(value)) return value.join(', ');
  return typeof value === 'string' ? value.replaceAll('-', ' ') : null;
}

/** A value of a field with its unit: `4.0 mm`, `6/8`, `breath hold`. */
export function sayField(field: SeriesField, value: unknown): string {
  const words = sayFieldWords(field, value);
  if (words !== null) return words === '-' ? 'none' : words;
  const number = sayFieldNumber(field, value as number);
  return field.unit === '' ? number : `${number} ${field.unit}`;
}
