/** How many colours may be used: none, the 16 named ones, the 256 of the fixed table, or any. */
export type ColourLevel = 0 | 1 | 2 | 3;

/** Values of the option `--color`. */
export const colourChoices = { never: 0, '16': 1, '256': 2, true: 3 } as const satisfies Record<string, ColourLevel>;

/** What decides about colour. */
export interface ColourQuestion {
  /** The value of `--color`, if it was given. */
  readonly choice?: keyof typeof colourChoices | undefined;
  readonly environment: Readonly<Record<string, string | undefined>>;
  /** Whether the output is a terminal. */
  readonly isTerminal: boolean;
}

/** What the terminal says of itself in TERM and COLORTERM. */
function levelOfTerminal(environment: ColourQuestion['environment']): ColourLevel {
  const term = environment.TERM ?? '';
  if (term === 'dumb' || term === '') return 0;
  if (/^(truecolor|24bit)$/i.test(environment.COLORTERM ?? '') || /-direct/.test(term)) return 3;
  if (/-256(color)?$/i.test(term)) return 2;
  if (/-m(ono)?$|^vt(52|100|102|220|320)(-|$)/.test(term)) return 0;
  return 1;
}

/** FORCE_COLOR: 0 or false for none, 1 to 3 for a level, anything else for what the terminal has, but some. */
function forcedLevel(force: string, environment: ColourQuestion['environment']): ColourLevel {
  if (force === '0' || force === 'false') return 0;
  if (force === '1') return 1;
  if (force === '2') return 2;
  if (force === '3') return 3;
  return levelOfTerminal(environment) || 1;
}

/**
 * The colour level, decided once. What comes first in this list wins: `--color`, FORCE_COLOR, NO_COLOR (if it is not empty), an
 * output that is no terminal, then TERM and COLORTERM.
 *
 * @example colourLevel({ environment: { TERM: 'xterm-256color' }, isTerminal: true }) //=> 2
 * @example colourLevel({ environment: { TERM: 'xterm-256color', NO_COLOR: '1' }, isTerminal: true }) //=> 0
 * @example colourLevel({ choice: 'true', environment: { NO_COLOR: '1' }, isTerminal: false }) //=> 3
 */
export function colourLevel({ choice, environment, isTerminal }: ColourQuestion): ColourLevel {
  if (choice !== undefined) return colourChoices[choice];
  const force = environment.FORCE_COLOR;
  if (force !== undefined) return forcedLevel(force, environment);
  if (environment.NO_COLOR) return 0;
  return isTerminal ? levelOfTerminal(environment) : 0;
}
