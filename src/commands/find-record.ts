import { cleanText } from '../study/clean-text.js';
import type { SessionRecord } from '../study/record.js';
import { allRecords } from '../study/record-report-filter.js';
import { type Attempt, refuse, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandSettings } from './command-settings.js';
import { exitCodes } from './exit-codes.js';
import { forEachRecord, recordFiles } from './records-source.js';

/** Records that are kept while looking: more than a person reads. */
const mostFound = 20;

/** Finds one record by its id or the beginning of it; several that fit are wrong use, none is no such input. */
export async function findRecord(
  wanted: string,
  named: readonly string[],
  { folders }: CommandSettings,
  reader: boolean,
  io: CommandIo,
): Promise<Attempt<SessionRecord>> {
  const files = await recordFiles(named, folders.recordsFile, io);
  if (!files.ok) return files;
  const found: SessionRecord[] = [];
  await forEachRecord(files.value, allRecords, io, { reader }, (record) => {
    if (record.id.startsWith(wanted) && found.length < mostFound) found.push(record);
    return record.id !== wanted;
  });
  const exact = found.filter(({ id }) => id === wanted);
  const [first, second] = exact.length > 0 ? exact : found;
  const shown = cleanText(wanted, 40);
  if (first === undefined) {
    const hint = 'holdfast records list shows the ids.';
    return refuse(exitCodes.noInput, { code: 'record-not-there', path: shown, message: `There is no record ${shown}.`, hint });
  }
  if (second !== undefined && second.id !== first.id) {
    return wrongUse(shown, `Several records begin with ${shown}: ${found.map(({ id }) => id).join(', ')}.`, 'Write more of the id.');
  }
  return { ok: true, value: first };
}
