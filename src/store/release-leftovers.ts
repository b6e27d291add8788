import { join } from 'node:path';
import type { Disk } from './disk.js';

/** Older than this, a temporary file belongs to nobody who still writes. */
const abandonedMs = 3_600_000;

/** Hidden, so that nobody takes it for a preset. */
export function temporaryName(id: string, random: string): string {
  return `.${id}.${random}.revision`;
}

/**
 * Removes temporary files that a killed program left in the folder an hour ago or earlier. Times are those of the disk, so that
 * machines with different clocks may share it. Whatever goes wrong here is left for the next time.
 *
 * @param own A temporary file just written: its time is now.
 */
export async function removeLeftovers(disk: Disk, folder: string, own: string): Promise<void> {
  try {
    const now = (await disk.facts(own)).modifiedMs;
    for (const name of await disk.names(folder)) {
      if (!/^\..*\.[0-9a-f]{16}\.revision$/.test(name)) continue;
      const path = join(folder, name);
      if (now - (await disk.facts(path)).modifiedMs > abandonedMs) await disk.remove(path);
    }
  } catch {
    // Somebody else removed it, or may not be helped: a leftover harms nobody.
  }
}
