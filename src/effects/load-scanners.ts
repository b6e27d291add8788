import type { Message } from '../session/message.js';
import { listScanners, scannerFolders } from '../store/scanner-folder.js';
import { readSiteRulesFile } from '../store/site-rules-file.js';
import type { InterfaceWorld } from './interface-world.js';

/** Reads the scanner files that can be chosen, of each name the first, and says what is wrong with the others. */
export async function loadScanners(world: InterfaceWorld): Promise<Message> {
  const { disk, folders, shippedPresets } = world;
  const searched = scannerFolders(folders.siteScannersFolder, folders.settingsFolder, shippedPresets);
  const { scanners, problems } = await listScanners(disk, searched);
  const seen = new Set<string>();
  const first = scanners.filter(({ file: { name } }) => {
    const plain = name.trim().toLowerCase();
    if (seen.has(plain)) return false;
    seen.add(plain);
    return true;
  });
  return { kind: 'scanners', scanners: first.map(({ file }) => file), notes: problems.map(({ message }) => message) };
}

/** Reads what the site keeps in all its presets. A wrong file is told, and nothing of it is kept. */
export async function loadSiteRules(world: InterfaceWorld): Promise<Message> {
  const read = await readSiteRulesFile(world.disk, world.folders.siteRulesFile, world.folders.settingsFolder, world.parser);
  if (read.ok) return { kind: 'site-rules', siteRules: read.value };
  const [first, ...others] = read.problems;
  const more = others.length === 0 ? '' : ` (and ${others.length} more)`;
  return { kind: 'note', words: `The rules of the site are not checked: ${first?.message ?? 'their file is wrong'}${more}` };
}
