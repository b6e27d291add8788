import { resolve } from 'node:path';
import { savePicture } from '../store/save-picture.js';
import { fileModeOf } from '../store/settings.js';
import { cleanText } from '../study/clean-text.js';
import type { Attempt } from './attempt.js';
import { wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import { refusedByStore } from './load-preset.js';
import type { CountedRecords } from './records-counted.js';
import type { ChangeRequest } from './records-export.js';
import { suggestionSheet } from './suggestion-pictures.js';

/** Writes the picture that goes with a change request: what the change does, on one sheet with its caption. Never over a file that is there. */
export async function writeRequestPicture(
  name: string,
  { study, suggestion }: ChangeRequest,
  { settings }: CountedRecords,
  io: CommandIo,
): Promise<Attempt<void>> {
  if (!/\.png$/i.test(name)) {
    return wrongUse(
      '--picture',
      `--picture takes the name of a PNG file; "${cleanText(name, 60)}" was given.`,
      'Write --picture request.png.',
    );
  }
  const sheet = await suggestionSheet(study, suggestion, io);
  if (sheet === null) return { ok: true, value: undefined };
  const path = resolve(io.workingFolder, name);
  const saved = await savePicture(io.disk, path, sheet.bytes, fileModeOf(settings.settings), false);
  if (!saved.ok) return refusedByStore(saved.problems);
  io.complain(`holdfast: picture to go with the request: ${cleanText(path)}\n`);
  return { ok: true, value: undefined };
}
