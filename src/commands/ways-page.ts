import type { FrontPoint } from '../search/front.js';
import { limitKeys, verdictsOf } from '../search/limits.js';
import type { NothingFits } from '../search/nothing-fits.js';
import { otherMoves } from '../search/other-moves.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import type { SearchResult } from '../search/search.js';
import type { Way } from '../search/way.js';
import { sayRatio } from '../session/say-ratio.js';
import { sayTime } from '../session/say-time.js';
import { sayVerdict } from '../session/say-verdict.js';
import {
  bindingInWords,
  bindingsInWords,
  changesInWords,
  exactInWords,
  kindWords,
  searchInWords,
  spareInWords,
  tradesInWords,
} from '../session/say-way.js';
import type { SeriesResult } from '../session/series-result.js';
import type { Emphasis } from '../session/text-page.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import type { Study } from '../study/study.js';
import { closingWords } from './closing-words.js';
import type { Page } from './page.js';
import { seriesHeading, studyHeading } from './study-page.js';

const emphasisOf: Readonly<Record<Way['verdict'], Emphasis>> = { FITS: 'fits', 'TOO CLOSE': 'close', OVER: 'over' };

/** Everything `holdfast ways` says as plain text. */
export function waysPage(
  study: Study,
  start: SeriesResult,
  problem: SearchProblem,
  result: SearchResult,
  nothing: NothingFits | null,
  page: Page,
): string {
  const { ways, fronts } = result;
  return [
    ...studyHeading(study, problem.scanner.fieldT, page),
    '',
    ...seriesHeading(start, page),
    ...startLines(start, problem, page),
    '',
    ...(ways.length === 0 ? nothingLines(result, nothing, problem, page) : wayLines(ways, page)),
    ...pairLines(problem, ways, page),
    ...wrapText(searchInWords(result), page.width),
    ...(fronts.timeSnr.length === 0 ? [] : ['', ...frontLines(fronts.timeSnr, page)]),
    '',
    ...(ways.length === 0 || otherMoves(problem).length === 0
      ? []
      : [...wrapText(`Before rewriting: ${otherMoves(problem).join('; ')}.`, page.width), '']),
    ...wrapText(closingWords, page.width),
    '',
  ].join('\n');
}

/** How the series stands against its limits before anything is changed. */
function startLines({ evaluation: { figures } }: SeriesResult, { limits, readings, scanner }: SearchProblem, page: Page): string[] {
  const verdicts = verdictsOf(limits, figures, readings, {
    modelErrorPercent: scanner.modelErrorPercent,
    hasTimeReading: readings.timeS !== undefined,
  });
  const names = { holdS: 'a breath-hold', timeS: 'the series', b1rmsUt: 'B1+rms', sarWkg: 'SAR', rfRatio: 'RF power' };
  const lines = limitKeys
    .flatMap((key) => verdicts.filter(({ limitKey }) => limitKey === key))
    .map((verdict) => {
      const isTime = verdict.limitKey === 'holdS' || verdict.limitKey === 'timeS';
      const value = isTime ? sayTime(verdict.value) : verdict.value.toFixed(2);
      const limit = isTime ? sayTime(verdict.limit) : String(verdict.limit);
      return `As it stands, ${names[verdict.limitKey]}: ${value}, the limit is ${limit}: ${sayVerdict(verdict)}.`;
    });
  return (lines.length === 0 ? ['No limit was given: everything within the bands fits.'] : lines).flatMap((line) =>
    wrapText(line, page.width),
  );
}

/** Ways numbered, those with the same changes once with all their kinds. */
function wayLines(ways: readonly Way[], page: Page): string[] {
  const groups = new Map<string, Way[]>();
  for (const way of ways) {
    const key = JSON.stringify(way.changes);
    groups.set(key, [...(groups.get(key) ?? []), way]);
  }
  const common = commonCautions(ways);
  return [
    ...[...groups.values()].flatMap((same, i) =>
      oneWay(same[0] as Way, `${i + 1}. ${[...new Set(same.map(({ kind }) => kindWords[kind]))].join(', ')}`, page, common),
    ),
    ...(common.length === 0 ? [] : [page.emphasis('heading', 'Of all these ways'), ...common.flatMap((text) => indented(text, page)), '']),
  ];
}

