import {
  comparedWith,
  originWords,
  type PresetRow,
  presetRow,
  presetRows,
  releasedWords,
  revisionRow,
  revisionRows,
} from '../session/preset-rows.js';
import { comparedText, pageColumns } from '../session/shelf-text.js';
import type { State } from '../session/state.js';
import type { Study } from '../study/study.js';
import { fitText } from '../terminal/text-width.js';
import { beside, blank, fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';

/** The presets by region and field strength: find by typing, Enter shows the revisions. A wide screen shows what is in the preset, too. */
export function presetsScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const row = presetRow(state);
  if (!isWide(columns) || row === undefined) return presetList(state, look, columns, rows);
  return besideList(presetList(state, look, pageColumns, rows), contents(row.study, columns - pageColumns - 3), look, rows);
}

function isWide(columns: number): boolean {
  return columns >= 2 * pageColumns + 1;
}

function besideList(list: readonly Line[], right: readonly Line[], look: Look, rows: number): Line[] {
  const shown = right.length <= rows ? right : [...right.slice(0, rows - 1), line(`${right.length - rows + 1} more lines: Enter`, 'quiet')];
  const indented = fill(shown, rows).map((each) => [span(' '), ...each]);
  return beside(list, indented, pageColumns, look.glyphs.verticalRule, look.glyphs.ellipsis);
}

/** What a preset holds, in words. */
function contents(study: Study, columns: number): Line[] {
  const series = study.series.map(({ id, title, mustKeep }) => {
    const kept = mustKeep.length === 0 ? '' : `, ${mustKeep.length} must-keep${mustKeep.length === 1 ? '' : 's'}`;
    return `${id.padEnd(13)}${title}${kept}`;
  });
  return [
    line(study.title, 'bold'),
    line(`${study.id} revision ${study.revision}, ${study.status}, ${study.fieldT} T`),
    line(`Released: ${releasedWords(study)}`),
    blank,
    ...series.map((words) => line(words)),
    blank,
    ...wrap(study.notes, columns).map((words) => line(words, 'quiet')),
  ];
}

function presetList(state: State, look: Look, columns: number, rows: number): Line[] {
  const list = presetRows(state);
  const here = presetRow(state);
  const typed: Line = [span('Type to find: '), span(state.shelf.narrowing, 'bold'), { text: ' ', style: 'inverse', cursor: true }];
  const head: Line[] = [
    typed,
    line('Region, field strength, id or title: 3 liver', 'quiet'),
    blank,
    line(
      `  ${'region'.padEnd(14)}${'field'.padStart(6)}  ${'preset'.padEnd(20)}${'rev'.padStart(4)}  ${'status'.padEnd(9)}${'from'.padEnd(11)}title`,
      'quiet',
    ),
  ];
  const shown = windowOf(
    list,
    Math.max(
      0,
      list.findIndex(({ field }) => field === here?.field),
    ),
    rows - head.length,
  );
  const body = shown.items.map((row): Line => {
    const { study, origin } = row;
    const words = `${study.region.padEnd(14)}${`${study.fieldT} T`.padStart(6)}  ${fitText(study.id, 20, look.glyphs.ellipsis)}${String(study.revision).padStart(4)}  ${statusOf(row).padEnd(9)}${originWords[origin].padEnd(11)}${study.title}`;
    return pointed(words, row.field === here?.field, look, columns);
  });
  if (list.length === 0)
    body.push(line(state.presets.length === 0 ? '  Reading the presets' : '  Nothing matches; Backspace takes a letter back'));
  return fill([...head, ...body], rows);
}

/** The revisions of one preset: status, who by role, when, why. A wide screen shows what differs from the one before, too. */
export function revisionsScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const row = revisionRow(state);
  const from = row === undefined ? undefined : comparedWith(state, row);
  if (!isWide(columns) || row === undefined || from === undefined) return revisionList(state, look, columns, rows);
  const text = comparedText(from, row.study, false).map(({ text: words, heading }) => line(words, heading ? 'bold' : 'plain'));
  return besideList(revisionList(state, look, pageColumns, rows), text, look, rows);
}

function revisionList(state: State, look: Look, columns: number, rows: number): Line[] {
  const { revisions, marked } = state.shelf;
  const list = revisionRows(state);
  const here = revisionRow(state);
  const head: Line[] = [
    line(`   ${'rev'.padStart(4)}  ${'status'.padEnd(9)}${'from'.padEnd(11)}${'released'.padEnd(11)}by, and why`, 'quiet'),
  ];
  const notes = (revisions?.notes ?? []).slice(0, 2).map((words) => line(fitText(words, columns, look.glyphs.ellipsis), 'trouble'));
  const about = here === undefined ? [] : aboutLines(here, look, columns);
  const shown = windowOf(
    list,
    Math.max(
      0,
      list.findIndex(({ field }) => field === here?.field),
    ),
    rows - head.length - notes.length - about.length,
  );
  const body = shown.items.map((row): Line => {
    const { study, origin } = row;
    const who = `${marked === study ? 'MARKED  ' : ''}${releasedWords(study)}`;
    const words = ` ${String(study.revision).padStart(4)}  ${statusOf(row).padEnd(9)}${originWords[origin].padEnd(11)}${who}`;
    return pointed(words, row.field === here?.field, look, columns);
  });
  if (revisions !== null && revisions.presets === null) body.push(line('  Reading the revisions'));
  else if (list.length === 0) body.push(line('  No revision can be read'));
  return [...fill([...head, ...body], rows - notes.length - about.length), ...notes, ...about];
}

/** What the hand is on, in words; a sign in the list is said here too. */
function aboutLines({ study, origin }: PresetRow, { glyphs }: Look, columns: number): Line[] {
  const words = [
    `${study.id}: ${study.title}, ${study.region}, ${study.fieldT} T, ${study.series.length} series`,
    origin === 'session'
      ? 'The open session on this preset: what it changed is saved by s, released by r.'
      : `Released: ${releasedWords(study)}`,
    ...(study.notes === '' ? [] : [study.notes]),
  ];
  return [blank, ...words.map((each) => line(fitText(each, columns, glyphs.ellipsis)))];
}

function statusOf({ origin, study }: PresetRow): string {
  return origin === 'session' ? 'session' : study.status;
}

function pointed(words: string, isHere: boolean, { glyphs }: Look, columns: number): Line {
  const text = fitText(`${isHere ? glyphs.pointer : ' '} ${words}`, columns, glyphs.ellipsis);
  return [isHere ? { text, style: 'inverse' } : span(text)];
}
