import { below } from './rounding.js';

export type VerdictWord = 'FITS' | 'TOO CLOSE' | 'OVER';
/** What is limited: one breath-hold, one series, the whole session, or RF under a cap. */
export type LimitKind = 'hold' | 'series' | 'session' | 'rf';

export interface Verdict {
  readonly word: VerdictWord;
  readonly kind: LimitKind;
  readonly value: number;
  readonly limit: number;
  /** What is to spare in the limit's own unit; negative when over. */
  readonly spare: number;
}

/** Real times run 3 to 6 % over the model (ACR phantom series): margins below which a fit is called too close. Common practice, no source. */
export interface VerdictMargins {
  /** Model error of this scanner, percent of the limit. */
  readonly modelErrorPercent: number;
  /** The scanner's own time of this series was typed in. */
  readonly hasTimeReading: boolean;
}

const withReadingPercent = 2;
const sessionMarginS = 20;
const seriesMarginPercent = 5;
const rfMarginPercent = 5;

/** Smallest spare, in the limit's unit, that still counts as a fit. */
export function verdictMargin(kind: LimitKind, limit: number, margins: VerdictMargins): number {
  if (kind === 'session') return sessionMarginS;
  if (kind === 'series') return (limit * seriesMarginPercent) / 100;
  if (kind === 'rf') return (limit * rfMarginPercent) / 100;
  return (limit * (margins.hasTimeReading ? withReadingPercent : margins.modelErrorPercent)) / 100;
}

/**
 * FITS, TOO CLOSE or OVER: over beyond the limit, too close when less than the margin is to spare.
 *
 * @example verdictOf('hold', 10.5, 11, { modelErrorPercent: 5, hasTimeReading: false }).word //=> 'TOO CLOSE'
 */
export function verdictOf(kind: LimitKind, value: number, limit: number, margins: VerdictMargins): Verdict {
  const spare = limit - value;
  const word = below(limit, value) ? 'OVER' : below(spare, verdictMargin(kind, limit, margins)) ? 'TOO CLOSE' : 'FITS';
  return { word, kind, value, limit, spare };
}
