import { loadParser } from '../formulas/load-parser.js';
import { presetNow } from '../store/preset-now.js';
import { RecordCounts, type RecordReport } from '../study/record-report.js';
import type { RecordFilter } from '../study/record-report-filter.js';
import type { PresetNow } from '../study/record-report-suggestion.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { type CommandSettings, commandSettings } from './command-settings.js';
import { readRecordFilter } from './read-record-filter.js';
import { forEachRecord, type RecordsRead, recordFiles } from './records-source.js';

/** Records counted, with what the presets are now. */
export interface CountedRecords {
  readonly report: RecordReport;
  readonly read: RecordsRead;
  readonly filter: RecordFilter;
  /** By the id of the preset. */
  readonly now: ReadonlyMap<string, PresetNow>;
  readonly settings: CommandSettings;
}

/** Reads and counts the records of a command line, then looks the presets up. */
export async function countRecords(request: CommandRequest, io: CommandIo): Promise<Attempt<CountedRecords>> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return settings;
  const filter = readRecordFilter(request);
  if (!filter.ok) return filter;
  const files = await recordFiles(request.arguments, settings.value.folders.recordsFile, io);
  if (!files.ok) return files;
  const counts = new RecordCounts();
  const read = await forEachRecord(files.value, filter.value, io, { reader: request.has('reader') }, (record) => counts.add(record));
  const report = counts.report();
  const now = new Map<string, PresetNow>();
  for (const preset of report.presets) now.set(preset.preset, await presetNow(io.disk, settings.value.presetFolders, preset, loadParser));
  return { ok: true, value: { report, read, filter: filter.value, now, settings: settings.value } };
}
