import { classKeys, classRow } from '../calc/classes.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { classOf, type GivenParameters } from '../calc/series.js';
import { nearestWord } from '../study/nearest-word.js';
import type { StudySeries } from '../study/study.js';
import { type Attempt, wrongUse } from './attempt.js';

/** Refuses a set value that this class has no use for: it would change nothing. A split goes on to the model, which says why it cannot be. */
export function parameterOfOtherClass(series: StudySeries, set: GivenParameters): Attempt<never> | null {
  const { parameters: has, label } = classRow(classOf(series));
  const foreign = (Object.keys(set) as ParameterKey[]).find(
    (key) => key !== 'rounds' && !has.includes(key) && set[key] !== series.parameters[key],
  );
  if (foreign === undefined) return null;
  const near = nearestWord(
    foreign,
    parameterKeys.filter((key) => has.includes(key)),
  );
  const users = classKeys.filter((key) => classRow(key).parameters.includes(foreign)).map((key) => classRow(key).label);
  const message = `Series ${series.id} is ${label}, which has no ${parameterRow(foreign).label} (${foreign}).`;
  return wrongUse('--set', message, near === null ? `It belongs to: ${users.join(', ')}.` : `Did you mean ${near}?`);
}
