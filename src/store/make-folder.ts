import type { Disk } from './disk.js';
import { folderModeOf } from './permissions.js';
import { problemOfError, refused, type Stored } from './problem-of-error.js';

/** Makes a folder of ours with the mode that fits its files; a folder that is there keeps the mode it has. */
export async function makeFolder(disk: Disk, folder: string, fileMode: number, thing: string): Promise<Stored<void>> {
  const mode = folderModeOf(fileMode);
  try {
    // The process's own mask may have taken bits away that the site's settings grant.
    if (await disk.makeFolder(folder, mode)) await disk.setMode(folder, mode);
    return { ok: true, value: undefined };
  } catch (error) {
    return refused(problemOfError(error, 'create', `the folder of the ${thing}`, folder));
  }
}
