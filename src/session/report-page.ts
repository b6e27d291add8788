import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { cleanText } from '../study/clean-text.js';
import { reasonWords } from '../study/record-reasons.js';
import { type PresetReport, type RecordReport, revisionWords } from '../study/record-report.js';
import type { ParameterChanges } from '../study/record-report-changes.js';
import type { Breach } from '../study/record-report-crossed.js';
import type { ErrorReport } from '../study/record-report-prediction.js';
import type { QualityCounts, SeriesReport } from '../study/record-report-series.js';
import { fewestForRate, shareWords } from '../study/record-report-share.js';
import type { PresetNow } from '../study/record-report-suggestion.js';
import type { CountedWord } from '../study/record-report-tally.js';
import { sayParameter } from './say-parameter.js';
import type { TextPage } from './text-page.js';
import { textTable } from './text-table.js';
import { wrapText } from './wrap-text.js';

/** Longest bar, in characters. */
const barLength = 24;
/** Lines of one plot, and names of one list; the rest is counted together. */
const mostRows = 8;

/** A report, and what it was made from. */
export interface ReportedRecords {
  readonly report: RecordReport;
  readonly files: number;
  /** Whole records read, wanted or not. */
  readonly records: number;
  readonly damaged: number;
  /** What was chosen among them, in words; empty for all. */
  readonly chosen: string;
  /** By the id of the preset. */
  readonly now: ReadonlyMap<string, PresetNow>;
}

/** The report as plain text, with small plots of `#`. */
export function reportPage({ report, files, records, damaged, chosen, now }: ReportedRecords, page: TextPage): string {
  const period = report.from === null ? 'no days recorded' : `${report.from} to ${report.to}`;
  const lines = [
    page.emphasis('heading', `${counted(report.sessions, 'session')} recorded, ${period}`),
    `${counted(files, 'file')}, ${counted(damaged, 'damaged line')} skipped${report.withoutDay === 0 ? '' : `, ${report.withoutDay} without a day`}`,
    ...(chosen === '' ? [] : wrapText(cleanText(`Chosen: ${chosen}; ${report.sessions} of ${records} records.`), page.width)),
    ...(report.leftOut.sessions === 0 ? [] : [`${report.leftOut.sessions} sessions of further presets are not counted apart.`]),
    ...report.presets.flatMap((preset) => ['', ...presetLines(preset, now.get(preset.preset), page)]),
    '',
    ...wrapText(
      `No rates from fewer than ${fewestForRate}. Quality is as seen at the console, no diagnosis. A suggestion is a variant to review, never a preset.`,
      page.width,
    ),
  ];
  return `${lines.join('\n')}\n`;
}

function presetLines(preset: PresetReport, now: PresetNow | undefined, page: TextPage): string[] {
  const revisions = revisionWords(preset.revisions, now?.study?.revision ?? null);
  const mixed = preset.revisions.length > 1 ? 'revisions mixed: ' : '';
  return [
    page.emphasis(
      'heading',
      cleanText(`Preset ${preset.preset}, ${preset.region}, ${preset.fieldT} T: ${counted(preset.sessions, 'session')}`),
    ),
    ...wrapText(`${mixed}${revisions}`, page.width),
    ...wrapText(cleanText(`roles: ${named(preset.roles, (word) => word || 'none given')}`), page.width),
    ...preset.series.flatMap((series) => ['', ...seriesLines(series, page), ...suggestionLines(series, now, page)]),
  ];
}

function seriesLines(series: SeriesReport, page: TextPage): string[] {
  const { recorded, run, rewritten, repeated, givenUp, quality, prediction } = series;
  return [
    page.emphasis('heading', cleanText(`Series ${series.series}: run ${run}, rewritten ${shareWords(rewritten, recorded)}`)),
    `repeated ${shareWords(repeated, recorded)}; given up ${shareWords(givenUp, recorded)}`,
    ...changeLines(series.parameters, page),
    ...plotLines(
      'reasons',
      series.reasons.map(({ word, count }) => [reasonWords(word), count]),
      page,
    ),
    ...(rewritten === 0 ? [] : [`quality when rewritten: ${qualityWords(quality.rewritten)}`]),
    `quality as planned: ${qualityWords(quality.asPlanned)}`,
    ...crossedLines(series, page),
    ...[
      errorLines('time', prediction.time, page),
      errorLines('B1+rms', prediction.b1rms, page),
      errorLines('SAR', prediction.sar, page),
    ].flat(),
  ];
}

function changeLines(parameters: readonly ParameterChanges[], page: TextPage): string[] {
  if (parameters.length === 0) return [];
  const columns = [
    { title: 'changed', align: 'left' },
    { title: 'times', align: 'right' },
    { title: 'up', align: 'right' },
    { title: 'down', align: 'right' },
    { title: 'by, median', align: 'point' },
    { title: 'quartiles', align: 'left' },
  ] as const;
  const rows = parameters.map(({ key, times, up, down, difference }) => {
    const enough = difference !== null && difference.count >= fewestForRate;
    const quartiles = enough ? `${signed(key, difference.lowQuartile)} to ${signed(key, difference.highQuartile)}` : 'too few';
    return [
      parameterRow(key).label,
      String(times),
      String(up),
      String(down),
      difference === null ? '-' : signed(key, difference.median),
      difference === null ? '-' : quartiles,
    ];
  });
  const plots = parameters.flatMap(({ key, used, words }) => [
    ...(used.length > 1
      ? plotLines(
          `${parameterRow(key).label} used`,
          used.map(({ value, count }) => [sayParameter(key, value), count]),
          page,
        )
      : []),
    ...plotLines(
      parameterRow(key).label,
      words.map(({ word, count }) => [word, count]),
      page,
    ),
  ]);
  return [...textTable(columns, rows, page.reader), ...plots];
}

