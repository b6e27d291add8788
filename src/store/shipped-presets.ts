import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Disk } from './disk.js';

/**
 * The folder of the presets that ship with the program: `presets` in the nearest folder above the running module that also has the
 * program's package.json, whether the module is the bundle or a source file.
 *
 * @param moduleUrl `import.meta.url` of the caller's bundle.
 */
export async function shippedPresetsFolder(disk: Disk, moduleUrl: string = import.meta.url): Promise<string | null> {
  let folder = dirname(fileURLToPath(moduleUrl));
  for (;;) {
    const presets = join(folder, 'presets');
    if ((await kindOf(disk, presets)) === 'folder' && (await kindOf(disk, join(folder, 'package.json'))) === 'file') return presets;
    const above = dirname(folder);
    if (above === folder) return null;
    folder = above;
  }
}

async function kindOf(disk: Disk, path: string): Promise<string | null> {
  return disk.facts(path).then(
    ({ kind }) => kind,
    () => null,
  );
}
