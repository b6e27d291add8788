import type { RecordedSeries } from './record.js';

/** How far the scanner's own numbers were from what was predicted: 0.05 is 5 % above; null where one of the two is missing. */
export interface PredictionError {
  readonly time: number | null;
  readonly b1rms: number | null;
  /** Against the predicted range of SAR; 0 inside it. */
  readonly sar: number | null;
}

/**
 * Compares the reading taken after a change with the prediction: the figures used for time and B1+rms, and for SAR the reading
 * before times the predicted trend.
 */
export function predictionError({ used, readings }: RecordedSeries): PredictionError {
  const { before, after } = readings;
  const { scanTimeS, b1PlusRmsUt, sarTrendLow, sarTrendHigh } = used.figures;
  const sarBefore = before?.sarWkg;
  return {
    time: excess(after?.timeS, scanTimeS, scanTimeS),
    b1rms: excess(after?.b1rmsUt, b1PlusRmsUt, b1PlusRmsUt),
    sar: sarBefore === undefined ? null : excess(after?.sarWkg, scaled(sarTrendLow, sarBefore), scaled(sarTrendHigh, sarBefore)),
  };
}

function scaled(trend: number | null | undefined, before: number): number | null {
  return trend === null || trend === undefined ? null : trend * before;
}

function excess(read: number | undefined, low: number | null | undefined, high: number | null | undefined): number | null {
  if (read === undefined || typeof low !== 'number' || typeof high !== 'number' || low <= 0) return null;
  if (read > high) return read / high - 1;
  return read < low ? read / low - 1 : 0;
}
