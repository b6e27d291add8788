import { modelOf, type SeriesModel, weightedSignal } from './model.js';
import { highestB } from './noise.js';
import { nullTimeMs, nullTissueOf } from './null-time.js';
import { isBreathHeld } from './pacing.js';
import type { Scanner } from './scanner.js';
import type { Series } from './series.js';
import { type Tissue, TissueRole } from './tissues.js';

/** What "relative" and "trend" compare with: the preset as it stands on its own field, computed once. */
export interface Baseline {
  readonly model: SeriesModel;
  readonly targetSignal: number | null;
  readonly comparisonSignal: number | null;
  readonly contrastRatio: number | null;
  readonly nullMs: number | null;
  readonly breathHeld: boolean;
  readonly highestB: number;
}

/** Signal of target over comparison; null where either is not known or the comparison gives nothing. */
export function contrastRatioOf(target: number | null, comparison: number | null): number | null {
  return target === null || comparison === null || comparison === 0 ? null : target / comparison;
}

const nullRole = new TissueRole();

/** Inversion time that nulls the series' null tissue, ms; null where the series has none. */
export function seriesNullMs(model: SeriesModel): number | null {
  const p = model.series.parameters;
  const name = nullTissueOf(model.series, p.fatSuppression, p.inversionTimeMs);
  const tissue: Tissue | null = name === null ? null : nullRole.tissueOf(name, model.scanner.fieldT, model.series);
  return tissue === null ? null : nullTimeMs(model.setting, tissue, model.timing);
}

/** Takes a series, as it stands on a scanner, as the thing others are compared with. Its own split is a fact. */
export function baselineOf(series: Series, scanner: Scanner): Baseline {
  const model = modelOf(series, scanner, null);
  const targetSignal = weightedSignal(model.target);
  const comparisonSignal = weightedSignal(model.comparison);
  return {
    model,
    targetSignal,
    comparisonSignal,
    contrastRatio: contrastRatioOf(targetSignal, comparisonSignal),
    nullMs: seriesNullMs(model),
    breathHeld: isBreathHeld(model.series.parameters),
    highestB: highestB(model.series.parameters),
  };
}
