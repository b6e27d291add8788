import { dirname, join } from 'node:path';
import type { Answer, Effect } from '../session/message.js';
import { makeFolder } from '../store/make-folder.js';
import { fileModeOf } from '../store/settings.js';
import { writeWhole } from '../store/write-whole.js';
import { cleanText } from '../study/clean-text.js';
import { recordPage } from '../study/record-print.js';
import type { InterfaceWorld } from './interface-world.js';

/** Writes the one-page printout beside the file of records. */
export async function savePage(world: InterfaceWorld, { record }: Extract<Effect, { kind: 'save-page' }>): Promise<Answer> {
  const { disk, folders, settings } = world;
  const id = world.newId();
  const folder = dirname(folders.recordsFile);
  const path = join(folder, `page-${id}.txt`);
  const made = await makeFolder(disk, folder, fileModeOf(settings), 'page');
  if (!made.ok) return { kind: 'failed', problems: made.problems };
  const page = recordPage({ ...record, id, day: settings.keepDay ? world.today() : null });
  const written = await writeWhole(disk, path, page, fileModeOf(settings), 'the page');
  return written.ok ? { kind: 'done', words: `Page written: ${cleanText(path)}` } : { kind: 'failed', problems: written.problems };
}
