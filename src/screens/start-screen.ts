import { chosenScanner, sayChoice } from '../session/equipment.js';
import { fieldStrengths, type StartRow, startRows } from '../session/start-list.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';

/** Chooses a field strength, a region and a preset; unfinished sessions are offered first. */
export function startScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const list = startRows(state);
  const chosen = Math.max(
    0,
    list.findIndex(({ field }) => field === state.place.fields.start),
  );
  const typed: Line = [span('Type to narrow: '), span(state.narrowing, 'bold'), { text: ' ', style: 'inverse', cursor: true }];
  const head: Line[] = [
    typed,
    line(
      state.presets.length === 0
        ? ''
        : `Field strength ${fieldStrengths(state)
            .map((field) => `${field} T`)
            .join(', ')}, and a region: 3 liver`,
      'quiet',
    ),
    line(`Scanner: ${sayChoice(chosenScanner(state))} (Tab: another)`),
    line(`  ${'field'.padStart(6)}   ${'region'.padEnd(16)}preset`, 'quiet'),
  ];
  const notes = noteLines(state, look, columns);
  const listRows = rows - head.length - notes.length;
  const shown = windowOf(list, chosen, listRows);
  const body = shown.items.map((row, at) => rowLine(row, shown.from + at === chosen, look, columns));
  if (list.length === 0)
    body.push(line(state.presets.length === 0 ? '  Reading the presets' : '  Nothing matches; Backspace takes a letter back'));
  return [...fill([...head, ...body], rows - notes.length), ...notes];
}

/** What is wrong with files that were read, under the list: two things, and how many more. */
function noteLines({ fileNotes }: State, { glyphs }: Look, columns: number): Line[] {
  const shown = fileNotes.slice(0, 2).flatMap((words) => wrap(words, columns).slice(0, 3));
  const more = fileNotes.length - 2;
  return [...shown, ...(more > 0 ? [`and ${more} more files: holdfast presets check`] : [])].map((words) =>
    line(fitText(words, columns, glyphs.ellipsis), 'trouble'),
  );
}

function rowLine(row: StartRow, here: boolean, { glyphs }: Look, columns: number): Line {
  const pointer = here ? `${glyphs.pointer} ` : '  ';
  if (row.kind === 'draft') {
    const words = `${pointer}Unfinished: ${row.words}, ${row.changes} changed, ${sayAge(row.draft.ageMs)}`;
    return [span(fitText(words, columns, glyphs.ellipsis), here ? 'inverse' : 'bold')];
  }
  const { study } = row.preset;
  const words = `${pointer}${`${study.fieldT} T`.padStart(6)}   ${study.region.padEnd(16)}${study.title}${study.status === 'starter' ? '' : ` (${study.status})`}`;
  return [span(fitText(words, columns, glyphs.ellipsis), here ? 'inverse' : 'plain')];
}

/** How long ago something was saved, roughly. */
function sayAge(ageMs: number): string {
  const minutes = Math.round(ageMs / 60_000);
  if (minutes < 1) return 'just now';
  if (minutes < 90) return `${minutes} min ago`;
  const hours = Math.round(minutes / 60);
  return hours < 36 ? `${hours} h ago` : `${Math.round(hours / 24)} days ago`;
}
