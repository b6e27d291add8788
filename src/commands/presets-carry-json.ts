import { classRow } from '../calc/classes.js';
import { parameterKeys } from '../calc/parameters.js';
import { classOf } from '../calc/series.js';
import type { SeriesCarry } from '../search/carry.js';
import type { StudyCarry } from '../search/carry-study.js';

/** The document that `presets carry --json` prints. */
export function carryJson(
  carried: StudyCarry,
  scanner: string | null,
  draft: { readonly id: string; readonly path: string } | null,
): string {
  const { study, from, to, aim, series, gaps } = carried;
  const document = {
    preset: study.id,
    revision: study.revision,
    fromT: from.fieldT,
    toT: to.fieldT,
    scanner,
    coil: to.coil?.name ?? null,
    equal: aim,
    series: series.map(seriesDocument),
    notCarried: gaps,
    draft,
  };
  return `${JSON.stringify(document, null, 2)}\n`;
}

function seriesDocument(one: SeriesCarry): object {
  const { series, parameters, values, evaluation, before, contrast, nulls, rf, averages, mustKeeps, gaps, extrapolated } = one;
  const has = classRow(classOf(series)).parameters;
  return {
    id: series.id,
    values: values.map(({ key, from, to, why, formula, source, numbers }) => ({
      key,
      from: from ?? null,
      to: to ?? null,
      why,
      formula,
      source,
      numbers,
    })),
    parameters: Object.fromEntries(
      parameterKeys.filter((key) => has.includes(key) && parameters[key] !== undefined).map((key) => [key, parameters[key]]),
    ),
    figures: { from: before.figures, to: evaluation.figures },
    contrast: { target: series.target, comparison: series.comparison, ...contrast },
    nulls,
    rf,
    averages,
    mustKeeps: mustKeeps.map(({ status, text, numbers }) => ({ status, text, numbers })),
    cautions: evaluation.cautions.map(({ code, level, text }) => ({ code, level, text })),
    extrapolated,
    notCarried: gaps,
  };
}
