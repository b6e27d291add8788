/**
 * A ratio to the baseline: whole percent up to twice, `x 2.4` above.
 *
 * @example sayRatio(1.274) //=> '127 %'
 * @example sayRatio(2.41) //=> 'x 2.4'
 */
export function sayRatio(ratio: number): string {
  const percent = Math.round(ratio * 100);
  return percent <= 200 ? `${percent} %` : `x ${ratio.toFixed(1)}`;
}
