import type { Baseline } from '../baseline.js';
import type { AddCaution } from '../caution.js';
import { classRow } from '../classes.js';
import type { SeriesModel } from '../model.js';
import { effectiveRepetitionTimeMs } from '../pacing.js';
import { atMost, below } from '../rounding.js';
import { linesInOneTrain } from '../series.js';
import { contrastEcho } from '../signal/echo-train-signal.js';
import { inWords } from './number-words.js';

/** Carried times are kept to a millionth of a millisecond: a slack that was carried may differ by that dust. */
const carriedDustMs = 1e-5;

/** An estimate that the preset already undercuts by as much says more about the estimate than about the edit. */
function levelOf(short: number, shortBefore: number): 'note' | 'caution' {
  return atMost(short, shortBefore + carriedDustMs) ? 'note' : 'caution';
}

/** Timing that cannot be played, and timing under the estimates of the fastest possible. */
export function timingCautions(model: SeriesModel, baseline: Baseline, add: AddCaution): void {
  const p = model.series.parameters;
  const before = baseline.model.series.parameters;
  const beforeMinimum = baseline.model.minimum;
  if (model.impossible !== null) {
    add(
      'timing-impossible',
      'error',
      { repetitionTimeMs: p.repetitionTimeMs, echoTimeMs: p.echoTimeMs },
      (_, { impossible }) => `impossible timing: ${impossible}`,
    );
  }
  const { minimum } = model;
  if (minimum.readoutOverGradient) {
    add(
      'readout-gradient',
      'caution',
      { neededMtPerM: minimum.readoutMtPerM, gradientMtPerM: model.scanner.gradientMtPerM },
      ({ neededMtPerM, gradientMtPerM }) =>
        `readout needs ${inWords(neededMtPerM)} mT/m, the gradients give ${inWords(gradientMtPerM)}: lower the bandwidth or the read matrix`,
    );
  }
  if (below(p.echoTimeMs, minimum.echoTimeMs)) {
    add(
      'below-minimum-te',
      levelOf(minimum.echoTimeMs - p.echoTimeMs, beforeMinimum.echoTimeMs - before.echoTimeMs),
      { echoTimeMs: p.echoTimeMs, minimumMs: minimum.echoTimeMs },
      ({ echoTimeMs, minimumMs }, { minimum: { binding } }) =>
        `TE ${inWords(echoTimeMs, 2)} ms is under the estimated minimum of ${inWords(minimumMs, 2)} ms (${binding}): the scanner may refuse it`,
    );
  }
  const tr = effectiveRepetitionTimeMs(p);
  if (below(tr, minimum.repetitionTimeMs)) {
    add(
      'below-minimum-tr',
      levelOf(minimum.repetitionTimeMs - tr, beforeMinimum.repetitionTimeMs - before.repetitionTimeMs),
      { repetitionTimeMs: tr, minimumMs: minimum.repetitionTimeMs },
      ({ repetitionTimeMs, minimumMs }) =>
        `TR ${inWords(repetitionTimeMs, 2)} ms is under the estimated minimum of ${inWords(minimumMs, 2)} ms: the scanner may refuse it`,
    );
  }
  const spacingMs = minimum.echoSpacingMs;
  if (spacingMs !== null && below(p.echoSpacingMs, spacingMs)) {
    add(
      'below-minimum-spacing',
      levelOf(spacingMs - p.echoSpacingMs, (beforeMinimum.echoSpacingMs ?? 0) - before.echoSpacingMs),
      { echoSpacingMs: p.echoSpacingMs, minimumMs: spacingMs },
      ({ echoSpacingMs, minimumMs }) =>
        `echo spacing ${inWords(echoSpacingMs, 2)} ms is under the estimated minimum of ${inWords(minimumMs, 2)} ms: the scanner may refuse it`,
    );
  }
}

