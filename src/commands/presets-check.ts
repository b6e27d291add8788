import { resolve } from 'node:path';
import { loadParser } from '../formulas/load-parser.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { findPreset, listPresets, type PresetFolder, readPresetFile, type StoredPreset } from '../store/preset-folder.js';
import type { Stored, StoreProblem } from '../store/problem-of-error.js';
import { cleanText } from '../study/clean-text.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { foldersOfPresets, refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';

/**
 * `holdfast presets check`: one line for each file that is right on standard output, every problem of the others on standard error.
 * Exit code 1 when a file is wrong, 66 when a named file is not there.
 */
export async function runPresetsCheck(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const parse = await loadParser();
  const folders = await foldersOfPresets(request, io);
  const right: string[] = [];
  const problems: StoreProblem[] = [];
  if (request.arguments.length === 0) {
    const listing = await listPresets(io.disk, folders, parse);
    right.push(...listing.presets.map(({ path, study }) => `${path}: ${study.id}, ${study.series.length} series`));
    problems.push(...listing.problems);
  }
  for (const file of request.arguments) {
    const read = await readNamed(file, folders, io, parse);
    if (read.ok) right.push(`${file}: ${read.value.study.id}, ${read.value.study.series.length} series`);
    else problems.push(...read.problems);
  }
  const page = pageOf(request, io);
  for (const line of right) io.write(page.plain(`right  ${cleanText(line)}\n`));
  if (problems.length === 0) return exitCodes.done;
  complain(refusedByStore(problems), io);
  const wasNamed = request.arguments.length > 0 || request.has('presets');
  return wasNamed && problems.some(({ exitCode }) => exitCode === exitCodes.noInput) ? exitCodes.noInput : exitCodes.failed;
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
