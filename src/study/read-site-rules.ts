import { validate } from '../../build/validate-rules.js';
import type { Outcome } from '../calc/problem.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { cleanText } from './clean-text.js';
import type { PlacedProblem } from './located-file.js';
import { checkMustKeep } from './must-keep-checks.js';
import { type FileKind, placedRefusal, readSchemaFile, unexplained } from './read-schema-file.js';
import { type SiteRule, type SiteRules, siteRulesLimits } from './site-rules.js';
import type { MustKeep } from './study.js';

const rulesKind: FileKind = {
  thing: 'file of rules',
  bytes: siteRulesLimits.bytes,
  nesting: siteRulesLimits.nesting,
  validate,
  schema: 'schema/rules.schema.json',
  about: 'A file of rules holds what one site keeps',
};

/** Copies without the bare objects of the JSON reader. */
function plainCopy<T>(value: T): T {
  return JSON.parse(JSON.stringify(value)) as T;
}

/**
 * Reads the text of a file of site rules: as a preset is read, its formulas too. A formula that is not allowed is refused with file, line
 * and the part that is not allowed. Never throws for anything a file says.
 *
 * @example readSiteRules('{ "format": "holdfast rules", "version": 1, "rules": [] }', 'rules.json', parse).ok //=> true
 */
export function readSiteRules(text: string, fileName: string, parse: ParseExpression): Outcome<SiteRules> {
  const read = readSchemaFile(text, fileName, rulesKind);
  if (!read.ok) return read;
  const given = read.value as Omit<SiteRules, 'notes'> & { readonly notes?: string };
  const problems: PlacedProblem[] = [...read.problems];
  given.rules.forEach(({ mustKeep }, i) => {
    checkMustKeep(mustKeep, ['rules', i, 'mustKeep'], (path, finding) => problems.push(read.file.problem(path, finding)), parse);
  });
  if (problems.length > 0) return placedRefusal(problems);
  if (!read.valid) return placedRefusal([unexplained(read.file, rulesKind.schema)]);
  const rules = given.rules.map(({ region, family, mustKeep }): SiteRule => {
    const clean: MustKeep = { ...plainCopy(mustKeep), source: cleanText(mustKeep.source) };
    return {
      ...(region === undefined ? {} : { region: cleanText(region) }),
      ...(family === undefined ? {} : { family }),
      mustKeep: clean,
    };
  });
  return { ok: true, value: { format: 'holdfast rules', version: 1, notes: cleanText(given.notes ?? ''), rules } };
}