/** Splits, slots and what a round of slices needs. */
export function splitCautions(model: SeriesModel, baseline: Baseline, breathHeld: boolean, add: AddCaution): void {
  const p = model.series.parameters;
  const usual = Math.min(p.rounds, baseline.model.series.parameters.rounds);
  const { roundsNeeded, capacity } = model;
  if (roundsNeeded !== null && capacity !== null && roundsNeeded > usual) {
    add(
      'slices-need-rounds',
      'caution',
      { slices: p.sliceCount, capacity, rounds: p.rounds, roundsNeeded },
      ({ slices, capacity, roundsNeeded }) =>
        `only ${capacity} of ${slices} slices fit in one TR: ${roundsNeeded} separate acquisitions, time counts them all`,
    );
  }
  if (model.slotFactor < 1) {
    add(
      'slot-scaled',
      'note',
      { factor: model.slotFactor },
      ({ factor }) => `the preset's slices fit only if one takes ${inWords(factor, 3)} of the modelled time: that factor is kept for edits`,
    );
  }
  // A volume has no split of its own; asking for one in a timed phase is refused all the same, with the reason.
  const splitAsked = model.rounds > 1 || model.ignored.includes('rounds');
  if (model.series.purpose === 'dynamic' && splitAsked) {
    add(
      'timed-phase-not-split',
      'error',
      { rounds: model.rounds },
      () => 'a timed contrast phase cannot be split: its parts would show different moments',
    );
  }
  const holds = model.time.holds;
  if (breathHeld && holds !== null && holds > p.volumes) {
    add(
      'shift-between-holds',
      'caution',
      { holds },
      ({ holds }) => `${holds} breath-holds: slices may be missed or doubled where two holds differ`,
    );
  }
}

/** Trains: where the echo really falls, and counts that differ from what the lines need. */
export function trainCautions(model: SeriesModel, add: AddCaution): void {
  const p = model.series.parameters;
  const row = classRow(model.key);
  if (row.train) {
    const echo = contrastEcho(p.echoTimeMs, p.echoSpacingMs, p.echoTrainLength);
    const playedMs = echo * p.echoSpacingMs;
    if (below(p.echoSpacingMs / 2, Math.abs(playedMs - p.echoTimeMs))) {
      add(
        'echo-off-time',
        'caution',
        { echo, playedMs, echoTimeMs: p.echoTimeMs },
        ({ echoTimeMs, playedMs }) =>
          `the train's nearest echo to TE ${inWords(echoTimeMs)} ms is at ${inWords(playedMs)} ms: figures use that`,
      );
    }
    if (model.key === 'single-shot-fast-spin-echo/2D') {
      const before = ((p.partialFourierPhase - 0.5) * model.lines.fullPhase) / p.parallelFactorPhase;
      if (Math.abs(echo - 1 - before) > 1.5) {
        add(
          'echo-centre-differs',
          'caution',
          { echoesBeforeByLines: before, echoesBeforeByTime: echo - 1 },
          ({ echoesBeforeByLines, echoesBeforeByTime }) =>
            `partial Fourier puts ${inWords(echoesBeforeByLines)} echoes before the centre, TE asks for ${echoesBeforeByTime}: the scanner will move one of them`,
        );
      }
    }
    if (row.acquisition === '3D' && p.refocusingAngleDeg < 180) {
      add(
        'approximate-train',
        'note',
        { refocusingAngleDeg: p.refocusingAngleDeg },
        () => '3D trains vary their angles: signal, blur and RF use their mean and are approximate',
      );
    }
  }
  if (row.otherwise.echoTrainLength === 'lines') {
    const wanted = linesInOneTrain(model.key, model.lines);
    if (wanted !== p.echoTrainLength) {
      add(
        'train-length-differs',
        'note',
        { wanted, echoTrainLength: p.echoTrainLength },
        ({ wanted, echoTrainLength }) => `the lines need a train of ${wanted}, the series says ${echoTrainLength}`,
      );
    }
  }
}
