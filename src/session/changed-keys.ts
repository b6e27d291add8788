import { type ParameterKey, parameterKeys } from '../calc/parameters.js';
import type { Parameters } from '../calc/series.js';

/** Parameters that differ, in the order a person types them. */
export function changedKeys(planned: Parameters, used: Parameters): ParameterKey[] {
  return parameterKeys.filter((key) => JSON.stringify(planned[key]) !== JSON.stringify(used[key]));
}
