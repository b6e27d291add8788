import { figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import { sayChange, sayFigure } from '../session/say-figure.js';
import { sayParameter } from '../session/say-parameter.js';
import { cleanText, shownValue } from '../study/clean-text.js';
import type { FigureDifference, OtherDifference, SeriesDifference } from '../study/preset-diff.js';
import type { Study } from '../study/study.js';
import type { Page } from './page.js';
import { textTable } from './text-table.js';
import { wrapText } from './wrap-text.js';

/** What stands above the two columns of a difference: `rev 2` and `rev 3`, `planned` and `used`. */
export interface SideNames {
  readonly from: string;
  readonly to: string;
}

/** One line that says what a study is, and who released it. */
export function studyLines(study: Study, page: Page): string[] {
  const line = `${study.id} revision ${study.revision}, ${study.status}${releaseWords(study)}`;
  return wrapText(cleanText(line), page.width);
}

/** Who released a revision, when and why; empty where nobody did. */
export function releaseWords({ released }: Study): string {
  if (released === undefined) return '';
  const second = released.secondRole === undefined ? '' : ` and ${released.secondRole}`;
  return `; released ${released.day} by ${released.role}${second}: ${released.reason}`;
}

/** The study's own differences, notes and titles among them. */
export function headLines(head: readonly OtherDifference[], names: SideNames, page: Page): string[] {
  return head.filter(({ key }) => key !== 'released').flatMap((difference) => otherLines(difference, names, page));
}

/** One series: parameters and figures side by side, then what else differs. Nothing for a series that is the same. */
export function seriesDifferenceLines(series: SeriesDifference, names: SideNames, page: Page): string[] {
  const heading = page.emphasis('heading', cleanText(series.title === '' ? series.id : `${series.id}: ${series.title}`));
  if (series.kind === 'same') return [];
  if (series.kind !== 'changed') return ['', heading, `only in ${series.kind === 'added' ? names.to : names.from}`];
  const columns = (first: string) =>
    [
      { title: first, align: 'left' },
      { title: names.from, align: 'point' },
      { title: names.to, align: 'point' },
      { title: 'change', align: 'right' },
    ] as const;
  const isLong = ({ key }: { readonly key: SeriesDifference['parameters'][number]['key'] }) => parameterRow(key).kind === 'object';
  const parameters = series.parameters
    .filter((difference) => !isLong(difference))
    .map(({ key, from, to }) => [
      parameterRow(key).label,
      cleanText(sayParameter(key, from)),
      cleanText(sayParameter(key, to)),
      ratioOf(from, to),
    ]);
  const long = series.parameters
    .filter(isLong)
    .map(({ key, from, to }) => `${parameterRow(key).label}: ${sayParameter(key, from)}; ${names.to}: ${sayParameter(key, to)}`);
  const figures = series.figures.map((difference) => {
    const { key, from, to } = difference;
    return [figureTable[key].label, sayFigure(key, from), sayFigure(key, to), figureChange(difference)];
  });
  return [
    '',
    heading,
    ...(parameters.length === 0 ? [] : textTable(columns('parameter'), parameters, page.reader)),
    ...long.flatMap((line) => wrapText(cleanText(line), page.width)),
    ...(figures.length === 0 ? ['no figure changes'] : ['', ...textTable(columns('figure'), figures, page.reader)]),
    ...series.other.flatMap((difference) => otherLines(difference, names, page)),
  ];
}

function otherLines({ key, from, to }: OtherDifference, names: SideNames, page: Page): string[] {
  const words = (value: unknown) => (Array.isArray(value) ? cleanText(JSON.stringify(value), 300) : shownValue(value ?? 'none'));
  return wrapText(cleanText(`${key} differs: ${names.from} ${words(from)}, ${names.to} ${words(to)}`), page.width);
}

function figureChange({ key, from, to }: FigureDifference): string {
  return key === 'contrastRatioChange' ? '' : ratioOf(from, to);
}

function ratioOf(from: unknown, to: unknown): string {
  return typeof from === 'number' && typeof to === 'number' && from !== 0 ? sayChange(to / from - 1) : '';
}
