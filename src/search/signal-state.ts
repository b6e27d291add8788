import type { Lines } from '../calc/lines.js';
import type { SlotPulses } from '../calc/pulses.js';
import type { Parameters } from '../calc/series.js';

/** What the time of lines follows. */
export interface SignalTiming {
  /** States with one of these play their lines in the same time. */
  readonly timeId: number;
  readonly rounds: number;
  /** Put together when asked for: few ever are. */
  readonly parameters: Parameters;
}

/** Tells whether a timing that takes so many changes is of any use. */
export type Timely = (timing: SignalTiming, changes: number) => boolean;

/** Timing, signal and RF of one choice of the signal variables, for one train and one choice of the shared ones. */
export interface SignalState extends SignalTiming {
  readonly lines: Lines;
  readonly pulses: SlotPulses;
  readonly target: number | null;
  readonly comparison: number | null;
  readonly blurPx: number | null;
  readonly power: number | null;
  readonly trainLoss: number;
  /** Verdict of the RF limits: 0 fits, 1 too close, 2 over. */
  readonly rfRank: 0 | 1 | 2;
  /** Largest RF value over its limit, 0 without one. */
  readonly rfExcess: number;
  /** States with one of these differ in the time of their lines by dummies alone. */
  readonly shotId: number;
  readonly dummyShots: number;
  /** States with one of these have the same estimates of the shortest timing. */
  readonly minimumId: number;
  /** What those estimates are compared with, ms. */
  readonly echoTimeMs: number;
  readonly comparedRepetitionMs: number;
  readonly echoSpacingMs: number;
  /** SNR without signal, over the preset's, from which on the noise bands may be kept: within a billionth. */
  readonly quietFrom: number;
}
