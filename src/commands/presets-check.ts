import { basename, dirname, resolve } from 'node:path';
import { loadParser } from '../formulas/load-parser.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { findPreset, listPresets, type PresetFolder, readPresetFile, type StoredPreset } from '../store/preset-folder.js';
import { nameProblem, revisionBefore } from '../store/preset-revisions.js';
import type { Stored, StoreProblem } from '../store/problem-of-error.js';
import { cleanText } from '../study/clean-text.js';
import { findingLine } from '../study/finding-line.js';
import { readRules } from '../study/read-rules.js';
import { checkStudy, type Finding, isReleasable } from '../study/release-checks.js';
import { type SiteRules, withSiteRules } from '../study/site-rules.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { missingFolder, refusedByStore } from './load-preset.js';
import { loadSiteRules } from './load-site-rules.js';
import { pageOf } from './page.js';
import { readField } from './read-named-numbers.js';

/** One file, and what the checks say of it. */
interface CheckedFile {
  readonly file: string;
  /** Null where the file could not be read as a preset. */
  readonly preset: StoredPreset | null;
  readonly problems: readonly StoreProblem[];
  readonly findings: readonly Finding[];
}

/**
 * `holdfast presets check`: is the file a preset, is its timing possible, are its figures there, are pairs and nulls right at the
 * exact field, are its must-keeps and the rules of the site kept and sourced? One line for each file that is right on standard output, everything else on
 * standard error. Exit code 1 when a file is wrong, 66 when a named file is not there.
 */
export async function runPresetsCheck(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const field = readField(request.value('field'));
  if (!field.ok) return complain(field, io);
  const site = await loadSiteRules(settings.value.folders, io);
  if (!site.ok) return complain(site, io);
  const parse = await loadParser();
  const { presetFolders } = settings.value;
  const { files, general } =
    request.arguments.length === 0 ? await everyFile(presetFolders, io, parse) : await namedFiles(request, presetFolders, io, parse);
  const checked: CheckedFile[] = [];
  for (const { file, read } of files)
    checked.push(
      read.ok ? await checkedFile(file, read.value, { fieldT: field.value, site: site.value }, io, parse) : wrongFile(file, read.problems),
    );

  const isRight = ({ preset, problems, findings }: CheckedFile) => preset !== null && problems.length === 0 && isReleasable(findings);
  const page = pageOf(request, io);
  if (request.has('json')) {
    const document = {
      ok: general.length === 0 && checked.every(isRight),
      files: checked.map((one) => fileDocument(one, isRight(one))),
      problems: general,
    };
    io.write(`${JSON.stringify(document, null, 2)}\n`);
  } else {
    for (const one of checked) {
      const { preset } = one;
      if (preset !== null && isRight(one))
        io.write(page.plain(`right  ${cleanText(`${one.file}: ${preset.study.id}, ${preset.study.series.length} series`)}\n`));
      for (const finding of one.findings) io.complain(`holdfast: ${cleanText(one.file)}: ${findingLine(finding)}\n`);
      complain(refusedByStore(one.problems), io);
    }
    complain(refusedByStore(general), io);
  }
  const namedIsMissing =
    request.arguments.length > 0 && checked.some(({ problems }) => problems.some(({ exitCode }) => exitCode === exitCodes.noInput));
  const folderIsMissing = request.has('presets') && missingFolder(general, presetFolders) !== undefined;
  if (namedIsMissing || folderIsMissing) return exitCodes.noInput;
  return general.length === 0 && checked.every(isRight) ? exitCodes.done : exitCodes.failed;
}

interface ReadFile {
  readonly file: string;
  readonly read: Stored<StoredPreset>;
}

/** Every preset of every folder; what is wrong stands among the problems. */
async function everyFile(folders: readonly PresetFolder[], io: CommandIo, parse: ParseExpression) {
  const { presets, problems } = await listPresets(io.disk, folders, parse);
  return { files: presets.map((preset): ReadFile => ({ file: preset.path, read: { ok: true, value: preset } })), general: problems };
}

async function namedFiles(request: CommandRequest, folders: readonly PresetFolder[], io: CommandIo, parse: ParseExpression) {
  const files: ReadFile[] = [];
  for (const file of request.arguments) files.push({ file, read: await readNamed(file, folders, io, parse) });
  return { files, general: [] };
}

/** A file by its path where there is one, else a preset by its id. */
async function readNamed(
  name: string,
  folders: readonly PresetFolder[],
  io: CommandIo,
  parse: ParseExpression,
): Promise<Stored<StoredPreset>> {
  const path = resolve(io.workingFolder, name);
  const isThere = (await io.disk.facts(path).catch(() => null)) !== null;
  return isThere ? readPresetFile(io.disk, path, 'file', parse) : findPreset(io.disk, folders, name, io.workingFolder, parse);
}

function wrongFile(file: string, problems: readonly StoreProblem[]): CheckedFile {
  return { file, preset: null, problems, findings: [] };
}

/** The checks of a preset, and of a revision against the one before it. */
async function checkedFile(
  file: string,
  preset: StoredPreset,
  { fieldT, site }: { readonly fieldT: number | null; readonly site: SiteRules },
  io: CommandIo,
  parse: ParseExpression,
): Promise<CheckedFile> {
  const { path, origin } = preset;
  const study = withSiteRules(preset.study, site);
  const rules = readRules(
    study.series.flatMap(({ mustKeep }) => mustKeep),
    parse,
  );
  const misnamed = nameProblem(preset);
  const before = basename(path).includes('@') ? await revisionBefore(io.disk, dirname(path), study, origin, parse) : null;
  const findings = checkStudy(study, { rules, fieldT, previous: before?.study ?? null });
  return { file, preset, problems: misnamed === null ? [] : [misnamed], findings };
}

function fileDocument({ file, preset, problems, findings }: CheckedFile, ok: boolean): object {
  const about =
    preset === null
      ? { preset: null, revision: null, status: null }
      : { preset: preset.study.id, revision: preset.study.revision, status: preset.study.status };
  return { file, ok, ...about, problems: problems.map(({ code, path, message, hint }) => ({ code, path, message, hint })), findings };
}
