import type { Answer, Effect, PresetChoice } from '../session/message.js';
import { allRevisions } from '../store/preset-revisions.js';
import { cleanText } from '../study/clean-text.js';
import type { InterfaceWorld } from './interface-world.js';

/** All revisions of a preset, in every folder that has it, each folder's newest first. Files that are wrong are told and stop nothing. */
export async function readRevisions(world: InterfaceWorld, { id }: Extract<Effect, { kind: 'read-revisions' }>): Promise<Answer> {
  const presets: PresetChoice[] = [];
  const notes: string[] = [];
  for (const { folder, origin, mustExist } of world.presetFolders) {
    const isThere = mustExist || (await world.disk.facts(folder).catch(() => null)) !== null;
    if (!isThere) continue;
    const { revisions, problems } = await allRevisions(world.disk, folder, id, origin);
    for (const { study, hash, path } of revisions) {
      const same = presets.find((each) => each.origin === origin && each.study.revision === study.revision);
      if (same === undefined) presets.push({ study, hash, origin });
      else if (same.hash !== hash)
        notes.push(`${cleanText(path)} says that it is revision ${study.revision} too, and holds something else.`);
    }
    notes.push(...problems.map(({ message }) => message));
  }
  return { kind: 'revisions', presets, notes };
}
