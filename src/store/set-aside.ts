import type { Disk } from './disk.js';
import { problemOfError, refused, type Stored } from './problem-of-error.js';

/**
 * Moves a damaged file out of the way, to the first free name `PATH.damaged-N`, and gives that name: nothing a person wrote is
 * thrown away. Null when somebody else has moved it already.
 */
export async function setAside(disk: Disk, path: string, thing: string): Promise<Stored<string | null>> {
  try {
    const aside = await reservedName(disk, path);
    try {
      await disk.rename(path, aside);
      return { ok: true, value: aside };
    } catch (error) {
      await disk.remove(aside).catch(() => {});
      if ((error as { code?: string }).code === 'ENOENT') return { ok: true, value: null };
      throw error;
    }
  } catch (error) {
    return refused(problemOfError(error, 'create', thing, path));
  }
}

/** An empty file of that name is made first, so that two programs never choose the same one. */
async function reservedName(disk: Disk, path: string): Promise<string> {
  for (let number = 1; ; number += 1) {
    const name = `${path}.damaged-${number}`;
    try {
      await (await disk.open(name, 'new')).close();
      return name;
    } catch (error) {
      if ((error as { code?: string }).code !== 'EEXIST') throw error;
    }
  }
}
