import { type ClassKey, classRow, type Family } from '../classes.js';
import type { Lines } from '../lines.js';
import { effectiveRepetitionTimeMs } from '../pacing.js';
import { guardedCeil, roundHalfUp } from '../rounding.js';
import type { Parameters } from '../series.js';
import type { Tissue } from '../tissues.js';
import { balancedSignal } from './balanced-steady-state.js';
import { type TrainTiming, trainSignal } from './echo-train-signal.js';
import { type InversionPreparedTiming, inversionPreparedSignal } from './inversion-prepared.js';
import { type SpinEchoTiming, spinEchoSignal } from './spin-echo.js';
import { spoiledGradientEchoSignal } from './spoiled-gradient-echo.js';

/** What a signal depends on besides the tissue. */
export interface SignalSetting {
  readonly key: ClassKey;
  readonly parameters: Parameters;
  readonly lines: Lines;
  /** Slices of one round. */
  readonly slicesOfRound: number;
}

/** True when each slice is excited once only: the magnetisation starts at equilibrium. */
function startsAtEquilibrium({ key, parameters: p }: SignalSetting): boolean {
  if (p.averages !== 1 || p.dummyShots !== 0) return false;
  if (key === 'single-shot-fast-spin-echo/2D') return true;
  return classRow(key).echoPlanar && p.volumes === 1 && p.diffusion === undefined;
}

/** From one excitation of a slice to the next, ms: single-shot series come back to a slice after all slices of the round. */
function signalRepetitionMs({ key, parameters: p, slicesOfRound }: SignalSetting): number {
  const tr = effectiveRepetitionTimeMs(p);
  return key === 'single-shot-fast-spin-echo/2D' ? tr * guardedCeil(slicesOfRound / p.simultaneousSlices) : tr;
}

/** Timing of a series as the signals of its class see it: worked out once, used for every tissue. */
export interface ClassTiming extends TrainTiming, SpinEchoTiming {
  /** The cycle of the inversion-prepared class, null in the others. */
  readonly prepared: InversionPreparedTiming | null;
}

/** Timing of a series as its signals see it. */
export function classTimingOf(setting: SignalSetting): ClassTiming {
  const p = setting.parameters;
  return {
    repetitionTimeMs: signalRepetitionMs(setting),
    echoTimeMs: p.echoTimeMs,
    secondEchoTimeMs: p.secondEchoTimeMs,
    inversionTimeMs: p.inversionTimeMs,
    flipAngleDeg: p.flipAngleDeg,
    refocusingAngleDeg: p.refocusingAngleDeg,
    echoTrainLength: p.echoTrainLength,
    echoSpacingMs: p.echoSpacingMs,
    fromEquilibrium: startsAtEquilibrium(setting),
    prepared: setting.key === 'inversion-prepared-gradient-echo/3D' ? inversionPreparedTimingOf(setting) : null,
  };
}

/** Timing of an inversion-prepared cycle: readouts from the partitions, the centre counted from 0. */
function inversionPreparedTimingOf({ parameters: p, lines }: SignalSetting): InversionPreparedTiming {
  const all = guardedCeil(lines.fullSlice / p.parallelFactorSlice);
  return {
    repetitionTimeMs: effectiveRepetitionTimeMs(p),
    inversionTimeMs: p.inversionTimeMs ?? 0,
    flipAngleDeg: p.flipAngleDeg,
    readouts: lines.slice,
    centre: roundHalfUp((p.partialFourierSlice - 0.5) * all),
    echoSpacingMs: p.echoSpacingMs,
  };
}

function spoiledSignal(s: ClassTiming, echoTimeMs: number, tissue: Tissue): number {
  if (s.fromEquilibrium) return Math.sin((s.flipAngleDeg * Math.PI) / 180) * Math.exp(-echoTimeMs / tissue.t2StarMs);
  return spoiledGradientEchoSignal(s.repetitionTimeMs, echoTimeMs, s.flipAngleDeg, tissue.t1Ms, tissue.t2StarMs);
}

/** Signed signal for proton density 1 at `echoTimeMs`. A new family is one file beside this one and one case here. */
function signedSignal(family: Family, s: ClassTiming, echoTimeMs: number, tissue: Tissue): number {
  switch (family) {
    case 'spoiled-gradient-echo':
    case 'echo-planar-gradient-echo':
      return spoiledSignal(s, echoTimeMs, tissue);
    case 'spin-echo':
    case 'echo-planar-spin-echo':
      return spinEchoSignal(s, echoTimeMs, tissue.t1Ms, tissue.t2Ms);
    case 'fast-spin-echo':
    case 'single-shot-fast-spin-echo':
    case 'rotating-strip-fast-spin-echo':
      return trainSignal(s, tissue.t1Ms, tissue.t2Ms);
    case 'balanced-steady-state':
      return balancedSignal(s.repetitionTimeMs, echoTimeMs, s.flipAngleDeg, tissue.t1Ms, tissue.t2Ms);
    case 'inversion-prepared-gradient-echo':
      return inversionPreparedSignal(s.prepared as InversionPreparedTiming, tissue.t1Ms) * Math.exp(-echoTimeMs / tissue.t2StarMs);
  }
}

/** Magnitude of the signal at `echoTimeMs` for proton density 1, before noise, fat factor and diffusion. */
export function classSignal(setting: SignalSetting, echoTimeMs: number, tissue: Tissue, timing = classTimingOf(setting)): number {
  return Math.abs(signedSignal(classRow(setting.key).family as Family, timing, echoTimeMs, tissue));
}
