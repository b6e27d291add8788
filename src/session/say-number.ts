/**
 * A number as a limit or an entry shows it: at most two digits after the point, none where they are zero.
 *
 * @example sayNumber(11) //=> '11'
 * @example sayNumber(2.804) //=> '2.8'
 */
export function sayNumber(value: number): string {
  return String(Number(value.toFixed(2)));
}

/**
 * Minutes and seconds, whatever the length; a clock that has run out shows a minus.
 *
 * @example sayClock(83) //=> '1:23'
 */
export function sayClock(seconds: number): string {
  const whole = Math.round(Math.abs(seconds));
  const sign = seconds < 0 && whole > 0 ? '-' : '';
  return `${sign}${Math.floor(whole / 60)}:${String(whole % 60).padStart(2, '0')}`;
}
