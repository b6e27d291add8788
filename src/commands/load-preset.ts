import type { ParseExpression } from '../formulas/parsed-node.js';
import { findPreset, type PresetFolder, readPresetFile, type StoredPreset } from '../store/preset-folder.js';
import type { StoreProblem } from '../store/problem-of-error.js';
import { cleanText } from '../study/clean-text.js';
import type { Rules } from '../study/must-keep.js';
import { readRules } from '../study/read-rules.js';
import type { Study } from '../study/study.js';
import type { Attempt, Refusal } from './attempt.js';
import type { CommandIo } from './command-io.js';
import { exitCodes } from './exit-codes.js';

/** A preset with its rules read. */
export interface LoadedPreset extends StoredPreset {
  readonly rules: Rules;
}

/** Finds a preset by id or path. Its rules are parsed and checked too; the parser is loaded only where there are rules. */
export async function loadPreset(wanted: string, folders: readonly PresetFolder[], io: CommandIo): Promise<Attempt<LoadedPreset>> {
  const found = await findPreset(io.disk, folders, wanted, io.workingFolder);
  if (!found.ok) return refusedByStore(found.problems);
  const parse = await parserFor(found.value.study);
  if (parse === null) return { ok: true, value: { ...found.value, rules: new Map() } };
  const checked = await readPresetFile(io.disk, found.value.path, found.value.origin, parse);
  if (!checked.ok) return refusedByStore(checked.problems);
  return {
    ok: true,
    value: {
      ...checked.value,
      rules: readRules(
        checked.value.study.series.flatMap(({ mustKeep }) => mustKeep),
        parse,
      ),
    },
  };
}

/** The parser of rules, or null for a study without any. */
async function parserFor(study: Study): Promise<ParseExpression | null> {
  const hasRules = study.series.some(({ mustKeep }) => mustKeep.some(({ rule, when }) => rule !== undefined || when !== undefined));
  return hasRules ? (await import('../formulas/load-parser.js')).loadParser() : null;
}

/** The problem that a folder itself is not there; what is wrong with a file in it is another matter. */
export function missingFolder(problems: readonly StoreProblem[], folders: readonly PresetFolder[]): StoreProblem | undefined {
  return problems.find(({ exitCode, path }) => exitCode === exitCodes.noInput && folders.some(({ folder }) => cleanText(folder) === path));
}

/** Problems of the store as a refusal: its own exit code. */
export function refusedByStore(problems: readonly StoreProblem[]): Refusal {
  return { ok: false, exit: problems[0]?.exitCode ?? exitCodes.inputOutput, problems };
}
