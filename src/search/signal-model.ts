import { seriesNullMs } from '../calc/baseline.js';
import type { AddCaution } from '../calc/caution.js';
import { driftCautions } from '../calc/cautions/drift-cautions.js';
import { echoPairCautions } from '../calc/cautions/echo-pair-cautions.js';
import { compareWith } from '../calc/compare.js';
import type { Lines } from '../calc/lines.js';
import { modelOf, type SeriesModel, weightedSignal } from '../calc/model.js';
import type { SlotPulses } from '../calc/pulses.js';
import { resolveParameters } from '../calc/resolve.js';
import type { Parameters } from '../calc/series.js';
import { pointParameters } from './lattice.js';
import type { SearchSetting } from './setting.js';

/** What a signal state takes from a model. */
export interface StateModel {
  readonly parameters: Parameters;
  readonly rounds: number;
  readonly lines: Lines;
  readonly pulses: SlotPulses;
  readonly target: number | null;
  readonly comparison: number | null;
  readonly targetT2Ms: number | null;
  readonly b1PlusRmsUt: number;
}

/** The model of a point by resolving and modelling it whole; null where it is an error. */
export function wholeModel({ problem, baseline, variables }: SearchSetting, point: ArrayLike<number>): StateModel | null {
  const { series, scanner } = problem;
  const { parameters } = resolveParameters(baseline, pointParameters(variables, point, problem.set), scanner);
  const model = modelOf({ ...series, parameters }, scanner, baseline.model.slotFactor);
  if (model.impossible !== null || (series.purpose === 'dynamic' && model.rounds > 1) || hasError(model, baseline)) return null;
  return {
    parameters: model.series.parameters,
    rounds: model.rounds,
    lines: model.lines,
    pulses: model.pulses,
    target: weightedSignal(model.target),
    comparison: weightedSignal(model.comparison),
    targetT2Ms: model.target?.t2Ms ?? null,
    b1PlusRmsUt: model.b1PlusRmsUt,
  };
}

/** A null that drifted away, or an echo pair that lost its phases. */
function hasError(model: SeriesModel, baseline: SearchSetting['baseline']): boolean {
  const p = model.series.parameters;
  let error = false;
  const add: AddCaution = (_code, level) => {
    if (level === 'error') error = true;
  };
  if (p.inversionTimeMs !== undefined || p.diffusion !== undefined)
    driftCautions(model, seriesNullMs(model), compareWith(model, baseline), baseline, add);
  if (p.secondEchoTimeMs !== undefined) echoPairCautions(model, add);
  return error;
}
