import { type Baseline, baselineOf } from '../calc/baseline.js';
import { evaluate } from '../calc/evaluate.js';
import type { Figures } from '../calc/figures.js';
import { effectiveRepetitionTimeMs, isCine } from '../calc/pacing.js';
import { resolveParameters } from '../calc/resolve.js';
import { atMost } from '../calc/rounding.js';
import { plainScanner } from '../calc/scanner.js';
import type { Parameters } from '../calc/series.js';
import type { VerdictMargins } from '../calc/verdict.js';
import { type BandLimit, bandLimits } from './bands.js';
import { type LatticeVariable, latticeOf } from './lattice.js';
import { hasRfCap } from './limits.js';
import type { SearchProblem } from './problem-to-solve.js';

/** A problem with everything worked out that all its points share. */
export interface SearchSetting {
  readonly problem: SearchProblem;
  readonly baseline: Baseline;
  /** The preset as it stands, readings applied. */
  readonly presetFigures: Figures;
  readonly variables: readonly LatticeVariable[];
  readonly bands: readonly BandLimit[];
  readonly margins: VerdictMargins;
  readonly rfCapped: boolean;
  /** The series wraps into its picture before anything is changed: then a way may do so too. */
  readonly startWraps: boolean;
  /** How far the preset is below each estimated minimum, ms; a way may be no further below. */
  readonly shortfall: Shortfall;
}

export interface Shortfall {
  readonly echoTimeMs: number;
  readonly repetitionTimeMs: number;
  readonly echoSpacingMs: number;
}

type Minimum = { readonly echoTimeMs: number; readonly repetitionTimeMs: number; readonly echoSpacingMs: number | null };

/** Repetition time that the estimate of the shortest one is compared with, ms. */
export function comparedRepetitionMs(p: Parameters): number {
  return isCine(p) ? p.repetitionTimeMs : effectiveRepetitionTimeMs(p);
}

/** How far timing is below its estimated minimum, ms; negative where there is room. */
export function shortfallOf(p: Parameters, minimum: Minimum): Shortfall {
  return {
    echoTimeMs: minimum.echoTimeMs - p.echoTimeMs,
    repetitionTimeMs: minimum.repetitionTimeMs - comparedRepetitionMs(p),
    echoSpacingMs: minimum.echoSpacingMs === null ? Number.NEGATIVE_INFINITY : minimum.echoSpacingMs - p.echoSpacingMs,
  };
}

/** Dust of carried times, ms: they are whole nanoseconds. */
const carriedDustMs = 1e-6;

/** True when timing is no further below the estimates than the preset's own. */
export function noFurtherBelow(now: Shortfall, allowed: Shortfall): boolean {
  return (
    atMost(now.echoTimeMs, allowed.echoTimeMs + carriedDustMs) &&
    atMost(now.repetitionTimeMs, allowed.repetitionTimeMs + carriedDustMs) &&
    atMost(now.echoSpacingMs, allowed.echoSpacingMs + carriedDustMs)
  );
}

/** What the estimates of the shortest timing are compared with, ms. */
interface ComparedTiming {
  readonly echoTimeMs: number;
  readonly comparedRepetitionMs: number;
  readonly echoSpacingMs: number;
}

/** `noFurtherBelow` of `shortfallOf`, without forming it: a search asks this millions of times. */
export function keepsShortfall(now: ComparedTiming, minimum: Minimum, allowed: Shortfall): boolean {
  return (
    atMost(minimum.echoTimeMs - now.echoTimeMs, allowed.echoTimeMs + carriedDustMs) &&
    atMost(minimum.repetitionTimeMs - now.comparedRepetitionMs, allowed.repetitionTimeMs + carriedDustMs) &&
    (minimum.echoSpacingMs === null || atMost(minimum.echoSpacingMs - now.echoSpacingMs, allowed.echoSpacingMs + carriedDustMs))
  );
}

/** Works out what all points of a search share. */
export function settingOf(problem: SearchProblem): SearchSetting {
  const { series, scanner, body, readings, set } = problem;
  // The preset at its own field, with the pauses of those who work here.
  const plain = plainScanner(problem.presetFieldT);
  const baseline = baselineOf(series, scanner.pauses === undefined ? plain : { ...plain, pauses: scanner.pauses });
  const presetFigures = evaluate(series, baseline.model.scanner, body, baseline, { readings }).figures;
  const { parameters } = resolveParameters(baseline, set, scanner);
  const start = evaluate({ ...series, parameters }, scanner, body, baseline);
  const own = shortfallOf(series.parameters, baseline.model.minimum);
  return {
    problem,
    baseline,
    presetFigures,
    variables: latticeOf(problem),
    bands: bandLimits(problem.bands, presetFigures),
    margins: { modelErrorPercent: scanner.modelErrorPercent, hasTimeReading: readings.timeS !== undefined },
    rfCapped: hasRfCap(problem.limits),
    startWraps: start.cautions.some(({ code, level }) => code === 'wrap' && level === 'caution'),
    shortfall: {
      echoTimeMs: Math.max(0, own.echoTimeMs),
      repetitionTimeMs: Math.max(0, own.repetitionTimeMs),
      echoSpacingMs: Math.max(0, own.echoSpacingMs),
    },
  };
}
