import { worstFirst } from '../calc/caution.js';
import { classRow } from '../calc/classes.js';
import { figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import { classOf } from '../calc/series.js';
import type { SeriesCarry } from '../search/carry.js';
import type { StudyCarry } from '../search/carry-study.js';
import { aimWords } from '../session/carry.js';
import { carryFigures } from '../session/carry-rows.js';
import { sayFigure } from '../session/say-figure.js';
import { sayParameter } from '../session/say-parameter.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import { mustKeepCautions } from '../study/must-keep.js';
import { cautionLines } from './caution-lines.js';
import { closingWords } from './closing-words.js';
import type { Page } from './page.js';

/** A carried study as plain text: side by side, and why. */
export function carryPage(
  carried: StudyCarry,
  scanner: string | null,
  draft: { readonly id: string; readonly path: string } | null,
  page: Page,
): string {
  const { study, from, to, aim, series, gaps } = carried;
  const where =
    scanner === null ? `${to.fieldT} T` : `${to.fieldT} T, scanner ${scanner}${to.coil === null ? '' : `, coil ${to.coil.name}`}`;
  return [
    ...wrapText(cleanText(`${study.title}: preset ${study.id}, revision ${study.revision}`), page.width).map((line) =>
      page.emphasis('heading', line),
    ),
    ...wrapText(
      cleanText(`From ${from.fieldT} T to ${where}, equal ${aimWords[aim]}. A proposal: a person reviews and releases it.`),
      page.width,
    ),
    ...series.flatMap((one) => ['', ...seriesLines(one, page)]),
    '',
    page.emphasis('heading', 'Not carried'),
    ...gaps.flatMap(({ what, why }) => listed(`${what}: ${why}`, page)),
    ...(draft === null ? [] : ['', ...wrapText(cleanText(`Draft ${draft.id} written to ${draft.path}.`), page.width)]),
    '',
    ...wrapText(closingWords, page.width),
    '',
  ].join('\n');
}

function listed(text: string, page: Page): string[] {
  return wrapText(cleanText(text), page.width - 4).map((line, i) => (i === 0 ? `  ${line}` : `    ${line}`));
}

function seriesLines(one: SeriesCarry, page: Page): string[] {
  const { series, values, evaluation, before, mustKeeps, gaps, extrapolated } = one;
  const columns = [
    { title: '', align: 'left' },
    { title: 'preset', align: 'point' },
    { title: 'carried', align: 'point' },
  ] as const;
  const isLong = (key: (typeof values)[number]['key']) => parameterRow(key).kind === 'object';
  const parameters = values
    .filter(({ key }) => !isLong(key))
    .map(({ key, from, to }) => [parameterRow(key).label, cleanText(sayParameter(key, from)), cleanText(sayParameter(key, to))]);
  const figures = carryFigures
    .filter((key) => before.figures[key] !== null || evaluation.figures[key] !== null)
    .map((key) => [figureTable[key].label, sayFigure(key, before.figures[key]), sayFigure(key, evaluation.figures[key])]);
  const kept = mustKeeps.filter(({ status }) => status === 'kept').length;
  const cautions = worstFirst([...evaluation.cautions.filter(({ level }) => level !== 'note'), ...mustKeepCautions(mustKeeps)]);
  return [
    ...wrapText(cleanText(`${series.id}: ${series.title}; ${classRow(classOf(series)).label}, ${series.plane}`), page.width).map((line) =>
      page.emphasis('heading', line),
    ),
    ...textTable(columns, [...parameters, ...figures], page.reader),
    'Why',
    ...whyLines(one, page),
    ...(kept === 0 ? [] : [`${kept} of ${mustKeeps.length} must-keeps kept`]),
    ...cautionLines(cautions, page),
    ...(extrapolated.length === 0 ? [] : listed(`extrapolated beyond the measured fields: ${extrapolated.join(', ')}`, page)),
    ...(gaps.length === 0
      ? []
      : [
          'Not carried',
          ...gaps.filter(({ what }) => what !== 'contrast ratio').flatMap(({ what, why }) => listed(`${what}: ${why}`, page)),
        ]),
  ];
}

/** One entry for each reason: parameters that share one stand together, whether they move by it or stay. */
function whyLines({ values, contrast, averages, rf }: SeriesCarry, page: Page): string[] {
  const byReason = new Map<string, string[]>();
  for (const { key, why, formula, source } of values) {
    const text = `${why.replace(/^stays; /, '')} [${formula}; ${source}]`;
    byReason.set(text, [...(byReason.get(text) ?? []), parameterRow(key).label]);
  }
  const reasons = [...byReason].map(([text, names]) => `${names.join(', ')}: ${text}`);
  const said = (words: string) => reasons.some((reason) => reason.includes(words));
  return [
    ...reasons,
    ...(said(contrast.words) ? [] : [`contrast: ${contrast.words}`]),
    ...(said(averages.words) ? [] : [`averages: ${averages.words}`]),
    `RF: ${rf.words}`,
  ].flatMap((text) => listed(text, page));
}
