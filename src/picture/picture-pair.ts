import type { Baseline } from '../calc/baseline.js';
import type { Body } from '../calc/body.js';
import { classRow } from '../calc/classes.js';
import { modelOf, type SeriesModel, weightedSignal } from '../calc/model.js';
import type { Outcome } from '../calc/problem.js';
import type { Scanner } from '../calc/scanner.js';
import type { Series } from '../calc/series.js';
import type { ObjectFile } from '../study/object-file.js';
import { type Picture, pictureOf, tissueWeights } from './picture.js';
import { picturePlane } from './picture-plane.js';
import { placeObject } from './placed-object.js';

/** What a pair of pictures is asked with. */
export interface PairRequest {
  readonly object: ObjectFile;
  /** The series as it is now, set and carried values in place. */
  readonly series: Series;
  readonly scanner: Scanner;
  readonly body: Body;
  /** The preset, at its own field. */
  readonly baseline: Baseline;
  /** Signal to noise of the preset's target: everything else follows from it. */
  readonly targetSnr: number;
  readonly seed: number;
  readonly fineness: number;
}

/** The preset's picture and the one of the series now, at one window. */
export interface PicturePair {
  readonly preset: Picture;
  readonly now: Picture;
  /** Value that is drawn white; 0 is black. */
  readonly white: number;
  /** What the pictures leave out or assume in this case, one sentence each. */
  readonly notes: readonly string[];
}

/** Signal to noise of the preset's target unless another is typed: an assumption, common practice, no source. */
export const usualTargetSnr = 20;

/**
 * Deviation of the noise of a picture: the target of the preset has `targetSnr`, and noise grows as SNR without signal falls (voxel, lines,
 * averages, bandwidth, field, mean g of the table). Null where either is not known.
 */
export function noiseDeviation(model: SeriesModel, baseline: Baseline, targetSnr: number): number | null {
  const signal = weightedSignal(baseline.model.target);
  const before = baseline.model.signalFreeSnr;
  const now = model.signalFreeSnr;
  if (signal === null || signal === 0 || before === null || now === null || now === 0) return null;
  return (signal / targetSnr) * (before / now);
}

/** White is at most this many times the brighter one of target and comparison, so that fat does not darken them. */
const pairShare = 2.2;

/** One of the pictures, and what it leaves out or assumes. */
export type DrawnSeries = Outcome<{ readonly picture: Picture; readonly notes: readonly string[] }>;

/** Computes the picture of the preset. */
export function presetPicture(request: PairRequest): DrawnSeries {
  return drawn(request.baseline.model, request);
}

/**
 * Computes both pictures. What cannot be drawn is a problem; what is left out or assumed stands in the notes.
 *
 * @param preset The picture of the preset where it is known from an earlier request with the same object, body and baseline.
 */
export function picturePair(request: PairRequest, preset: DrawnSeries = presetPicture(request)): Outcome<PicturePair> {
  const { baseline, series, scanner } = request;
  const model = modelOf(series, scanner, baseline.model.slotFactor);
  if (!preset.ok) return preset;
  const now = drawn(model, request);
  if (!now.ok) return now;
  const white = Math.min(
    Math.max(brightness(preset.value.picture), brightness(now.value.picture)),
    pairShare *
      Math.max(...[baseline.model, model].flatMap(({ target, comparison }) => [target, comparison].map((one) => weightedSignal(one) ?? 0))),
  );
  const notes = [...new Set([...preset.value.notes, ...now.value.notes])];
  return { ok: true, value: { preset: preset.value.picture, now: now.value.picture, white: white > 0 ? white : 1, notes } };
}

function drawn(model: SeriesModel, request: PairRequest): DrawnSeries {
  const { series } = model;
  const plane = picturePlane(series.plane, series.parameters.phaseDirection);
  const object = placeObject(request.object, series, plane, request.body);
  if (!object.ok) return object;
  const noise = noiseDeviation(model, request.baseline, request.targetSnr);
  const options = { noise: noise ?? 0, seed: request.seed, fineness: request.fineness };
  const picture = pictureOf({ model, object: object.value, plane }, options);
  if (!picture.ok) return picture;
  const unknown = [...tissueWeights(model, object.value)].flatMap(([name, signal]) => (weightedSignal(signal) === null ? [name] : []));
  const { bodyMm, enlarged } = object.value;
  const unfolds = bodyMm[plane.phaseIsDown ? 1 : 0] <= model.geometry.encodedPhaseExtentMm;
  return { ok: true, value: { picture: picture.value, notes: notesOf(model, { noise, unknown, enlarged, unfolds }) } };
}

/** What a case is like, besides the series. */
interface CaseFacts {
  readonly noise: number | null;
  /** Tissues of the object without a signal here. */
  readonly unknown: readonly string[];
  readonly enlarged: boolean;
  /** The body lies within what is encoded along phase. */
  readonly unfolds: boolean;
}

function notesOf(model: SeriesModel, { noise, unknown, enlarged, unfolds }: CaseFacts): string[] {
  const p = model.series.parameters;
  const volume = model.series.acquisition === '3D';
  const cases: readonly (readonly [boolean, string])[] = [
    [enlarged, 'The body is drawn larger than typed: the shapes inside need the room.'],
    [noise === null, 'The noise of this setting is not known: drawn without noise.'],
    [unknown.length > 0, `No signal is known here for ${unknown.join(', ')}: drawn black.`],
    [p.partialFourierPhase < 1, 'Partial Fourier: lines that are not acquired are filled with zeros.'],
    [
      p.parallelFactorPhase > 1 && !unfolds,
      'The body is wider than what is encoded: acceleration cannot unfold that. A plain fold is drawn; what a scanner shows looks worse.',
    ],
    [
      p.parallelFactorPhase > 1 || (volume && p.parallelFactorSlice > 1),
      'Acceleration: noise by the mean g of the table, the same everywhere; no residue of unfolding.',
    ],
    [volume, 'A partition is drawn as a slice with sharp edges; what is left out along slices is not drawn.'],
    [volume && p.ellipticalSampling, 'Elliptical sampling leaves out corners along slices: not drawn.'],
    [volume && classRow(model.key).train, 'The train blurs along phase alone.'],
    [p.secondEchoTimeMs !== undefined, 'The first of the two echoes is drawn.'],
    [p.diffusion !== undefined, 'The highest b-value is drawn.'],
    [p.fatSuppression === 'two-point', 'The water image is drawn.'],
    [model.key === 'rotating-strip-fast-spin-echo/2D', 'Rotating strips are drawn as straight lines.'],
    [p.inversionTimeMs !== undefined, 'Tissues after an inversion are drawn by their magnitude, edges between signs included.'],
  ];
  return cases.flatMap(([holds, words]) => (holds ? [words] : []));
}

/** A value near the brightest of a picture: one pixel in 70 is brighter, so that noise, ringing and a fold do not set the window. */
function brightness({ values }: Picture): number {
  let most = 0;
  for (const value of values) if (value > most) most = value;
  // Counted in classes: sorting half a million pixels would take longer than drawing them.
  const classes = new Uint32Array(1000);
  for (const value of values) {
    const at = Math.min(999, Math.floor((value / most) * 1000)) || 0;
    classes[at] = (classes[at] as number) + 1;
  }
  let brighter = 0;
  for (let at = 999; at >= 0; at -= 1) {
    brighter += classes[at] as number;
    if (brighter > values.length / 70) return ((at + 1) / 1000) * most;
  }
  return most;
}
