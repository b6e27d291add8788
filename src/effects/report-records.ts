import type { Answer, Effect } from '../session/message.js';
import { presetNow } from '../store/preset-now.js';
import { RecordCounts } from '../study/record-report.js';
import type { PresetNow } from '../study/record-report-suggestion.js';
import type { InterfaceWorld } from './interface-world.js';
import { ownRecordFiles, readMeant } from './record-reading.js';

/** The report over the records that are meant by what was typed. */
export async function reportRecords(
  world: InterfaceWorld,
  { ask, typed }: Extract<Effect, { kind: 'report-records' }>,
): Promise<Answer | null> {
  const counts = new RecordCounts();
  const read = await readMeant(world, ask, typed, (record) => counts.add(record));
  if (read === null) return null;
  const report = counts.report();
  const now = new Map<string, PresetNow>();
  for (const preset of report.presets) now.set(preset.preset, await presetNow(world.disk, world.presetFolders, preset, world.parser));
  const files = (await ownRecordFiles(world)).length;
  const shown = { report, files, records: read.records, damaged: read.damaged, chosen: typed.trim(), now };
  return { kind: 'record-report', report: { ...read, shown } };
}
