import type { Baseline } from '../baseline.js';
import type { AddCaution } from '../caution.js';
import type { SeriesModel } from '../model.js';
import { effectiveRepetitionTimeMs } from '../pacing.js';
import type { PlayedPulse } from '../pulses.js';
import type { Readings } from '../reading.js';
import { b1RmsWindowMs } from '../rf.js';
import { below } from '../rounding.js';
import { inWords } from './number-words.js';

function lengthenedOne(pulse: PlayedPulse | null): PlayedPulse | null {
  return pulse?.lengthened === true ? pulse : null;
}

/** Pulses that had to change, RF bounds, and what a scanner reading stands for. */
export function rfCautions(model: SeriesModel, baseline: Baseline, readings: Readings, add: AddCaution): void {
  const p = model.series.parameters;
  const { excitation, refocusing, band, fatSaturation } = model.pulses;
  const stretched = lengthenedOne(excitation) ?? lengthenedOne(refocusing) ?? lengthenedOne(band) ?? lengthenedOne(fatSaturation);
  if (stretched !== null) {
    add(
      'pulse-lengthened',
      'caution',
      { maximumB1Ut: model.scanner.maximumB1Ut, durationMs: stretched.durationMs },
      ({ maximumB1Ut, durationMs }) =>
        `a pulse needs more than the scanner's ${inWords(maximumB1Ut)} uT and is lengthened to ${inWords(durationMs, 2)} ms`,
    );
  }
  if (below(b1RmsWindowMs, effectiveRepetitionTimeMs(p))) {
    add(
      'rf-window-bound',
      'note',
      { repetitionTimeMs: effectiveRepetitionTimeMs(p) },
      () => 'TR is over 10 s: all of its RF is counted within 10 s, an upper bound of B1+rms',
    );
  }
  const before = baseline.model.series.parameters;
  if (below(before.parallelFactorPhase, p.parallelFactorPhase) || below(before.parallelFactorSlice, p.parallelFactorSlice)) {
    add('rf-per-exposure', 'note', {}, () => 'acceleration shortens the RF exposure but does not lower B1+rms');
  }
  if (readings.timeS !== undefined || readings.b1rmsUt !== undefined || readings.sarWkg !== undefined) {
    readingCaution(readings, add);
    fieldCaution(model, baseline, add);
  }
  if (readings.b1rmsUt !== undefined || readings.sarWkg !== undefined) {
    add(
      'read-scanner-again',
      'caution',
      {},
      () => "read the scanner's displayed value again before starting; the implant's label and local rules decide",
    );
  }
}

/** A magnet a few percent off its name is still one of that field. Common practice, no source. */
const sameField = 0.05;

/** What was read at one field says nothing about another. */
function fieldCaution(model: SeriesModel, baseline: Baseline, add: AddCaution): void {
  const [fromT, toT] = [baseline.model.scanner.fieldT, model.scanner.fieldT];
  if (Math.abs(toT - fromT) <= sameField * fromT) return;
  add(
    'reading-no-longer-holds',
    'caution',
    { fromT, toT },
    ({ fromT: from, toT: to }) =>
      `a reading of the preset at ${inWords(from, 3)} T no longer holds at ${inWords(to, 3)} T: read time, B1+rms and SAR on that scanner`,
  );
}

function readingCaution(readings: Readings, add: AddCaution): void {
  add('reading-used', 'note', { ...readings } as Readonly<Record<string, number>>, ({ timeS, b1rmsUt, sarWkg }) => {
    const parts: string[] = [];
    if (timeS !== undefined) parts.push(`time ${inWords(timeS)} s`);
    if (b1rmsUt !== undefined) parts.push(`B1+rms ${inWords(b1rmsUt, 2)} uT`);
    if (sarWkg !== undefined) parts.push(`SAR ${inWords(sarWkg, 2)} W/kg`);
    return `scaled from the scanner's own ${parts.join(', ')} of the preset: same coil, same patient`;
  });
}
