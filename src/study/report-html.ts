import { parameterRow } from '../calc/parameters.js';
import { parameterWords } from './record-changes.js';
import { reasonWords } from './record-reasons.js';
import { type PresetReport, type RecordReport, revisionWords } from './record-report.js';
import type { ParameterChanges } from './record-report-changes.js';
import type { ErrorReport } from './record-report-prediction.js';
import type { QualityCounts, SeriesReport } from './record-report-series.js';
import { fewestForRate, shareWords } from './record-report-share.js';
import type { Suggested } from './record-report-suggestion.js';
import { barPlot, escapeHtml, monthPlot } from './report-html-plots.js';
import { reportStyle } from './report-html-style.js';

/** What stands around the counts. */
export interface ReportSurroundings {
  /** The filter in words; empty for all records. */
  readonly chosen: string;
  readonly damaged: number;
  readonly files: number;
  /** Current revision by preset. */
  readonly current: ReadonlyMap<string, number>;
  readonly suggestions: readonly Suggested[];
  /** Pictures of suggested variants, by `pictureOfVariant`. */
  readonly pictures?: ReadonlyMap<string, ReportPicture>;
}

/** A picture inside the page: a PNG, and what it shows. */
export interface ReportPicture {
  readonly pngBase64: string;
  readonly caption: string;
}

/** Name of the picture of a series' variant. */
export function pictureOfVariant(preset: string, series: string): string {
  return `${preset} ${series}`;
}

/** Rows of one plot; what is beyond is counted together. */
const mostRows = 12;

/**
 * The report as one HTML page that needs nothing else: plots are drawings inside it, there is no script and no address. It reads at
 * 800 pixels and prints on A4.
 */
export function reportHtml(report: RecordReport, surroundings: ReportSurroundings): string {
  const { chosen, damaged, files } = surroundings;
  const period = report.from === null ? 'no days recorded' : `${report.from} to ${report.to}`;
  const facts = [
    `${report.sessions} sessions recorded, ${period}`,
    `${files} ${files === 1 ? 'file' : 'files'}, ${damaged} damaged ${damaged === 1 ? 'line' : 'lines'} skipped`,
    ...(chosen === '' ? [] : [`Chosen: ${chosen}`]),
    `No rates from fewer than ${fewestForRate}. Quality is as seen at the console, no diagnosis. A suggestion is a variant to review, never a preset.`,
    'RF figures are trends. Figures come from published population values, not from one patient. People decide.',
  ];
  return [
    '<!doctype html>',
    '<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">',
    // Without an icon of its own, a browser would ask a server for one.
    `<link rel="icon" href="data:,"><title>Records of rewritten presets</title><style>${reportStyle}</style></head><body><main>`,
    '<h1>Records of rewritten presets</h1>',
    ...facts.map((fact) => paragraph(fact)),
    ...report.presets.map((preset) => presetHtml(preset, surroundings)),
    '</main></body></html>',
    '',
  ].join('\n');
}

function presetHtml(preset: PresetReport, { current, suggestions, pictures }: ReportSurroundings): string {
  const mixed = preset.revisions.length > 1 ? 'Revisions mixed: ' : 'Revision: ';
  return [
    '<section class="preset">',
    `<h2>${escapeHtml(preset.preset)} <small>${escapeHtml(`${preset.region}, ${preset.fieldT} T, ${preset.sessions} sessions`)}</small></h2>`,
    paragraph(`${mixed}${revisionWords(preset.revisions, current.get(preset.preset) ?? null)}`),
    barPlot(
      'How often rewritten',
      preset.series.map(({ series, rewritten }) => ({ label: series, value: rewritten })),
    ),
    ...preset.series.map((series) =>
      seriesHtml(series, suggestionFor(series, preset, suggestions), pictures?.get(pictureOfVariant(preset.preset, series.series))),
    ),
    '</section>',
  ].join('\n');
}

/** Series of two presets may share an id: suggestions are looked up by both. */
function suggestionFor({ series }: SeriesReport, { preset }: PresetReport, suggestions: readonly Suggested[]): string | null {
  for (const one of suggestions) {
    if (one.kind === 'variant' && one.suggestion.preset === preset && one.suggestion.series === series) return one.suggestion.evidence;
  }
  return null;
}

