/**
 * A number for a sentence: at most this many digits after the point, trailing zeros dropped.
 *
 * @example inWords(2.30, 2) //=> '2.3'
 */
export function inWords(value: number, digits = 1): string {
  return String(Number(value.toFixed(digits)));
}
