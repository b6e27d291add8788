import { classRow } from '../calc/classes.js';
import { classOf } from '../calc/series.js';
import { sayFigure } from '../session/say-figure.js';
import { sayTime } from '../session/say-time.js';
import type { SeriesResult } from '../session/series-result.js';
import { type Column, textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import type { Study } from '../study/study.js';
import { cautionLines } from './caution-lines.js';
import { closingWords } from './closing-words.js';
import type { Page } from './page.js';

const columns: readonly Column[] = [
  { title: 'series', align: 'left' },
  { title: 'time', align: 'right' },
  { title: 'breath-holds', align: 'right' },
  { title: 'SNR', align: 'right' },
  { title: 'contrast', align: 'right' },
  { title: 'B1+rms', align: 'right' },
  { title: 'running total', align: 'right' },
];

/** A whole study as plain text: the running order with its figures, then each series with its cautions. */
export function studyPage(study: Study, fieldT: number, results: readonly SeriesResult[], page: Page): string {
  return [
    ...studyHeading(study, fieldT, page),
    '',
    ...textTable(columns, runningOrderRows(results), page.reader),
    '',
    ...results.flatMap((result) => [...seriesHeading(result, page), ...cautionLines(result.cautions, page)]),
    '',
    `One series in full: holdfast figures ${study.id} SERIES`,
    ...wrapText(closingWords, page.width),
    '',
  ].join('\n');
}

/** Title, where it comes from, and its notes. */
export function studyHeading(study: Study, fieldT: number, page: Page): string[] {
  const own = fieldT === study.fieldT ? '' : `, preset for ${study.fieldT} T`;
  return [
    ...wrapText(cleanText(`${study.title}: preset ${study.id}, ${study.status}, revision ${study.revision}`), page.width).map((line) =>
      page.emphasis('heading', line),
    ),
    `At ${fieldT} T${own}. SNR and contrast are relative to the preset at ${study.fieldT} T.`,
    ...(study.notes === '' ? [] : wrapText(cleanText(study.notes), page.width)),
  ];
}

/** Id, title and class of a series. */
export function seriesHeading({ series }: SeriesResult, page: Page): string[] {
  const words = cleanText(`${series.id}: ${series.title}; ${classRow(classOf(series)).label}, ${series.plane}`);
  return wrapText(words, page.width).map((line) => page.emphasis('heading', line));
}

function runningOrderRows(results: readonly SeriesResult[]): string[][] {
  let totalS = 0;
  return results.map(({ series, evaluation: { figures } }) => {
    totalS += figures.tableTimeS ?? 0;
    return [
      series.id,
      sayFigure('scanTimeS', figures.scanTimeS),
      sayHolds(figures),
      sayFigure('relativeSnr', figures.relativeSnr),
      sayFigure('relativeContrast', figures.relativeContrast),
      sayFigure('b1PlusRmsUt', figures.b1PlusRmsUt),
      sayTime(totalS),
    ];
  });
}

/** Breath-holds in words: `4 x 17.0 s`; a dash without. */
export function sayHolds(figures: SeriesResult['evaluation']['figures']): string {
  return figures.holds === null || figures.holdTimeS === null ? '-' : `${figures.holds} x ${sayTime(figures.holdTimeS)}`;
}
