import { echoAmplitude, longitudinalAfterTrain, type TrainPhysics } from '../echo-train.js';
import { roundHalfUp } from '../rounding.js';

/** Timing and angles of an echo train; times in ms, angles in degrees. */
export interface TrainTiming {
  /** From one excitation of a slice to the next. */
  readonly repetitionTimeMs: number;
  readonly echoTimeMs: number;
  readonly inversionTimeMs: number | undefined;
  readonly flipAngleDeg: number;
  readonly refocusingAngleDeg: number;
  readonly echoTrainLength: number;
  readonly echoSpacingMs: number;
  /** True when nothing was excited before: the magnetisation starts at equilibrium. */
  readonly fromEquilibrium: boolean;
}

/**
 * The echo that sets contrast, counted from 1: `clamp(round(TE / spacing), 1, train length)`.
 *
 * @example contrastEcho(100, 10, 20) //=> 10
 */
export function contrastEcho(echoTimeMs: number, echoSpacingMs: number, echoTrainLength: number): number {
  return Math.min(echoTrainLength, Math.max(1, roundHalfUp(echoTimeMs / echoSpacingMs)));
}

/** What a train does to longitudinal magnetisation: it ends with `z0 + gain M` when it begins with M. */
export interface TrainEnd {
  readonly z0: number;
  readonly gain: number;
}

/** End of a train, linear in what it begins with: two passes, one where the excitation leaves nothing longitudinal. */
export function trainEnd(s: TrainTiming, t1Ms: number, t2Ms: number): TrainEnd {
  const train: TrainPhysics = { refocusingAngleDeg: s.refocusingAngleDeg, echoSpacingMs: s.echoSpacingMs, t1Ms, t2Ms };
  const flipCosine = Math.cos((s.flipAngleDeg * Math.PI) / 180);
  const z0 = longitudinalAfterTrain(train, s.echoTrainLength, 0);
  const gain = Math.abs(flipCosine) < 1e-12 ? 0 : longitudinalAfterTrain(train, s.echoTrainLength, flipCosine) - z0;
  return { z0, gain };
}

/**
 * Longitudinal magnetisation before the excitation of a train in its steady state (equilibrium is 1):
 * `(1 - E + E z0) / (1 - E gain)`; an inversion turns M into -M and recovers for TI.
 * Transverse magnetisation is spoiled before the next excitation.
 */
export function trainLongitudinal(s: TrainTiming, t1Ms: number, end: TrainEnd, ti = s.inversionTimeMs): number {
  const i = ti === undefined ? 0 : Math.exp(-ti / t1Ms);
  if (s.fromEquilibrium) return 1 - 2 * i;
  const e = Math.exp(-(s.repetitionTimeMs - (ti ?? 0) - s.echoTrainLength * s.echoSpacingMs) / t1Ms);
  if (ti === undefined) return (1 - e + e * end.z0) / (1 - e * end.gain);
  // Before the inversion M' = 1 - e + e (z0 + gain M); the excitation sees M = 1 - i - i M'.
  return (1 - i - i * (1 - e + e * end.z0)) / (1 + i * e * end.gain);
}

const untouched: TrainEnd = { z0: 0, gain: 0 };

/** Signed signal of a train at the echo that sets contrast, for proton density 1. */
export function trainSignal(s: TrainTiming, t1Ms: number, t2Ms: number): number {
  const train: TrainPhysics = { refocusingAngleDeg: s.refocusingAngleDeg, echoSpacingMs: s.echoSpacingMs, t1Ms, t2Ms };
  const end = s.fromEquilibrium ? untouched : trainEnd(s, t1Ms, t2Ms);
  const echo = contrastEcho(s.echoTimeMs, s.echoSpacingMs, s.echoTrainLength);
  return trainLongitudinal(s, t1Ms, end) * Math.sin((s.flipAngleDeg * Math.PI) / 180) * echoAmplitude(train, echo);
}
