import { figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { readQuantity } from './read-quantity.js';

/** A number that was written with a unit, `0.5 cm`: what it is worth depends on what it is compared with. */
export interface UnitLiteral {
  readonly number: number;
  readonly unit: string;
}

/** Units that rules know beside those of typed values, by the unit they are counted in. */
const more: Readonly<Record<string, Readonly<Record<string, number>>>> = {
  mm2: { mm2: 1, cm2: 100 },
  mm3: { mm3: 1, cm3: 1000, ml: 1000 },
  px: { px: 1 },
  uT: { uT: 1 },
  's/mm2': {},
};

/** Units that a rule may name after a number. */
export const ruleUnits: ReadonlySet<string> = new Set([
  'ms',
  's',
  'us',
  'min',
  'mm',
  'cm',
  'm',
  'um',
  'deg',
  'rad',
  'percent',
  'Hz',
  'kHz',
  'uT',
  ...Object.values(more).flatMap((units) => Object.keys(units)),
]);

/** The unit that a name of a formula is counted in; blank for plain numbers. */
export function unitOfName(name: string): string {
  if (Object.hasOwn(figureTable, name)) return figureTable[name as keyof typeof figureTable].unit;
  if (name === 'diffusion') return 's/mm2';
  const row = parameterRow(name as ParameterKey);
  return row.kind === 'number' ? row.unit : '';
}

/**
 * A number with a unit, in the unit of what stands beside it; null where the two do not measure the same.
 *
 * @example inUnit({ number: 0.5, unit: 'cm' }, 'mm') //=> 5
 */
export function inUnit({ number, unit }: UnitLiteral, wanted: string): number | null {
  const factor = more[wanted]?.[unit];
  if (factor !== undefined) return number * factor;
  if (wanted === '') return null;
  const read = readQuantity(`${number} ${unit}`, wanted);
  return read.ok ? read.value : null;
}

const powers: Readonly<Record<string, number>> = { mm: 1, mm2: 2, mm3: 3, '': 0 };
const lengths = ['', 'mm', 'mm2', 'mm3'];

/** Unit of a product or a quotient; null where it has no name here. A plain number leaves the other's unit. */
export function productUnit(a: string | null, b: string | null, operator: '*' | '/'): string | null {
  if (a === null || b === null) return null;
  if (b === '') return a;
  if (a === '' && operator === '*') return b;
  const [left, right] = [powers[a], powers[b]];
  if (left !== undefined && right !== undefined) return lengths[operator === '*' ? left + right : left - right] ?? null;
  return operator === '/' && a === b ? '' : null;
}
