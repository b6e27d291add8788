import type { Answer, Effect } from '../session/message.js';
import { listPresets } from '../store/preset-folder.js';
import { saveDraftPreset } from '../store/save-draft-preset.js';
import { fileModeOf } from '../store/settings.js';
import { cleanText } from '../study/clean-text.js';
import type { InterfaceWorld } from './interface-world.js';

/** Saves a study as a draft preset of this user; it never overwrites one. */
export async function savePreset(world: InterfaceWorld, { study }: Extract<Effect, { kind: 'save-preset' }>): Promise<Answer> {
  const { disk, folders, settings } = world;
  const others = await listPresets(disk, world.presetFolders);
  const taken = new Set(others.presets.map((preset) => preset.study.id));
  const saved = await saveDraftPreset(disk, folders.ownPresetsFolder, study, taken, fileModeOf(settings));
  if (!saved.ok) return { kind: 'failed', problems: saved.problems };
  return { kind: 'done', words: `Draft preset ${saved.value.id} saved in ${cleanText(saved.value.path)}` };
}
