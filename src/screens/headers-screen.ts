import { classReason } from '../session/header-rows.js';
import { headerDraft, leftOutWords, seriesHere } from '../session/header-view.js';
import { extraWords, type HeaderCells, headerCells, lackWords, seriesTitle } from '../session/header-words.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { longNotice } from './common-lines.js';
import { headerValueLines } from './header-values-screen.js';
import { beside, fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';

/** Columns of the list where the review stands beside it. */
const listColumns = 84;

/** The series of a folder that was read: class, slices, coverage, where the values come from; what the draft would hold under them. */
export function headersScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const { reading, found } = state.headers;
  if (reading !== null || found === null) return fill([...guidance(state, columns), ...longNotice(state, columns)], rows);
  const isWide = columns >= listColumns + 60;
  const width = isWide ? listColumns : columns;
  const foot = footLines(state, look, width, rows >= 26 ? 12 : 9);
  const list = [...listLines(state, look, width, rows - foot.length), ...foot];
  if (!isWide) return list;
  const right = headerValueLines(state, look, columns - listColumns - 2, rows, false).map((each): Line => [span(' '), ...each]);
  return beside(list, right, listColumns, look.glyphs.verticalRule, look.glyphs.ellipsis);
}

/** What the screen is for, while there is nothing to list. */
function guidance({ headers }: State, columns: number): Line[] {
  if (headers.reading !== null) return [line('Escape stops the reading and shows what was read.')];
  const words = [
    'A folder of MR objects (DICOM) or sidecars (BIDS, .json): folders in it are read, too.',
    'What a scanner wrote becomes a draft preset: each value with where it came from, and what must still be typed.',
    'Names, numbers, dates and places of patients and staff are not read, shown or kept.',
    '/ types the path; a path can be pasted.',
  ];
  return words.flatMap((each) => wrap(each, Math.min(columns, 100)).map((text) => line(text)));
}

function listLines(state: State, look: Look, columns: number, rows: number): Line[] {
  const cells = headerCells(state);
  const here = seriesHere(state)?.read.id;
  const room = classColumns(columns);
  const head = `      id    ${'class'.padEnd(room)} slices  coverage read derived assumed missing`;
  const lacking = cells.some(({ needed }) => needed !== 0) ? [line('  * something must be typed before it can be used', 'quiet')] : [];
  const at = Math.max(
    0,
    cells.findIndex(({ id }) => id === here),
  );
  const { items } = windowOf(cells, at, rows - 2 - lacking.length);
  const hidden = cells.length - items.length;
  const body = items.map((one): Line => {
    const isHere = one.id === here;
    const text = fitText(`${isHere ? look.glyphs.pointer : ' '} ${cellText(one, room, look)}`, columns, look.glyphs.ellipsis);
    return [isHere ? { text, style: 'inverse', cursor: true } : span(text, one.needed === 0 ? 'plain' : 'attention')];
  });
  return fill([line(head, 'quiet'), ...body, ...(hidden === 0 ? [] : [line(`  and ${hidden} more series`, 'quiet')]), ...lacking], rows);
}

function classColumns(columns: number): number {
  return Math.max(14, Math.min(36, columns - 58));
}

function cellText({ id, isPicked, className, slices, coverage, counts, needed }: HeaderCells, room: number, { glyphs }: Look): string {
  const { read, derived, assumed, missing } = counts;
  return `${isPicked ? '[x]' : '[ ]'} ${`${id}${needed === 0 ? '' : '*'}`.padEnd(6)}${fitText(className, room, glyphs.ellipsis)}${slices.padStart(7)}${coverage.padStart(10)}${String(read).padStart(5)}${String(derived).padStart(8)}${String(assumed).padStart(8)}${String(missing).padStart(8)}`;
}

/** The series under the hand, what the draft would hold, and what could not be read. */
function footLines(state: State, { glyphs }: Look, columns: number, most: number): Line[] {
  const one = seriesHere(state);
  const { study } = headerDraft(state.headers);
  const { notes } = state.headers.found ?? { notes: [] };
  const about = one === undefined ? [] : aboutWords(one);
  const left = leftOutWords(state.headers);
  const said = (words: readonly string[], style: 'plain' | 'quiet' | 'attention' | 'trouble', rows: number) => {
    const lines = words.flatMap((each) => wrap(each, columns - 2).map((text, at) => `${at === 0 ? '' : '  '}${text}`));
    const shown = lines.length <= rows ? lines : [...lines.slice(0, rows - 1), `and ${lines.length - rows + 1} more lines`];
    return shown.map((text) => line(fitText(text, columns, glyphs.ellipsis).trimEnd(), style));
  };
  const draft =
    study === null ? 'Draft: no series that is picked is whole yet' : `Draft ${study.id}: ${study.series.map(({ id }) => id).join(', ')}`;
  const long = longNotice(state, columns).slice(0, 3);
  const below = [...said([draft], 'plain', 2), ...said(left, 'attention', 2), ...said(notes, 'trouble', 2), ...long];
  return [line(glyphs.horizontalRule.repeat(columns), 'quiet'), ...said(about, 'plain', most - below.length - 1), ...below];
}

function aboutWords(one: NonNullable<ReturnType<typeof seriesHere>>): string[] {
  const { read } = one;
  const lacks = lackWords(one);
  return [
    seriesTitle(read),
    `Class: ${classReason(one)}`,
    ...(read.isDerived ? ['Made from other images: in the draft only where it is picked'] : []),
    extraWords(read),
    ...(lacks === null ? [] : [`${lacks}: Enter`]),
  ];
}
