import type { ParameterKey } from '../calc/parameters.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { cleanText } from './clean-text.js';
import type { JsonPath, LocatedFile, PlacedProblem } from './located-file.js';
import { checkMustKeep, type Say } from './must-keep-checks.js';
import { nearestWord } from './nearest-word.js';
import { parameterClashes } from './parameter-checks.js';
import type { PresetFile, SeriesFile } from './preset-file.js';
import { rangeFault } from './range-fault.js';

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
