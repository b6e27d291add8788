import { dirname } from 'node:path';
import { cleanText } from '../study/clean-text.js';
import type { Disk } from './disk.js';
import { problemOfError, refused, type Stored, storeProblem } from './problem-of-error.js';
import { createWhole } from './save-draft-preset.js';
import { writeWhole } from './write-whole.js';

const thing = 'the picture';

/** Saves a picture under a name that a person chose, whole or not at all. A name that is taken is refused (exit code 73) unless it is to be replaced. */
export async function savePicture(disk: Disk, path: string, bytes: Uint8Array, fileMode: number, replace: boolean): Promise<Stored<void>> {
  const folder = await disk.facts(dirname(path)).catch(() => null);
  if (folder?.kind !== 'folder') {
    const message = `the folder ${cleanText(dirname(path))} is not there: the picture ${cleanText(path)} was not written.`;
    return refused(storeProblem('folder-not-there', 73, path, message, 'Make the folder, or choose another place.'));
  }
  if (replace) {
    const there = await disk.facts(path).catch(() => null);
    if (there !== null && there.kind !== 'file') return refused(problemOfError({ code: 'EISDIR' }, 'create', thing, path));
    return writeWhole(disk, path, bytes, fileMode, thing);
  }
  const created = await createWhole(disk, path, bytes, fileMode, thing);
  if (created === 'created') return { ok: true, value: undefined };
  if (created !== 'taken') return refused(created);
  const problem = problemOfError({ code: 'EEXIST' }, 'create', thing, path);
  return refused({ ...problem, hint: 'Choose another name, or add --replace.' });
}
