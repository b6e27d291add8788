import type { Formula } from '../formulas/formula.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { readFormula } from '../formulas/read-formula.js';
import type { MustKeep } from './study.js';

/**
 * Reads the rules and conditions of must-keeps once, by their text. What cannot be read is left out, and so is never kept:
 * `readPreset` with the same parser has refused it before.
 *
 * @example readRules(study.series.flatMap((series) => series.mustKeep), parse)
 */
export function readRules(mustKeeps: readonly MustKeep[], parse: ParseExpression): ReadonlyMap<string, Formula> {
  const rules = new Map<string, Formula>();
  for (const text of mustKeeps.flatMap(({ rule, when }) => [rule, when])) {
    if (text === undefined || rules.has(text)) continue;
    const reading = readFormula(text, parse);
    if (reading.ok) rules.set(text, reading.value);
  }
  return rules;
}
