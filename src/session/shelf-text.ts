import { recordedDifference } from '../study/preset-diff.js';
import { recordPage } from '../study/record-print.js';
import type { Study } from '../study/study.js';
import { differencePage, seriesDifferenceLines } from './difference-page.js';
import { reportPage } from './report-page.js';
import type { State } from './state.js';
import type { TextPage } from './text-page.js';
import { wrapText } from './wrap-text.js';

/** One line of a text, and whether it is a heading. */
export interface TextLine {
  readonly text: string;
  readonly heading: boolean;
}

/** Differences by their two sides. */
const pairs = new WeakMap<Study, WeakMap<Study, object>>();

/** What differs between two studies, as lines. */
export function comparedText(from: Study, to: Study, reader: boolean): readonly TextLine[] {
  const others = pairs.get(from) ?? new WeakMap<Study, object>();
  const pair = others.get(to) ?? {};
  pairs.set(from, others.set(to, pair));
  return textOf(pair, reader, (page) => differencePage(from, to, page));
}

/** Texts by what they were made from: they are asked for with every key. */
const known = new WeakMap<object, Map<string, readonly TextLine[]>>();

/** The text of the comparison, of a record or of the report, as lines; none while there is nothing to show. */
export function shelfText(state: State, reader: boolean): readonly TextLine[] {
  const { screen } = state.place;
  const { compared, record, report } = state.shelf;
  if (screen === 'compare' && compared !== null) return comparedText(compared.from, compared.to, reader);
  if (screen === 'past-record' && record?.read != null) {
    const past = record.read;
    return textOf(past, reader, (page) => [
      ...recordPage(past).trimEnd().split('\n'),
      ...past.series.map(recordedDifference).flatMap((series) => seriesDifferenceLines(series, { from: 'planned', to: 'used' }, page)),
    ]);
  }
  if (screen === 'report' && report?.read != null) {
    const { shown, notes } = report.read;
    return textOf(report.read, reader, (page) => [...notes, ...reportPage(shown, page).trimEnd().split('\n')]);
  }
  return [];
}

function textOf(source: object, reader: boolean, make: (page: TextPage) => readonly string[]): readonly TextLine[] {
  let texts = known.get(source);
  if (texts === undefined) {
    texts = new Map();
    known.set(source, texts);
  }
  const name = reader ? 'reader' : 'eyes';
  let lines = texts.get(name);
  if (lines === undefined) {
    const headings = new Set<string>();
    const page: TextPage = {
      reader,
      width: reader ? Number.POSITIVE_INFINITY : 78,
      emphasis: (kind, text) => {
        if (kind === 'heading') headings.add(text);
        return text;
      },
    };
    const made = make(page)
      // Rows of a table keep their columns, headings are told apart by their text.
      .flatMap((text) => (text.length <= page.width || headings.has(text) || /\S {2,}\S/.test(text) ? [text] : wrapText(text, page.width)))
      .map((text) => ({ text, heading: headings.has(text) }));
    lines = reader ? made.filter(({ text }) => text.trim() !== '') : made;
    texts.set(name, lines);
  }
  return lines;
}

/** Columns of a text; where two fit they stand beside each other, as the pages of a book. */
export const pageColumns = 79;

export function textPages({ size }: State): 1 | 2 {
  return size.columns >= 2 * pageColumns + 1 ? 2 : 1;
}

/** Lines of text that a screen shows: beside the verdict, the title, the message and the keys. */
export function textRoom(state: State): number {
  return textPages(state) * Math.max(1, state.size.rows - 4);
}

/** Line of the text that stands first on the screen. */
export function textFrom({ place }: State): number {
  const at = Number(place.fields[place.screen] ?? 0);
  return Number.isFinite(at) ? Math.max(0, at) : 0;
}
