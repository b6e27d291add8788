import { parameterRow, type ParameterKey } from '../calc/parameters.js';
import { readFormula } from '../formulas/read-formula.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { cleanText, shownValue } from './clean-text.js';
import type { Finding, JsonPath, LocatedFile, PlacedProblem } from './located-file.js';
import { nearestWord } from './nearest-word.js';
import { parameterClashes } from './parameter-checks.js';
import type { PresetFile, SeriesFile } from './preset-file.js';
import type { MustKeep, Range } from './study.js';

type Say = (path: JsonPath, finding: Finding) => void;

const limitKeys = ['atMost', 'atLeast', 'between'] as const;

/** Ids must be there, each once. */
function checkIds(file: PresetFile, say: Say): void {
  const ids = file.series.map((series) => series.id);
  ids.forEach((id, i) => {
    if (ids.indexOf(id) === i) return;
    say(['series', i, 'id'], { code: 'duplicate-id', given: `the id "${id}" is used twice`, expected: 'an id for each series of its own', hint: 'Rename one of them.' });
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
    else item.forEach((id, j) => { known(['minimumSet', i, j], id); });
  });
  file.series.forEach((series, i) => { (series.pairedWith ?? []).forEach((id, j) => { known(['series', i, 'pairedWith', j], id); }); });
}

/** One of figure, parameter, rule; limits with the first two only. */
function checkMustKeep(mustKeep: MustKeep, path: JsonPath, say: Say, parse: ParseExpression | undefined): void {
  const subjects = (['figure', 'parameter', 'rule'] as const).filter((key) => mustKeep[key] !== undefined);
  const limits = limitKeys.filter((key) => mustKeep[key] !== undefined);
  if (subjects.length !== 1) {
    const given = subjects.length === 0 ? 'nothing to keep is named' : `${subjects.join(' and ')} stand together`;
    say(path, { code: 'must-keep-form', given, expected: 'one of figure, parameter or rule', hint: 'Name one, and write a second must-keep for the other.' });
  } else if (subjects[0] === 'rule' ? limits.length > 0 : limits.length === 0) {
    const given = limits.length === 0 ? 'no limit is given' : `${limits.join(' and ')} beside a rule`;
    const expected = limits.length === 0 ? 'atMost, atLeast or between' : 'a rule that holds its own limits';
    say(path, { code: 'must-keep-form', given, expected, hint: limits.length === 0 ? 'Add a limit.' : 'Take the limit out, or write it into the rule.' });
  }
  const { atMost = Number.POSITIVE_INFINITY, atLeast = Number.NEGATIVE_INFINITY, between = [0, 0] } = mustKeep;
  if (atLeast > atMost || between[0] > between[1]) {
    say(path, { code: 'must-keep-form', given: 'the lower limit is above the upper one', expected: 'the lower limit first', hint: 'Swap the limits.' });
  }
  for (const key of ['rule', 'when'] as const) {
    const formula = mustKeep[key];
    if (formula === undefined || parse === undefined) continue;
    const read = readFormula(formula, parse);
    if (read.ok) continue;
    for (const problem of read.problems) say([...path, key], { code: problem.code, given: problem.given, expected: problem.expected, hint: problem.hint });
  }
}

/** A search may only offer values that the table allows. */
function checkRange(key: ParameterKey, range: Range, path: JsonPath, say: Say): void {
  const row = parameterRow(key);
  if (row.kind === 'object') return;
  const wrong = (given: string, expected: string) => { say(path, { code: 'range-form', given, expected, hint: 'Change the range.' }); };
  const values: readonly unknown[] = 'step' in range ? [range.min, range.max] : range;
  if ('step' in range) {
    if (row.kind !== 'number') return wrong('steps were given', 'a list of values');
    if (range.min > range.max) return wrong(`min ${range.min} is above max ${range.max}`, 'min first');
    if ((range.max - range.min) / range.step > 10000) return wrong('more than 10000 steps', 'a larger step');
  }
  for (const value of values) {
    if (row.kind === 'number') {
      const inside = typeof value === 'number' && value <= row.max && (row.aboveMin ? value > row.min : value >= row.min) && (!row.whole || Number.isInteger(value));
      if (!inside) return wrong(`${shownValue(value)} was given`, `${row.whole ? 'whole numbers' : 'numbers'} from ${row.aboveMin ? 'more than ' : ''}${row.min} to ${row.max}`);
    } else if (row.kind === 'flag' ? typeof value !== 'boolean' : !row.choices.includes(value as string)) {
      return wrong(`${shownValue(value)} was given`, row.kind === 'flag' ? 'true and false' : row.choices.join(', '));
    }
  }
}

function checkSeries(series: SeriesFile, path: JsonPath, say: Say, parse: ParseExpression | undefined): void {
  for (const clash of parameterClashes(series.parameters)) say([...path, 'parameters', ...clash.path], { code: 'values-clash', ...clash });
  for (const [key, range] of Object.entries(series.ranges ?? {})) checkRange(key as ParameterKey, range, [...path, 'ranges', key], say);
  (series.mustKeep ?? []).forEach((mustKeep, i) => { checkMustKeep(mustKeep, [...path, 'mustKeep', i], say, parse); });
  const both = (series.opened ?? []).findIndex((key) => series.locked?.includes(key));
  if (both >= 0) {
    say([...path, 'opened', both], { code: 'values-clash', given: `"${series.opened?.[both]}" is locked and opened`, expected: 'one of the two', hint: 'Take it out of one list.' });
  }
}

/** What the structure alone cannot tell: ids, must-keeps, ranges, formulas, values that contradict each other. */
export function presetProblems(preset: PresetFile, file: LocatedFile, parse?: ParseExpression): PlacedProblem[] {
  const problems: PlacedProblem[] = [];
  const say: Say = (path, finding) => { problems.push(file.problem(path, finding)); };
  checkIds(preset, say);
  preset.series.forEach((series, i) => { checkSeries(series, ['series', i], say, parse); });
  return problems;
}
