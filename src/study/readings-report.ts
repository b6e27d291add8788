import { type ClassKey, classKeys } from '../calc/classes.js';
import type { SessionRecord } from './record.js';
import { modelTimeError, predictionError } from './record-prediction.js';
import { ErrorCounts, type ErrorReport } from './record-report-prediction.js';

/** Series of records that do not say their class, or one this program does not know, are counted under this word. */
export const classNotSaid = 'not-said';
export type ReportedClass = ClassKey | typeof classNotSaid;

/** What was read of one class, against what was predicted. */
export interface ClassReadings {
  readonly class: ReportedClass;
  readonly time: ErrorReport | null;
  readonly b1rms: ErrorReport | null;
  readonly sar: ErrorReport | null;
  /** The model alone against the scan time: what the model error of a scanner file stands for. */
  readonly modelTime: ErrorReport | null;
  /** Of that the error that nine in ten do not pass. */
  readonly modelTimeNinthTenth: number | null;
}

/** What was read on one scanner. */
export interface ScannerReadings {
  /** Nickname; empty where none is named. */
  readonly scanner: string;
  /** In the order of the table of classes; those that were read. */
  readonly classes: readonly ClassReadings[];
}

export interface ReadingsReport {
  /** By name. */
  readonly scanners: readonly ScannerReadings[];
  /** Sessions of further scanners, not counted apart. */
  readonly leftOut: number;
}

/** Scanners that are counted apart, so that no file can fill the memory. */
const mostScanners = 200;

interface Counts {
  readonly time: ErrorCounts;
  readonly b1rms: ErrorCounts;
  readonly sar: ErrorCounts;
  readonly modelTime: ErrorCounts;
}

const known: ReadonlySet<string> = new Set(classKeys);

/** One scanner by its nickname, upper and lower case alike. */
export function plainScannerName(name: string): string {
  return name.trim().toLowerCase();
}

/**
 * Counts readings against predictions by scanner and class, record by record; memory does not grow with their number.
 *
 * @example const counts = new ReadingCounts(); counts.add(record); counts.report().scanners.length //=> 1
 */
export class ReadingCounts {
  private readonly scanners = new Map<string, { readonly name: string; readonly classes: Map<ReportedClass, Counts> }>();
  private leftOut = 0;

  add(record: SessionRecord): void {
    const read = record.series.filter(({ readings }) => readings.before !== null || readings.after !== null);
    if (read.length === 0) return;
    const key = plainScannerName(record.scanner);
    let scanner = this.scanners.get(key);
    if (scanner === undefined) {
      if (this.scanners.size >= mostScanners) {
        this.leftOut += 1;
        return;
      }
      scanner = { name: record.scanner.trim(), classes: new Map() };
      this.scanners.set(key, scanner);
    }
    for (const series of read) {
      const name = series.class !== undefined && known.has(series.class) ? (series.class as ClassKey) : classNotSaid;
      let counts = scanner.classes.get(name);
      if (counts === undefined) {
        counts = { time: new ErrorCounts(), b1rms: new ErrorCounts(), sar: new ErrorCounts(), modelTime: new ErrorCounts() };
        scanner.classes.set(name, counts);
      }
      const error = predictionError(series);
      counts.time.add(error.time, record.day);
      counts.b1rms.add(error.b1rms, record.day);
      counts.sar.add(error.sar, record.day);
      counts.modelTime.add(modelTimeError(series), record.day);
    }
  }

  report(): ReadingsReport {
    const scanners = [...this.scanners].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, { name, classes }]) => scannerReport(name, classes));
    return { scanners: scanners.filter(({ classes }) => classes.length > 0), leftOut: this.leftOut };
  }
}

function scannerReport(scanner: string, classes: ReadonlyMap<ReportedClass, Counts>): ScannerReadings {
  const reports = [...classKeys, classNotSaid].flatMap((key): ClassReadings[] => {
    const counts = classes.get(key as ReportedClass);
    if (counts === undefined) return [];
    const [time, b1rms, sar] = [counts.time.report(), counts.b1rms.report(), counts.sar.report()];
    const modelTime = counts.modelTime.report();
    if (time === null && b1rms === null && sar === null && modelTime === null) return [];
    return [{ class: key as ReportedClass, time, b1rms, sar, modelTime, modelTimeNinthTenth: counts.modelTime.ninthTenth() }];
  });
  return { scanner, classes: reports };
}
