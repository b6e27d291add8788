import type { Answer, Effect, PresetChoice } from '../session/message.js';
import { allRevisions } from '../store/preset-revisions.js';
import type { InterfaceWorld } from './interface-world.js';

/** All revisions of a preset, in every folder that has it, each folder's newest first. Files that are wrong are told and stop nothing. */
export async function readRevisions(world: InterfaceWorld, { id }: Extract<Effect, { kind: 'read-revisions' }>): Promise<Answer> {
  const presets: PresetChoice[] = [];
  const notes: string[] = [];
  for (const { folder, origin, mustExist } of world.presetFolders) {
    const isThere = mustExist || (await world.disk.facts(folder).catch(() => null)) !== null;
    if (!isThere) continue;
    const { revisions, problems } = await allRevisions(world.disk, folder, id, origin);
    presets.push(...revisions.map(({ study, hash }) => ({ study, hash, origin })));
    notes.push(...problems.map(({ message }) => message));
  }
  return { kind: 'revisions', presets, notes };
}