function cautionsInWords({ cautions }: Way): string[] {
  return cautions.filter(({ level }) => level !== 'note').map(({ level, text, code }) => `${level}: ${text} [${code}]`);
}

/** What every way says: it is said once, where there are several. */
function commonCautions(ways: readonly Way[]): string[] {
  const [first, ...others] = ways.map(cautionsInWords);
  return first === undefined || others.length === 0 ? [] : first.filter((text) => others.every((texts) => texts.includes(text)));
}

function indented(text: string, page: Page): string[] {
  return wrapText(cleanText(text), page.width - 5).map((line, i) => `   ${i === 0 ? '' : '  '}${line}`);
}

function oneWay(way: Way, title: string, page: Page, saidOnce: readonly string[] = []): string[] {
  const { figures } = way;
  const hold = figures.holdTimeS === null ? '' : `, a hold ${sayTime(figures.holdTimeS)}`;
  const time = `${sayTime(figures.scanTimeS ?? 0)}${hold}, SNR ${figures.relativeSnr === null ? 'not known' : sayRatio(figures.relativeSnr)}`;
  const body = [
    `change: ${changesInWords(way)}`,
    `in ${time}`,
    `gives up: ${tradesInWords(way.gives)}`,
    `gains: ${tradesInWords(way.gains)}`,
    ...exactInWords(way),
    ...way.cautions.filter(({ code }) => code === 'timing-carried').map(({ text }) => `follows: ${text}`),
    ...cautionsInWords(way).filter((text) => !saidOnce.includes(text)),
  ];
  return [
    ...wrapText(title, page.width).map((line) => page.emphasis('heading', line)),
    ...wrapText(spareInWords(way), page.width - 3).map((line) => `   ${page.emphasis(emphasisOf[way.verdict], line)}`),
    ...body.flatMap((text) => indented(text, page)),
    '',
  ];
}

/** Where nothing fits: what binds, the nearest way, and what else the trade does. */
function nothingLines({ nearest }: SearchResult, nothing: NothingFits | null, problem: SearchProblem, page: Page): string[] {
  const moves = otherMoves(problem);
  const known = nothing === null ? null : bindingsInWords(nothing);
  return [
    page.emphasis('over', 'Nothing fits.'),
    ...(known === null ? [] : wrapText(known, page.width)),
    ...(nothing?.bindings ?? []).flatMap((binding) => [
      ...wrapText(bindingInWords(binding, problem), page.width),
      ...oneWay(binding.way, 'the way that needs least', page),
    ]),
    ...((nothing?.bindings.length ?? 0) > 0 || nearest === null ? [] : oneWay(nearest, 'nearest', page)),
    ...(moves.length === 0 ? [] : [...wrapText(`What else is done: ${moves.join('; ')}.`, page.width), '']),
  ];
}

function pairLines({ series }: SearchProblem, ways: readonly Way[], page: Page): string[] {
  if (series.pairedWith.length === 0 || ways.length === 0) return [];
  return [
    ...wrapText(`What changes here changes in ${series.pairedWith.join(', ')} too: they are compared with each other.`, page.width),
    '',
  ];
}

/** Some points of the front of time against SNR: at most nine, evenly spread, both ends kept. */
function frontLines(points: readonly FrontPoint[], page: Page): string[] {
  const most = 9;
  const count = Math.min(most, points.length);
  const some = Array.from(
    { length: count },
    (_, i) => points[Math.round((i * (points.length - 1)) / Math.max(1, count - 1))] as FrontPoint,
  );
  const rows = [['most SNR', ...some.map(({ value }) => sayRatio(value))]];
  const columns = [
    { title: 'in', align: 'left' as const },
    ...some.map(({ timeS }) => ({ title: sayTime(timeS), align: 'right' as const })),
  ];
  return textTable(columns, rows, page.reader);
}
