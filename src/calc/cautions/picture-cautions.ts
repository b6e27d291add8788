import type { Caution } from '../caution.js';
import { classRow } from '../classes.js';
import type { SeriesModel } from '../model.js';
import { below } from '../rounding.js';
import { inWords } from './number-words.js';

/** Gap under this share of the thickness lets neighbours excite each other (common practice, no source). */
const crossTalkShare = 0.1;

/** Partial Fourier, acceleration beyond the table, cross-talk, and values from beyond the measured fields. */
export function pictureCautions(model: SeriesModel, add: (caution: Caution) => void): void {
  const p = model.series.parameters;
  const volume = classRow(model.key).acquisition === '3D';
  if (volume && p.partialFourierPhase < 1 && p.partialFourierSlice < 1) {
    add({
      code: 'partial-fourier-two-directions',
      level: 'caution',
      text: 'partial Fourier in two directions: the corners have no conjugate and are lost, fine oblique detail with them',
      numbers: { partialFourierPhase: p.partialFourierPhase, partialFourierSlice: p.partialFourierSlice },
    });
  }
  const phase = p.partialFourierPhase / p.parallelFactorPhase;
  const slice = volume ? p.partialFourierSlice / p.parallelFactorSlice : 1;
  if (below(Math.min(phase, slice), 0.25)) {
    add({ code: 'partial-fourier-low', level: 'caution', text: `only ${inWords(100 * Math.min(phase, slice), 0)} % of the lines of one direction are acquired`, numbers: { phase, slice } });
  }
  if (model.noiseFactor === null) {
    add({
      code: 'g-unknown',
      level: 'caution',
      text: `noise of acceleration ${inWords(p.parallelFactorPhase)} x ${inWords(volume ? p.parallelFactorSlice : 1)} is not known for this coil: no SNR`,
      numbers: { parallelFactorPhase: p.parallelFactorPhase, parallelFactorSlice: p.parallelFactorSlice },
    });
  }
  if (p.simultaneousSlices > 1 && model.scanner.simultaneousSliceG[p.simultaneousSlices] === undefined) {
    add({ code: 'g-unknown', level: 'note', text: `noise of ${p.simultaneousSlices} simultaneous slices is not known for this coil: taken as none`, numbers: { simultaneousSlices: p.simultaneousSlices } });
  }
  if (!volume && p.sliceCount > 1 && model.rounds === 1 && below(p.sliceGapMm, crossTalkShare * p.sliceThicknessMm)) {
    add({
      code: 'cross-talk',
      level: 'note',
      text: `gap ${inWords(p.sliceGapMm, 2)} mm is under 10 % of the slice: neighbours excite each other`,
      numbers: { sliceGapMm: p.sliceGapMm, sliceThicknessMm: p.sliceThicknessMm },
    });
  }
  for (const tissue of [model.target, model.comparison]) {
    if (tissue?.extrapolated === true) {
      add({
        code: 'extrapolated-tissue',
        level: 'note',
        text: `${tissue.tissue}: relaxation at ${inWords(model.scanner.fieldT, 2)} T lies beyond the measured fields`,
        numbers: { t1Ms: tissue.t1Ms, t2Ms: tissue.t2Ms },
      });
    }
  }
}
