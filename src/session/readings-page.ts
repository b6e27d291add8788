import { classRow } from '../calc/classes.js';
import { cleanText } from '../study/clean-text.js';
import type { ModelErrorAdvice } from '../study/model-error-advice.js';
import { classNotSaid, type ReadingsReport, type ReportedClass } from '../study/readings-report.js';
import type { ErrorReport } from '../study/record-report-prediction.js';
import { fewestForRate, smallCount } from '../study/record-report-share.js';
import { sayErrorPercent, worstError } from './say-residual.js';
import type { TextPage } from './text-page.js';
import { textTable } from './text-table.js';
import { wrapText } from './wrap-text.js';

/** The readings of records against predictions, and what they were read from. */
export interface ReportedReadings {
  readonly report: ReadingsReport;
  readonly sessions: number;
  readonly records: number;
  readonly files: number;
  readonly damaged: number;
  /** What was chosen among the records, in words; empty for all. */
  readonly chosen: string;
  /** Of each scanner of the report, in its order. */
  readonly advice: readonly ScannerAdvice[];
}

/** Whether a scanner's model error suits; `fromFile` is false where it has no file, so that the usual one holds. */
export interface ScannerAdvice extends ModelErrorAdvice {
  readonly fromFile: boolean;
}

/** The readings as plain text: by scanner and class, drift, and what is to be reviewed. */
export function readingsPage(reported: ReportedReadings, page: TextPage): string {
  const { report, sessions, records, files, damaged, chosen, advice } = reported;
  const lines = [
    page.emphasis('heading', 'Readings against predictions'),
    `${counted(sessions, 'session')}, ${counted(files, 'file')}, ${counted(damaged, 'damaged line')} skipped`,
    ...(chosen === '' ? [] : wrapText(cleanText(`Chosen: ${chosen}; ${sessions} of ${records} records.`), page.width)),
    ...(report.leftOut === 0 ? [] : [`${report.leftOut} sessions of further scanners are not counted apart.`]),
    ...(report.scanners.length === 0 ? ['', 'No record holds a reading that can be compared.'] : []),
    ...report.scanners.flatMap(({ scanner, classes }, at) => [
      '',
      page.emphasis('heading', cleanText(`Scanner ${scanner === '' ? 'not named' : scanner}`)),
      ...classes.flatMap((one) => [
        sayClass(one.class),
        ...textTable(
          columns,
          [
            errorRow('time', one.time),
            // Where nothing was read before, the prediction was the model alone: one row says both.
            isSame(one.time, one.modelTime) ? [] : errorRow('model alone', one.modelTime),
            errorRow('B1+rms', one.b1rms),
            errorRow('SAR', one.sar),
          ].flat(),
          page.reader,
        ),
      ]),
      ...adviceLines(advice[at], page),
    ]),
    '',
    ...wrapText(
      `Plus: the scanner read more than was predicted. No rates from fewer than ${fewestForRate}; fewer than ${smallCount} are a small count. Model alone: times against the model without a reading of the preset. Drift is from the first to the last month with ${fewestForRate} readings. RF figures are trends.`,
      page.width,
    ),
  ];
  return `${lines.join('\n')}\n`;
}

const columns = [
  { title: 'read', align: 'left' },
  { title: 'readings', align: 'right' },
  { title: 'median', align: 'point' },
  { title: 'quartiles', align: 'left' },
  { title: 'worst', align: 'point' },
  { title: 'drift', align: 'left' },
] as const;

function isSame(one: ErrorReport | null, other: ErrorReport | null): boolean {
  return JSON.stringify(one) === JSON.stringify(other);
}

function errorRow(name: string, error: ErrorReport | null): string[][] {
  if (error === null) return [];
  const { spread, drift } = error;
  const few = spread.count < fewestForRate;
  return [
    [
      name,
      `${spread.count}${!few && spread.count < smallCount ? ' small' : ''}`,
      few ? 'too few' : sayErrorPercent(spread.median),
      few ? '-' : `${sayErrorPercent(spread.lowQuartile)} to ${sayErrorPercent(spread.highQuartile)}`,
      sayErrorPercent(worstError(spread)),
      drift === null ? '-' : `${sayErrorPercent(drift.change)} since ${drift.from}`,
    ],
  ];
}

function sayClass(name: ReportedClass): string {
  return name === classNotSaid ? 'class not said' : classRow(name).label;
}

function adviceLines(advice: ScannerAdvice | undefined, page: TextPage): string[] {
  if (advice === undefined) return [];
  const { kind, because, suggestedPercent } = advice;
  const words = adviceWords(advice);
  const marked = kind === 'raise' || kind === 'lower';
  const text = marked && because !== null && suggestedPercent !== null ? `TO REVIEW. ${words}` : words;
  return wrapText(cleanText(text, 400), page.width).map((line) => (marked ? page.emphasis('close', line) : line));
}

/** What the readings say of the model error of a scanner, as a sentence. */
export function adviceWords({ kind, percent, suggestedPercent, readings, because, fromFile }: ScannerAdvice): string {
  const now = fromFile
    ? `model error ${percent} % in the scanner file`
    : `model error ${percent} %, the usual one, since no scanner file has this name`;
  if (because === null || suggestedPercent === null)
    return `${now}: nothing to say from ${counted(readings, 'time')} of the model alone, no class has ${fewestForRate}.`;
  const small = because.readings < smallCount ? ', small count' : '';
  const found = `nine in ten times of ${sayClass(because.class)} were within ${sayErrorPercent(because.ninthTenth)} of the model alone (${because.readings} readings${small})`;
  if (kind === 'raise') return `${now}: ${found}. ${suggestedPercent} % would cover them. Nothing was changed.`;
  if (kind === 'lower')
    return `${now}: ${found}, the most of all classes. ${suggestedPercent} % would still cover them. Nothing was changed.`;
  return `${now}: it suits; ${found}.`;
}

function counted(count: number, thing: string): string {
  return `${count} ${thing}${count === 1 ? '' : 's'}`;
}
