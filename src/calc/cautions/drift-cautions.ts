import type { Baseline } from '../baseline.js';
import type { AddCaution } from '../caution.js';
import type { Comparison } from '../compare.js';
import type { SeriesModel } from '../model.js';
import type { ParameterKey } from '../parameters.js';
import { preparesEverySlot } from '../rf.js';
import { below, same } from '../rounding.js';
import { changesPicture } from './changes-picture.js';
import { inWords } from './number-words.js';

/** Share by which a null may drift before it is said, and before it is lost (common practice, no source). */
const nullDriftSaid = 0.03;
const nullDriftLost = 0.1;
const contrastDrift = 0.1;

/** True when the series aims at a null: fat or fluid inversion, or a tissue it names. An inversion-prepared gradient echo aims at contrast. */
function aimsAtNull(model: SeriesModel): boolean {
  return (
    model.series.nullTissue !== null ||
    model.series.parameters.fatSuppression === 'inversion' ||
    model.key !== 'inversion-prepared-gradient-echo/3D'
  );
}

/** What moved away from the baseline without being asked to: null, contrast ratio, matching phases, and what the model leaves out. */
export function driftCautions(
  model: SeriesModel,
  nullMs: number | null,
  comparison: Comparison,
  baseline: Baseline,
  add: AddCaution,
): void {
  const p = model.series.parameters;
  const before = baseline.model.series.parameters;
  if (
    nullMs !== null &&
    baseline.nullMs !== null &&
    p.inversionTimeMs !== undefined &&
    before.inversionTimeMs !== undefined &&
    aimsAtNull(model)
  ) {
    const inversionTimeMs = p.inversionTimeMs;
    const wanted = (before.inversionTimeMs * nullMs) / baseline.nullMs;
    const drift = Math.abs(inversionTimeMs / wanted - 1);
    if (drift > nullDriftSaid) {
      add(
        'null-drift',
        drift > nullDriftLost ? 'error' : 'caution',
        { inversionTimeMs, wantedMs: wanted, nullMs, presetNullMs: baseline.nullMs },
        ({ inversionTimeMs, wantedMs }) =>
          `the null moved: TI ${inWords(inversionTimeMs, 0)} ms, about ${inWords(wantedMs, 0)} ms would null as before`,
      );
    }
  }
  const change = comparison.contrastRatioChange;
  if (change !== null && below(contrastDrift, Math.abs(change))) {
    add(
      'contrast-drift',
      'caution',
      { change, contrastRatio: comparison.contrastRatio ?? 0 },
      ({ change }, { series }) =>
        `${series.target} over ${series.comparison} changes by ${inWords(100 * change, 0)} %: the picture will look different`,
    );
  }
  if (model.series.purpose === 'dynamic' && p !== before && changesPicture(p, before)) {
    add(
      'phases-must-match',
      'caution',
      {},
      () =>
        'all phases of a dynamic series use the same values: repeat the volume before contrast, or lose the match. Oxygen or a practised hold may restore the preset',
    );
  }
  if (p.reconstruction === 'learned') {
    add('not-modelled', 'note', {}, () => 'learned reconstruction: its effect on noise and detail is not modelled');
  }
  if (p.diffusion !== undefined && !same(p.averages, 1)) {
    add(
      'not-modelled',
      'error',
      { averages: p.averages },
      () => 'a diffusion series counts its averages by b-value: its own averages must be 1',
    );
  }
  if (p.fatSuppressionEveryLines === undefined && !preparesEverySlot(model.key)) {
    if (p.fatSuppression === 'spectral') {
      add(
        'not-modelled',
        'note',
        {},
        () => 'how often fat saturation is played between the lines is not stated: its time and RF are not counted',
      );
    }
    if (p.saturationBands > 0) {
      add(
        'not-modelled',
        'note',
        {},
        () => 'how often bands are played between the lines is not stated: their RF is counted before every line, an upper bound',
      );
    }
  }
  // What the preset gives in vain stays said while it is edited.
  const ignored = ignoredOf(model, baseline);
  for (let i = 0; i < ignored.length; i += 1) ignoredCaution(ignored[i] as ParameterKey, add);
}

function ignoredCaution(name: ParameterKey, add: AddCaution): void {
  add('not-modelled', 'caution', {}, () => `${name} has no effect in this class`);
}

/** What the class cannot use, of the series and of its preset, each once. */
function ignoredOf(model: SeriesModel, baseline: Baseline): readonly ParameterKey[] {
  const before = baseline.model.ignored;
  if (before.length === 0) return model.ignored;
  return model.ignored.length === 0 ? before : [...new Set([...model.ignored, ...before])];
}
