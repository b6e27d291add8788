import type { SeriesModel } from '../calc/model.js';
import { effectiveRepetitionTimeMs } from '../calc/pacing.js';
import { ernstAngleDeg } from '../calc/signal/spoiled-gradient-echo.js';
import type { CarrySetting, Settled } from './carry-setting.js';

/**
 * Angle of most signal of the target, degrees: `arccos e^(-TR/T1)` (Ernst & Anderson 1966); balanced
 * `cos a = (T1/T2 - 1) / (T1/T2 + 1)` (Freeman & Hill 1971).
 */
export function mostSignalAngleDeg(model: SeriesModel): number | null {
  const { target, series } = model;
  if (target === null) return null;
  if (series.family === 'balanced-steady-state') {
    const ratio = target.t1Ms / target.t2Ms;
    return (Math.acos((ratio - 1) / (ratio + 1)) * 180) / Math.PI;
  }
  return ernstAngleDeg(effectiveRepetitionTimeMs(series.parameters), target.t1Ms);
}

/** The preset's angle, times what the angle of most signal grew or shrank by; halves of a degree; null where it is not known. */
export function optimumAngleDeg({ baseline, series }: CarrySetting, settled: Settled): number | null {
  const before = mostSignalAngleDeg(baseline.model);
  const after = mostSignalAngleDeg(settled.model);
  if (before === null || after === null || before === 0) return null;
  return Math.max(0.5, Math.min(90, Math.round((2 * series.parameters.flipAngleDeg * after) / before) / 2));
}
