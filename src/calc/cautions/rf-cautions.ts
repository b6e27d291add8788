import type { Baseline } from '../baseline.js';
import type { Caution } from '../caution.js';
import type { SeriesModel } from '../model.js';
import { effectiveRepetitionTimeMs } from '../pacing.js';
import type { Readings } from '../reading.js';
import { b1RmsWindowMs } from '../rf.js';
import { below } from '../rounding.js';
import { inWords } from './number-words.js';

/** Pulses that had to change, RF bounds, and what a scanner reading stands for. */
export function rfCautions(model: SeriesModel, baseline: Baseline, readings: Readings, add: (caution: Caution) => void): void {
  const p = model.series.parameters;
  const { excitation, refocusing, band, fatSaturation } = model.pulses;
  const stretched = [excitation, refocusing, band, fatSaturation].find((pulse) => pulse?.lengthened === true);
  if (stretched) {
    add({
      code: 'pulse-lengthened',
      level: 'caution',
      text: `a pulse needs more than the scanner's ${inWords(model.scanner.maximumB1Ut)} uT and is lengthened to ${inWords(stretched.durationMs, 2)} ms`,
      numbers: { maximumB1Ut: model.scanner.maximumB1Ut, durationMs: stretched.durationMs },
    });
  }
  if (below(b1RmsWindowMs, effectiveRepetitionTimeMs(p))) {
    add({ code: 'rf-window-bound', level: 'note', text: 'TR is over 10 s: all of its RF is counted within 10 s, an upper bound of B1+rms', numbers: { repetitionTimeMs: effectiveRepetitionTimeMs(p) } });
  }
  const before = baseline.model.series.parameters;
  if (below(before.parallelFactorPhase, p.parallelFactorPhase) || below(before.parallelFactorSlice, p.parallelFactorSlice)) {
    add({ code: 'rf-per-exposure', level: 'note', text: 'acceleration shortens the RF exposure but does not lower B1+rms', numbers: {} });
  }
  if (readings.timeS !== undefined || readings.b1rmsUt !== undefined || readings.sarWkg !== undefined) {
    const parts: string[] = [];
    if (readings.timeS !== undefined) parts.push(`time ${inWords(readings.timeS)} s`);
    if (readings.b1rmsUt !== undefined) parts.push(`B1+rms ${inWords(readings.b1rmsUt, 2)} uT`);
    if (readings.sarWkg !== undefined) parts.push(`SAR ${inWords(readings.sarWkg, 2)} W/kg`);
    add({ code: 'reading-used', level: 'note', text: `scaled from the scanner's own ${parts.join(', ')} of the preset: same coil, same patient`, numbers: { ...readings } as Record<string, number> });
  }
  if (readings.b1rmsUt !== undefined || readings.sarWkg !== undefined) {
    add({ code: 'read-scanner-again', level: 'caution', text: "read the scanner's displayed value again before starting; the implant's label and local rules decide", numbers: {} });
  }
}
