/**
 * Characters that steer a terminal or hide text: controls (C0, C1, DEL), bidirectional marks and overrides, invisible
 * spaces and joins, line and paragraph separators, lone surrogates, tag characters (Unicode 16, general categories Cc, Cf, Zl, Zp, Cs).
 */
const steering = /[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/gu;

/** White space that a person may have typed on purpose. */
const breaks = /[\t\n\v\f\r\u0085\u2028\u2029]+/g;

/**
 * Text from a file, fit for a terminal: control, bidirectional and invisible characters removed, line breaks and tabs made
 * single spaces, ends trimmed, at most `longest` characters (whole code points) with `...` where it was cut.
 *
 * @example cleanText('liver\u001b[2J\u202E 3 T') //=> 'liver[2J 3 T'
 */
export function cleanText(text: string, longest = Number.POSITIVE_INFINITY): string {
  const clean = text.replace(breaks, ' ').replace(steering, '').trim();
  if (clean.length <= longest) return clean;
  const characters = [...clean];
  return characters.length <= longest ? clean : `${characters.slice(0, Math.max(0, longest - 3)).join('')}...`;
}

/**
 * A value as a message shows it: JSON, cleaned and shortened.
 *
 * @example shownValue('12 mm') //=> '"12 mm"'
 */
export function shownValue(value: unknown): string {
  if (typeof value === 'string') return `"${cleanText(value, 40)}"`;
  if (typeof value === 'number') return String(value);
  if (Array.isArray(value)) return value.length > 6 ? `a list of ${value.length}` : cleanText(JSON.stringify(value), 60);
  if (typeof value === 'object' && value !== null) return 'an object';
  return String(value);
}
