import type { Baseline } from '../baseline.js';
import type { Caution } from '../caution.js';
import { classRow } from '../classes.js';
import type { SeriesModel } from '../model.js';
import { effectiveRepetitionTimeMs, isCine } from '../pacing.js';
import { atMost, below } from '../rounding.js';
import { linesInOneTrain } from '../series.js';
import { contrastEcho } from '../signal/echo-train-signal.js';
import { inWords } from './number-words.js';

type Add = (caution: Caution) => void;

/** An estimate that the preset already undercuts by as much says more about the estimate than about the edit. */
function levelOf(short: number, shortBefore: number): 'note' | 'caution' {
  return atMost(short, shortBefore) ? 'note' : 'caution';
}

/** Timing that cannot be played, and timing under the estimates of the fastest possible. */
export function timingCautions(model: SeriesModel, baseline: Baseline, add: Add): void {
  const p = model.series.parameters;
  const before = baseline.model.series.parameters;
  const beforeMinimum = baseline.model.minimum;
  if (model.impossible !== null) {
    add({ code: 'timing-impossible', level: 'error', text: `impossible timing: ${model.impossible}`, numbers: { repetitionTimeMs: p.repetitionTimeMs, echoTimeMs: p.echoTimeMs } });
  }
  const { minimum } = model;
  if (minimum.readoutOverGradient) {
    add({
      code: 'readout-gradient',
      level: 'caution',
      text: `readout needs ${inWords(minimum.readoutMtPerM)} mT/m, the gradients give ${inWords(model.scanner.gradientMtPerM)}: lower the bandwidth or the read matrix`,
      numbers: { neededMtPerM: minimum.readoutMtPerM, gradientMtPerM: model.scanner.gradientMtPerM },
    });
  }
  if (below(p.echoTimeMs, minimum.echoTimeMs)) {
    add({
      code: 'below-minimum-te',
      level: levelOf(minimum.echoTimeMs - p.echoTimeMs, beforeMinimum.echoTimeMs - before.echoTimeMs),
      text: `TE ${inWords(p.echoTimeMs, 2)} ms is under the estimated minimum of ${inWords(minimum.echoTimeMs, 2)} ms (${minimum.binding}): the scanner may refuse it`,
      numbers: { echoTimeMs: p.echoTimeMs, minimumMs: minimum.echoTimeMs },
    });
  }
  const tr = isCine(p) ? p.repetitionTimeMs : effectiveRepetitionTimeMs(p);
  if (below(tr, minimum.repetitionTimeMs)) {
    add({
      code: 'below-minimum-tr',
      level: levelOf(minimum.repetitionTimeMs - tr, beforeMinimum.repetitionTimeMs - before.repetitionTimeMs),
      text: `TR ${inWords(tr, 2)} ms is under the estimated minimum of ${inWords(minimum.repetitionTimeMs, 2)} ms: the scanner may refuse it`,
      numbers: { repetitionTimeMs: tr, minimumMs: minimum.repetitionTimeMs },
    });
  }
  if (minimum.echoSpacingMs !== null && below(p.echoSpacingMs, minimum.echoSpacingMs)) {
    add({
      code: 'below-minimum-spacing',
      level: levelOf(minimum.echoSpacingMs - p.echoSpacingMs, (beforeMinimum.echoSpacingMs ?? 0) - before.echoSpacingMs),
      text: `echo spacing ${inWords(p.echoSpacingMs, 2)} ms is under the estimated minimum of ${inWords(minimum.echoSpacingMs, 2)} ms: the scanner may refuse it`,
      numbers: { echoSpacingMs: p.echoSpacingMs, minimumMs: minimum.echoSpacingMs },
    });
  }
}

/** Splits, slots and what a round of slices needs. */
export function splitCautions(model: SeriesModel, baseline: Baseline, breathHeld: boolean, add: Add): void {
  const p = model.series.parameters;
  const usual = Math.min(p.rounds, baseline.model.series.parameters.rounds);
  const { roundsNeeded, capacity } = model;
  if (roundsNeeded !== null && capacity !== null && roundsNeeded > usual) {
    add({
      code: 'slices-need-rounds',
      level: 'caution',
      text: `only ${capacity} of ${p.sliceCount} slices fit in one TR: ${roundsNeeded} separate acquisitions, time counts them all`,
      numbers: { slices: p.sliceCount, capacity, rounds: p.rounds, roundsNeeded },
    });
  }
  if (model.slotFactor < 1) {
    add({
      code: 'slot-scaled',
      level: 'note',
      text: `the preset's slices fit only if one takes ${inWords(model.slotFactor, 3)} of the modelled time: that factor is kept for edits`,
      numbers: { factor: model.slotFactor },
    });
  }
  if (model.series.purpose === 'dynamic' && model.rounds > 1) {
    add({
      code: 'timed-phase-not-split',
      level: 'error',
      text: 'a timed contrast phase cannot be split: its parts would show different moments',
      numbers: { rounds: model.rounds },
    });
  }
  const holds = model.time.holds;
  if (breathHeld && holds !== null && holds > p.volumes) {
    add({ code: 'shift-between-holds', level: 'caution', text: `${holds} breath-holds: slices may be missed or doubled where two holds differ`, numbers: { holds } });
  }
}

/** Trains: where the echo really falls, and counts that differ from what the lines need. */
export function trainCautions(model: SeriesModel, add: Add): void {
  const p = model.series.parameters;
  const row = classRow(model.key);
  if (row.train) {
    const echo = contrastEcho(p.echoTimeMs, p.echoSpacingMs, p.echoTrainLength);
    const playedMs = echo * p.echoSpacingMs;
    if (below(p.echoSpacingMs / 2, Math.abs(playedMs - p.echoTimeMs))) {
      add({
        code: 'echo-off-time',
        level: 'caution',
        text: `the train's nearest echo to TE ${inWords(p.echoTimeMs)} ms is at ${inWords(playedMs)} ms: figures use that`,
        numbers: { echo, playedMs, echoTimeMs: p.echoTimeMs },
      });
    }
    if (model.key === 'single-shot-fast-spin-echo/2D') {
      const before = ((p.partialFourierPhase - 0.5) * model.lines.fullPhase) / p.parallelFactorPhase;
      if (Math.abs(echo - 1 - before) > 1.5) {
        add({
          code: 'echo-centre-differs',
          level: 'caution',
          text: `partial Fourier puts ${inWords(before)} echoes before the centre, TE asks for ${echo - 1}: the scanner will move one of them`,
          numbers: { echoesBeforeByLines: before, echoesBeforeByTime: echo - 1 },
        });
      }
    }
    if (row.acquisition === '3D' && p.refocusingAngleDeg < 180) {
      add({ code: 'approximate-train', level: 'note', text: '3D trains vary their angles: signal, blur and RF use their mean and are approximate', numbers: { refocusingAngleDeg: p.refocusingAngleDeg } });
    }
  }
  if (row.otherwise.echoTrainLength === 'lines') {
    const wanted = linesInOneTrain(model.key, p);
    if (wanted !== p.echoTrainLength) {
      add({
        code: 'train-length-differs',
        level: 'note',
        text: `the lines need a train of ${wanted}, the series says ${p.echoTrainLength}`,
        numbers: { wanted, echoTrainLength: p.echoTrainLength },
      });
    }
  }
}
