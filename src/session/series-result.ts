import { type Baseline, baselineOf } from '../calc/baseline.js';
import type { Body } from '../calc/body.js';
import { type Caution, worstFirst } from '../calc/caution.js';
import { type EvaluateOptions, type Evaluation, evaluate } from '../calc/evaluate.js';
import { parameterRow } from '../calc/parameters.js';
import { type Carried, resolveParameters } from '../calc/resolve.js';
import { plainScanner, type Scanner } from '../calc/scanner.js';
import type { GivenParameters, Parameters } from '../calc/series.js';
import { checkMustKeeps, type MustKeepResult, mustKeepCautions, type Rules } from '../study/must-keep.js';
import type { StudySeries } from '../study/study.js';
import { sayParameter } from './say-parameter.js';

/** Everything there is to say about one series with some values set. */
export interface SeriesResult {
  readonly series: StudySeries;
  /** Set and carried values in place. */
  readonly parameters: Parameters;
  readonly carried: readonly Carried[];
  readonly evaluation: Evaluation;
  readonly mustKeeps: readonly MustKeepResult[];
  /** Those of the model, of the must-keeps and of what was carried, worst first. */
  readonly cautions: readonly Caution[];
}

/** The preset of a series as it stands at the field of its file: what everything is relative to. */
export function presetBaseline(series: StudySeries, fieldT: number, pauses?: Scanner['pauses']): Baseline {
  const scanner = plainScanner(fieldT);
  return baselineOf(series, pauses === undefined ? scanner : { ...scanner, pauses });
}

/** Sets values on a series, carries what follows, evaluates it and judges its must-keeps. */
export function seriesResult(
  series: StudySeries,
  set: GivenParameters,
  baseline: Baseline,
  circumstances: { readonly scanner: Scanner; readonly body: Body; readonly rules: Rules },
  options?: EvaluateOptions,
): SeriesResult {
  const { scanner, body, rules } = circumstances;
  const { parameters, carried } = resolveParameters(baseline, set, scanner);
  const evaluation = evaluate({ ...series, parameters }, scanner, body, baseline, options);
  const mustKeeps = checkMustKeeps(series.mustKeep, parameters, evaluation.figures, rules);
  const cautions = worstFirst([...evaluation.cautions, ...mustKeepCautions(mustKeeps), ...carried.map(carriedCaution)]);
  return { series, parameters, carried, evaluation, mustKeeps, cautions };
}

/** A value that followed an edit by itself, as a note. */
function carriedCaution({ key, from, to, because }: Carried): Caution {
  const text = `${parameterRow(key).label} ${sayParameter(key, from)} becomes ${sayParameter(key, to)}: ${because}`;
  return { code: 'timing-carried', level: 'note', text, numbers: { from, to } };
}
