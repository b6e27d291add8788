import { changeRequest } from '../study/change-request.js';
import { recordLine } from '../study/record-line.js';
import type { Suggestion } from '../study/record-report-suggestion.js';
import { recordsCsvHead, recordsCsvRows } from '../study/records-csv.js';
import type { Study } from '../study/study.js';
import { type Attempt, refuse, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { pageOf } from './page.js';
import { readRecordFilter } from './read-record-filter.js';
import { type CountedRecords, countRecords } from './records-counted.js';
import { forEachRecord, recordFiles } from './records-source.js';

const forms = ['csv', 'lines', 'change-request'] as const;

/** `holdfast records export`: records as a table, as lines, or what they ask for as a page for a committee. */
export async function runRecordsExport(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const asked = forms.filter((form) => request.has(form));
  const [form, second] = asked;
  if (form === undefined || second !== undefined) {
    const given = second === undefined ? 'None' : asked.map((one) => `--${one}`).join(' and ');
    return complain(wrongUse('--csv', `${given} was given.`, 'Write one of --csv, --lines, --change-request.'), io);
  }
  if (form === 'change-request') return exportRequest(request, io);
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const filter = readRecordFilter(request);
  if (!filter.ok) return complain(filter, io);
  const files = await recordFiles(request.arguments, settings.value.folders.recordsFile, io);
  if (!files.ok) return complain(files, io);
  if (form === 'csv') io.write(recordsCsvHead);
  const read = await forEachRecord(files.value, filter.value, io, { reader: request.has('reader'), rows: true }, (record) => {
    io.write(form === 'csv' ? recordsCsvRows(record) : `${recordLine(record)}\n`);
  });
  return read.exit;
}

async function exportRequest(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  if (request.value('preset') === undefined) {
    return complain(wrongUse('--preset', 'A change request is about one preset: --preset is missing.', 'Write --preset liver-3t.'), io);
  }
  const counted = await countRecords(request, io);
  if (!counted.ok) return complain(counted, io);
  const asked = requestText(counted.value, request.value('series'));
  if (!asked.ok) return complain(asked, io);
  const picture = request.value('picture');
  if (picture !== undefined) {
    const written = await (await import('./request-picture.js')).writeRequestPicture(picture, asked.value, counted.value, io);
    if (!written.ok) return complain(written, io);
  }
  io.write(pageOf(request, io).plain(asked.value.text));
  return counted.value.read.exit;
}

/** What is asked of the committee, and the page that asks it. */
export interface ChangeRequest {
  readonly text: string;
  readonly study: Study;
  readonly suggestion: Suggestion;
}

/** The page of the series that was asked for, else of the first that has a suggestion. */
function requestText({ report, now }: CountedRecords, wanted: string | undefined): Attempt<ChangeRequest> {
  const preset = report.presets[0];
  const current = preset === undefined ? undefined : now.get(preset.preset);
  if (preset === undefined || current === undefined) return nothing('no record of this preset was found');
  if (current.study === null) return nothing(`preset ${preset.preset} is in no folder`);
  const names = preset.series.map(({ series }) => series);
  if (wanted !== undefined && !names.includes(wanted)) {
    return wrongUse('--series', `The records of ${preset.preset} have no series "${wanted.slice(0, 60)}".`, `Known: ${names.join(', ')}.`);
  }
  const whys: string[] = [];
  for (const suggested of current.suggestions) {
    const series = suggested.kind === 'none' ? suggested.series : suggested.suggestion.series;
    if (wanted !== undefined && series !== wanted) continue;
    if (suggested.kind === 'none') {
      whys.push(`${series}: ${suggested.why}`);
      continue;
    }
    const counts = preset.series.find((one) => one.series === series);
    if (counts === undefined) continue;
    const { study } = current;
    return {
      ok: true,
      value: { text: changeRequest(study, preset, counts, suggested.suggestion), study, suggestion: suggested.suggestion },
    };
  }
  return nothing(whys.join('; '));
}

function nothing(why: string): Attempt<never> {
  const hint = 'holdfast records report says what was changed.';
  return refuse(exitCodes.failed, { code: 'nothing-to-request', path: '', message: `There is nothing to request: ${why}.`, hint });
}
