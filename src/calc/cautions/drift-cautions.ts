import type { Baseline } from '../baseline.js';
import type { Caution } from '../caution.js';
import type { Comparison } from '../compare.js';
import type { SeriesModel } from '../model.js';
import { parameterKeys } from '../parameters.js';
import { below, same } from '../rounding.js';
import { forEachIgnored } from '../series.js';
import { inWords } from './number-words.js';

/** Share by which a null may drift before it is said, and before it is lost (common practice, no source). */
const nullDriftSaid = 0.03;
const nullDriftLost = 0.1;
const contrastDrift = 0.1;

/** True when the series aims at a null: fat or fluid inversion, or a tissue it names. An inversion-prepared gradient echo aims at contrast. */
function aimsAtNull(model: SeriesModel): boolean {
  return model.series.nullTissue !== null || model.series.parameters.fatSuppression === 'inversion' || model.key !== 'inversion-prepared-gradient-echo/3D';
}

/** What moved away from the baseline without being asked to: null, contrast ratio, matching phases, and what the model leaves out. */
export function driftCautions(model: SeriesModel, nullMs: number | null, comparison: Comparison, baseline: Baseline, add: (caution: Caution) => void): void {
  const p = model.series.parameters;
  const before = baseline.model.series.parameters;
  if (nullMs !== null && baseline.nullMs !== null && p.inversionTimeMs !== undefined && before.inversionTimeMs !== undefined && aimsAtNull(model)) {
    const wanted = (before.inversionTimeMs * nullMs) / baseline.nullMs;
    const drift = Math.abs(p.inversionTimeMs / wanted - 1);
    if (drift > nullDriftSaid) {
      add({
        code: 'null-drift',
        level: drift > nullDriftLost ? 'error' : 'caution',
        text: `the null moved: TI ${inWords(p.inversionTimeMs, 0)} ms, about ${inWords(wanted, 0)} ms would null as before`,
        numbers: { inversionTimeMs: p.inversionTimeMs, wantedMs: wanted, nullMs, presetNullMs: baseline.nullMs },
      });
    }
  }
  const change = comparison.contrastRatioChange;
  if (change !== null && below(contrastDrift, Math.abs(change))) {
    add({
      code: 'contrast-drift',
      level: 'caution',
      text: `${model.series.target} over ${model.series.comparison} changes by ${inWords(100 * change, 0)} %: the picture will look different`,
      numbers: { change, contrastRatio: comparison.contrastRatio ?? 0 },
    });
  }
  if (model.series.purpose === 'dynamic' && p !== before && changesPicture(model, baseline)) {
    add({
      code: 'phases-must-match',
      level: 'caution',
      text: 'all phases of a dynamic series use the same values: repeat the volume before contrast, or lose the match. Oxygen or a practised hold may restore the preset',
      numbers: {},
    });
  }
  if (p.reconstruction === 'learned') {
    add({ code: 'not-modelled', level: 'note', text: 'learned reconstruction: its effect on noise and detail is not modelled', numbers: {} });
  }
  if (p.diffusion !== undefined && !same(p.averages, 1)) {
    add({ code: 'not-modelled', level: 'error', text: 'a diffusion series counts its averages by b-value: its own averages must be 1', numbers: { averages: p.averages } });
  }
  if (model.key === 'spoiled-gradient-echo/3D' && p.fatSuppression === 'spectral' && p.fatSuppressionEveryLines === undefined && before.fatSuppression !== 'spectral') {
    add({ code: 'not-modelled', level: 'note', text: 'how often the fat-suppression pulse is played is not stated: its time and RF are not counted', numbers: {} });
  }
  forEachIgnored(model.key, p, (name) => add({ code: 'not-modelled', level: 'caution', text: `${name} has no effect in this class`, numbers: {} }));
}

/** True when anything that shows in the picture differs from the baseline. */
function changesPicture(model: SeriesModel, baseline: Baseline): boolean {
  const p = model.series.parameters;
  const before = baseline.model.series.parameters;
  return parameterKeys.some((key) => key !== 'pacing' && key !== 'diffusion' && key !== 'volumes' && p[key] !== before[key]);
}
