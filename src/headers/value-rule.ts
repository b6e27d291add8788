import type { ClassKey } from '../calc/classes.js';
import type { Keyword } from './attribute-table.js';
import type { CollectedSeries } from './collected-series.js';
import { type Found, missingFor, readAs } from './found.js';

/** How one parameter is found in headers: a row of the mapping table. */
export interface ValueRule {
  /** Attributes it is taken from, the first that says it wins. */
  readonly from: readonly Keyword[];
  /** Fields of a sidecar that say it. */
  readonly fields: readonly string[];
  /** What is done with them, one line. */
  readonly how: string;
  readonly find: (series: CollectedSeries, key: ClassKey | null) => Found;
}

/** A number that stands in one attribute just as the parameter means it. */
export function numberIn(keyword: Keyword, fields: readonly string[] = []): ValueRule {
  return { from: [keyword], fields, how: 'as it stands', find: (series) => firstNumber(series, keyword) };
}

/** The first number of an attribute as it stands; a note where images differ. */
export function firstNumber(series: CollectedSeries, keyword: Keyword): Found {
  const value = series.attributes[keyword]?.[0];
  if (typeof value !== 'number') return missingFor(`${keyword} is not stated`);
  return readAs(value, series.varies(keyword) ? `${keyword}, which differs between images: the first is taken` : keyword);
}

/** For a parameter that no attribute of the standard holds. */
export function heldNowhere(fields: readonly string[] = []): ValueRule {
  return {
    from: [],
    fields,
    how: 'no standard attribute holds it: typed by a person',
    find: () => missingFor('no standard attribute holds it'),
  };
}

/** True when a list of words says this one. */
export function says(words: readonly string[] | undefined, word: string): boolean {
  return words?.includes(word) === true;
}
