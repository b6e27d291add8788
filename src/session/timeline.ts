import { resultNow, sessionSeries } from './results.js';
import { holdClock } from './running.js';
import type { SessionSeries } from './session.js';
import type { State } from './state.js';

/** One series on the timeline. Times in seconds from now. */
export interface TimelineRow {
  readonly series: SessionSeries;
  /** Time on the table, preparation and rests included; of a running series what is left; 0 for what is over or skipped. */
  readonly takesS: number;
  /** Running total at its end. */
  readonly endsS: number;
  /** Whether the patient's time ends before it does. */
  readonly beyond: boolean;
}

export interface Timeline {
  readonly rows: readonly TimelineRow[];
  readonly totalS: number;
  /** What is left of the patient's minutes; null where no minutes were said. */
  readonly leftS: number | null;
}

/** What is left of the patient's time, s; it runs from the first series that is started. */
function timeLeftS(state: State): number | null {
  const { session } = state;
  if (session === null || session.limits.minutesLeft === null) return null;
  const goneS = session.clockFromMs === null ? 0 : Math.max(0, state.nowMs - session.clockFromMs) / 1000;
  return session.limits.minutesLeft * 60 - goneS;
}

/** The running order in time. */
export function timeline(state: State): Timeline {
  const leftS = timeLeftS(state);
  let endsS = 0;
  const rows = (state.session?.series ?? []).map((series): TimelineRow => {
    const takesS = takesTime(state, series);
    endsS += takesS;
    return { series, takesS, endsS, beyond: takesS > 0 && leftS !== null && endsS > leftS + 1e-9 };
  });
  return { rows, totalS: endsS, leftS };
}

function takesTime(state: State, series: SessionSeries): number {
  if (series.state === 'to-do') return resultNow(state, series.id).evaluation.figures.tableTimeS ?? 0;
  return series.state === 'running' ? (holdClock(state, series)?.seriesLeftS ?? 0) : 0;
}

/** One item of the minimum set and whether it stands. */
export interface MinimumItem {
  readonly ids: readonly string[];
  readonly complete: boolean;
}

/** What must be acquired at least: of a list any one serves. */
export function minimumSet(state: State): readonly MinimumItem[] {
  return (state.opened?.study.minimumSet ?? []).map((item) => {
    const ids = typeof item === 'string' ? [item] : item;
    return { ids, complete: ids.some((id) => ['done', 'repeated'].includes(sessionSeries(state, id).state)) };
  });
}
