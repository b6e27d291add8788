/** Units that a typed value may carry, by the unit it is kept in: how many of the kept unit one of it is. */
const unitTable: Readonly<Record<string, Readonly<Record<string, number>>>> = {
  ms: { ms: 1, s: 1000, us: 0.001, min: 60_000 },
  s: { s: 1, ms: 0.001, min: 60 },
  mm: { mm: 1, cm: 10, m: 1000, um: 0.001 },
  deg: { deg: 1, rad: 180 / Math.PI },
  '%': { '%': 1 },
  'Hz/px': { 'Hz/px': 1, Hz: 1, 'kHz/px': 1000, kHz: 1000 },
  T: { T: 1, mT: 0.001 },
  uT: { uT: 1, mT: 1000 },
  'W/kg': { 'W/kg': 1 },
  '': {},
};

/** A number, or what stood there and what was expected. */
export type QuantityReading =
  | { readonly ok: true; readonly value: number }
  | { readonly ok: false; readonly given: string; readonly expected: string };

const numberForm = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d{1,3})?/i;
const fractionForm = /^(\d{1,4})\s*\/\s*(\d{1,4})$/;

/**
 * Reads a number with or without a unit, given in any unit that measures the same, and answers it in the unit it is kept in.
 * Plain numbers may also be fractions (`6/8`). Never NaN or infinite. Micro may be written u or with its own sign.
 *
 * @example readQuantity('38 cm', 'mm') //=> { ok: true, value: 380 }
 * @example readQuantity('6/8', '') //=> { ok: true, value: 0.75 }
 */
export function readQuantity(text: string, unit: string): QuantityReading {
  const typed = text.trim().replace(/[\u00b5\u03bc]/g, 'u').replace(/\u2212/g, '-').replace(/\u00b0/g, 'deg');
  const units = unitTable[unit] ?? {};
  const names = Object.keys(units);
  const expected = names.length === 0 ? 'a plain number' : `a number, alone or in ${names.join(', ')}`;
  const refused: QuantityReading = { ok: false, given: text, expected };
  const fraction = unit === '' ? fractionForm.exec(typed) : null;
  if (fraction !== null) return Number(fraction[2]) === 0 ? refused : { ok: true, value: Number(fraction[1]) / Number(fraction[2]) };
  const number = numberForm.exec(typed)?.[0];
  if (number === undefined) return refused;
  const suffix = typed.slice(number.length).trim();
  const factor = suffix === '' ? 1 : Object.hasOwn(units, suffix) ? units[suffix] : undefined;
  if (factor === undefined) return refused;
  const value = scaled(Number(number), factor);
  return Number.isFinite(value) ? { ok: true, value } : refused;
}

/** Division by the whole inverse where there is one: 250 us is 0.25 ms, and no 0.25000000000000006. */
function scaled(number: number, factor: number): number {
  const inverse = Math.round(1 / factor);
  return factor < 1 && Math.abs(inverse * factor - 1) < 1e-12 ? number / inverse : number * factor;
}
