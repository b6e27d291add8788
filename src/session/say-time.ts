/**
 * A time in seconds as the trade writes it: `m:ss` from a minute up, seconds with one decimal below.
 *
 * @example sayTime(17.04) //=> '17.0 s'
 * @example sayTime(230.4) //=> '3:50'
 */
export function sayTime(seconds: number): string {
  const tenths = Math.round(seconds * 10);
  if (Math.abs(tenths) < 600) return `${(tenths / 10).toFixed(1)} s`;
  const whole = Math.round(Math.abs(seconds));
  const sign = seconds < 0 ? '-' : '';
  const minutes = Math.floor(whole / 60);
  if (minutes < 60) return `${sign}${minutes}:${twoDigits(whole % 60)}`;
  return `${sign}${Math.floor(minutes / 60)}:${twoDigits(minutes % 60)}:${twoDigits(whole % 60)}`;
}

function twoDigits(count: number): string {
  return String(count).padStart(2, '0');
}
