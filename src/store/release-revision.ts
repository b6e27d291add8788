import { dirname, join } from 'node:path';
import { cleanText } from '../study/clean-text.js';
import type { Study } from '../study/study.js';
import { writePreset } from '../study/write-preset.js';
import type { Disk } from './disk.js';
import type { StoredPreset } from './preset-folder.js';
import { newestRevision, revisionName } from './preset-revisions.js';
import { problemOfError, refused, type Stored, storeProblem } from './problem-of-error.js';
import { randomId } from './random-id.js';
import { removeLeftovers, temporaryName } from './release-leftovers.js';
import { writeTemporary } from './write-whole.js';

/** A revision was added, or somebody else was first: then theirs is the current one and nothing was written. */
export type AddedRevision =
  | { readonly kind: 'added'; readonly revision: number; readonly path: string; readonly study: Study }
  | { readonly kind: 'taken'; readonly newest: StoredPreset };

/** File systems without links answer with one of these. */
const noLinks = new Set(['EPERM', 'ENOTSUP', 'EOPNOTSUPP', 'ENOSYS', 'EMLINK', 'EXDEV']);

/**
 * Adds a study as the next revision of its preset, `ID@REV.json`: temporary file, sync, then a link to the next name, which the system
 * refuses when it is taken. Whoever comes second is told, and nothing is ever renamed over another's work. The file is read-only: a
 * revision never changes. Whenever the machine stops, the folder holds the old revisions or those and the whole new one.
 *
 * @param basedOn Revision that the study was made from; 0 for a preset that is new in this folder.
 */
export async function addRevision(disk: Disk, folder: string, study: Study, basedOn: number): Promise<Stored<AddedRevision>> {
  const newest = await newestRevision(disk, folder, study.id, 'site');
  if (!newest.ok) return newest;
  if (newest.value !== null && newest.value.study.revision > basedOn) return { ok: true, value: { kind: 'taken', newest: newest.value } };

  const revision = basedOn + 1;
  const added: Study = { ...study, revision };
  const path = join(folder, revisionName(study.id, revision));
  const temporary = join(folder, temporaryName(study.id, randomId()));
  const mode = await readableLikeFolder(disk, folder);
  if (!mode.ok) return mode;
  const written = await writeTemporary(disk, temporary, writePreset(added), mode.value, 'the revision');
  if (!written.ok) return written;
  await removeLeftovers(disk, folder, temporary);
  try {
    await disk.link(temporary, path);
  } catch (error) {
    const code = (error as { code?: string }).code ?? '';
    if (code === 'EEXIST') return somebodyWasFirst(disk, folder, study.id, path);
    return refused(noLinks.has(code) ? cannotLink(folder, code) : problemOfError(error, 'create', 'the revision', path));
  } finally {
    await disk.remove(temporary).catch(() => {});
  }
  try {
    await disk.syncFolder(dirname(path));
  } catch (error) {
    return refused(problemOfError(error, 'write', 'the revision', path));
  }
  return { ok: true, value: { kind: 'added', revision, path, study: added } };
}

async function somebodyWasFirst(disk: Disk, folder: string, id: string, path: string): Promise<Stored<AddedRevision>> {
  const newest = await newestRevision(disk, folder, id, 'site');
  if (!newest.ok) return newest;
  if (newest.value !== null) return { ok: true, value: { kind: 'taken', newest: newest.value } };
  return refused(problemOfError({ code: 'EEXIST' }, 'create', 'the revision', path));
}

/** Whoever may read the folder may read the revision; nobody may write it. */
async function readableLikeFolder(disk: Disk, folder: string): Promise<Stored<number>> {
  try {
    return { ok: true, value: ((await disk.facts(folder)).mode & 0o444) | 0o400 };
  } catch (error) {
    return refused(problemOfError(error, 'create', 'the folder of presets', folder));
  }
}

function cannotLink(folder: string, code: string) {
  return storeProblem(
    'no-links',
    73,
    folder,
    `the file system of ${cleanText(folder)} gives a file no second name (${code}), so that two people could overwrite each other's revision.`,
    'Keep the presets on a file system with hard links.',
  );
}
