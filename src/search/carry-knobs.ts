import { classRow } from '../calc/classes.js';
import { isCine, pacingPeriodMs } from '../calc/pacing.js';
import type { GivenParameters } from '../calc/series.js';
import { contrastEcho } from '../calc/signal/echo-train-signal.js';
import { type CarrySetting, nullsByInversion, type Settled } from './carry-setting.js';

/** A parameter that contrast is brought back with, and how far it may go. */
export interface Knob {
  readonly key: 'repetitionTimeMs' | 'flipAngleDeg' | 'inversionTimeMs' | 'echoTimeMs';
  readonly start: number;
  readonly low: number;
  readonly high: number;
  /** To what a scanner accepts. */
  readonly round: (value: number) => number;
  /** What is set for a value. */
  readonly set: (value: number) => GivenParameters;
}

/** A knob that sets its own parameter and nothing else. */
function plainKnob(key: Knob['key'], start: number, low: number, high: number, round: (value: number) => number): Knob {
  return { key, start, low, high, round, set: (value) => ({ [key]: value }) };
}

/** TR may halve or double, an inversion time too; within a half more or less it stands before any change of TE. */
const widest = 2;
export const usual = 1.5;

function roundedTo(step: number): (value: number) => number {
  return (value) => Number((Math.round(value / step) * step).toFixed(6));
}

/** Step of a repetition time: three digits. */
function timeStep(ms: number): number {
  return ms >= 1000 ? 5 : ms >= 200 ? 1 : ms >= 20 ? 0.1 : 0.01;
}

/**
 * The parameter that sets contrast in a class: the angle of gradient echoes and balanced steady states, TI of an inversion-prepared gradient
 * echo, TR of everything refocused. Null where TR does not act (each slice is excited once) or waits for a breath or a beat.
 */
export function firstKnob(setting: CarrySetting, settled: Settled): Knob | null {
  const { baseline, aim } = setting;
  const row = classRow(baseline.model.key);
  const p = settled.parameters;
  if (row.family === 'inversion-prepared-gradient-echo' && !nullsByInversion(setting)) {
    const start = p.inversionTimeMs as number;
    return plainKnob('inversionTimeMs', start, start / widest, start * widest, Math.round);
  }
  if (row.gradientEcho && row.family !== 'inversion-prepared-gradient-echo') {
    const start = p.flipAngleDeg;
    return plainKnob('flipAngleDeg', start, Math.min(1, start), Math.max(90, start), roundedTo(start < 30 ? 0.1 : 0.5));
  }
  if (aim === 'time' || isCine(p) || pacingPeriodMs(p) !== null || settled.model.setting.slicesOfRound === 0) return null;
  if (row.family === 'single-shot-fast-spin-echo') return null;
  const start = p.repetitionTimeMs;
  return plainKnob('repetitionTimeMs', start, start / widest, start * widest, roundedTo(timeStep(start)));
}

/** An echo time to start from, and what may be turned from there. */
export interface EchoTry {
  /** What is set; nothing for the echo time as it was carried. */
  readonly set: GivenParameters;
  readonly echoTimeMs: number;
  /** TE by itself; null where it follows the readout or belongs to a pair. */
  readonly knob: Knob | null;
}

/** How far the spacing of a train may be stretched so that an echo falls where TE is wanted. */
const mostStretch = 1.25;

/**
 * Echo times that may be tried, the carried one first, then nearest first, within two thirds and one and a half of it.
 * In a train TE is a whole echo: any of its echoes, and the spacing may be stretched by up to a quarter so that the echo falls where TE is wanted.
 * In a single shot the lines fix the echo that is the centre, and only the spacing can be stretched. Elsewhere TE moves freely above the shortest.
 */
export function echoTries({ baseline, series }: CarrySetting, { parameters: p, model }: Settled): readonly EchoTry[] {
  const row = classRow(baseline.model.key);
  const follows =
    row.gradientEcho && !row.echoPlanar && p.echoTimeMs < followingShare * (model.target?.t2StarMs ?? Number.POSITIVE_INFINITY);
  if (
    p.secondEchoTimeMs !== undefined ||
    row.family === 'balanced-steady-state' ||
    row.family === 'inversion-prepared-gradient-echo' ||
    follows
  ) {
    return [{ set: {}, echoTimeMs: p.echoTimeMs, knob: null }];
  }
  if (!row.train) {
    // The estimate may be undercut by as much as the preset undercuts its own.
    const shortest = model.minimum.echoTimeMs - Math.max(0, baseline.model.minimum.echoTimeMs - series.parameters.echoTimeMs);
    const low = Math.max(p.echoTimeMs / usual, Math.min(p.echoTimeMs, shortest));
    return [{ set: {}, echoTimeMs: p.echoTimeMs, knob: plainKnob('echoTimeMs', p.echoTimeMs, low, p.echoTimeMs * usual, roundedTo(0.01)) }];
  }
  const spacing = p.echoSpacingMs;
  const own = contrastEcho(p.echoTimeMs, spacing, p.echoTrainLength);
  const singleShot = row.family === 'single-shot-fast-spin-echo';
  const echoes = Array.from({ length: p.echoTrainLength }, (_, i) => i + 1)
    .filter((echo) => echo === own || (!singleShot && echo * spacing >= p.echoTimeMs / usual && echo * spacing <= p.echoTimeMs * usual))
    .sort((a, b) => Math.abs(Math.log(a / own)) - Math.abs(Math.log(b / own)));
  return echoes.slice(0, 12).map((echo): EchoTry => {
    const echoTimeMs = Number((echo * spacing).toFixed(6));
    const stretch = (ms: number) => ({ echoTimeMs: ms, echoSpacingMs: Number((ms / echo).toFixed(6)) });
    const knob: Knob = { ...plainKnob('echoTimeMs', echoTimeMs, echoTimeMs, echoTimeMs * mostStretch, roundedTo(0.01)), set: stretch };
    return { set: echo === own ? {} : { echoTimeMs }, echoTimeMs, knob };
  });
}

/** A gradient echo whose TE is under this share of T2* takes TE from its readout; above it TE sets contrast (common practice, no source). */
const followingShare = 0.2;
