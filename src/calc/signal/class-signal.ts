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

/** Signed signal for proton density 1, at `echoTimeMs`, before fat factor and diffusion. */
type SignalOf = (setting: SignalSetting, echoTimeMs: number, tissue: Tissue) => number;

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

/** Timing of a refocused train as its signal sees it. */
export function trainTimingOf(setting: SignalSetting): TrainTiming {
  const p = setting.parameters;
  return {
    repetitionTimeMs: signalRepetitionMs(setting),
    echoTimeMs: p.echoTimeMs,
    inversionTimeMs: p.inversionTimeMs,
    flipAngleDeg: p.flipAngleDeg,
    refocusingAngleDeg: p.refocusingAngleDeg,
    echoTrainLength: p.echoTrainLength,
    echoSpacingMs: p.echoSpacingMs,
    fromEquilibrium: startsAtEquilibrium(setting),
  };
}

/** Timing of a spin echo as its signal sees it. */
export function spinEchoTimingOf(setting: SignalSetting): SpinEchoTiming {
  const p = setting.parameters;
  return {
    repetitionTimeMs: signalRepetitionMs(setting),
    echoTimeMs: p.echoTimeMs,
    secondEchoTimeMs: p.secondEchoTimeMs,
    inversionTimeMs: p.inversionTimeMs,
    flipAngleDeg: p.flipAngleDeg,
    refocusingAngleDeg: p.refocusingAngleDeg,
    fromEquilibrium: startsAtEquilibrium(setting),
  };
}

/** Timing of an inversion-prepared cycle: readouts from the partitions, the centre counted from 0. */
export function inversionPreparedTimingOf({ parameters: p, lines }: SignalSetting): InversionPreparedTiming {
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

const spinEcho: SignalOf = (s, te, tissue) => spinEchoSignal(spinEchoTimingOf(s), te, tissue.t1Ms, tissue.t2Ms);
const train: SignalOf = (s, _te, tissue) => trainSignal(trainTimingOf(s), tissue.t1Ms, tissue.t2Ms);
const spoiled: SignalOf = (s, te, tissue) => {
  const p = s.parameters;
  if (startsAtEquilibrium(s)) return Math.sin((p.flipAngleDeg * Math.PI) / 180) * Math.exp(-te / tissue.t2StarMs);
  return spoiledGradientEchoSignal(signalRepetitionMs(s), te, p.flipAngleDeg, tissue.t1Ms, tissue.t2StarMs);
};

/** The signal of each family. A new family is one file beside this one and one line here. */
const signals: Readonly<Record<Family, SignalOf>> = {
  'spin-echo': spinEcho,
  'fast-spin-echo': train,
  'single-shot-fast-spin-echo': train,
  'rotating-strip-fast-spin-echo': train,
  'spoiled-gradient-echo': spoiled,
  'balanced-steady-state': (s, te, tissue) =>
    balancedSignal(signalRepetitionMs(s), te, s.parameters.flipAngleDeg, tissue.t1Ms, tissue.t2Ms),
  'inversion-prepared-gradient-echo': (s, te, tissue) =>
    inversionPreparedSignal(inversionPreparedTimingOf(s), tissue.t1Ms) * Math.exp(-te / tissue.t2StarMs),
  'echo-planar-gradient-echo': spoiled,
  'echo-planar-spin-echo': spinEcho,
};

/** Magnitude of the signal at `echoTimeMs` for proton density 1, before noise, fat factor and diffusion. */
export function classSignal(setting: SignalSetting, echoTimeMs: number, tissue: Tissue): number {
  return Math.abs(signals[classRow(setting.key).family as Family](setting, echoTimeMs, tissue));
}
