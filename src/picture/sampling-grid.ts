import { classRow } from '../calc/classes.js';
import { fatShiftHz } from '../calc/constants.js';
import type { SeriesModel } from '../calc/model.js';
import type { Outcome } from '../calc/problem.js';
import { contrastEcho } from '../calc/signal/echo-train-signal.js';

/** What a series samples of the Fourier transform of an object. Counts run from the most negative frequency upwards. */
export interface SamplingGrid {
  /** Samples along readout, extra ones included, and the extent they encode, mm. */
  readonly readSamples: number;
  readonly readExtentMm: number;
  /** Lines along phase, oversampling included, and the extent they encode, mm. What lies beyond folds in by the sampling itself. */
  readonly phaseLines: number;
  readonly phaseExtentMm: number;
  /** First line that is acquired: those before it are left out by partial Fourier and filled with zeros. */
  readonly firstLine: number;
  /** What the picture keeps, mm. */
  readonly keptReadMm: number;
  readonly keptPhaseMm: number;
}

/** Most samples of one picture: beyond, a picture would take seconds and gigabytes. */
const mostSamples = 2 ** 22;
const mostAlongOne = 4096;

/**
 * The grid of a series. Nothing folds along readout: the receiver samples finer and filters (common practice), so that as many times the
 * field is encoded as the body needs.
 *
 * @param bodyAlongReadMm Extent of the body along readout.
 */
export function samplingGrid({ lines, geometry, series, shift, key }: SeriesModel, bodyAlongReadMm: number): Outcome<SamplingGrid> {
  const { fieldOfViewMm, matrixRead } = series.parameters;
  const shiftMm = classRow(key).echoPlanar ? 0 : Math.abs(shift.chemicalShiftMm);
  const times = Math.max(1, Math.ceil((bodyAlongReadMm + 2 * shiftMm + fieldOfViewMm) / 2 / fieldOfViewMm - 1e-9));
  const readSamples = matrixRead * times;
  const phaseLines = lines.fullPhase;
  if (readSamples * phaseLines > mostSamples || Math.max(readSamples, phaseLines) > mostAlongOne) {
    const message = `${readSamples} x ${phaseLines} samples were asked for; a picture is computed of at most ${mostAlongOne} a side and ${mostSamples / 1e6} million.`;
    return {
      ok: false,
      problems: [{ code: 'picture-too-fine', path: 'matrixPhase', message, hint: 'Lower the matrix or the oversampling.' }],
    };
  }
  return {
    ok: true,
    value: {
      readSamples,
      readExtentMm: fieldOfViewMm * times,
      phaseLines,
      // The voxel is kept and lines are whole: the extent follows.
      phaseExtentMm: phaseLines * geometry.voxelPhaseMm,
      firstLine: phaseLines - Math.min(phaseLines, lines.encodedPhase),
      keptReadMm: fieldOfViewMm,
      keptPhaseMm: Math.min(geometry.phaseExtentMm, phaseLines * geometry.voxelPhaseMm),
    },
  };
}

/** Frequency index of a sample among `count`: from -floor(count / 2). */
export function frequencyIndex(sample: number, count: number): number {
  return sample - Math.floor(count / 2);
}

/**
 * Time in ms between the acquisition of each line and of the middle one, 0 where a line comes with every excitation. In trains in steps of a
 * spacing: one after the other from edge to edge, or from the middle outwards when the echo of contrast is among the first two (as in the
 * blur figure). In echo-planar series evenly, a spacing over R a line.
 */
export function lineDelaysMs({ key, series, lines }: SeriesModel): Float64Array {
  const p = series.parameters;
  const row = classRow(key);
  const delays = new Float64Array(lines.fullPhase);
  if (!row.train && !row.echoPlanar) return delays;
  const middle = contrastEcho(p.echoTimeMs, p.echoSpacingMs, p.echoTrainLength);
  const echoesPerLine = p.echoTrainLength / Math.max(1, lines.encodedPhase);
  for (let line = 0; line < lines.fullPhase; line += 1) {
    const index = frequencyIndex(line, lines.fullPhase);
    if (row.echoPlanar) delays[line] = (index * p.echoSpacingMs) / p.parallelFactorPhase;
    else {
      const step = middle <= 2 ? Math.floor(2 * Math.abs(index) * echoesPerLine) : Math.floor(index * echoesPerLine + 0.5);
      const echo = Math.min(p.echoTrainLength, Math.max(1, middle + step));
      delays[line] = (echo - middle) * p.echoSpacingMs;
    }
  }
  return delays;
}

/** Phase of fat against water at the echo, radians: 0 where the echo is a refocused one. */
export function fatPhase({ key, series, scanner }: SeriesModel): number {
  const row = classRow(key);
  if (!row.gradientEcho) return 0;
  const { echoTimeMs, repetitionTimeMs } = series.parameters;
  const hz = fatShiftHz(scanner.fieldT);
  // A balanced steady state refocuses in the middle of TR and turns its sign from band to band (Scheffler & Lehnhardt, Eur Radiol 2003;13:2409; value from memory).
  if (series.family === 'balanced-steady-state') return Math.PI * (Math.round((hz * repetitionTimeMs) / 1000) % 2);
  return 2 * Math.PI * hz * (echoTimeMs / 1000);
}
