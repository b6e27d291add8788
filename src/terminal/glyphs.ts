/** Every sign that is drawn and is no letter, digit or punctuation. Each has one meaning, and each is one column wide. */
export interface Glyphs {
  /** Done, ticked off. */
  readonly tick: string;
  /** Not done, given up. */
  readonly cross: string;
  /** A limit or a must-keep on a scale. */
  readonly marker: string;
  /** The line where the hand is. */
  readonly pointer: string;
  readonly horizontalRule: string;
  readonly verticalRule: string;
  /** Where a text was cut. */
  readonly ellipsis: string;
  readonly minus: string;
  /** The prefix of a unit: a millionth. */
  readonly micro: string;
  readonly increases: string;
  readonly decreases: string;
  /** A filled cell of a strip or bar. */
  readonly barFull: string;
  /** The end of a strip that runs to the right: its left half is filled. */
  readonly barLeftHalf: string;
  /** The end of a strip that runs to the left: its right half is filled. */
  readonly barRightHalf: string;
  /** An empty cell of a strip or bar. */
  readonly barTrack: string;
  /** The middle of a strip, where nothing changes. */
  readonly barMiddle: string;
}

/** No character whose width depends on the font or a setting: bars are braille, not blocks; rules are not box drawing. */
export const unicodeGlyphs: Glyphs = {
  tick: '\u2713',
  cross: '\u2717',
  marker: '\u25ca',
  pointer: '\u25b8',
  horizontalRule: '\u2812',
  verticalRule: '|',
  ellipsis: '\u22ef',
  minus: '\u2212',
  micro: '\u00b5',
  increases: '\u25b4',
  decreases: '\u25be',
  barFull: '\u28ff',
  barLeftHalf: '\u2847',
  barRightHalf: '\u28b8',
  barTrack: '\u2804',
  barMiddle: '+',
};

/** The same in ASCII; a half cell cannot be drawn on one side, so both halves are one sign. */
export const asciiGlyphs: Glyphs = {
  tick: '*',
  cross: 'x',
  marker: '!',
  pointer: '>',
  horizontalRule: '=',
  verticalRule: '|',
  ellipsis: '~',
  minus: '-',
  micro: 'u',
  increases: '^',
  decreases: 'v',
  barFull: '#',
  barLeftHalf: ':',
  barRightHalf: ':',
  barTrack: '.',
  barMiddle: '+',
};

/**
 * True if the locale says that text is UTF-8: LC_ALL, else LC_CTYPE, else LANG (POSIX, base definitions 8.2).
 *
 * @example isUtf8Locale({ LANG: 'de_DE.UTF-8', LC_ALL: 'C' }) //=> false
 */
export function isUtf8Locale(environment: Readonly<Record<string, string | undefined>>): boolean {
  return /utf-?8/i.test(environment.LC_ALL || environment.LC_CTYPE || environment.LANG || '');
}

/**
 * The glyphs for this terminal.
 *
 * @param ascii The option `--ascii`: plain characters whatever the locale says.
 */
export function glyphsFor(ascii: boolean, environment: Readonly<Record<string, string | undefined>>): Glyphs {
  return !ascii && isUtf8Locale(environment) ? unicodeGlyphs : asciiGlyphs;
}
