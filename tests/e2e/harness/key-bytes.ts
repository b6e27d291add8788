/** What a terminal sends for a key. */
export const keyBytes = {
  up: '\u001b[A',
  down: '\u001b[B',
  right: '\u001b[C',
  left: '\u001b[D',
  home: '\u001b[H',
  end: '\u001b[F',
  pageUp: '\u001b[5~',
  pageDown: '\u001b[6~',
  delete: '\u001b[3~',
  backspace: '\u007f',
  tab: '\t',
  shiftTab: '\u001b[Z',
  enter: '\r',
  escape: '\u001b',
  ctrlC: '\u0003',
  ctrlZ: '\u001a',
  ctrlBackslash: '\u001c',
} as const;

/** A paste as a terminal sends it. */
export function pasted(text: string): string {
  return `\u001b[200~${text}\u001b[201~`;
}
