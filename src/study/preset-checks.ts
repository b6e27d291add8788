import type { ParameterKey } from '../calc/parameters.js';
import { formulaNames } from '../formulas/formula-names.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { readFormula } from '../formulas/read-formula.js';
import { cleanText } from './clean-text.js';
import type { Finding, JsonPath, LocatedFile, PlacedProblem } from './located-file.js';
import { nearestWord } from './nearest-word.js';
import { parameterClashes } from './parameter-checks.js';
import type { PresetFile, SeriesFile } from './preset-file.js';
import { rangeFault } from './range-fault.js';
import type { MustKeep } from './study.js';

type Say = (path: JsonPath, finding: Finding) => void;

const limitKeys = ['atMost', 'atLeast', 'between'] as const;

/** Ids must be there, each once. */
function checkIds(file: PresetFile, say: Say): void {
  const ids = file.series.map((series) => series.id);
  ids.forEach((id, i) => {
    if (ids.indexOf(id) === i) return;
    say(['series', i, 'id'], {
      code: 'duplicate-id',
      given: `the id "${id}" is used twice`,
      expected: 'an id for each series of its own',
      hint: 'Rename one of them.',
    });
  });
  function known(path: JsonPath, id: string): void {
    if (ids.includes(id)) return;
    const near = nearestWord(id, ids);
    say(path, {
      code: 'unknown-id',
      given: `there is no series "${cleanText(id, 40)}"`,
      expected: ids.length > 12 ? 'the id of a series of this file' : `one of ${ids.join(', ')}`,
      hint: near === null ? 'Use the id of a series of this file.' : `Did you mean "${near}"?`,
    });
  }
  (file.minimumSet ?? []).forEach((item, i) => {
    if (typeof item === 'string') known(['minimumSet', i], item);
    else
      item.forEach((id, j) => {
        known(['minimumSet', i, j], id);
      });
  });
  file.series.forEach((series, i) => {
    (series.pairedWith ?? []).forEach((id, j) => {
      known(['series', i, 'pairedWith', j], id);
    });
  });
}

/** One of figure, parameter, rule; limits with the first two only. */
function checkMustKeep(mustKeep: MustKeep, path: JsonPath, say: Say, parse: ParseExpression | undefined): void {
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

function checkSeries(series: SeriesFile, path: JsonPath, say: Say, parse: ParseExpression | undefined): void {
  for (const clash of parameterClashes(series.parameters)) say([...path, 'parameters', ...clash.path], { code: 'values-clash', ...clash });
  for (const [key, range] of Object.entries(series.ranges ?? {})) {
    const fault = rangeFault(key as ParameterKey, range);
    if (fault !== null) say([...path, 'ranges', key], { code: 'range-form', ...fault, hint: 'Change the range.' });
  }
  (series.mustKeep ?? []).forEach((mustKeep, i) => {
    checkMustKeep(mustKeep, [...path, 'mustKeep', i], say, parse);
  });
  const both = (series.opened ?? []).findIndex((key) => series.locked?.includes(key));
  if (both >= 0) {
    say([...path, 'opened', both], {
      code: 'values-clash',
      given: `"${series.opened?.[both]}" is locked and opened`,
      expected: 'one of the two',
      hint: 'Take it out of one list.',
    });
  }
}

/** What the structure alone cannot tell: ids, must-keeps, ranges, formulas, values that contradict each other. */
export function presetProblems(preset: PresetFile, file: LocatedFile, parse?: ParseExpression): PlacedProblem[] {
  const problems: PlacedProblem[] = [];
  const say: Say = (path, finding) => {
    problems.push(file.problem(path, finding));
  };
  checkIds(preset, say);
  preset.series.forEach((series, i) => {
    checkSeries(series, ['series', i], say, parse);
  });
  return problems;
}
