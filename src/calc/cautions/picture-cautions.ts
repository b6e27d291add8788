import type { AddCaution } from '../caution.js';
import { classRow } from '../classes.js';
import type { SeriesModel, TissueSignal } from '../model.js';
import { below } from '../rounding.js';
import { inWords } from './number-words.js';

/** Gap under this share of the thickness lets neighbours excite each other (common practice, no source). */
const crossTalkShare = 0.1;

/** Partial Fourier, acceleration beyond the table, cross-talk, and values from beyond the measured fields. */
export function pictureCautions(model: SeriesModel, add: AddCaution): void {
  const p = model.series.parameters;
  const volume = classRow(model.key).acquisition === '3D';
  if (volume && p.partialFourierPhase < 1 && p.partialFourierSlice < 1) {
    add(
      'partial-fourier-two-directions',
      'caution',
      { partialFourierPhase: p.partialFourierPhase, partialFourierSlice: p.partialFourierSlice },
      () => 'partial Fourier in two directions: the corners have no conjugate and are lost, fine oblique detail with them',
    );
  }
  const phase = p.partialFourierPhase / p.parallelFactorPhase;
  const slice = volume ? p.partialFourierSlice / p.parallelFactorSlice : 1;
  if (below(Math.min(phase, slice), 0.25)) {
    add(
      'partial-fourier-low',
      'caution',
      { phase, slice },
      () => `only ${inWords(100 * Math.min(phase, slice), 0)} % of the lines of one direction are acquired`,
    );
  }
  if (model.noiseFactor === null) {
    add(
      'g-unknown',
      'caution',
      { parallelFactorPhase: p.parallelFactorPhase, parallelFactorSlice: p.parallelFactorSlice },
      () =>
        `noise of acceleration ${inWords(p.parallelFactorPhase)} x ${inWords(volume ? p.parallelFactorSlice : 1)} is not known for this coil: no SNR`,
    );
  }
  if (p.simultaneousSlices > 1 && model.scanner.simultaneousSliceG[p.simultaneousSlices] === undefined) {
    add(
      'g-unknown',
      'note',
      { simultaneousSlices: p.simultaneousSlices },
      () => `noise of ${p.simultaneousSlices} simultaneous slices is not known for this coil: taken as none`,
    );
  }
  if (!volume && p.sliceCount > 1 && model.rounds === 1 && below(p.sliceGapMm, crossTalkShare * p.sliceThicknessMm)) {
    add(
      'cross-talk',
      'note',
      { sliceGapMm: p.sliceGapMm, sliceThicknessMm: p.sliceThicknessMm },
      () => `gap ${inWords(p.sliceGapMm, 2)} mm is under 10 % of the slice: neighbours excite each other`,
    );
  }
  extrapolationCaution(model.target, model, add);
  extrapolationCaution(model.comparison, model, add);
}

function extrapolationCaution(tissue: TissueSignal | null, model: SeriesModel, add: AddCaution): void {
  if (tissue === null || !tissue.extrapolated) return;
  add(
    'extrapolated-tissue',
    'note',
    { t1Ms: tissue.t1Ms, t2Ms: tissue.t2Ms },
    () => `${tissue.tissue}: relaxation at ${inWords(model.scanner.fieldT, 2)} T lies beyond the measured fields`,
  );
}
