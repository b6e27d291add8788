/** A share of fewer than this is no rate. Common practice, no source. */
export const fewestForRate = 5;
/** Up to here a rate is said to come from a small count. Common practice, no source. */
export const smallCount = 20;

/**
 * A part of a whole as a number from 0 to 1; null where the whole is under five, which is too few for a rate.
 *
 * @example shareOf(16, 40) //=> 0.4
 * @example shareOf(2, 4) //=> null
 */
export function shareOf(part: number, whole: number): number | null {
  return whole < fewestForRate ? null : part / whole;
}

/**
 * The share in words: nothing where it is too small for a rate, which is said.
 *
 * @example shareWords(16, 40) //=> '16 of 40 (40 %)'
 * @example shareWords(3, 12) //=> '3 of 12 (25 %, small count)'
 * @example shareWords(2, 4) //=> '2 of 4 (too few for a rate)'
 */
export function shareWords(part: number, whole: number): string {
  const share = shareOf(part, whole);
  if (whole === 0) return '0';
  if (share === null) return `${part} of ${whole} (too few for a rate)`;
  return `${part} of ${whole} (${Math.round(share * 100)} %${whole < smallCount ? ', small count' : ''})`;
}
