import { roundHalfUp } from '../calc/rounding.js';
import { derivedAs, type Found, readAs } from './found.js';

/** What a header says of the lines: counted as acquired, the share of the field, and lines over samples where it is stated. */
export interface CountedLines {
  readonly read: number;
  readonly phase: number;
  readonly by: string;
  readonly phaseFieldPercent: number | undefined;
  readonly percentSampling: number | undefined;
}

/** Counts that a scanner's grid steps by, the coarsest first (common practice). */
const steps = [16, 8, 4, 2, 1];

/**
 * Lines over a square field, from lines as the header counts them. The standard means lines that were acquired, which a rectangular
 * field has fewer of; some headers count over a square field all the same. PercentSampling (lines over samples, both over a square
 * field) tells the two apart where it is stated.
 *
 * @example squareLines({ read: 384, phase: 202, by: 'AcquisitionMatrix', phaseFieldPercent: 75, percentSampling: 70 }).value //=> 269
 */
export function squareLines({ read, phase, by, phaseFieldPercent, percentSampling }: CountedLines): Found {
  const share = (phaseFieldPercent ?? 100) / 100;
  if (!(share > 0) || Math.abs(share - 1) < 0.001) return readAs(phase, by);
  const wanted = percentSampling === undefined || percentSampling <= 0 ? null : (percentSampling / 100) * read;
  const near = (lines: number) => wanted !== null && Math.abs(lines - wanted) <= 0.03 * wanted;
  const overField = wholeLines(phase, share, wanted);
  if (near(phase) && !near(overField)) return readAs(phase, `${by}, counted over a square field: PercentSampling says so`);
  const why = near(overField) ? 'PercentSampling agrees' : 'taken as the standard means it: lines of the rectangular field';
  return derivedAs(overField, `${by} ${phase} / PercentPhaseFieldOfView ${plain(share * 100)} %; ${why}`);
}

/** The whole number of lines of which the share rounds to the count: nearest to what is wanted, else on the coarsest grid. */
function wholeLines(phase: number, share: number, wanted: number | null): number {
  const middle = Math.round(phase / share);
  const reach = Math.ceil(1 / share);
  const fitting: number[] = [];
  for (let lines = Math.max(1, middle - reach); lines <= middle + reach; lines += 1)
    if (roundHalfUp(lines * share) === phase) fitting.push(lines);
  if (fitting.length === 0) return middle;
  if (wanted !== null) return fitting.reduce((best, lines) => (Math.abs(lines - wanted) < Math.abs(best - wanted) ? lines : best));
  for (const step of steps) {
    const onGrid = fitting.find((lines) => lines % step === 0);
    if (onGrid !== undefined) return onGrid;
  }
  return middle;
}

function plain(value: number): string {
  return String(Number(value.toFixed(3)));
}
