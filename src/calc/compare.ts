import { type Baseline, contrastRatioOf } from './baseline.js';
import { type SeriesModel, weightedSignal } from './model.js';
import { sarTrend } from './rf.js';

/** The figures that only mean something against the baseline. */
export interface Comparison {
  readonly relativeSnr: number | null;
  readonly relativeContrast: number | null;
  readonly contrastRatio: number | null;
  readonly contrastRatioChange: number | null;
  readonly rfPowerTrend: number | null;
  readonly sarTrendLow: number | null;
  readonly sarTrendHigh: number | null;
}

/** Share of the larger signal below which target and comparison count as equal. */
const equalShare = 0.01;

/** Compares a series with its baseline: SNR and contrast with signal, contrast ratio, RF power and the range of the SAR trend. */
export function compareWith(model: SeriesModel, baseline: Baseline): Comparison {
  const target = weightedSignal(model.target);
  const comparison = weightedSignal(model.comparison);
  const { targetSignal, comparisonSignal } = baseline;
  const noiseRatio =
    model.signalFreeSnr === null || baseline.model.signalFreeSnr === null ? null : model.signalFreeSnr / baseline.model.signalFreeSnr;
  const relativeSnr =
    noiseRatio === null || target === null || targetSignal === null || targetSignal === 0 ? null : (noiseRatio * target) / targetSignal;
  let relativeContrast: number | null = null;
  if (noiseRatio !== null && target !== null && comparison !== null && targetSignal !== null && comparisonSignal !== null) {
    const before = Math.abs(targetSignal - comparisonSignal);
    if (before >= equalShare * Math.max(targetSignal, comparisonSignal) && before > 0)
      relativeContrast = (noiseRatio * Math.abs(target - comparison)) / before;
  }
  const contrastRatio = contrastRatioOf(target, comparison);
  const contrastRatioChange =
    contrastRatio === null || baseline.contrastRatio === null || baseline.contrastRatio === 0
      ? null
      : contrastRatio / baseline.contrastRatio - 1;
  const power = (model.b1PlusRmsUt / baseline.model.b1PlusRmsUt) ** 2;
  const sar = sarTrend(power, model.scanner.fieldT / baseline.model.scanner.fieldT);
  return {
    relativeSnr,
    relativeContrast,
    contrastRatio,
    contrastRatioChange,
    rfPowerTrend: power,
    sarTrendLow: sar.low,
    sarTrendHigh: sar.high,
  };
}
