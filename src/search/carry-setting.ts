import { type Baseline, contrastRatioOf, seriesNullMs } from '../calc/baseline.js';
import { classRow } from '../calc/classes.js';
import { modelOf, type SeriesModel, weightedSignal } from '../calc/model.js';
import { nullTissueOf } from '../calc/null-time.js';
import { type Carried, resolveParameters } from '../calc/resolve.js';
import type { Scanner } from '../calc/scanner.js';
import type { GivenParameters, Parameters } from '../calc/series.js';
import { contrastEcho } from '../calc/signal/echo-train-signal.js';
import type { StudySeries } from '../study/study.js';
import type { CarryAim } from './carry.js';

/** What a series is carried from and to. */
export interface CarrySetting {
  readonly series: StudySeries;
  /** The preset on its own field. */
  readonly baseline: Baseline;
  readonly to: Scanner;
  readonly aim: CarryAim;
}

/** A series with some values set at the new field: timing carried by difference, TI by null. */
export interface Settled {
  readonly parameters: Parameters;
  readonly carried: readonly Carried[];
  readonly model: SeriesModel;
  /** Signal of target over comparison; null where either is not known or the timing is impossible. */
  readonly ratio: number | null;
}

/** True where the inversion time is there to null a tissue, and not for the contrast of an inversion-prepared gradient echo. */
export function nullsByInversion({ series, baseline }: Pick<CarrySetting, 'series' | 'baseline'>): boolean {
  const p = series.parameters;
  if (nullTissueOf(series, p.fatSuppression, p.inversionTimeMs) === null || baseline.nullMs === null) return false;
  return (
    series.nullTissue !== null ||
    p.fatSuppression === 'inversion' ||
    classRow(baseline.model.key).family !== 'inversion-prepared-gradient-echo'
  );
}

/** Values set, at the new field, with everything that follows them. */
export function settle(setting: CarrySetting, set: GivenParameters): Settled {
  const first = resolved(setting, set);
  const { baseline, series } = setting;
  if (set.inversionTimeMs !== undefined || !nullsByInversion(setting)) return first;
  const nullMs = seriesNullMs(first.model);
  if (nullMs === null) return first;
  // The preset's own distance from the null is kept: what a site runs is not always the null itself.
  const inversionTimeMs = Math.max(1, Math.round(((series.parameters.inversionTimeMs as number) * nullMs) / (baseline.nullMs as number)));
  return resolved(setting, { ...set, inversionTimeMs });
}

function resolved({ series, baseline, to }: CarrySetting, set: GivenParameters): Settled {
  const { parameters, carried } = resolveParameters(baseline, withFixedEcho({ series, baseline, to }, set), to);
  const model = modelOf({ ...series, parameters }, to, baseline.model.slotFactor);
  return { parameters, carried, model, ratio: contrastRatioOf(weightedSignal(model.target), weightedSignal(model.comparison)) };
}

/** A single shot reads its lines in one go: the echo that is the centre stays the same one, and TE follows the spacing. */
function withFixedEcho({ series, baseline, to }: Pick<CarrySetting, 'series' | 'baseline' | 'to'>, set: GivenParameters): GivenParameters {
  if (series.family !== 'single-shot-fast-spin-echo' || set.echoTimeMs !== undefined) return set;
  const before = series.parameters;
  const echo = contrastEcho(before.echoTimeMs, before.echoSpacingMs, before.echoTrainLength);
  const { parameters } = resolveParameters(baseline, set, to);
  return { ...set, echoTimeMs: Number((echo * parameters.echoSpacingMs).toFixed(6)) };
}
