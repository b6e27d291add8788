import type { Scanner } from '../calc/scanner.js';
import { pausesOf } from '../calc/time.js';
import type { BudgetProblem } from '../search/budget.js';
import type { Limits } from '../search/limits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { runningOrder } from '../study/running-order.js';
import type { StudySeries } from '../study/study.js';
import { scannerNow } from './equipment.js';
import { bodyOf, readingsOf, resultOfPreset, sessionSeries, studySeries } from './results.js';
import { holdClock } from './running.js';
import type { Session } from './session.js';
import type { State } from './state.js';
import { timeline } from './timeline.js';
import { bandsOf, baseSet } from './ways.js';

/** Once contrast is given a timed phase is never changed: the volumes before it cannot be acquired again. */
function isFrozen({ contrastAtMs }: Session, { purpose }: StudySeries): boolean {
  return contrastAtMs !== null && purpose === 'dynamic';
}

/** What limits a series: the hold where it has one, the longest series, and the caps that can be judged. */
function limitsOf(state: State, id: string): Limits {
  const { session } = state;
  if (session === null) return {};
  const { holdS, longestSeriesS, b1rmsCapUt, sarCapWkg } = session.limits;
  const readings = readingsOf(state, sessionSeries(state, id));
  const held = resultOfPreset(state, id).evaluation.figures.holdTimeS !== null;
  return {
    ...(holdS !== null && held ? { holdS } : {}),
    ...(longestSeriesS !== null ? { timeS: longestSeriesS } : {}),
    ...(b1rmsCapUt !== null && readings.b1rmsUt !== undefined ? { b1rmsUt: b1rmsCapUt } : {}),
    ...(sarCapWkg !== null && readings.sarWkg !== undefined ? { sarWkg: sarCapWkg } : {}),
  };
}

/** Everything that the search of a series is asked with: its values set by hand, this patient, what is kept. */
export function searchProblemOf(state: State, id: string): SearchProblem | null {
  const { opened, session } = state;
  if (opened === null || session === null) return null;
  const series = studySeries(state, id);
  const own = sessionSeries(state, id);
  return {
    // What was opened by hand is no longer locked.
    series: { ...series, locked: series.locked.filter((key) => !own.opened.includes(key)) },
    presetFieldT: opened.study.fieldT,
    scanner: scannerNow(state) ?? opened.scanner,
    body: bodyOf(state),
    rules: state.rules,
    limits: limitsOf(state, id),
    readings: readingsOf(state, own),
    bands: bandsOf(session),
    set: baseSet(state, id),
    opened: [],
    frozen: isFrozen(session, series),
  };
}

/** The scanners of one session differ by this. */
function scannerKey({ name, fieldT, coil }: Scanner): readonly unknown[] {
  return [name, fieldT, coil?.name];
}

/** Two problems with the same key have the same answer, within one opened study. */
export function searchKey({ series, scanner, body, rules, limits, readings, bands, set, frozen }: SearchProblem): string {
  return JSON.stringify([
    series.id,
    series.locked,
    series.mustKeep.length,
    scannerKey(scanner),
    body,
    rules.size,
    limits,
    readings,
    bands,
    set,
    frozen,
  ]);
}

/** Everything that a plan into the minutes left is asked with; null where no minutes were said. Series skipped by hand or stopped early stay out. */
export function budgetProblemOf(state: State): BudgetProblem | null {
  const { opened, session } = state;
  const { leftS } = timeline(state);
  if (opened === null || session === null || leftS === null) return null;
  const { study } = opened;
  const runsS = session.series.reduce((sum, series) => sum + (holdClock(state, series)?.seriesLeftS ?? 0), 0);
  const stays = session.series.filter(({ state: word }) => word !== 'not-done' && word !== 'stopped-early');
  const planned = stays.map(({ id }) => studySeries(state, id));
  const scanner = scannerNow(state) ?? opened.scanner;
  // The order by hand is the order of importance, where it differs from the preset's.
  const same = runningOrder(study.series).every((series, at) => series.id === session.series[at]?.id);
  const series = same ? planned : planned.map((each, at) => ({ ...each, priority: at + 1 }));
  return {
    study: { ...study, series },
    scanner,
    body: bodyOf(state),
    rules: state.rules,
    minutes: Math.max(0, leftS - runsS) / 60,
    longestS: session.limits.longestSeriesS,
    holdS: session.limits.holdS,
    overheadS: pausesOf(scanner).preparationS,
    done: stays.filter((each) => each.state !== 'to-do').map(({ id }) => id),
    bands: bandsOf(session),
    readings: {},
    asSet: Object.fromEntries(
      stays.map((each) => [
        each.id,
        { set: each.set, readings: readingsOf(state, each), frozen: isFrozen(session, studySeries(state, each.id)) },
      ]),
    ),
  };
}

/** Two plans with the same key have the same answer; minutes are compared to the tenth. */
export function budgetKey({ study, scanner, body, rules, minutes, longestS, holdS, done, bands, asSet }: BudgetProblem): string {
  const order = study.series.map(({ id, priority }) => [id, priority]);
  return JSON.stringify([order, scannerKey(scanner), body, rules.size, Math.floor(minutes * 10), longestS, holdS, done, bands, asSet]);
}
