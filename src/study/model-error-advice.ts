import type { ClassReadings, ReportedClass, ScannerReadings } from './readings-report.js';
import { fewestForRate, smallCount } from './record-report-share.js';

/** Whether the model error of a scanner file still suits what was read; something to review, never a change. */
export interface ModelErrorAdvice {
  readonly kind: 'too-few' | 'keep' | 'raise' | 'lower';
  /** What holds now, percent: the file's, or that of a scanner without one. */
  readonly percent: number;
  /** What the readings ask for, percent, in steps of a half; null where they are too few. */
  readonly suggestedPercent: number | null;
  /** Times of the model alone that were compared. */
  readonly readings: number;
  /** The class that asks for most. */
  readonly because: { readonly class: ReportedClass; readonly ninthTenth: number; readonly readings: number } | null;
}

/** Steps and bounds of a suggestion, percent. The bounds are those of a scanner file. */
const stepPercent = 0.5;
const mostPercent = 50;

/**
 * The percent that nine in ten times of the model alone stayed within, of the class where that is most; classes with fewer than five
 * readings say nothing. Raised wherever one class asks for it; lowered by one percent at least, from twenty readings on, and only where
 * every class that was read has five. Common practice, no source.
 */
export function modelErrorAdvice({ classes }: ScannerReadings, percent: number): ModelErrorAdvice {
  const read = classes.filter(({ modelTime }) => modelTime !== null);
  const readings = read.reduce((sum, { modelTime }) => sum + (modelTime?.spread.count ?? 0), 0);
  const enough = read.filter(hasEnough);
  const most = enough.reduce<ClassReadings | null>(
    (worst, one) => (worst === null || (one.modelTimeNinthTenth ?? 0) > (worst.modelTimeNinthTenth ?? 0) ? one : worst),
    null,
  );
  if (most === null || most.modelTime === null || most.modelTimeNinthTenth === null)
    return { kind: 'too-few', percent, suggestedPercent: null, readings, because: null };
  const ninthTenth = most.modelTimeNinthTenth;
  // A product like 0.055 * 100 lies a hair over the number that it is.
  const steps = Math.ceil(Number(((ninthTenth * 100) / stepPercent).toPrecision(10)));
  const suggestedPercent = Math.min(mostPercent, Math.max(stepPercent, steps * stepPercent));
  const because = { class: most.class, ninthTenth, readings: most.modelTime.spread.count };
  const lower = suggestedPercent <= percent - 1 && readings >= smallCount && enough.length === read.length;
  const kind = suggestedPercent > percent ? 'raise' : lower ? 'lower' : 'keep';
  return { kind, percent, suggestedPercent, readings, because };
}

function hasEnough({ modelTime }: ClassReadings): boolean {
  return modelTime !== null && modelTime.spread.count >= fewestForRate;
}
