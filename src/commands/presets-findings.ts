import { loadParser } from '../formulas/load-parser.js';
import { cleanText } from '../study/clean-text.js';
import { readPreset } from '../study/read-preset.js';
import { readRules } from '../study/read-rules.js';
import { type CheckCircumstances, checkStudy, type Finding } from '../study/release-checks.js';
import { type SiteRules, withSiteRules } from '../study/site-rules.js';
import type { Study } from '../study/study.js';
import { writePreset } from '../study/write-preset.js';
import type { Attempt } from './attempt.js';
import { exitCodes } from './exit-codes.js';

/**
 * What the checks find in a study that is about to be written. It is written and read again first: nothing may be released that the
 * program would then refuse to read. The rules of the site are checked with its own.
 */
export async function checkedStudy(
  study: Study,
  site: SiteRules,
  circumstances: Omit<CheckCircumstances, 'rules'>,
): Promise<Attempt<Finding[]>> {
  const parse = await loadParser();
  const read = readPreset(writePreset(study), `${study.id}@${study.revision}.json`, parse);
  if (!read.ok) return { ok: false, exit: exitCodes.failed, problems: read.problems };
  const judged = withSiteRules(read.value, site);
  const rules = readRules(
    judged.series.flatMap(({ mustKeep }) => mustKeep),
    parse,
  );
  return { ok: true, value: checkStudy(judged, { ...circumstances, rules }) };
}

/** One finding in one line. */
export function findingLine({ level, code, series, text }: Finding): string {
  return cleanText(`${level}: ${series === null ? '' : `${series}: `}${text} [${code}]`);
}
