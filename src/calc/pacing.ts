import { guardedCeil } from './rounding.js';
import type { Parameters } from './series.js';

/** Breath or RR interval when none is given, ms (common practice, no source). */
const usualBreathMs = 4000;
const usualBeatMs = 900;

/** Period of what starts the shots, ms; null when nothing does. */
export function pacingPeriodMs(p: Parameters): number | null {
  if (p.pacing.kind === 'respiratory-trigger') return p.pacing.periodMs ?? usualBreathMs;
  if (p.pacing.kind === 'cardiac-gate') return p.pacing.periodMs ?? usualBeatMs;
  return null;
}

/** True for a gated series that gathers several lines of one slice in each beat. */
export function isCine(p: Parameters): boolean {
  return p.pacing.kind === 'cardiac-gate' && p.linesPerBeat !== undefined;
}

/**
 * The repetition time that magnetisation and RF see, ms: each shot waits for the next breath or beat,
 * `period x ceil(TR / period)`; a cine keeps its own TR within the beat.
 */
export function effectiveRepetitionTimeMs(p: Parameters): number {
  const { kind } = p.pacing;
  if (kind === 'none' || kind === 'breath-hold' || isCine(p)) return p.repetitionTimeMs;
  const period = pacingPeriodMs(p);
  if (period === null) return p.repetitionTimeMs;
  return period * guardedCeil(p.repetitionTimeMs / period);
}

/** Time within one repetition in which slices may be acquired, ms: the window of a trigger (else 40 % of the period), or all of TR. */
export function acquisitionWindowMs(p: Parameters): number {
  const period = pacingPeriodMs(p);
  if (p.pacing.kind !== 'respiratory-trigger' || period === null) return effectiveRepetitionTimeMs(p);
  return p.pacing.windowMs ?? 0.4 * period;
}

/** True when the series is acquired in breath-holds. */
export function isBreathHeld(p: Parameters): boolean {
  return p.pacing.kind === 'breath-hold' || (p.pacing.kind === 'cardiac-gate' && p.pacing.breathHold === true);
}
