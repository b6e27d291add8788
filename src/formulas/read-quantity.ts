/**
 * Units that a typed value may carry, by the unit it is kept in: how many of the kept unit one of it is.
 * Bandwidth is always per pixel, as PixelBandwidth in DICOM (PS3.3): `20 kHz` is 20000 Hz/px. A total bandwidth is not converted,
 * since that would hang on the read matrix.
 */
const unitTable: Readonly<Record<string, Readonly<Record<string, number>>>> = {
  ms: { ms: 1, s: 1000, us: 0.001, min: 60_000, sec: 1000 },
  s: { s: 1, ms: 0.001, min: 60, sec: 1 },
  mm: { mm: 1, cm: 10, m: 1000, um: 0.001 },
  deg: { deg: 1, rad: 180 / Math.PI, degrees: 1 },
  '%': { '%': 1, percent: 1 },
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
const minutesForm = /^(\d{1,4}):([0-5]\d(?:\.\d+)?)$/;

/**
 * Reads a number with or without a unit, given in any unit that measures the same, and answers it in the unit it is kept in.
 * Plain numbers may also be fractions (`6/8`), times minutes and seconds (`1:30`). Never NaN or infinite. Micro may be written u or
 * with its own sign; upper and lower case of a unit do not count.
 *
 * @example readQuantity('38 cm', 'mm') //=> { ok: true, value: 380 }
 * @example readQuantity('6/8', '') //=> { ok: true, value: 0.75 }
 */
export function readQuantity(text: string, unit: string): QuantityReading {
  const typed = text
    .trim()
    .replace(/[\u00b5\u03bc]/g, 'u')
    .replace(/\u2212/g, '-')
    .replace(/\u00b0/g, 'deg');
  const units = unitTable[unit] ?? {};
  const names = Object.keys(units);
  const expected = names.length === 0 ? 'a plain number' : `a number, alone or in ${names.join(', ')}`;
  const refused: QuantityReading = { ok: false, given: text, expected };
  const fraction = unit === '' ? fractionForm.exec(typed) : null;
  if (fraction !== null) return Number(fraction[2]) === 0 ? refused : { ok: true, value: Number(fraction[1]) / Number(fraction[2]) };
  const minutes = unit === 's' || unit === 'ms' ? minutesForm.exec(typed) : null;
  if (minutes !== null) return { ok: true, value: scaled(Number(minutes[1]) * 60 + Number(minutes[2]), unit === 'ms' ? 1000 : 1) };
  const number = numberForm.exec(typed)?.[0];
  if (number === undefined) return refused;
  const suffix = typed.slice(number.length).trim();
  const name = names.find((known) => known.toLowerCase() === suffix.toLowerCase());
  const factor = suffix === '' ? 1 : name === undefined ? undefined : units[name];
  if (factor === undefined) return refused;
  const value = scaled(Number(number), factor);
  // Minus zero becomes zero.
  return Number.isFinite(value) ? { ok: true, value: value + 0 } : refused;
}

/** Without the last binary digits: 1.005 s is 1005 ms and no 1004.9999999999999. Division by the whole inverse where there is one. */
function scaled(number: number, factor: number): number {
  if (factor === 1) return number;
  const inverse = Math.round(1 / factor);
  const product = factor < 1 && Math.abs(inverse * factor - 1) < 1e-12 ? number / inverse : number * factor;
  return Number(product.toPrecision(15));
}
