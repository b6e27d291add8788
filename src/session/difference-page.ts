import { figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import { cleanText, shownValue } from '../study/clean-text.js';
import { type FigureDifference, type OtherDifference, type SeriesDifference, studyDifference } from '../study/preset-diff.js';
import type { Study } from '../study/study.js';
import { sayChange, sayFigure } from './say-figure.js';
import { sayParameter } from './say-parameter.js';
import type { TextPage } from './text-page.js';
import { textTable } from './text-table.js';
import { wrapText } from './wrap-text.js';

/** What stands above the two columns of a difference: `rev 2` and `rev 3`, `planned` and `used`. */
interface SideNames {
  readonly from: string;
  readonly to: string;
}

/** The difference of two studies as lines of text. */
export function differencePage(a: Study, b: Study, page: TextPage): string[] {
  const difference = studyDifference(a, b);
  const names = sideNames(a, b);
  const same = difference.series.filter(({ kind }) => kind === 'same').map(({ id }) => id);
  return [
    ...studyLines(a, page),
    ...studyLines(b, page),
    ...wrapText(`SNR, contrast and RF are relative to ${names.from}.`, page.width),
    ...headLines(
      difference.head.filter(({ key }) => !['id', 'revision', 'status'].includes(key)),
      names,
      page,
    ),
    ...difference.series.flatMap((series) => seriesDifferenceLines(series, names, page)),
    ...(same.length === 0 ? [] : ['', ...wrapText(`the same: ${same.join(', ')}`, page.width)]),
  ];
}

function sideNames(a: Study, b: Study): SideNames {
  if (a.id === b.id && a.revision !== b.revision) return { from: `rev ${a.revision}`, to: `rev ${b.revision}` };
  if (a.id === b.id && a.status !== 'draft' && b.status === 'draft') return { from: `rev ${a.revision}`, to: 'draft' };
  return a.id === b.id ? { from: 'first', to: 'second' } : { from: a.id, to: b.id };
}

/** A revision and who released it, as the start of a sentence. */
export function releaseText(study: Study): string {
  return cleanText(`${study.id} revision ${study.revision}, ${study.status}${releaseWords(study)}`);
}

/** One line that says what a study is, and who released it. */
function studyLines(study: Study, page: TextPage): string[] {
  return wrapText(releaseText(study), page.width);
}

/** Who released a revision, when and why; empty where nobody did. */
export function releaseWords({ released }: Study): string {
  if (released === undefined) return '';
  const second = released.secondRole === undefined ? '' : ` and ${released.secondRole}`;
  return `; released ${released.day} by ${released.role}${second}: ${released.reason}`;
}

/** The study's own differences, notes and titles among them. */
function headLines(head: readonly OtherDifference[], names: SideNames, page: TextPage): string[] {
  return head.filter(({ key }) => key !== 'released').flatMap((difference) => otherLines(difference, names, page));
}

/** One series: parameters and figures side by side, then what else differs. Nothing for a series that is the same. */
export function seriesDifferenceLines(series: SeriesDifference, names: SideNames, page: TextPage): string[] {
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

function otherLines({ key, from, to }: OtherDifference, names: SideNames, page: TextPage): string[] {
  const words = (value: unknown) => (Array.isArray(value) ? cleanText(JSON.stringify(value), 300) : shownValue(value ?? 'none'));
  return wrapText(cleanText(`${key} differs: ${names.from} ${words(from)}, ${names.to} ${words(to)}`), page.width);
}

function figureChange({ key, from, to }: FigureDifference): string {
  return key === 'contrastRatioChange' ? '' : ratioOf(from, to);
}

function ratioOf(from: unknown, to: unknown): string {
  return typeof from === 'number' && typeof to === 'number' && from !== 0 ? sayChange(to / from - 1) : '';
}
