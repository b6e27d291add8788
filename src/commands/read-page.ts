import type { ClassKey } from '../calc/classes.js';
import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { fillDefaults } from '../calc/series.js';
import { givenOfHeaders, lackingFor, type SeriesToDraft } from '../headers/draft-of-headers.js';
import type { ReadValue } from '../headers/found.js';
import { extraWords, seriesTitle } from '../session/header-words.js';
import { sayParameter } from '../session/say-parameter.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import type { Page } from './page.js';
import type { ReadResult } from './read.js';

/** What was read, as plain text: each series with its class, its values, why, and what is still to type. */
export function readPage(result: ReadResult, page: Page): string {
  const { counts, series, draft, picked, written } = result;
  const images = series.reduce((sum, { read }) => sum + read.images, 0);
  const count = (n: number, word: string) => `${n} ${word}${n === 1 || word === 'series' ? '' : 's'}`;
  const over = counts.passedOver === 0 ? '' : `; ${count(counts.passedOver, 'other file')} passed over`;
  const heading = `${count(series.length, 'series')}, ${count(images, 'image')} in ${counts.read} of ${count(counts.files, 'file')}${over}`;
  return [
    page.emphasis('heading', heading),
    ...series.flatMap((one) => ['', ...seriesLines(one, picked.has(one.read.id), page)]),
    '',
    page.emphasis('heading', 'Draft'),
    ...(draft.study === null
      ? ['no series is whole yet']
      : listed(`${draft.study.id}: ${draft.study.series.map(({ id }) => id).join(', ')}`, page)),
    ...draft.leftOut.flatMap(({ id, why }) => listed(`${id} is left out: ${why}`, page)),
    ...listed('target, comparison and, where no body part is stated, region are assumed', page),
    ...(written === null ? [] : wrapText(cleanText(`Written to ${written.path}.`), page.width)),
    '',
    ...wrapText('Read from headers, which say what a scanner wrote, not all that it did. A person reviews every value.', page.width),
    '',
  ].join('\n');
}

function listed(text: string, page: Page): string[] {
  return wrapText(cleanText(text), page.width - 4).map((line, i) => (i === 0 ? `  ${line}` : `    ${line}`));
}

function seriesLines(one: SeriesToDraft, isPicked: boolean, page: Page): string[] {
  const { read, typed } = one;
  const { key, reason } = read.decision;
  const known = read.values.filter(({ key: name, origin }) => origin !== 'missing' || typed[name] !== undefined);
  const rows = known.map((value) => [parameterRow(value.key).label, valueWords(value, typed[value.key]), originWords(value, typed)]);
  const columns = [
    { title: '', align: 'left' },
    { title: 'value', align: 'point' },
    { title: 'where from', align: 'left' },
  ] as const;
  const why = known.filter(({ key: name, origin }) => (origin === 'derived' || origin === 'guess') && typed[name] === undefined);
  return [
    ...wrapText(seriesTitle(read), page.width).map((line) => page.emphasis('heading', line)),
    ...listed(`class: ${reason}`, page),
    ...(read.isDerived && !isPicked ? listed('made from other images: not in the draft unless it is picked (--series)', page) : []),
    ...listed(extraWords(read), page),
    ...textTable(columns, rows, page.reader),
    ...(why.length === 0 ? [] : ['Why', ...why.flatMap(({ key: name, words }) => listed(`${parameterRow(name).label}: ${words}`, page))]),
    ...missingLines(one, key, page),
  ];
}

function valueWords({ key, value }: ReadValue, own: unknown): string {
  const shown = own ?? value;
  return shown === undefined ? 'none' : cleanText(sayParameter(key, shown), 40);
}

function originWords({ key, origin, words }: ReadValue, typed: SeriesToDraft['typed']): string {
  if (typed[key] !== undefined) return 'typed';
  if (origin === 'guess') return 'A GUESS';
  return origin === 'read' && words.length <= 36 ? `read: ${words}` : origin;
}

/** What is missing: first what the series cannot be without, then what stays at the default, by reason. */
function missingLines(one: SeriesToDraft, key: ClassKey | null, page: Page): string[] {
  const { read, typed } = one;
  const missing = read.values.filter(({ key: name, origin }) => origin === 'missing' && typed[name] === undefined);
  const given = givenOfHeaders(one);
  const needed = key === null ? [] : lackingFor(key, given);
  const defaults = key === null ? null : fillDefaults(key, given);
  const byReason = new Map<string, string[]>();
  for (const { key: name, words } of missing) {
    if (needed.includes(name)) continue;
    const value = defaults?.[name];
    const shown =
      value === undefined || value === null || Number.isNaN(value) ? '' : ` (${cleanText(sayParameter(name as ParameterKey, value), 30)})`;
    byReason.set(words, [...(byReason.get(words) ?? []), `${parameterRow(name).label}${shown}`]);
  }
  const reasonOf = (name: ParameterKey) => missing.find((value) => value.key === name)?.words ?? 'not stated';
  return [
    ...(key === null ? ['To type first', ...listed(`--class ${read.id}:CLASS, such as fast-spin-echo/2D`, page)] : []),
    ...(needed.length === 0
      ? []
      : [
          'To type before it can be used',
          ...needed.flatMap((name) => listed(`${name} (${parameterRow(name).label}): ${reasonOf(name)}`, page)),
        ]),
    ...(byReason.size === 0
      ? []
      : [
          'Missing: the default in brackets holds until a person types it',
          ...[...byReason].flatMap(([words, names]) => listed(`${names.join(', ')}: ${words}`, page)),
        ]),
  ];
}
