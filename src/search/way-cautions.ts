import type { Caution, CautionCode, CautionLevel } from '../calc/caution.js';
import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import type { Carried } from '../calc/resolve.js';
import { same } from '../calc/rounding.js';
import type { Parameters } from '../calc/series.js';
import { namedValues } from '../formulas/formula-names.js';
import { checkMustKeeps, limitInWords } from '../study/must-keep.js';
import type { MustKeep } from '../study/study.js';
import type { SearchSetting } from './setting.js';
import { grownSideEffects, sayGrown } from './side-effects.js';

/** A caution as plain data, and those that only a way can raise. */
export interface WayCaution {
  readonly code: CautionCode | 'coverage-lost' | 'must-keep-exact' | 'side-effect-grows';
  readonly level: CautionLevel;
  readonly text: string;
}

const short = (value: number) => String(Number(value.toFixed(3)));

/** A value that followed by itself, by the words of the table of parameters. */
export function carriedCaution({ key, from, to, because }: Carried): Caution {
  const row = parameterRow(key);
  const unit = row.kind === 'number' && row.unit !== '' ? ` ${row.unit}` : '';
  return {
    code: 'timing-carried',
    level: 'note',
    text: `${row.label} ${short(from)} becomes ${short(to)}${unit}: ${because}`,
    numbers: { from, to },
  };
}

/** Coverage that is lost is said: what lies outside is not acquired. */
function coverageCautions({ presetFigures, baseline }: SearchSetting, { coverageMm }: Figures): WayCaution[] {
  const before = presetFigures.coverageMm;
  if (before === null || coverageMm === null || coverageMm >= before - baseline.model.series.parameters.sliceThicknessMm / 2) return [];
  const text = `coverage falls from ${short(before)} to ${short(coverageMm)} mm: what lies outside is not acquired`;
  return [{ code: 'coverage-lost', level: 'caution', text }];
}

/** Distortion and chemical shift that grow past their bound: no other number of a way weighs them. */
function sideEffectCautions({ presetFigures }: SearchSetting, figures: Figures): WayCaution[] {
  const grown = grownSideEffects(figures, presetFigures);
  return grown.length === 0 ? [] : [{ code: 'side-effect-grows', level: 'caution', text: sayGrown(grown, figures, presetFigures) }];
}

/** The limits of a must-keep as numbers. */
function boundsOf({ atMost, atLeast, between }: MustKeep): readonly number[] {
  return [atMost, atLeast, ...(between ?? [])].filter((bound): bound is number => bound !== undefined);
}

/** Label and unit of a figure or a parameter. */
function wordsOf(name: FigureKey | ParameterKey): { readonly label: string; readonly unit: string } {
  if (Object.hasOwn(figureTable, name)) return figureTable[name as FigureKey];
  const row = parameterRow(name as ParameterKey);
  return { label: row.label, unit: row.kind === 'number' ? row.unit : '' };
}

/** Where a way moves a value to the very bound of what must be kept, that is said with its source: no step further is left. */
function exactNotes({ problem, presetFigures }: SearchSetting, parameters: Parameters, figures: Figures): WayCaution[] {
  const { mustKeep: mustKeeps, parameters: preset } = problem.series;
  const now = namedValues(parameters, figures);
  const before = namedValues(preset, presetFigures);
  return checkMustKeeps(mustKeeps, parameters, figures, problem.rules).flatMap(({ mustKeep, status }) => {
    const name = mustKeep.figure ?? mustKeep.parameter;
    if (name === undefined || status !== 'kept') return [];
    const [to, from] = [now(name), before(name)];
    if (typeof to !== 'number' || (typeof from === 'number' && same(to, from)) || !boundsOf(mustKeep).some((bound) => same(bound, to)))
      return [];
    const { label, unit } = wordsOf(name);
    const text = `${label} ${short(to)}${unit === '' ? '' : ` ${unit}`}: exactly what must be kept, ${limitInWords(mustKeep, unit)} (${mustKeep.source})`;
    return [{ code: 'must-keep-exact' as const, level: 'note' as const, text }];
  });
}

/** Cautions that only a way can raise, worst first. */
export function cautionsOfWay(setting: SearchSetting, parameters: Parameters, figures: Figures): WayCaution[] {
  return [...coverageCautions(setting, figures), ...sideEffectCautions(setting, figures), ...exactNotes(setting, parameters, figures)];
}
