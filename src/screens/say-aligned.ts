import type { FigureKey } from '../calc/figures.js';
import { sayFigure } from '../session/say-figure.js';

/** A number with its point in a fixed column: so many characters before it, so many from it on. */
export function alignPoint(number: string, before: number, after: number): string {
  // Minutes and seconds have no point: they end where the digits after it would.
  if (number.includes(':')) return number.padStart(before + after);
  const point = number.indexOf('.');
  const whole = point === -1 ? number : number.slice(0, point);
  const rest = point === -1 ? '' : number.slice(point);
  return whole.padStart(before) + rest.padEnd(after);
}

/** A figure as a number that lines up, and its unit apart. */
export function figureParts(key: FigureKey, value: number | null): { readonly number: string; readonly unit: string } {
  const said = sayFigure(key, value);
  const ratio = /^x (.*)$/.exec(said);
  if (ratio?.[1] !== undefined) return { number: ratio[1], unit: 'x' };
  const parts = /^(\S+) (.*)$/.exec(said);
  return parts === null ? { number: said, unit: '' } : { number: parts[1] ?? said, unit: parts[2] ?? '' };
}
