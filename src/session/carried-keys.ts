import type { ParameterKey } from '../calc/parameters.js';
import type { Carried } from '../calc/resolve.js';

/** Parameters that follow others by themselves until they are set by hand. */
export const carriedKeys: readonly ParameterKey[] = [
  'echoTrainLength',
  'echoSpacingMs',
  'repetitionTimeMs',
  'echoTimeMs',
  'rounds',
] satisfies readonly Carried['key'][];
