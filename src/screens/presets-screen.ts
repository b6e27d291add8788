import { originWords, type PresetRow, presetRow, presetRows, releasedWords, revisionRow, revisionRows } from '../session/preset-rows.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { blank, fill, type Line, line, span, windowOf } from './line.js';
import type { Look } from './look.js';

/** The presets by region and field strength: find by typing, Enter shows the revisions. */
export function presetsScreen(state: State, look: Look, columns: number, rows: number): Line[] {
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

/** The revisions of one preset: status, who by role, when, why. */
export function revisionsScreen(state: State, look: Look, columns: number, rows: number): Line[] {
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
