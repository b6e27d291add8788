import { classOf } from '../calc/series.js';
import type { ClassReadings } from '../study/readings-report.js';
import { type Change, only } from './change.js';
import { equipmentNow } from './equipment.js';
import type { Effect } from './message.js';
import { readingsOf, sessionSeries, studySeries } from './results.js';
import { classResiduals } from './say-residual.js';
import type { State } from './state.js';

/** Asks the records how far predictions have been off on the scanner of the session, once a screen shows it: once for each scanner. */
export function keepResiduals(state: State): Change {
  const { screen } = state.place;
  const equipment = equipmentNow(state);
  if (equipment === null || state.session === null || (screen !== 'series' && screen !== 'readings')) return only(state);
  const scanner = equipment.scannerName;
  if (state.residuals?.scanner === scanner) return only(state);
  const ask = state.asks + 1;
  const next: State = { ...state, asks: ask, open: { ...state.open, residuals: ask }, residuals: { scanner, classes: null } };
  return [next, [{ kind: 'read-residuals', ask, scanner } satisfies Effect]];
}

/** What the records say came; where they cannot be read nothing is shown, since nobody asked for it by hand. */
export function takeResiduals(state: State, classes: readonly ClassReadings[] | null): State {
  return state.residuals === null ? state : { ...state, residuals: { ...state.residuals, classes } };
}

/** How far predictions have been off on this scanner for series of this class: one text for each of time, B1+rms and SAR that was read. */
export function residualsOf(state: State, id: string): readonly string[] {
  const { residuals } = state;
  if (residuals?.classes == null || residuals.scanner !== equipmentNow(state)?.scannerName) return [];
  const own = classOf(studySeries(state, id));
  const read = residuals.classes.find((one) => one.class === own);
  return read === undefined ? [] : classResiduals(read, readingsOf(state, sessionSeries(state, id)).timeS !== undefined);
}
