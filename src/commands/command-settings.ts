import { type Folders, foldersOf } from '../store/folders.js';
import { type PresetFolder, presetFolders } from '../store/preset-folder.js';
import type { Settings } from '../store/settings.js';
import { readSettings } from '../store/settings-file.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { refusedByStore } from './load-preset.js';

/** What a command line, the environment and the settings say together. */
export interface CommandSettings {
  readonly settings: Settings;
  readonly folders: Folders;
  /** The folders that presets are looked for in, in their order. */
  readonly presetFolders: readonly PresetFolder[];
}

/** Reads the settings; options win over the environment, that over the settings. Wrong settings stop the command with exit code 78. */
export async function commandSettings(request: CommandRequest, io: CommandIo): Promise<Attempt<CommandSettings>> {
  const { environment, homeFolder, workingFolder } = io;
  const choices = {
    environment,
    homeFolder,
    workingFolder,
    flags: { presets: request.value('presets'), records: request.value('records') },
  };
  const read = await readSettings(io.disk, foldersOf(choices).settingsFolder);
  if (!read.ok) return refusedByStore(read.problems);
  if (read.value.notes.length > 0) complain(refusedByStore(read.value.notes), io);
  const { settings } = read.value;
  const folders = foldersOf({ ...choices, settings });
  const found = presetFolders(folders.sitePresetsFolder, folders.ownPresetsFolder, await io.shippedPresets());
  return { ok: true, value: { settings, folders, presetFolders: found } };
}
