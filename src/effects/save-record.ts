import type { Answer, Effect } from '../session/message.js';
import { appendRecord } from '../store/record-file.js';
import { fileModeOf } from '../store/settings.js';
import { cleanText } from '../study/clean-text.js';
import type { InterfaceWorld } from './interface-world.js';

/** Ids of records whose saving failed: the same record keeps its id when it is tried again. */
const tried = new WeakMap<InterfaceWorld, string>();

/** Appends the record to the file of records, with an id and the day. */
export async function saveRecord(world: InterfaceWorld, { record, again }: Extract<Effect, { kind: 'save-record' }>): Promise<Answer> {
  const { disk, folders, settings } = world;
  const id = (again ? tried.get(world) : undefined) ?? world.newId();
  const saved = await appendRecord(
    disk,
    folders.recordsFile,
    { ...record, id, day: settings.keepDay ? world.today() : null },
    { fileMode: fileModeOf(settings), again },
  );
  if (!saved.ok) {
    tried.set(world, id);
    return { kind: 'failed', problems: saved.problems };
  }
  tried.delete(world);
  return { kind: 'done', words: `Record ${id} saved in ${cleanText(folders.recordsFile)}` };
}
