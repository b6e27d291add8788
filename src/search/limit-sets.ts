import { type FigureKey, type Figures, figureKeys } from '../calc/figures.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from '../study/study.js';
import { bandLimits, withinBand } from './bands.js';
import type { Judged } from './judge.js';
import { type LimitKey, limitedValue, limitKeys, limitVerdict } from './limits.js';
import { isCrossed } from './must-keep-test.js';
import type { SearchProblem } from './problem-to-solve.js';
import type { SearchSetting } from './setting.js';

/** Something that may stand in the way: a limit of the patient, a band, or a must-keep. */
export type Binder =
  | { readonly kind: 'limit'; readonly key: LimitKey; readonly name: string }
  | { readonly kind: 'band'; readonly figure: FigureKey; readonly name: string }
  | { readonly kind: 'must keep'; readonly mustKeep: MustKeep; readonly name: string };

/** A limit so high that it never binds, while what only a cap opens stays open. */
const never = 1e9;

function mustKeepName({ figure, parameter, rule, atMost, atLeast, between }: MustKeep): string {
  const name = figure ?? parameter;
  if (name === undefined) return rule ?? '';
  const parts = [
    ...(atMost === undefined ? [] : [`<= ${atMost}`]),
    ...(atLeast === undefined ? [] : [`>= ${atLeast}`]),
    ...(between === undefined ? [] : [`between ${between[0]} and ${between[1]}`]),
  ];
  return `${name} ${parts.join(' and ')}`;
}

/** Everything that may stand in the way of a problem, limits of the patient first. A band on a figure that the series does not have never does. */
export function bindersOf({ problem, presetFigures }: Pick<SearchSetting, 'problem' | 'presetFigures'>): Binder[] {
  return [
    ...limitKeys.filter((key) => problem.limits[key] !== undefined).map((key): Binder => ({ kind: 'limit', key, name: key })),
    ...figureKeys
      .filter((figure) => problem.bands[figure] !== undefined && presetFigures[figure] !== null)
      .map((figure): Binder => ({ kind: 'band', figure, name: figure })),
    ...problem.series.mustKeep.map((mustKeep): Binder => ({ kind: 'must keep', mustKeep, name: mustKeepName(mustKeep) })),
  ];
}

/** The problem without some of what stands in the way. */
export function without(problem: SearchProblem, binders: readonly Binder[]): SearchProblem {
  const limits: Record<string, number | undefined> = { ...problem.limits };
  const bands: Record<string, number | undefined> = { ...problem.bands };
  let { mustKeep } = problem.series;
  for (const binder of binders) {
    if (binder.kind === 'limit') limits[binder.key] = never;
    else if (binder.kind === 'band') delete bands[binder.figure];
    else mustKeep = mustKeep.filter((one) => one !== binder.mustKeep);
  }
  return {
    ...problem,
    limits: limits as SearchProblem['limits'],
    bands: bands as SearchProblem['bands'],
    series: { ...problem.series, mustKeep },
  };
}

function crosses(binder: Binder, setting: SearchSetting, { parameters, figures }: Pick<Judged, 'parameters' | 'figures'>): boolean {
  const { problem, margins } = setting;
  if (binder.kind === 'limit') {
    const value = limitedValue(binder.key, figures, problem.readings);
    return limitVerdict(binder.key, value, problem.limits[binder.key] as number, margins).word === 'OVER';
  }
  if (binder.kind === 'must keep') return isCrossed(binder.mustKeep, namedValues(parameters, figures), problem.rules);
  const ratio = problem.bands[binder.figure] as number;
  return bandLimits({ [binder.figure]: ratio }, setting.presetFigures as Figures).some((band) => !withinBand(band, figures[binder.figure]));
}

/** What of all that may stand in the way of a problem one of its points crosses. */
export function crossedBy(binders: readonly Binder[], setting: SearchSetting, judged: Pick<Judged, 'parameters' | 'figures'>): Binder[] {
  return binders.filter((binder) => crosses(binder, setting, judged));
}
