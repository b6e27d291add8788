import type { Figures } from '../calc/figures.js';
import type { Readings } from '../calc/reading.js';
import { type LimitKind, type Verdict, type VerdictMargins, type VerdictWord, verdictOf } from '../calc/verdict.js';

/** What this patient or implant allows for one series; a limit that is left out does not bind. */
export interface Limits {
  /** Seconds of one breath-hold. */
  readonly holdS?: number;
  /** Seconds of the whole series. */
  readonly timeS?: number;
  /** B1+rms cap in uT; needs the scanner's own reading of the preset. */
  readonly b1rmsUt?: number;
  /** SAR cap in W/kg; needs the scanner's own reading of the preset. */
  readonly sarWkg?: number;
  /** RF power (SAR) cap as a ratio to the preset. */
  readonly rfRatio?: number;
}

export type LimitKey = keyof Limits;

/** Names of the limits in the order they are said. */
export const limitKeys = ['holdS', 'timeS', 'b1rmsUt', 'sarWkg', 'rfRatio'] as const satisfies readonly LimitKey[];

const kinds: Readonly<Record<LimitKey, LimitKind>> = { holdS: 'hold', timeS: 'series', b1rmsUt: 'rf', sarWkg: 'rf', rfRatio: 'rf' };

/** True where any RF cap is set: only then may a search touch what RF alone asks for. */
export function hasRfCap(limits: Limits): boolean {
  return limits.b1rmsUt !== undefined || limits.sarWkg !== undefined || limits.rfRatio !== undefined;
}

type LimitedFigures = Pick<Figures, 'scanTimeS' | 'holdTimeS' | 'b1PlusRmsUt' | 'sarTrendHigh'>;

/**
 * The number that a limit is compared with. A series that is not acquired in breath-holds would have to run in one hold: its scan time counts.
 * Null where the figure is not known.
 */
export function limitedValue(key: LimitKey, figures: LimitedFigures, readings: Readings): number | null {
  switch (key) {
    case 'holdS':
      return figures.holdTimeS ?? figures.scanTimeS;
    case 'timeS':
      return figures.scanTimeS;
    case 'b1rmsUt':
      return figures.b1PlusRmsUt;
    case 'sarWkg':
      return figures.sarTrendHigh === null || readings.sarWkg === undefined ? null : readings.sarWkg * figures.sarTrendHigh;
    case 'rfRatio':
      return figures.sarTrendHigh;
  }
}

/** Order of verdict words: what fits comes first. */
export const verdictRank: Readonly<Record<VerdictWord, 0 | 1 | 2>> = { FITS: 0, 'TOO CLOSE': 1, OVER: 2 };

/** Verdict of one limit on a value; a value that is not known is over. */
export function limitVerdict(key: LimitKey, value: number | null, limit: number, margins: VerdictMargins): Verdict {
  return verdictOf(kinds[key], value ?? Number.POSITIVE_INFINITY, limit, margins);
}

/** Verdicts of all limits that are set, in their order. */
export function verdictsOf(
  limits: Limits,
  figures: LimitedFigures,
  readings: Readings,
  margins: VerdictMargins,
): (Verdict & { readonly limitKey: LimitKey })[] {
  return limitKeys.flatMap((key) => {
    const limit = limits[key];
    return limit === undefined ? [] : [{ ...limitVerdict(key, limitedValue(key, figures, readings), limit, margins), limitKey: key }];
  });
}

/** The worst rank of some verdicts: 0 fits, 1 too close, 2 over. */
export function worstRank(verdicts: readonly Verdict[]): 0 | 1 | 2 {
  return Math.max(0, ...verdicts.map(({ word }) => verdictRank[word])) as 0 | 1 | 2;
}
