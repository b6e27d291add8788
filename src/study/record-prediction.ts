import type { Figures } from '../calc/figures.js';
import { endedBy } from './reading-conditions.js';
import type { ComparedReading, ComparedReadings, RecordedSeries } from './record.js';

/** How far the scanner's own numbers were from what was predicted: 0.05 is 5 % above; null where one of the two is missing. */
export interface PredictionError {
  readonly time: number | null;
  readonly b1rms: number | null;
  /** Against the predicted range of SAR; 0 inside it. */
  readonly sar: number | null;
}

/**
 * Compares the reading taken after a change with the prediction: the figures used for time and B1+rms, and for SAR the reading
 * before times the predicted trend. With another coil, body or field than before it is no comparison.
 */
export function predictionError({ used, readings }: Pick<RecordedSeries, 'used' | 'readings'>): PredictionError {
  const { timeS, b1rmsUt, sarWkg } = comparedAfter(used.figures, readings);
  const error = (compared: ComparedReading | undefined) => (compared === undefined ? null : compared.ratio - 1);
  return { time: error(timeS), b1rms: error(b1rmsUt), sar: error(sarWkg) };
}

/**
 * How far the model alone was from the scan time: of the series as run where nothing was read before, else of the preset as it was read
 * before; null where nothing says it. It is what the model error of a scanner file stands for.
 */
export function modelTimeError({ used, readings }: Pick<RecordedSeries, 'used' | 'readings'>): number | null {
  if (readings.before?.timeS === undefined) return predictionError({ used, readings }).time;
  const before = readings.compared?.before.timeS;
  return before === undefined ? null : before.ratio - 1;
}

type TwoReadings = Pick<RecordedSeries['readings'], 'before' | 'after'>;

/** Readings beside what was predicted for them; null where there are none that can be compared. */
export function comparedReadings(model: Partial<Figures>, used: Partial<Figures>, readings: TwoReadings): ComparedReadings | null {
  const { before } = readings;
  const compared = {
    before: kept({
      timeS: compare(before?.timeS, model.scanTimeS, model.scanTimeS),
      b1rmsUt: compare(before?.b1rmsUt, model.b1PlusRmsUt, model.b1PlusRmsUt),
    }),
    after: comparedAfter(used, readings),
  };
  return Object.keys(compared.before).length + Object.keys(compared.after).length === 0 ? null : compared;
}

function comparedAfter(used: Partial<Figures>, { before, after }: TwoReadings): ComparedReadings['after'] {
  const { scanTimeS, b1PlusRmsUt, sarTrendLow, sarTrendHigh } = used;
  const now = after?.conditions;
  const sarBefore = before?.sarWkg;
  const holds = (key: 'timeS' | 'b1rmsUt' | 'sarWkg') => endedBy(before, key, now) === null;
  return kept({
    timeS: holds('timeS') ? compare(after?.timeS, scanTimeS, scanTimeS) : undefined,
    b1rmsUt: holds('b1rmsUt') ? compare(after?.b1rmsUt, b1PlusRmsUt, b1PlusRmsUt) : undefined,
    sarWkg:
      sarBefore !== undefined && holds('sarWkg')
        ? compare(after?.sarWkg, scaled(sarTrendLow, sarBefore), scaled(sarTrendHigh, sarBefore))
        : undefined,
  });
}

function scaled(trend: number | null | undefined, before: number): number | null {
  return trend === null || trend === undefined ? null : trend * before;
}

function compare(read: number | undefined, low: number | null | undefined, high: number | null | undefined): ComparedReading | undefined {
  if (read === undefined || typeof low !== 'number' || typeof high !== 'number' || low <= 0) return undefined;
  const predicted = Math.min(high, Math.max(low, read));
  return { predicted, read, ratio: read / predicted };
}

/** Without what is not there: JSON knows no undefined. */
function kept<K extends string>(values: Readonly<Record<K, ComparedReading | undefined>>): { readonly [key in K]?: ComparedReading } {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined)) as { readonly [key in K]?: ComparedReading };
}
