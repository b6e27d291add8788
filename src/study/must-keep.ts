import type { Caution } from '../calc/caution.js';
import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { atLeast, atMost } from '../calc/rounding.js';
import type { Parameters } from '../calc/series.js';
import { evaluateFormula, namesIn, type ValueOfName } from '../formulas/evaluate-formula.js';
import type { Formula } from '../formulas/formula.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from './study.js';

/** Formulas by their text, as `readRules` gives them; a formula that is not there is not read yet. */
export type Rules = ReadonlyMap<string, Formula>;

/** What became of one must-keep. `does not apply`: its `when` is false. */
export interface MustKeepResult {
  readonly mustKeep: MustKeep;
  readonly status: 'kept' | 'crossed' | 'not checked' | 'does not apply';
  /** One sentence with the numbers and the source. */
  readonly text: string;
  readonly numbers: Readonly<Record<string, number>>;
}

/** Number for a sentence: four digits at most after the point, none where they are zero. */
const shown = (value: number) => String(Number(value.toFixed(Math.abs(value) < 0.01 ? 6 : 4)));

function wordsOf(name: string): { label: string; unit: string } {
  if (Object.hasOwn(figureTable, name)) return figureTable[name as FigureKey];
  if (name === 'diffusion') return { label: 'highest b-value', unit: 's/mm2' };
  const row = parameterRow(name as ParameterKey);
  return { label: row.label, unit: row.kind === 'number' ? row.unit : '' };
}

const withUnit = (value: number, unit: string) => (unit === '' ? shown(value) : `${shown(value)} ${unit}`);

/** The limit in words: `at most 5 mm`. */
export function limitInWords(mustKeep: MustKeep, unit: string): string {
  const parts: string[] = [];
  if (mustKeep.atLeast !== undefined) parts.push(`at least ${withUnit(mustKeep.atLeast, unit)}`);
  if (mustKeep.atMost !== undefined) parts.push(`at most ${withUnit(mustKeep.atMost, unit)}`);
  if (mustKeep.between !== undefined) parts.push(`between ${shown(mustKeep.between[0])} and ${withUnit(mustKeep.between[1], unit)}`);
  return parts.join(' and ');
}

function withinLimits(mustKeep: MustKeep, value: number): boolean {
  const { atMost: most, atLeast: least, between } = mustKeep;
  if (most !== undefined && !atMost(value, most)) return false;
  if (least !== undefined && !atLeast(value, least)) return false;
  return between === undefined || (atLeast(value, between[0]) && atMost(value, between[1]));
}

function result(
  mustKeep: MustKeep,
  status: MustKeepResult['status'],
  sentence: string,
  numbers: Readonly<Record<string, number>>,
): MustKeepResult {
  return { mustKeep, status, text: `${sentence} (${mustKeep.source})`, numbers };
}

function checkLimits(mustKeep: MustKeep, name: string, valueNamed: ValueOfName): MustKeepResult {
  const { label, unit } = wordsOf(name);
  const value = valueNamed(name);
  const limit = limitInWords(mustKeep, unit);
  if (typeof value !== 'number' || !Number.isFinite(value))
    return result(mustKeep, 'not checked', `${label} has no value here: must be ${limit}, not checked`, {});
  const kept = withinLimits(mustKeep, value);
  const numbers = { [name]: value };
  return result(mustKeep, kept ? 'kept' : 'crossed', `${label} ${withUnit(value, unit)}: must be ${limit}`, numbers);
}

/** The names of formulas with their values: `voxel volume 4.2 mm3, chemical shift 0.9 px`. */
function valuesOf(formula: Formula, valueNamed: ValueOfName): { words: string; numbers: Record<string, number> } {
  const numbers: Record<string, number> = {};
  const words = namesIn(formula).map((name) => {
    const { label, unit } = wordsOf(name);
    const value = valueNamed(name);
    if (typeof value === 'number' && Number.isFinite(value)) numbers[name] = value;
    return typeof value === 'number'
      ? `${label} ${withUnit(value, unit)}`
      : `${label} ${value === true ? 'on' : value === false ? 'off' : 'has no value'}`;
  });
  return { words: words.join(', '), numbers };
}

function checkRule(mustKeep: MustKeep, rule: string, valueNamed: ValueOfName, rules: Rules): MustKeepResult {
  const formula = rules.get(rule);
  if (formula === undefined) return result(mustKeep, 'not checked', `must keep ${rule}: not checked, the rule is not read yet`, {});
  const { truth, missing } = evaluateFormula(formula, valueNamed);
  const { words, numbers } = valuesOf(formula, valueNamed);
  if (truth === null)
    return result(
      mustKeep,
      'not checked',
      `must keep ${rule}: not checked, ${missing.map((part) => `${part} has no value`).join(', ')}`,
      numbers,
    );
  return result(mustKeep, truth ? 'kept' : 'crossed', `${words}: must keep ${rule}`, numbers);
}

function checkOne(mustKeep: MustKeep, valueNamed: ValueOfName, rules: Rules): MustKeepResult {
  if (mustKeep.when !== undefined) {
    const when = rules.get(mustKeep.when);
    const applies = when === undefined ? null : evaluateFormula(when, valueNamed).truth;
    if (applies === false) return result(mustKeep, 'does not apply', `only when ${mustKeep.when}`, {});
    if (applies === null)
      return result(mustKeep, 'not checked', `applies when ${mustKeep.when}, and that cannot be told here: not checked`, {});
  }
  const name = mustKeep.figure ?? mustKeep.parameter;
  return name === undefined ? checkRule(mustKeep, mustKeep.rule ?? '', valueNamed, rules) : checkLimits(mustKeep, name, valueNamed);
}

/**
 * Checks every must-keep of a series against its parameters and figures, with the tolerance of `calc/rounding`.
 * What has no value is not checked, never kept. Rules need `readRules`.
 *
 * @example checkMustKeeps(series.mustKeep, parameters, figures, rules).filter(({ status }) => status === 'crossed')
 */
export function checkMustKeeps(
  mustKeeps: readonly MustKeep[],
  parameters: Parameters,
  figures: Figures,
  rules: Rules,
): readonly MustKeepResult[] {
  const valueNamed = namedValues(parameters, figures);
  return mustKeeps.map((mustKeep) => checkOne(mustKeep, valueNamed, rules));
}

/** Cautions for what is crossed (`must-keep`) and what could not be checked (`must-keep-not-checked`), in the order of the must-keeps. */
export function mustKeepCautions(results: readonly MustKeepResult[]): readonly Caution[] {
  return results.flatMap(({ status, text, numbers }): Caution[] => {
    if (status === 'crossed') return [{ code: 'must-keep', level: 'caution', text, numbers }];
    return status === 'not checked' ? [{ code: 'must-keep-not-checked', level: 'note', text, numbers }] : [];
  });
}
