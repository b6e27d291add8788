import { restOfHoldS } from '../calc/time.js';
import { scannerNow } from './equipment.js';
import { resultNow } from './results.js';
import type { SessionSeries } from './session.js';
import type { State } from './state.js';

/** Where a running series stands. */
export interface HoldClock {
  /** Which breath-hold, from 1; null for a series without. */
  readonly hold: number | null;
  readonly holds: number | null;
  /** Of the present hold or scan; the whole of it while it has not begun. */
  readonly leftS: number;
  /** A hold or the scan is under way; false between two holds. */
  readonly counting: boolean;
  /** All that is still to come of this series, with the rests between its holds. */
  readonly seriesLeftS: number;
}

/** The countdown of a running series; null when it does not run. */
export function holdClock(state: State, series: SessionSeries): HoldClock | null {
  const { run } = series;
  if (run === null) return null;
  const { holdTimeS, holds, scanTimeS } = resultNow(state, series.id).evaluation.figures;
  const held = holdTimeS !== null && holds !== null;
  const lengthS = (held ? holdTimeS : scanTimeS) ?? 0;
  const goneS = run.sinceMs === null ? 0 : Math.max(0, (state.nowMs - run.sinceMs) / 1000);
  const leftS = Math.max(0, lengthS - goneS);
  const counting = run.sinceMs !== null && leftS > 0;
  if (!held) return { hold: null, holds: null, leftS, counting, seriesLeftS: leftS };
  const hold = Math.min(holds, run.holdsDone + 1);
  const scanner = scannerNow(state);
  const restS = scanner === null ? 0 : restOfHoldS(scanner);
  return { hold, holds, leftS, counting, seriesLeftS: leftS + Math.max(0, holds - hold) * (lengthS + restS) };
}

/** The series that runs, if one does. */
export function runningSeries(state: State): SessionSeries | null {
  return state.session?.series.find(({ run }) => run !== null) ?? null;
}
