import type { Outcome } from '../calc/problem.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { readPreset } from './read-preset.js';
import { readRules } from './read-rules.js';
import { type CheckCircumstances, checkStudy, type Finding } from './release-checks.js';
import { type SiteRules, withSiteRules } from './site-rules.js';
import type { Study } from './study.js';
import { writePreset } from './write-preset.js';

/**
 * What the checks find in a study that is about to be written. It is written and read again first: nothing may be released that the
 * program would then refuse to read. The rules of the site are checked with its own.
 */
export function checkedStudy(
  study: Study,
  site: SiteRules,
  circumstances: Omit<CheckCircumstances, 'rules'>,
  parse: ParseExpression,
): Outcome<Finding[]> {
  const read = readPreset(writePreset(study), `${study.id}@${study.revision}.json`, parse);
  if (!read.ok) return read;
  const judged = withSiteRules(read.value, site);
  const rules = readRules(
    judged.series.flatMap(({ mustKeep }) => mustKeep),
    parse,
  );
  return { ok: true, value: checkStudy(judged, { ...circumstances, rules }) };
}
