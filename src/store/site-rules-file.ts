import { basename, join } from 'node:path';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { readSiteRules } from '../study/read-site-rules.js';
import { noSiteRules, type SiteRules, siteRulesLimits } from '../study/site-rules.js';
import type { Disk } from './disk.js';
import type { Stored } from './problem-of-error.js';
import { readWhole } from './read-whole.js';

/**
 * The rules of a site: the file that was named (`HOLDFAST_RULES`), else `rules.json` beside the settings of this user; none where neither is
 * there. A file that was named and is not there is a problem, and so is one that cannot be read.
 *
 * @param parser Loads the parser of formulas, once there is a file.
 */
export async function readSiteRulesFile(
  disk: Disk,
  named: string | null,
  settingsFolder: string,
  parser: () => Promise<ParseExpression>,
): Promise<Stored<SiteRules>> {
  const path = named ?? join(settingsFolder, 'rules.json');
  if (named === null && (await disk.facts(path).catch(() => null)) === null) return { ok: true, value: noSiteRules };
  const whole = await readWhole(disk, path, 'the file of rules', siteRulesLimits.bytes);
  if (!whole.ok) return whole;
  const read = readSiteRules(whole.value.text, basename(path), await parser());
  return read.ok ? read : { ok: false, problems: read.problems.map((problem) => ({ ...problem, exitCode: 65 })) };
}
