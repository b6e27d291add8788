import type { Baseline } from '../baseline.js';
import type { Body } from '../body.js';
import type { AddCaution } from '../caution.js';
import type { SeriesModel } from '../model.js';
import { atMost, below } from '../rounding.js';
import { inWords } from './number-words.js';

/** Extent of the body along the phase direction, mm: as typed, or the visible length of the scanner head-feet; null when not known. */
function bodyAlongPhaseMm(model: SeriesModel, body: Body): number | null {
  const direction = model.series.parameters.phaseDirection;
  if (direction === 'HF') return model.scanner.visibleLengthMm;
  return direction === 'AP' ? body.frontBackMm : body.leftRightMm;
}

/** What is wider than the encoded extent, in words. */
function wideOne({ series }: SeriesModel): string {
  return series.parameters.phaseDirection === 'HF' ? 'visible length' : 'body';
}

/** True where phase encoding follows no body axis, so that no typed extent lies along it. */
function isOblique(plane: string): boolean {
  return plane.includes('oblique') || plane.includes('axis');
}

/**
 * Wrap along the phase direction, body centred. At R 1 the fold reaches the kept field when the encoded extent is under
 * (body + kept) / 2; at R > 1 unfolding fails when it is under the body (geometry; common practice).
 * Head-feet a saturation band on that side excuses it.
 */
export function wrapCautions(model: SeriesModel, body: Body, baseline: Baseline, add: AddCaution): void {
  const p = model.series.parameters;
  if (model.key === 'rotating-strip-fast-spin-echo/2D') return;
  const bodyKnown = body.frontBackMm !== null || body.leftRightMm !== null;
  if (!bodyKnown && p.phaseDirection !== 'HF') return;
  if (isOblique(model.series.plane)) {
    if (bodyKnown) {
      add('wrap-not-checked', 'note', {}, (_, { series }) => `wrap not checked: ${series.plane} plane, no body extent lies along phase`);
    }
    return;
  }
  const bodyMm = bodyAlongPhaseMm(model, body);
  if (bodyMm === null) return;
  const headFeet = p.phaseDirection === 'HF';
  if (headFeet && p.saturationBands > 0) return;
  const encoded = model.geometry.encodedPhaseExtentMm;
  const kept = model.geometry.phaseExtentMm;
  const numbers = { encodedMm: encoded, keptMm: kept, bodyMm };
  if (p.parallelFactorPhase > 1) {
    if (atMost(bodyMm, encoded)) return;
    // Head-feet the visible length is a property of the magnet, not this body: what the preset already does is a caution, an edit that causes it an error.
    const before = baseline.model;
    const asPreset =
      headFeet &&
      before.series.parameters.phaseDirection === 'HF' &&
      atMost(before.geometry.encodedPhaseExtentMm, encoded) &&
      before.series.parameters.parallelFactorPhase > 1;
    add(
      'wrap-unfoldable',
      asPreset ? 'caution' : 'error',
      numbers,
      ({ bodyMm, encodedMm }, model) =>
        `${wideOne(model)} ${inWords(bodyMm, 0)} mm, ${inWords(encodedMm, 0)} mm encoded: acceleration cannot unfold the rest (body taken as centred)`,
    );
    return;
  }
  if (below(encoded, (bodyMm + kept) / 2)) {
    add(
      'wrap',
      'caution',
      { ...numbers, neededMm: (bodyMm + kept) / 2 },
      ({ bodyMm, encodedMm, neededMm }, model) =>
        `wrap reaches the picture: ${wideOne(model)} ${inWords(bodyMm, 0)} mm, ${inWords(encodedMm, 0)} mm encoded, ${inWords(neededMm, 0)} mm needed (body taken as centred)`,
    );
  }
}
