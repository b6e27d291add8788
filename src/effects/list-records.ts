import type { Answer, Effect } from '../session/message.js';
import type { RecordRow } from '../session/shelf.js';
import { changedParameters } from '../study/record-changes.js';
import type { InterfaceWorld } from './interface-world.js';
import { readMeant } from './record-reading.js';

/** Records that a list holds: the newest. */
const mostRows = 2000;

/** Newest first; of one day, and without a day, the later in the files first. */
function newestFirst(rows: readonly (RecordRow & { readonly place: number })[]) {
  return [...rows].sort((a, b) => ((a.day ?? '') < (b.day ?? '') ? 1 : (a.day ?? '') > (b.day ?? '') ? -1 : b.place - a.place));
}

/** Lists the records that are meant by what was typed, newest first. Memory is bounded however many there are. */
export async function listRecords(
  world: InterfaceWorld,
  { ask, typed }: Extract<Effect, { kind: 'list-records' }>,
): Promise<Answer | null> {
  let rows: (RecordRow & { readonly place: number })[] = [];
  let place = 0;
  const counts = await readMeant(world, ask, typed, (record, named, file, line) => {
    const rewritten = record.series.filter((one) => changedParameters(one).length > 0).length;
    place += 1;
    rows.push({ ...named, file, line, place, id: record.id, revision: record.preset.revision, series: record.series.length, rewritten });
    if (rows.length >= 2 * mostRows) rows = newestFirst(rows).slice(0, mostRows);
  });
  if (counts === null) return null;
  return { kind: 'record-list', list: { ...counts, typed, rows: newestFirst(rows).slice(0, mostRows) } };
}