/** `+1.00 mm`: a difference keeps its sign. */
function signed(key: ParameterKey, value: number): string {
  return `${value > 0 ? '+' : ''}${sayParameter(key, value)}`;
}

/** A bar for each row, in the order given; for a screen reader one sentence. */
function plotLines(title: string, rows: readonly (readonly [string, number])[], page: TextPage): string[] {
  if (rows.length === 0) return [];
  const shown = rows.slice(0, mostRows);
  const rest = rows.slice(mostRows).reduce((sum, [, count]) => sum + count, 0);
  const all = rest === 0 ? shown : [...shown, [`${rows.length - mostRows} others`, rest] as const];
  if (page.reader) return [cleanText(`${title}: ${all.map(([word, count]) => `${word} ${count}`).join(', ')}.`)];
  const most = Math.max(...all.map(([, count]) => count));
  const wide = Math.min(34, Math.max(...all.map(([word]) => cleanText(word, 34).length)));
  return [
    title,
    ...all.map(([word, count]) => {
      const bar = '#'.repeat(Math.max(1, Math.round((barLength * count) / most)));
      return `  ${cleanText(word, 34).padEnd(wide)} ${String(count).padStart(6)}  ${bar}`;
    }),
  ];
}

function crossedLines({ crossed }: SeriesReport, page: TextPage): string[] {
  const { times, withReason, withRole, breaches } = crossed;
  if (times === 0) return [];
  const head = `must-keeps crossed ${times}: ${withReason} with a reason, ${times - withReason} without; accepted by a role ${withRole}, by nobody ${times - withRole}`;
  return [
    ...wrapText(head, page.width),
    ...breaches.flatMap((breach) =>
      wrapText(cleanText(breachWords(breach)), page.width - 4).map((line, i) => `${i === 0 ? '  ' : '    '}${line}`),
    ),
    ...(times > breaches.length ? [`  and ${times - breaches.length} more`] : []),
  ];
}

function breachWords({ record, day, revision, rule, reason, role }: Breach): string {
  return `${record}, ${day ?? 'day left out'}, rev ${revision}: ${rule}; ${reasonWords(reason)}; ${role === null ? 'ACCEPTED BY NOBODY' : `accepted by ${role}`}`;
}

/** Error of a prediction, its months as a row of bars, and its drift. */
function errorLines(name: string, error: ErrorReport | null, page: TextPage): string[] {
  if (error === null) return [];
  const { spread, months, drift } = error;
  const few = spread.count < fewestForRate;
  const quartiles = few ? 'too few for quartiles' : `quartiles ${percent(spread.lowQuartile)} to ${percent(spread.highQuartile)}`;
  const moved = drift === null ? 'drift: too few' : `drift ${percent(drift.change)} from ${drift.from} to ${drift.to}`;
  const head = `${name} read against predicted: median ${percent(spread.median)} of ${spread.count}, ${quartiles}; ${moved}`;
  const last = months.filter(({ count }) => count >= fewestForRate).slice(-mostRows);
  const row = last.map(({ month, median }) => `${month} ${percent(median)}`).join(', ');
  return [
    ...wrapText(head, page.width),
    ...(last.length > 1 ? wrapText(`by month: ${row}`, page.width - 2).map((line) => `  ${line}`) : []),
  ];
}

function percent(value: number): string {
  return `${value > 0 ? '+' : ''}${(value * 100).toFixed(1)} %`;
}

function suggestionLines({ series }: SeriesReport, now: PresetNow | undefined, page: TextPage): string[] {
  if (now === undefined || now.study === null) return ['no suggestion: the preset is in no folder'];
  const suggested = now.suggestions.find((one) => (one.kind === 'none' ? one.series : one.suggestion.series) === series);
  if (suggested === undefined) return [];
  if (suggested.kind === 'none') return wrapText(cleanText(`no suggestion: ${suggested.why}`), page.width);
  return wrapText(cleanText(`VARIANT TO REVIEW. ${suggested.suggestion.evidence}`), page.width).map((line) => page.emphasis('close', line));
}

function qualityWords({ diagnostic, limited, not, notSaid }: QualityCounts): string {
  return `diagnostic ${diagnostic}, limited ${limited}, not diagnostic ${not}, not said ${notSaid}`;
}

function named(words: readonly CountedWord[], say: (word: string) => string): string {
  const shown = words.slice(0, mostRows).map(({ word, count }) => `${say(word)} ${count}`);
  return [...shown, ...(words.length > mostRows ? [`${words.length - mostRows} others`] : [])].join(', ');
}

function counted(count: number, thing: string): string {
  return `${count} ${thing}${count === 1 ? '' : 's'}`;
}