function seriesHtml(series: SeriesReport, suggestion: string | null, picture: ReportPicture | undefined): string {
  const { recorded, run, rewritten, repeated, givenUp, quality, prediction } = series;
  return [
    `<section class="series"><h3>${escapeHtml(series.series)}</h3>`,
    paragraph(
      `Run ${run}; rewritten ${shareWords(rewritten, recorded)}; repeated ${shareWords(repeated, recorded)}; given up ${shareWords(givenUp, recorded)}.`,
    ),
    ...(suggestion === null ? [] : [`<p class="variant"><strong>Variant to review.</strong> ${escapeHtml(suggestion)}</p>`]),
    ...(suggestion === null || picture === undefined ? [] : [pictureHtml(picture)]),
    '<div class="plots">',
    barPlot('Reasons', rows(series.reasons.map(({ word, count }) => ({ label: reasonWords(word), value: count })))),
    ...series.parameters.flatMap(parameterPlots),
    ...(rewritten === 0 ? [] : [barPlot('Quality when rewritten', qualityRows(quality.rewritten))]),
    barPlot('Quality as planned', qualityRows(quality.asPlanned)),
    errorPlot('Time read against predicted', prediction.time),
    errorPlot('B1+rms read against predicted', prediction.b1rms),
    errorPlot('SAR read against predicted', prediction.sar),
    '</div>',
    changeTable(series.parameters),
    crossedHtml(series),
    '</section>',
  ].join('\n');
}

/** A picture with its caption; the bytes stand in the page itself. */
function pictureHtml({ pngBase64, caption }: ReportPicture): string {
  const words = escapeHtml(caption);
  return `<figure class="sheet"><img alt="${words}" src="data:image/png;base64,${pngBase64.replace(/[^A-Za-z0-9+/=]/g, '')}"><figcaption>${words}</figcaption></figure>`;
}

interface Row {
  readonly label: string;
  readonly value: number;
}

function rows(all: readonly Row[]): readonly Row[] {
  if (all.length <= mostRows) return all;
  const rest = all.slice(mostRows).reduce((sum, { value }) => sum + value, 0);
  return [...all.slice(0, mostRows), { label: `${all.length - mostRows} others`, value: rest }];
}

function qualityRows({ diagnostic, limited, not, notSaid }: QualityCounts): Row[] {
  return [
    { label: 'diagnostic', value: diagnostic },
    { label: 'limited', value: limited },
    { label: 'not diagnostic', value: not },
    { label: 'not said', value: notSaid },
  ];
}

function parameterPlots({ key, used, words }: ParameterChanges): string[] {
  const { label } = parameterRow(key);
  const values = rows(used.map(({ value, count }) => ({ label: parameterWords(key, value), value: count })));
  return [
    ...(values.length === 0 ? [] : [barPlot(`${label}, used instead`, values)]),
    ...(words.length === 0 ? [] : [barPlot(`${label}, changed`, rows(words.map(({ word, count }) => ({ label: word, value: count }))))]),
  ];
}

function changeTable(parameters: readonly ParameterChanges[]): string {
  if (parameters.length === 0) return '';
  const body = parameters.map(({ key, times, up, down, difference }) => {
    const words = (value: number) => `${value > 0 ? '+' : ''}${parameterWords(key, value)}`;
    const quartiles =
      difference === null
        ? ''
        : difference.count < fewestForRate
          ? 'too few'
          : `${words(difference.lowQuartile)} to ${words(difference.highQuartile)}`;
    const cells = [parameterRow(key).label, times, up, down, difference === null ? '' : words(difference.median), quartiles];
    return `<tr>${cells.map((cell) => `<td>${escapeHtml(String(cell))}</td>`).join('')}</tr>`;
  });
  const head = ['changed', 'times', 'up', 'down', 'by, median', 'quartiles'].map((title) => `<th>${title}</th>`).join('');
  return `<table><thead><tr>${head}</tr></thead><tbody>${body.join('')}</tbody></table>`;
}

function crossedHtml({ crossed }: SeriesReport): string {
  const { times, withReason, withRole, breaches } = crossed;
  if (times === 0) return '';
  const items = breaches.map(({ record, day, revision, rule, reason, role }) => {
    const words = `${record}, ${day ?? 'day left out'}, rev ${revision}: ${rule}; ${reasonWords(reason)}; ${role === null ? 'ACCEPTED BY NOBODY' : `accepted by ${role}`}`;
    return `<li>${escapeHtml(words)}</li>`;
  });
  const more = times > breaches.length ? paragraph(`and ${times - breaches.length} more`) : '';
  const head = `Must-keeps crossed ${times}: ${withReason} with a reason, ${times - withReason} without; accepted by a role ${withRole}, by nobody ${times - withRole}.`;
  return `${paragraph(head)}<ul>${items.join('')}</ul>${more}`;
}

function errorPlot(title: string, error: ErrorReport | null): string {
  if (error === null) return '';
  const months = error.months.filter(({ count }) => count >= fewestForRate).map(({ month, median }) => ({ label: month, value: median }));
  const drift =
    error.drift === null ? 'drift: too few' : `drift ${percent(error.drift.change)} from ${error.drift.from} to ${error.drift.to}`;
  const words = `median ${percent(error.spread.median)} of ${error.spread.count}; ${drift}`;
  return monthPlot(title, words, months);
}

function percent(value: number): string {
  return `${value > 0 ? '+' : ''}${(value * 100).toFixed(1)} %`;
}

function paragraph(text: string): string {
  return `<p>${escapeHtml(text)}</p>`;
}
