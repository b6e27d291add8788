import { dirname } from 'node:path';
import { cleanText } from '../study/clean-text.js';
import type { Study } from '../study/study.js';
import { writePreset } from '../study/write-preset.js';
import type { Disk } from './disk.js';
import { privateFileMode } from './permissions.js';
import { problemOfError, refused, type Stored, storeProblem } from './problem-of-error.js';
import { createWhole } from './save-draft-preset.js';

/** Saves a study under a name that a person chose. It never overwrites: exit code 73 when the name is taken or the folder is not there. */
export async function saveNewPreset(disk: Disk, path: string, study: Study, fileMode = privateFileMode): Promise<Stored<string>> {
  const folder = dirname(path);
  const facts = await disk.facts(folder).catch(() => null);
  if (facts?.kind !== 'folder') {
    const message = `the folder ${cleanText(folder)} is not there: the preset ${cleanText(path)} was not written.`;
    return refused(storeProblem('folder-not-there', 73, path, message, 'Make the folder, or choose another place.'));
  }
  const created = await createWhole(disk, path, writePreset(study), fileMode);
  if (created === 'created') return { ok: true, value: path };
  return refused(created === 'taken' ? problemOfError({ code: 'EEXIST' }, 'create', 'the preset', path) : created);
}
