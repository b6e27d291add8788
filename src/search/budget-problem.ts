import type { Body } from '../calc/body.js';
import type { Readings } from '../calc/reading.js';
import type { Scanner } from '../calc/scanner.js';
import type { GivenParameters } from '../calc/series.js';
import type { Rules } from '../study/must-keep.js';
import type { Study, StudySeries } from '../study/study.js';
import type { Bands } from './bands.js';
import type { Change, Trade } from './way.js';

/** What a session is planned with. */
export interface BudgetProblem {
  readonly study: Study;
  readonly scanner: Scanner;
  readonly body: Body;
  readonly rules: Rules;
  readonly minutes: number;
  /** No series longer than this, s. */
  readonly longestS: number | null;
  /** Seconds of one breath-hold; binds series that are held. Absent or null: not known. */
  readonly holdS?: number | null;
  /** Counted once for each planned series, s. */
  readonly overheadS: number;
  /** Ids that are done and take no more time. */
  readonly done: readonly string[];
  readonly bands: Bands;
  readonly readings: Readings;
  /** Values set by hand, and the scanner's numbers, of single series; from these the plan starts. */
  readonly asSet?: Readonly<Record<string, { readonly set: GivenParameters; readonly readings: Readings; readonly frozen: boolean }>>;
}

export type Choice = 'as it is' | 'shortened' | 'skipped';

/** What becomes of one series. */
export interface PlannedSeries {
  readonly series: StudySeries;
  readonly choice: Choice;
  /** Everything that is changed, a split that follows included: on a front that may be more than three settings. */
  readonly changes: Readonly<Record<string, Change>>;
  readonly given: GivenParameters;
  /** What shortening gives up, as of a way; empty otherwise. */
  readonly gives: readonly Trade[];
  /** Time of the series with the rests between its breath-holds, without overhead, s; 0 when skipped. */
  readonly timeS: number;
  /** Balanced loss against its preset; 0 as it is, what was set by hand included: that was decided already. */
  readonly loss: number;
}
