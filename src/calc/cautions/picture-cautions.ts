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
      ({ phase, slice }) => `only ${inWords(100 * Math.min(phase, slice), 0)} % of the lines of one direction are acquired`,
    );
  }
  if (model.noiseFactor === null) {
    add(
      'g-unknown',
      'caution',
      { parallelFactorPhase: p.parallelFactorPhase, parallelFactorSlice: p.parallelFactorSlice },
      ({ parallelFactorPhase, parallelFactorSlice }, { series }) =>
        `noise of acceleration ${inWords(parallelFactorPhase)} x ${inWords(series.acquisition === '3D' ? parallelFactorSlice : 1)} is not known for this coil: no SNR`,
    );
  }
  if (p.simultaneousSlices > 1 && model.scanner.simultaneousSliceG[p.simultaneousSlices] === undefined) {
    add(
      'g-unknown',
      'note',
      { simultaneousSlices: p.simultaneousSlices },
      ({ simultaneousSlices }) => `noise of ${simultaneousSlices} simultaneous slices is not known for this coil: taken as none`,
    );
  }
  if (!volume && p.sliceCount > 1 && model.rounds === 1 && below(p.sliceGapMm, crossTalkShare * p.sliceThicknessMm)) {
    add(
      'cross-talk',
      'note',
      { sliceGapMm: p.sliceGapMm, sliceThicknessMm: p.sliceThicknessMm },
      ({ sliceGapMm }) => `gap ${inWords(sliceGapMm, 2)} mm is under 10 % of the slice: neighbours excite each other`,
    );
  }
  if (model.target?.extrapolated === true) extrapolationCaution(model.target, add);
  if (model.comparison?.extrapolated === true) extrapolationCaution(model.comparison, add);
}

function extrapolationCaution({ tissue, t1Ms, t2Ms }: TissueSignal, add: AddCaution): void {
  add(
    'extrapolated-tissue',
    'note',
    { t1Ms, t2Ms },
    (_, { scanner }) => `${tissue}: relaxation at ${inWords(scanner.fieldT, 2)} T lies beyond the measured fields`,
  );
}
