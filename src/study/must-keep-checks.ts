import { formulaNames } from '../formulas/formula-names.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { readFormula } from '../formulas/read-formula.js';
import type { Finding, JsonPath } from './located-file.js';
import { nearestWord } from './nearest-word.js';
import type { MustKeep } from './study.js';

/** Reports what is wrong at a place of a file. */
export type Say = (path: JsonPath, finding: Finding) => void;

const limitKeys = ['atMost', 'atLeast', 'between'] as const;

/** One of figure, parameter, rule; limits with the first two only. */
export function checkMustKeep(mustKeep: MustKeep, path: JsonPath, say: Say, parse: ParseExpression | undefined): void {
  const subjects = (['figure', 'parameter', 'rule'] as const).filter((key) => mustKeep[key] !== undefined);
  const limits = limitKeys.filter((key) => mustKeep[key] !== undefined);
  if (subjects.length !== 1) {
    const given = subjects.length === 0 ? 'nothing to keep is named' : `${subjects.join(' and ')} stand together`;
    say(path, {
      code: 'must-keep-form',
      given,
      expected: 'one of figure, parameter or rule',
      hint: 'Name one, and write a second must-keep for the other.',
    });
  } else if (subjects[0] === 'rule' ? limits.length > 0 : limits.length === 0) {
    const given = limits.length === 0 ? 'no limit is given' : `${limits.join(' and ')} beside a rule`;
    const expected = limits.length === 0 ? 'atMost, atLeast or between' : 'a rule that holds its own limits';
    say(path, {
      code: 'must-keep-form',
      given,
      expected,
      hint: limits.length === 0 ? 'Add a limit.' : 'Take the limit out, or write it into the rule.',
    });
  }
  const { atMost = Number.POSITIVE_INFINITY, atLeast = Number.NEGATIVE_INFINITY, between = [0, 0] } = mustKeep;
  if (atLeast > atMost || between[0] > between[1]) {
    say(path, {
      code: 'must-keep-form',
      given: 'the lower limit is above the upper one',
      expected: 'the lower limit first',
      hint: 'Swap the limits.',
    });
  }
  for (const key of ['rule', 'when'] as const) {
    const formula = mustKeep[key];
    if (formula === undefined || parse === undefined) continue;
    const read = readFormula(formula, parse);
    if (read.ok) continue;
    for (const problem of read.problems) {
      const near = problem.code === 'formula-name' ? nearestWord(problem.part, [...formulaNames.keys()]) : null;
      const hint = near === null ? problem.hint : `Did you mean "${near}"?`;
      say([...path, key], { code: problem.code, given: problem.given, expected: problem.expected, hint });
    }
  }
}
