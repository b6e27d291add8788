import type { ColourLevel } from './colour-level.js';

/**
 * Colours of words, by name, so that they follow the reader's theme. Red and magenta are the two of the sixteen that can be read on
 * black and on white in the common themes and that no common colour blindness confuses (red turns brown, magenta blue: common
 * practice, no source). What is in order has no colour. The word itself always says the same as its colour.
 */
export const textColours = { attention: 'magenta', trouble: 'red' } as const;

/**
 * Colours that people with the common colour blindnesses tell apart: Okabe and Ito, Color Universal Design, 2008
 * (https://jfly.uni-koeln.de/color/), without black and yellow, which vanish on black and on white. Ordered so that the first ones
 * can be read on both.
 */
export const seriesColours = ['#d55e00', '#0072b2', '#009e73', '#cc79a7', '#56b4e9', '#e69f00'] as const;

const namedSeriesColours = ['red', 'blue', 'green', 'magenta', 'cyan', 'yellow'] as const;

/**
 * The colour of a curve in a chart, or nothing where there are no colours: curves must differ by their signs too.
 *
 * @param index From 0; after the sixth they repeat.
 * @example seriesColour(0, 1) //=> 'red'
 */
export function seriesColour(index: number, level: ColourLevel): string | undefined {
  if (level === 0) return undefined;
  const colours = level === 1 ? namedSeriesColours : seriesColours;
  return colours[index % colours.length];
}
