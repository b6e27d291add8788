import type { Message } from '../session/message.js';
import { currentRevisions, listPresets } from '../store/preset-folder.js';
import type { InterfaceWorld } from './interface-world.js';

/** Reads the presets that can be chosen, of each folder's the current revisions, and says what is wrong with the others. */
export async function loadPresets(world: InterfaceWorld): Promise<Message> {
  const { presets, problems } = await listPresets(world.disk, world.presetFolders);
  return {
    kind: 'presets',
    presets: currentRevisions(presets).map(({ study, hash, origin }) => ({ study, hash, origin })),
    notes: problems.map(({ message }) => message),
  };
}

/** Looks for sessions that were left unfinished. */
export async function loadDrafts(world: InterfaceWorld): Promise<readonly Message[]> {
  const { drafts, problems } = await world.drafts.unfinished();
  return [{ kind: 'drafts', drafts }, ...problems.map(({ message }): Message => ({ kind: 'note', words: message }))];
}
