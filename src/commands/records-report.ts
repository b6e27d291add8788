import { resolve } from 'node:path';
import { reportPage } from '../session/report-page.js';
import { saveDraftPreset } from '../store/save-draft-preset.js';
import { fileModeOf } from '../store/settings.js';
import { writeWhole } from '../store/write-whole.js';
import { cleanText } from '../study/clean-text.js';
import { filterWords } from '../study/record-report-filter.js';
import type { Suggested } from '../study/record-report-suggestion.js';
import { reportHtml } from '../study/report-html.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import type { ExitCode } from './exit-codes.js';
import { refusedByStore } from './load-preset.js';
import { type Page, pageOf } from './page.js';
import { type CountedRecords, countRecords } from './records-counted.js';

/**
 * `holdfast records report`: what the records say of each preset and series, as text, as JSON or as one HTML page. With
 * `--save-drafts` suggestions become draft presets of this user, and nothing else ever comes of them.
 */
export async function runRecordsReport(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  if (request.has('readings')) return (await import('./records-readings.js')).runRecordsReadings(request, io);
  const counted = await countRecords(request, io);
  if (!counted.ok) return complain(counted, io);
  const page = pageOf(request, io);
  const html = request.value('html');
  if (html !== undefined) {
    const written = await writeHtml(resolve(io.workingFolder, html), counted.value, io);
    if (!written.ok) return complain(written, io);
  }
  const saved = request.has('save-drafts') ? await saveDrafts(counted.value, io) : ({ ok: true, value: [] } as const);
  if (!saved.ok) return complain(saved, io);
  io.write(request.has('json') ? reportJson(counted.value) : page.plain(reportText(counted.value, page)));
  for (const line of saved.value) io.complain(`holdfast: ${line}\n`);
  return counted.value.read.exit;
}

async function writeHtml(path: string, counted: CountedRecords, io: CommandIo): Promise<Attempt<void>> {
  const { report, read, filter, now, settings } = counted;
  const current = new Map([...now].flatMap(([id, { study }]) => (study === null ? [] : [[id, study.revision] as const])));
  const suggestions = [...now.values()].flatMap((one) => one.suggestions);
  // Drawing is loaded where a page is written and nowhere else.
  const pictures = await (await import('./suggestion-pictures.js')).suggestionPictures(counted, io);
  const text = reportHtml(report, {
    chosen: filterWords(filter),
    damaged: read.damaged,
    files: read.files.length,
    current,
    suggestions,
    pictures,
  });
  const written = await writeWhole(io.disk, path, text, fileModeOf(settings.settings), 'the page');
  return written.ok ? written : refusedByStore(written.problems);
}

function reportText({ report, read, filter, now }: CountedRecords, page: Page): string {
  const { files, records, damaged } = read;
  return reportPage({ report, files: files.length, records, damaged, chosen: filterWords(filter), now }, page);
}

async function saveDrafts({ now, settings }: CountedRecords, io: CommandIo): Promise<Attempt<string[]>> {
  const lines: string[] = [];
  for (const { suggestions } of now.values()) {
    for (const suggested of suggestions) {
      if (suggested.kind === 'none') continue;
      const { study } = suggested.suggestion;
      const saved = await saveDraftPreset(io.disk, settings.folders.ownPresetsFolder, study, new Set(), fileModeOf(settings.settings));
      if (!saved.ok) return refusedByStore(saved.problems);
      lines.push(cleanText(`draft to review: ${saved.value.id}, ${saved.value.path}`));
    }
  }
  return { ok: true, value: lines };
}

function reportJson({ report, read, filter, now }: CountedRecords): string {
  const presets = report.presets.map((preset) => ({
    ...preset,
    currentRevision: now.get(preset.preset)?.study?.revision ?? null,
    suggestions: (now.get(preset.preset)?.suggestions ?? []).map(suggestionDocument),
  }));
  const { files, records, damaged } = read;
  return `${JSON.stringify({ filter, files, records, damaged, ...report, presets }, null, 2)}\n`;
}

function suggestionDocument(suggested: Suggested): object {
  if (suggested.kind === 'none') return { series: suggested.series, kind: 'none', why: suggested.why };
  const { series, rewrite, changed, before, after, mustKeeps, evidence } = suggested.suggestion;
  const kept = mustKeeps.map(({ status, text }) => ({ status, text }));
  return {
    series,
    kind: 'variant to review',
    set: rewrite.set,
    changed,
    times: rewrite.times,
    good: rewrite.good,
    before,
    after,
    mustKeeps: kept,
    evidence,
  };
}
