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

/** Errors of one quantity, counted, all and by month. Memory grows with neither. */
export class ErrorCounts {
  private readonly all = new StepCounts(digits);
  private readonly months = new Map<string, StepCounts>();

  /** What is no number is not counted. */
  add(value: number | null, day: string | null): void {
    if (value === null || !Number.isFinite(value)) return;
    this.all.add(value);
    if (day === null) return;
    const month = day.slice(0, 7);
    let counts = this.months.get(month);
    if (counts === undefined) {
      counts = new StepCounts(digits);
      this.months.set(month, counts);
    }
    counts.add(value);
  }

  /** The error that nine in ten do not pass (type 7 of Hyndman and Fan); null where nothing was counted. */
  ninthTenth(): number | null {
    return this.all.quantile(0.9);
  }

  /** Null where nothing was counted. */
  report(): ErrorReport | null {
    const spread = this.all.spread();
    return spread === null ? null : errorReport(spread, this.months);
  }
}

/** Prediction errors of one series, counted. */
export class PredictionCounts {
  private readonly counts: Readonly<Record<PredictedQuantity, ErrorCounts>> = {
    time: new ErrorCounts(),
    b1rms: new ErrorCounts(),
    sar: new ErrorCounts(),
  };

  add(series: RecordedSeries, day: string | null): void {
    if (series.readings.after === null) return;
    const error = predictionError(series);
    for (const quantity of predictedQuantities) this.counts[quantity].add(error[quantity], day);
  }

  report(): PredictionReport {
    const { time, b1rms, sar } = this.counts;
    return { time: time.report(), b1rms: b1rms.report(), sar: sar.report() };
  }
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
