import { classRow } from '../calc/classes.js';
import { isCine, pacingPeriodMs } from '../calc/pacing.js';
import { contrastEcho } from '../calc/signal/echo-train-signal.js';
import { type CarrySetting, nullsByInversion, type Settled } from './carry-setting.js';

/** A parameter that contrast is brought back with, and how far it may go. */
export interface Knob {
  readonly key: 'repetitionTimeMs' | 'flipAngleDeg' | 'inversionTimeMs';
  readonly start: number;
  readonly low: number;
  readonly high: number;
  /** To what a scanner accepts. */
  readonly round: (value: number) => number;
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
    return { key: 'inversionTimeMs', start, low: start / widest, high: start * widest, round: Math.round };
  }
  if (row.gradientEcho && row.family !== 'inversion-prepared-gradient-echo') {
    return { key: 'flipAngleDeg', start: p.flipAngleDeg, low: Math.min(1, p.flipAngleDeg), high: Math.max(90, p.flipAngleDeg), round: roundedTo(p.flipAngleDeg < 30 ? 0.1 : 0.5) };
  }
  if (aim === 'time' || isCine(p) || pacingPeriodMs(p) !== null || settled.model.setting.slicesOfRound === 0) return null;
  if (row.family === 'single-shot-fast-spin-echo') return null;
  const start = p.repetitionTimeMs;
  return { key: 'repetitionTimeMs', start, low: start / widest, high: start * widest, round: roundedTo(timeStep(start)) };
}

/**
 * Echo times that may be tried besides the carried one, nearest first: whole echoes of a train, steps of 4 % elsewhere, none under the shortest
 * TE. TE stays within two thirds and one and a half of what it was.
 */
export function otherEchoTimes({ baseline, series }: CarrySetting, { parameters: p, model }: Settled): readonly number[] {
  const row = classRow(baseline.model.key);
  if (p.secondEchoTimeMs !== undefined || row.family === 'balanced-steady-state' || row.family === 'inversion-prepared-gradient-echo') return [];
  const [low, high] = [p.echoTimeMs / usual, p.echoTimeMs * usual];
  const times: number[] = [];
  if (row.train) {
    const echo = contrastEcho(p.echoTimeMs, p.echoSpacingMs, p.echoTrainLength);
    for (let n = 1; n <= p.echoTrainLength; n += 1) {
      const ms = n * p.echoSpacingMs;
      if (n !== echo && ms >= low && ms <= high) times.push(Number(ms.toFixed(6)));
    }
  } else {
    // The estimate may be undercut by as much as the preset undercuts its own.
    const slack = Math.max(0, baseline.model.minimum.echoTimeMs - series.parameters.echoTimeMs);
    for (let i = 1; i <= 10; i += 1) {
      for (const ms of [p.echoTimeMs * 1.04 ** i, p.echoTimeMs / 1.04 ** i]) {
        if (ms <= high && ms >= low && ms >= model.minimum.echoTimeMs - slack) times.push(Number(ms.toFixed(2)));
      }
    }
  }
  const far = (ms: number) => Math.abs(Math.log(ms / p.echoTimeMs));
  return times.sort((a, b) => far(a) - far(b)).slice(0, 12);
}

