import { plainScanner } from '../calc/scanner.js';
import { adviceWords, type ReportedReadings, readingsPage, type ScannerAdvice } from '../session/readings-page.js';
import { worstError } from '../session/say-residual.js';
import { listScanners } from '../store/scanner-folder.js';
import { modelErrorAdvice } from '../study/model-error-advice.js';
import { type ClassReadings, plainScannerName, ReadingCounts } from '../study/readings-report.js';
import { filterWords } from '../study/record-report-filter.js';
import type { ErrorReport } from '../study/record-report-prediction.js';
import { fewestForRate } from '../study/record-report-share.js';
import { wrongUse } from './attempt.js';
import { foldersOfScanners } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import type { ExitCode } from './exit-codes.js';
import { pageOf } from './page.js';
import { readRecordFilter } from './read-record-filter.js';
import { forEachRecord, recordFiles } from './records-source.js';

/**
 * `holdfast records report --readings`: how far the scanner's numbers were from predictions, by scanner and class, whether that drifts,
 * and whether the model error of a scanner file should be looked at. Nothing is changed by it.
 */
export async function runRecordsReadings(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const other = ['html', 'save-drafts'].find((name) => request.has(name));
  if (other !== undefined) return complain(wrongUse(`--${other}`, `--readings has no --${other}.`, `Leave one of the two away.`), io);
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const filter = readRecordFilter(request);
  if (!filter.ok) return complain(filter, io);
  const files = await recordFiles(request.arguments, settings.value.folders.recordsFile, io);
  if (!files.ok) return complain(files, io);
  const counts = new ReadingCounts();
  const read = await forEachRecord(files.value, filter.value, io, { reader: request.has('reader') }, (record) => counts.add(record));
  const report = counts.report();
  const percents = await modelErrors(io);
  const advice = report.scanners.map((scanner): ScannerAdvice => {
    const own = percents.get(plainScannerName(scanner.scanner));
    return { ...modelErrorAdvice(scanner, own ?? plainScanner(1.5).modelErrorPercent), fromFile: own !== undefined };
  });
  const { records, wanted: sessions, damaged } = read;
  const reported = { report, sessions, records, files: read.files.length, damaged, chosen: filterWords(filter.value), advice };
  const page = pageOf(request, io);
  io.write(request.has('json') ? readingsJson({ ...reported, filter: filter.value }) : page.plain(readingsPage(reported, page)));
  return read.exit;
}

/** Model error by the name of the scanner, percent; of each name the file that is taken. */
async function modelErrors(io: CommandIo): Promise<ReadonlyMap<string, number>> {
  const { scanners } = await listScanners(io.disk, await foldersOfScanners(io));
  const percents = new Map<string, number>();
  for (const { file } of scanners) {
    const name = plainScannerName(file.name);
    if (!percents.has(name)) percents.set(name, file.modelErrorPercent ?? plainScanner(file.fieldT).modelErrorPercent);
  }
  return percents;
}

function readingsJson({
  report,
  advice,
  filter,
  files,
  records,
  sessions,
  damaged,
}: ReportedReadings & { readonly filter: object }): string {
  const scanners = report.scanners.map(({ scanner, classes }, at) => {
    const { fromFile, kind, percent, suggestedPercent, readings, because } = advice[at] as ScannerAdvice;
    const words = adviceWords(advice[at] as ScannerAdvice);
    return {
      scanner,
      classes: classes.map(classDocument),
      modelError: { kind, fromFile, percent, suggestedPercent, readings, because, words },
    };
  });
  return `${JSON.stringify({ filter, files, records, sessions, damaged, scanners, leftOut: report.leftOut }, null, 2)}\n`;
}

function classDocument({ class: name, time, modelTime, b1rms, sar }: ClassReadings): object {
  return {
    class: name,
    time: errorDocument(time),
    modelTime: errorDocument(modelTime),
    b1rms: errorDocument(b1rms),
    sar: errorDocument(sar),
  };
}

/** Ratios less one; of fewer than five no median and no quartiles. */
function errorDocument(error: ErrorReport | null): object | null {
  if (error === null) return null;
  const { spread, months, drift } = error;
  const enough = spread.count >= fewestForRate;
  return {
    readings: spread.count,
    median: enough ? spread.median : null,
    lowQuartile: enough ? spread.lowQuartile : null,
    highQuartile: enough ? spread.highQuartile : null,
    worst: worstError(spread),
    months: months.map(({ month, count, median }) => ({ month, readings: count, median: count >= fewestForRate ? median : null })),
    drift,
  };
}
