import type { ParameterKey } from '../calc/parameters.js';
import { contrastRules } from './contrast-rules.js';
import { extentRules } from './extent-rules.js';
import { sliceRules } from './slice-rules.js';
import { speedRules } from './speed-rules.js';
import { timingRules } from './timing-rules.js';
import type { ValueRule } from './value-rule.js';

/**
 * The mapping table: for every parameter the attributes that may hold it, the fields of a sidecar, and what is done with them.
 * `holdfast read --explain` prints it; the reading follows it.
 */
export const valueRules: Readonly<Record<ParameterKey, ValueRule>> = {
  ...extentRules,
  ...sliceRules,
  ...speedRules,
  ...timingRules,
  ...contrastRules,
};
