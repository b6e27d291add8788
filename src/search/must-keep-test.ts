import { atLeast, atMost } from '../calc/rounding.js';
import { breaksFormula } from '../formulas/breaks-formula.js';
import { evaluateFormula, namesIn, type ValueOfName } from '../formulas/evaluate-formula.js';
import type { NumberTree } from '../formulas/formula.js';
import type { Rules } from '../study/must-keep.js';
import type { MustKeep } from '../study/study.js';

/**
 * True when a must-keep is crossed, without the words of `checkMustKeeps`: a search asks this millions of times.
 * What has no value is not checked, and so not crossed.
 */
export function isCrossed(mustKeep: MustKeep, valueNamed: ValueOfName, rules: Rules): boolean {
  if (mustKeep.when !== undefined) {
    const when = rules.get(mustKeep.when);
    if (when === undefined || evaluateFormula(when, valueNamed).truth !== true) return false;
  }
  const name = mustKeep.figure ?? mustKeep.parameter;
  if (name === undefined) {
    const rule = rules.get(mustKeep.rule ?? '');
    return rule !== undefined && breaksFormula(rule, valueNamed);
  }
  const value = valueNamed(name);
  if (typeof value !== 'number' || !Number.isFinite(value)) return false;
  const { atMost: most, atLeast: least, between } = mustKeep;
  if (most !== undefined && !atMost(value, most)) return true;
  if (least !== undefined && !atLeast(value, least)) return true;
  return between !== undefined && !(atLeast(value, between[0]) && atMost(value, between[1]));
}

/** Names of parameters and figures that a must-keep looks at. */
export function namesOfMustKeep(mustKeep: MustKeep, rules: Rules): string[] {
  const name = mustKeep.figure ?? mustKeep.parameter;
  const formulas = [mustKeep.when, mustKeep.rule].flatMap((text) => {
    const formula = text === undefined ? undefined : rules.get(text);
    return formula === undefined ? [] : namesIn(formula);
  });
  return [...new Set([...(name === undefined ? [] : [name as string]), ...formulas])];
}

const timeNames: readonly string[] = ['scanTimeS', 'holdTimeS', 'tableTimeS'];

function isNumber(tree: NumberTree): boolean {
  return tree.kind === 'number' && tree.value > 0;
}

/**
 * True for a must-keep that only caps time: `scanTimeS` at most, or a rule `scanTimeS / volumes <= 15`. More lines can break it, fewer never.
 */
export function isTimeCap({ figure, atMost: most, atLeast: least, between, rule, when }: MustKeep, rules: Rules): boolean {
  if (when !== undefined) return false;
  if (figure !== undefined) return timeNames.includes(figure) && most !== undefined && least === undefined && between === undefined;
  const tree = rules.get(rule ?? '');
  if (tree?.kind !== 'compare' || (tree.operator !== '<=' && tree.operator !== '<') || !isNumber(tree.right)) return false;
  const { left } = tree;
  const top = left.kind === 'arithmetic' && left.operator === '/' ? left.left : left;
  const bottom = left.kind === 'arithmetic' && left.operator === '/' ? left.right : null;
  return (
    top.kind === 'name' &&
    timeNames.includes(top.name) &&
    (bottom === null || isNumber(bottom) || (bottom.kind === 'name' && bottom.name === 'volumes'))
  );
}
