import type { Command } from './change.js';
import type { State } from './state.js';

/** One line of the key map: keys, what they are called, what they do. Help and the bottom line are made from it. */
export interface KeyRow {
  /** Names of keys; characters stand for themselves. `any-text`: every character that no other line has. */
  readonly keys: readonly string[];
  /** How the keys are written on screen. */
  readonly shown: string;
  /** One or two words for the bottom line; blank keeps the line out of it. */
  readonly brief: string;
  readonly help: string;
  readonly command: Command;
  /** Where the keys work only here and now. */
  readonly when?: (state: State) => boolean;
}

/** A line of the key map. */
export function row(
  keys: string | readonly string[],
  shown: string,
  brief: string,
  help: string,
  command: Command,
  when?: KeyRow['when'],
): KeyRow {
  return {
    keys: typeof keys === 'string' ? [keys] : keys,
    shown,
    brief,
    help,
    command,
    ...(when === undefined ? {} : { when }),
  };
}

/** The keys that move through rows. */
export function upAndDown(by: (rows: number) => Command, what: string): readonly KeyRow[] {
  return [
    row('up', 'up down', '', `Moves through ${what}.`, by(-1)),
    row('down', '', '', '', by(1)),
    row('home', 'Home End', '', `First and last of ${what}.`, by(-9999)),
    row('end', '', '', '', by(9999)),
  ];
}
