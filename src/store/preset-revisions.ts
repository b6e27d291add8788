import { basename, join } from 'node:path';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { cleanText } from '../study/clean-text.js';
import type { Disk } from './disk.js';
import { type PresetOrigin, readPresetFile, type StoredPreset } from './preset-folder.js';
import { problemOfError, refused, type Stored, type StoreProblem, storeProblem } from './problem-of-error.js';

/** One file that holds a revision of a preset. */
export interface RevisionFile {
  /** By its name; null for `ID.json`, whose number stands inside. */
  readonly revision: number | null;
  readonly name: string;
}

/** The name of a revision's file. */
export function revisionName(id: string, revision: number): string {
  return `${id}@${revision}.json`;
}

/**
 * The files of a preset in a folder, by their names alone: `ID@REV.json` from the highest down, then `ID.json`. No pointer is stored:
 * which revision is the current one follows from the files.
 */
async function revisionFiles(disk: Disk, folder: string, id: string): Promise<Stored<RevisionFile[]>> {
  let names: readonly string[];
  try {
    names = await disk.names(folder);
  } catch (error) {
    return refused(problemOfError(error, 'read', 'the folder of presets', folder));
  }
  const files = names.flatMap((name): RevisionFile[] => {
    if (name === `${id}.json`) return [{ revision: null, name }];
    const revision = numberIn(name, id);
    return revision === null ? [] : [{ revision, name }];
  });
  return { ok: true, value: files.sort((a, b) => (b.revision ?? 0) - (a.revision ?? 0)) };
}

/** The number in `ID@REV.json`; null for other names, and for numbers written in another way (`ID@02.json`). */
function numberIn(name: string, id: string): number | null {
  if (!name.startsWith(`${id}@`)) return null;
  const digits = /^([1-9]\d{0,6})\.json$/.exec(name.slice(id.length + 1))?.[1];
  return digits === undefined ? null : Number(digits);
}

/**
 * The current revision of a preset in a folder: the one with the highest number, in a name or inside `ID.json`. Null when there is none.
 * A file whose name and content disagree is refused: nobody could tell which one it is.
 */
export async function newestRevision(
  disk: Disk,
  folder: string,
  id: string,
  origin: PresetOrigin,
  parse?: ParseExpression,
): Promise<Stored<StoredPreset | null>> {
  const files = await revisionFiles(disk, folder, id);
  if (!files.ok) return files;
  const numbered = files.value.find(({ revision }) => revision !== null);
  const plain = files.value.find(({ revision }) => revision === null);
  let newest: StoredPreset | null = null;
  for (const file of [numbered, plain]) {
    if (file === undefined) continue;
    const read = await readRevision(disk, folder, file, id, origin, parse);
    if (!read.ok) return read;
    if (newest === null || read.value.study.revision > newest.study.revision) newest = read.value;
  }
  return { ok: true, value: newest };
}

/** All revisions of a preset in a folder, newest first; files that cannot be read come back as problems and do not stop the others. */
export async function allRevisions(disk: Disk, folder: string, id: string, origin: PresetOrigin, parse?: ParseExpression) {
  const files = await revisionFiles(disk, folder, id);
  if (!files.ok) return { revisions: [], problems: files.problems };
  const read = [];
  for (const file of files.value) read.push(await readRevision(disk, folder, file, id, origin, parse));
  const revisions = read.flatMap((one) => (one.ok ? [one.value] : []));
  revisions.sort((a, b) => b.study.revision - a.study.revision);
  return { revisions, problems: read.flatMap((one) => (one.ok ? [] : one.problems)) };
}

/** The revision of a preset that came before another one in its folder; null when there is none that can be read. */
export async function revisionBefore(
  disk: Disk,
  folder: string,
  { id, revision }: { readonly id: string; readonly revision: number },
  origin: PresetOrigin,
  parse?: ParseExpression,
): Promise<StoredPreset | null> {
  const files = await revisionFiles(disk, folder, id);
  if (!files.ok) return null;
  // Highest number below first; `ID.json`, whose number is not known before it is read, last.
  for (const file of files.value.filter((one) => (one.revision ?? 0) < revision)) {
    const read = await readRevision(disk, folder, file, id, origin, parse);
    if (read.ok && read.value.study.revision < revision) return read.value;
  }
  return null;
}

async function readRevision(
  disk: Disk,
  folder: string,
  { name, revision }: RevisionFile,
  id: string,
  origin: PresetOrigin,
  parse?: ParseExpression,
): Promise<Stored<StoredPreset>> {
  const read = await readPresetFile(disk, join(folder, name), origin, parse);
  if (!read.ok) return read;
  const { study, path } = read.value;
  const agrees = study.id === id && (revision === null || study.revision === revision);
  return agrees ? read : refused(namesAnother(path, study.id, study.revision, revision === null ? id : `${id} revision ${revision}`));
}

/** What is wrong with the name of a revision's file (`ID@REV.json`): it names another preset or revision than stands in it. */
export function nameProblem({ study, path }: StoredPreset): StoreProblem | null {
  const [, id, revision] = /^(.+)@(\d+)\.json$/.exec(basename(path)) ?? [];
  if (id === undefined || (id === study.id && revision === String(study.revision))) return null;
  return namesAnother(path, study.id, study.revision, `${id} revision ${revision}`);
}

function namesAnother(path: string, id: string, revision: number, expected: string): StoreProblem {
  const message = `${cleanText(path)} holds ${id} revision ${revision}, expected ${expected}.`;
  return storeProblem('revision-name-differs', 65, path, message, 'Rename the file, or mend what stands in it.');
}
