import type { ClassReadings } from '../study/readings-report.js';
import type { Spread } from '../study/record-report-counts.js';
import type { ErrorReport } from '../study/record-report-prediction.js';
import { fewestForRate } from '../study/record-report-share.js';

/**
 * An error in percent with its sign, one decimal, none where it is whole.
 *
 * @example sayErrorPercent(0.034) //=> '+3.4 %'
 * @example sayErrorPercent(0.06) //=> '+6 %'
 */
export function sayErrorPercent(error: number): string {
  const percent = Number((error * 100).toFixed(1));
  return `${percent > 0 ? '+' : ''}${percent + 0} %`;
}

/** The error that lies farthest from none, with its sign. */
export function worstError({ least, most }: Pick<Spread, 'least' | 'most'>): number {
  return Math.abs(least) > Math.abs(most) ? least : most;
}

/**
 * How far predictions of one kind have been off: `time: 12 readings, median +3.4 %, worst +6 %`. Fewer than five give no median.
 */
function residualWords(name: string, error: ErrorReport | null): string[] {
  if (error === null) return [];
  const { count, median } = error.spread;
  const middle = count < fewestForRate ? 'too few for a median' : `median ${sayErrorPercent(median)}`;
  return [`${name}: ${count} reading${count === 1 ? '' : 's'}, ${middle}, worst ${sayErrorPercent(worstError(error.spread))}`];
}

/** How far predictions of a class have been off on a scanner, one text each; of time the model alone while this series has no reading of its own. */
export function classResiduals({ time, modelTime, b1rms, sar }: ClassReadings, hasTimeReading: boolean): readonly string[] {
  return [
    ...residualWords('time', hasTimeReading ? (time ?? modelTime) : (modelTime ?? time)),
    ...residualWords('B1+rms', b1rms),
    ...residualWords('SAR', sar),
  ];
}
