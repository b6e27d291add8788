import { createHash } from 'node:crypto';
import { basename, join, resolve } from 'node:path';
import type { Problem } from '../calc/problem.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { cleanText } from '../study/clean-text.js';
import { presetLimits } from '../study/limits.js';
import { nearestWord } from '../study/nearest-word.js';
import { readPreset } from '../study/read-preset.js';
import type { Study } from '../study/study.js';
import type { Disk } from './disk.js';
import { problemOfError, refused, type Stored, type StoreProblem, storeProblem } from './problem-of-error.js';
import { readWhole } from './read-whole.js';

/** Whose presets a folder holds; `file` is one that was named by its path. */
export type PresetOrigin = 'site' | 'own' | 'shipped' | 'file';

export interface PresetFolder {
  readonly origin: PresetOrigin;
  readonly folder: string;
  /** True for a folder that a person named: that it is not there is a problem. */
  readonly mustExist: boolean;
}

/** A preset and where it came from. */
export interface StoredPreset {
  readonly study: Study;
  readonly path: string;
  readonly origin: PresetOrigin;
  /** SHA-256 of the file's bytes, hexadecimal. */
  readonly hash: string;
}

export interface PresetListing {
  /** By id, then revision; of one id in several folders the one that is taken comes first. */
  readonly presets: readonly StoredPreset[];
  /** Files that are no presets and folders that cannot be read; they do not stop the others. */
  readonly problems: readonly StoreProblem[];
}

/** The folders in the order in which they are asked: what the site has, what this user saved, what ships with the program. */
export function presetFolders(site: string | null, own: string, shipped: string | null): PresetFolder[] {
  return [
    ...(site === null ? [] : [{ origin: 'site', folder: site, mustExist: true } as const]),
    { origin: 'own', folder: own, mustExist: false },
    ...(shipped === null ? [] : [{ origin: 'shipped', folder: shipped, mustExist: true } as const]),
  ];
}

/** Reads every preset of the folders. */
export async function listPresets(disk: Disk, folders: readonly PresetFolder[], parse?: ParseExpression): Promise<PresetListing> {
  const presets: StoredPreset[] = [];
  const problems: StoreProblem[] = [];
  for (const folder of folders) {
    const names = await presetNames(disk, folder);
    if (!names.ok) {
      problems.push(...names.problems);
      continue;
    }
    const read = await readFiles(disk, folder, names.value, parse);
    presets.push(...read.presets);
    problems.push(...read.problems);
  }
  const place = (preset: StoredPreset) => folders.findIndex(({ origin }) => origin === preset.origin);
  presets.sort((a, b) => compare(a.study.id, b.study.id) || place(a) - place(b) || b.study.revision - a.study.revision);
  return { presets, problems };
}

/** Of each preset of a folder the highest revision, of presets as `listPresets` sorts them. */
export function currentRevisions(presets: readonly StoredPreset[]): readonly StoredPreset[] {
  return presets.filter(({ study, origin }, i) => presets[i - 1]?.study.id !== study.id || presets[i - 1]?.origin !== origin);
}

/**
 * Finds a preset by its id (`liver-3t`), its id and revision (`liver-3t@2`), or the path of its file. An id is looked for in the
 * folders in their order; the highest revision is taken. Exit code 66 when there is none, 65 when its file is wrong.
 *
 * @param workingFolder Where a relative path starts.
 */
export async function findPreset(
  disk: Disk,
  folders: readonly PresetFolder[],
  wanted: string,
  workingFolder: string,
  parse?: ParseExpression,
): Promise<Stored<StoredPreset>> {
  const path = resolve(workingFolder, wanted);
  if (/[/\\]/.test(wanted)) return readPresetFile(disk, path, 'file', parse);
  const [, id = wanted, revision] = /^(.*)@(\d+)$/.exec(wanted) ?? [];
  const isWanted = ({ study }: StoredPreset) => study.id === id && (revision === undefined || study.revision === Number(revision));

  const knownIds: string[] = [];
  for (const folder of folders) {
    const names = await presetNames(disk, folder);
    // Going on to the next folder would quietly take another preset of that name.
    if (!names.ok) return names;
    const near = names.value.filter(isNameOf(id));
    // A file with the preset's name is read first; the others only when it is not the one.
    for (const some of [near, names.value]) {
      const { presets, problems } = await readFiles(disk, folder, some, parse);
      const found = presets.filter(isWanted).sort((a, b) => b.study.revision - a.study.revision)[0];
      if (found !== undefined) return { ok: true, value: found };
      if (some === near && problems.length > 0) return { ok: false, problems };
      knownIds.push(...presets.map(({ study }) => study.id));
    }
  }
  if ((await disk.facts(path).catch(() => null)) !== null) return readPresetFile(disk, path, 'file', parse);
  const near = nearestWord(wanted, [...new Set(knownIds)]);
  const hint = near === null ? 'holdfast presets list shows the ids; a path to a file serves too.' : `Did you mean ${near}?`;
  return refused(
    storeProblem('preset-not-there', 66, wanted, `there is no preset ${cleanText(wanted, 80)}, neither as an id nor as a file.`, hint),
  );
}

/** Files that are read side by side: most of the time of one is waiting, on a file system over a network nearly all. */
const filesAtOnce = 8;

async function readFiles(
  disk: Disk,
  { folder, origin }: PresetFolder,
  names: readonly string[],
  parse?: ParseExpression,
): Promise<{ presets: StoredPreset[]; problems: StoreProblem[] }> {
  const presets: StoredPreset[] = [];
  const problems: StoreProblem[] = [];
  for (let from = 0; from < names.length; from += filesAtOnce) {
    const some = names.slice(from, from + filesAtOnce);
    for (const read of await Promise.all(some.map((name) => readPresetFile(disk, join(folder, name), origin, parse)))) {
      if (read.ok) presets.push(read.value);
      else problems.push(...read.problems);
    }
  }
  return { presets, problems };
}

/** `ID.json`, or a revision of it: `ID@2.json`. */
function isNameOf(id: string): (name: string) => boolean {
  return (name) => name === `${id}.json` || (name.startsWith(`${id}@`) && /^@\d+\.json$/.test(name.slice(id.length)));
}

async function presetNames(disk: Disk, { folder, mustExist }: PresetFolder): Promise<Stored<string[]>> {
  try {
    const names = await disk.names(folder);
    return { ok: true, value: names.filter((name) => name.endsWith('.json') && !name.startsWith('.')) };
  } catch (error) {
    if (!mustExist && (error as { code?: string }).code === 'ENOENT') return { ok: true, value: [] };
    return refused(problemOfError(error, 'read', 'the folder of presets', folder));
  }
}

/** Reads one preset file; everything wrong with it comes back as problems. */
export async function readPresetFile(
  disk: Disk,
  path: string,
  origin: PresetOrigin,
  parse?: ParseExpression,
): Promise<Stored<StoredPreset>> {
  const file = await readWhole(disk, path, 'the preset', presetLimits.bytes);
  if (!file.ok) return file;
  const read = readPreset(file.value.text, basename(path), parse);
  if (!read.ok) return { ok: false, problems: read.problems.map((problem: Problem) => ({ ...problem, exitCode: 65 })) };
  const hash = createHash('sha256').update(file.value.bytes).digest('hex');
  return { ok: true, value: { study: read.value, path, origin, hash } };
}

function compare(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
