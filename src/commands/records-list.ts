import { cleanText } from '../study/clean-text.js';
import type { SessionRecord } from '../study/record.js';
import { changedParameters } from '../study/record-changes.js';
import { reasonWords } from '../study/record-reasons.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import type { ExitCode } from './exit-codes.js';
import { pageOf } from './page.js';
import { readRecordFilter } from './read-record-filter.js';
import { forEachRecord, recordFiles } from './records-source.js';

/** `holdfast records list`: one line a session, as they are read. Widths are fixed: nothing waits for the last record. */
export async function runRecordsList(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const filter = readRecordFilter(request);
  if (!filter.ok) return complain(filter, io);
  const files = await recordFiles(request.arguments, settings.value.folders.recordsFile, io);
  if (!files.ok) return complain(files, io);
  const page = pageOf(request, io);
  const asJson = request.has('json');
  let count = 0;
  if (asJson) io.write('[');
  else if (!page.reader) io.write(`${line(['record', 'day', 'preset', 'rev', 'rewritten', 'reasons'])}\n`);
  const read = await forEachRecord(files.value, filter.value, io, { reader: page.reader, rows: true }, (record) => {
    const row = rowOf(record);
    if (asJson) io.write(`${count === 0 ? '' : ','}\n  ${JSON.stringify(row)}`);
    else io.write(page.plain(`${page.reader ? sentence(row) : line(cells(row))}\n`));
    count += 1;
  });
  if (asJson) io.write(`${count === 0 ? '' : '\n'}]\n`);
  return read.exit;
}

/** What a list says of a session. */
function rowOf({ id, day, preset, region, role, series, reasons }: SessionRecord) {
  const rewritten = series.filter((one) => changedParameters(one).length > 0).length;
  const given = [...new Set([...reasons, ...series.map(({ reason }) => reason)].filter((reason) => reason.trim() !== ''))];
  return { id, day, preset: preset.id, revision: preset.revision, region, role, series: series.length, rewritten, reasons: given };
}

type Row = ReturnType<typeof rowOf>;

function cells({ id, day, preset, revision, series, rewritten, reasons }: Row): string[] {
  return [id, day ?? '-', preset, String(revision), `${rewritten} of ${series}`, reasons.map(reasonWords).join(', ')];
}

const widths = [16, 10, 18, 3, 9];

function line(words: readonly string[]): string {
  const padded = words.map((word, i) => (i === 3 ? cleanText(word).padStart(widths[i] ?? 0) : cleanText(word).padEnd(widths[i] ?? 0)));
  return padded.join('  ').trimEnd();
}

function sentence(row: Row): string {
  const [id, day, preset, revision, rewritten, reasons] = cells(row).map((word) => cleanText(word));
  return `Record ${id}: day ${day}; preset ${preset}; revision ${revision}; rewritten ${rewritten}${reasons === '' ? '' : `; reasons ${reasons}`}.`;
}
