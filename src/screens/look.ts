import type { ColourLevel } from '../terminal/colour-level.js';
import { seriesColour, textColours } from '../terminal/colours.js';
import type { Glyphs } from '../terminal/glyphs.js';
import { cursorHere } from '../terminal/painter/cursor-mark.js';
import type { Line, Span, Style } from './line.js';

/** How this terminal is drawn on. */
export interface Look {
  readonly glyphs: Glyphs;
  readonly set: 'unicode' | 'ascii';
  readonly colourLevel: ColourLevel;
  /** Screens as linear text. */
  readonly reader: boolean;
}

const sgr = '\u001b[';

/** Foreground codes of the sixteen named colours (ECMA-48, 8.3.117). */
const namedCodes: Readonly<Record<string, number>> = { red: 31, green: 32, yellow: 33, blue: 34, magenta: 35, cyan: 36 };

function colourCode(colour: string | undefined, level: ColourLevel): string {
  if (colour === undefined || level === 0) return '';
  const named = namedCodes[colour];
  if (named !== undefined) return `${sgr}${named}m`;
  const [r, g, b] = [1, 3, 5].map((at) => Number.parseInt(colour.slice(at, at + 2), 16)) as [number, number, number];
  if (level === 3) return `${sgr}38;2;${r};${g};${b}m`;
  const cube = (part: number) => Math.round((part / 255) * 5);
  return `${sgr}38;5;${16 + 36 * cube(r) + 6 * cube(g) + cube(b)}m`;
}

function opening(style: Style, level: ColourLevel): string {
  switch (style) {
    case 'bold':
      return `${sgr}1m`;
    case 'quiet':
      return `${sgr}2m`;
    case 'inverse':
      return `${sgr}7m`;
    case 'attention':
      return `${sgr}1m${colourCode(textColours.attention, level)}`;
    case 'trouble':
      return `${sgr}1m${colourCode(textColours.trouble, level)}`;
    case 'first':
      return colourCode(seriesColour(0, level), level);
    case 'second':
      return colourCode(seriesColour(1, level), level);
    case 'plain':
      return '';
  }
}

/** The code of a grey: as it is in true colour, on the ramp of 24 between black and white of the 256 (232 to 255; 16 and 231). */
function greyCode(grey: number, level: ColourLevel): string {
  if (level === 3) {
    const value = Math.round(grey * 255);
    return `2;${value};${value};${value}`;
  }
  const step = Math.round(grey * 25);
  return `5;${step === 0 ? 16 : step === 25 ? 231 : 231 + step}`;
}

/** Sequences of two greys. The pairs of a picture stay the same while it is shown, and each is written out once. */
const greySequences: Readonly<Record<ColourLevel, WeakMap<NonNullable<Span['greys']>, string>>> = {
  0: new WeakMap(),
  1: new WeakMap(),
  2: new WeakMap(),
  3: new WeakMap(),
};

function greySequence(greys: NonNullable<Span['greys']>, level: ColourLevel): string {
  const known = greySequences[level].get(greys);
  if (known !== undefined) return known;
  const written = `${sgr}38;${greyCode(greys[0], level)};48;${greyCode(greys[1], level)}m`;
  greySequences[level].set(greys, written);
  return written;
}

/** A line with its styles as the painter reads them. */
export function paintLine(given: Line, { colourLevel }: Look): string {
  let painted = '';
  // One sequence a cell of a picture and none between them: each is read again with every frame.
  let inPicture = false;
  for (const { text, style, cursor, greys } of given) {
    if (text === '') continue;
    if (greys !== undefined) {
      painted += greySequence(greys, colourLevel) + text;
      inPicture = true;
      continue;
    }
    if (inPicture) painted += `${sgr}0m`;
    inPicture = false;
    const begin = opening(style, colourLevel);
    const shown = cursor ? cursorHere(text) : text;
    painted += begin === '' ? shown : `${begin}${shown}${sgr}0m`;
  }
  if (inPicture) painted += `${sgr}0m`;
  return painted;
}
