import { dirname, join } from 'node:path';
import type { Study } from '../study/study.js';
import { writePreset } from '../study/write-preset.js';
import type { Disk } from './disk.js';
import { makeFolder } from './make-folder.js';
import { privateFileMode } from './permissions.js';
import { problemOfError, refused, type Stored, type StoreProblem, storeProblem } from './problem-of-error.js';
import { randomId } from './random-id.js';
import { writeTemporary } from './write-whole.js';

const mostDrafts = 999;

/** File systems without links (some network and memory-card ones) answer with one of these. */
const noLinks = new Set(['EPERM', 'ENOTSUP', 'EOPNOTSUPP', 'ENOSYS', 'EMLINK', 'EXDEV']);

export interface SavedDraftPreset {
  readonly id: string;
  readonly path: string;
}

/**
 * Saves a study as a new draft preset, `ID-draft.json`, or with the next free number. It never overwrites: the whole file is written
 * under a temporary name first and then given its own, which fails when that is taken.
 *
 * @param takenIds Ids of presets in other folders.
 */
export async function saveDraftPreset(
  disk: Disk,
  folder: string,
  study: Study,
  takenIds: ReadonlySet<string> = new Set(),
  fileMode = privateFileMode,
): Promise<Stored<SavedDraftPreset>> {
  const made = await makeFolder(disk, folder, fileMode, 'preset');
  if (!made.ok) return made;
  const base = `${study.id.replace(/-draft(-\d+)?$/, '')}-draft`;
  for (let number = 1; number <= mostDrafts; number += 1) {
    const id = number === 1 ? base : `${base}-${number}`;
    if (takenIds.has(id)) continue;
    const path = join(folder, `${id}.json`);
    const text = writePreset({ ...study, id, status: 'draft', revision: 1 });
    const created = await createWhole(disk, path, text, fileMode);
    if (created === 'taken') continue;
    return created === 'created' ? { ok: true, value: { id, path } } : refused(created);
  }
  return refused(
    storeProblem(
      'no-free-name',
      73,
      folder,
      `${mostDrafts} drafts of ${study.id} are there already.`,
      'Remove those that are no longer needed.',
    ),
  );
}

/** Creates a file whole, or not at all when its name is taken. */
export async function createWhole(
  disk: Disk,
  path: string,
  content: string | Uint8Array,
  fileMode: number,
  thing = 'the preset',
): Promise<'created' | 'taken' | StoreProblem> {
  const temporary = join(dirname(path), `.${randomId()}.tmp`);
  const written = await writeTemporary(disk, temporary, content, fileMode, thing);
  if (!written.ok) return written.problems[0]!;
  try {
    await disk.link(temporary, path);
    await disk.remove(temporary).catch(() => {});
  } catch (error) {
    const code = (error as { code?: string }).code ?? '';
    if (code === 'EEXIST' || !noLinks.has(code)) {
      await disk.remove(temporary).catch(() => {});
      return code === 'EEXIST' ? 'taken' : problemOfError(error, 'create', thing, path);
    }
    const renamed = await reserveAndRename(disk, temporary, path, thing);
    if (renamed !== 'created') return renamed;
  }
  try {
    await disk.syncFolder(dirname(path));
    return 'created';
  } catch (error) {
    return problemOfError(error, 'write', thing, path);
  }
}

/** Without links: the name is taken by an empty file of our own, which the whole file then replaces. */
async function reserveAndRename(disk: Disk, temporary: string, path: string, thing: string): Promise<'created' | 'taken' | StoreProblem> {
  let reserved = false;
  try {
    await (await disk.open(path, 'new')).close();
    reserved = true;
    await disk.rename(temporary, path);
    return 'created';
  } catch (error) {
    await disk.remove(temporary).catch(() => {});
    if (reserved) await disk.remove(path).catch(() => {});
    else if ((error as { code?: string }).code === 'EEXIST') return 'taken';
    return problemOfError(error, 'create', thing, path);
  }
}
