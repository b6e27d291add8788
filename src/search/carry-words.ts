/**
 * A number for a sentence: so many digits after the point at most, none where they are zero.
 *
 * @example digits(440.004, 2) //=> '440'
 */
export function digits(value: number, most: number): string {
  return String(Number(value.toFixed(most)));
}
