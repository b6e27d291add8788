import { type ClassKey, classRow, figureNeeds } from '../calc/classes.js';
import { type FigureKey, figureKeys, figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { same } from '../calc/rounding.js';
import { classOf } from '../calc/series.js';
import { sayChange, sayFigure } from '../session/say-figure.js';
import { sayParameter } from '../session/say-parameter.js';
import type { SeriesResult } from '../session/series-result.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import type { Study } from '../study/study.js';
import { cautionLines } from './caution-lines.js';
import { closingWords } from './closing-words.js';
import type { Page } from './page.js';
import { seriesHeading, studyHeading } from './study-page.js';

/** One series in full as plain text: parameters and figures beside those of the preset, signals, must-keeps, cautions. */
export function seriesPage(study: Study, fieldT: number, result: SeriesResult, preset: SeriesResult, page: Page): string {
  return [
    ...studyHeading(study, fieldT, page),
    '',
    ...seriesHeading(result, page),
    '',
    ...parameterTableLines(result, page),
    '',
    ...figureLines(result, preset, page),
    '',
    ...signalLines(result, page),
    '',
    ...mustKeepLines(result, page),
    ...(result.cautions.length === 0 ? [] : [page.emphasis('heading', 'Cautions'), ...cautionLines(result.cautions, page), '']),
    ...wrapText(closingWords, page.width),
    '',
  ].join('\n');
}

/** Parameters that a class can leave out are shown only where they are there. */
function parameterTableLines({ series, parameters, carried }: SeriesResult, page: Page): string[] {
  const has = classRow(classOf(series)).parameters;
  const before = series.parameters;
  const keys = parameterKeys.filter((key) => has.includes(key) && (parameters[key] !== undefined || before[key] !== undefined));
  const followed: readonly ParameterKey[] = carried.map(({ key }) => key);
  const rows = keys.map((key) => {
    const now = cleanText(sayParameter(key, parameters[key]));
    const then = cleanText(sayParameter(key, before[key]));
    const note = followed.includes(key) ? 'carried' : now === then ? '' : 'set';
    return { key, cells: [parameterRow(key).label, now, now === then ? '' : then, note] as const };
  });
  const isLong = (key: ParameterKey) => parameterRow(key).kind === 'object';
  const columns = [
    { title: 'parameter', align: 'left' },
    { title: 'value', align: 'point' },
    { title: 'preset', align: 'point' },
    { title: '', align: 'left' },
  ] as const;
  // What holds several values is long: it stands on a line of its own.
  const long = rows
    .filter(({ key }) => isLong(key))
    .map(({ cells: [label, now, then] }) => `${label}: ${now}${then === '' ? '' : ` (preset: ${then})`}`);
  const short = rows.filter(({ key }) => !isLong(key)).map(({ cells }) => cells);
  return [...textTable(columns, short, page.reader), ...long.flatMap((line) => wrapText(line, page.width))];
}

function figureLines({ series, evaluation }: SeriesResult, preset: SeriesResult, page: Page): string[] {
  const { figures, fromReading } = evaluation;
  const before = preset.evaluation.figures;
  const known = figureKeys.filter((key) => figures[key] !== null);
  const rows = known.map((key) => {
    const now = sayFigure(key, figures[key]);
    const moved = before[key] !== null && !same(figures[key] as number, before[key]);
    return [
      figureTable[key].label,
      now,
      moved ? sayFigure(key, before[key]) : '',
      moved ? changeOf(key, figures[key], before[key]) : '',
      fromReading.includes(key) ? 'scanner reading' : '',
    ];
  });
  const columns = [
    { title: 'figure', align: 'left' },
    { title: 'value', align: 'point' },
    { title: 'preset', align: 'point' },
    { title: 'change', align: 'right' },
    { title: '', align: 'left' },
  ] as const;
  return [...textTable(columns, rows, page.reader), ...nullLines(figures, classOf(series), page)];
}

/** Figures without a value, by the reason. */
function nullLines(figures: SeriesResult['evaluation']['figures'], classKey: ClassKey, page: Page): string[] {
  const labels = new Map<string, string[]>();
  for (const key of figureKeys.filter((candidate) => figures[candidate] === null)) {
    const reason = reasonOfNull(key, classKey);
    labels.set(reason, [...(labels.get(reason) ?? []), figureTable[key].label]);
  }
  return [...labels].flatMap(([reason, names]) => wrapText(`No value for ${names.join(', ')}: ${reason}.`, page.width));
}

/** Ratios to the preset change by themselves; the others in percent of the preset's value. */
function changeOf(key: FigureKey, now: number | null, before: number | null): string {
  if (key === 'contrastRatioChange' || now === null || before === null || before === 0) return '';
  return sayChange(now / before - 1);
}

function reasonOfNull(key: FigureKey, classKey: ClassKey): string {
  const row = classRow(classKey);
  return row.figures.includes(key) ? (figureNeeds[key] ?? 'it cannot be computed with these values') : `none in ${row.label}`;
}

function signalLines({ evaluation, series }: SeriesResult, page: Page): string[] {
  const pair = evaluation.signals.filter(({ tissue }) => tissue === series.target || tissue === series.comparison);
  const columns = [
    { title: 'tissue', align: 'left' },
    { title: 'T1 ms', align: 'right' },
    { title: 'T2 ms', align: 'right' },
    { title: 'T2* ms', align: 'right' },
    { title: 'density', align: 'right' },
    { title: 'signal', align: 'right' },
    { title: '', align: 'left' },
  ] as const;
  const rows = pair.map(({ tissue, t1Ms, t2Ms, t2StarMs, protonDensity, signal }) => [
    tissue,
    t1Ms.toFixed(0),
    t2Ms.toFixed(0),
    t2StarMs.toFixed(0),
    protonDensity.toFixed(2),
    signal === null ? '-' : signal.toFixed(4),
    tissue === series.target ? 'target' : 'comparison',
  ]);
  return textTable(columns, rows, page.reader);
}

/** Must-keeps that are kept; those that are crossed stand among the cautions. */
function mustKeepLines({ mustKeeps }: SeriesResult, page: Page): string[] {
  const kept = mustKeeps.filter(({ status }) => status === 'kept');
  if (kept.length === 0) return [];
  const lines = kept.flatMap(({ text }) =>
    wrapText(cleanText(text), page.width - 4).map((line, i) => (i === 0 ? `  ${line}` : `    ${line}`)),
  );
  return [page.emphasis('heading', 'Kept'), ...lines, ''];
}
