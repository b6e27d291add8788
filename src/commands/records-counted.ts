import { loadParser } from '../formulas/load-parser.js';
import { findPreset } from '../store/preset-folder.js';
import { readRules } from '../study/read-rules.js';
import { type PresetReport, RecordCounts, type RecordReport } from '../study/record-report.js';
import type { RecordFilter } from '../study/record-report-filter.js';
import { type Suggested, suggestVariant } from '../study/record-report-suggestion.js';
import type { Study } from '../study/study.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { type CommandSettings, commandSettings } from './command-settings.js';
import { readRecordFilter } from './read-record-filter.js';
import { forEachRecord, type RecordsRead, recordFiles } from './records-source.js';

/** The current revision of a preset that records name, and a suggestion for each of its series. */
export interface PresetNow {
  /** Null where no folder has it. */
  readonly study: Study | null;
  readonly suggestions: readonly Suggested[];
}

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
  for (const preset of report.presets) now.set(preset.preset, await presetNow(preset, settings.value, io));
  return { ok: true, value: { report, read, filter: filter.value, now, settings: settings.value } };
}

async function presetNow(preset: PresetReport, { presetFolders }: CommandSettings, io: CommandIo): Promise<PresetNow> {
  const found = await findPreset(io.disk, presetFolders, preset.preset, io.workingFolder);
  if (!found.ok || found.value.study.id !== preset.preset) return { study: null, suggestions: [] };
  const { study } = found.value;
  const hasRules = study.series.some(({ mustKeep }) => mustKeep.some(({ rule, when }) => rule !== undefined || when !== undefined));
  const all = study.series.flatMap(({ mustKeep }) => mustKeep);
  const rules = hasRules ? readRules(all, await loadParser()) : new Map();
  return { study, suggestions: preset.series.map((series) => suggestVariant(study, preset, series, rules)) };
}
