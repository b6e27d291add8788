import type { RecordedSeries } from './record.js';
import { predictionError } from './record-prediction.js';
import { type Spread, StepCounts } from './record-report-counts.js';
import { fewestForRate } from './record-report-share.js';

/** What can be predicted and read. */
export const predictedQuantities = ['time', 'b1rms', 'sar'] as const;
export type PredictedQuantity = (typeof predictedQuantities)[number];

/** Errors of one month: 0.05 is 5 % above the prediction. */
export interface MonthOfError {
  /** YYYY-MM. */
  readonly month: string;
  readonly count: number;
  readonly median: number;
}

/** How far the scanner's readings were from the prediction, and whether that moves. */
export interface ErrorReport {
  readonly spread: Spread;
  readonly months: readonly MonthOfError[];
  /** Last month less first month, of those with five readings at least; null with fewer than two such months. */
  readonly drift: { readonly from: string; readonly to: string; readonly change: number } | null;
}

export type PredictionReport = Readonly<Record<PredictedQuantity, ErrorReport | null>>;

/** Errors are told apart to a thousandth. */
const digits = 3;

/** Prediction errors of one series, counted. */
export class PredictionCounts {
  private readonly all = new Map<PredictedQuantity, StepCounts>();
  private readonly months = new Map<PredictedQuantity, Map<string, StepCounts>>();

  add(series: RecordedSeries, day: string | null): void {
    if (series.readings.after === null) return;
    const error = predictionError(series);
    for (const quantity of predictedQuantities) {
      const value = error[quantity];
      if (value === null || !Number.isFinite(value)) continue;
      countsIn(this.all, quantity).add(value);
      if (day === null) continue;
      let months = this.months.get(quantity);
      if (months === undefined) {
        months = new Map();
        this.months.set(quantity, months);
      }
      countsIn(months, day.slice(0, 7)).add(value);
    }
  }

  report(): PredictionReport {
    const of = (quantity: PredictedQuantity) => {
      const spread = this.all.get(quantity)?.spread() ?? null;
      return spread === null ? null : errorReport(spread, this.months.get(quantity) ?? new Map());
    };
    return { time: of('time'), b1rms: of('b1rms'), sar: of('sar') };
  }
}

function countsIn<K>(map: Map<K, StepCounts>, key: K): StepCounts {
  const known = map.get(key);
  if (known !== undefined) return known;
  const counts = new StepCounts(digits);
  map.set(key, counts);
  return counts;
}

function errorReport(spread: Spread, counted: ReadonlyMap<string, StepCounts>): ErrorReport {
  const months = [...counted]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([month, counts]) => ({ month, count: counts.count, median: counts.spread()?.median ?? Number.NaN }));
  const enough = months.filter(({ count }) => count >= fewestForRate);
  const [first, last] = [enough[0], enough.at(-1)];
  const drift =
    first === undefined || last === undefined || first === last
      ? null
      : { from: first.month, to: last.month, change: Number((last.median - first.median).toPrecision(12)) };
  return { spread, months, drift };
}
