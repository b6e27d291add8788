import { scannerRow, scannerRows, scannerWords } from '../session/scanner-list.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { beside, blank, fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';
import { tableLines } from './table-lines.js';

/** Chooses a scanner and a coil, and shows what changes on it. */
export function scannerScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const wide = columns >= 140;
  const { glyphs } = look;
  const listColumns = wide ? 60 : columns;
  const changes = changeLines(state, look, wide ? columns - listColumns - 1 : columns, rows >= 26);
  const listRows = wide ? rows - 1 : Math.max(5, rows - changes.length - 2);
  const all = scannerRows(state);
  const here = scannerRow(state).field;
  const at = all.findIndex(({ field }) => field === here);
  const shown = windowOf(all, at, listRows);
  const list = shown.items.map(({ field, name, where, coil, inUse }): Line => {
    const isHere = field === here;
    const text = `${isHere ? glyphs.pointer : ' '}${inUse ? glyphs.tick : ' '} ${fitText(name, 18, glyphs.ellipsis)} ${where.padStart(12)}  ${coil}`;
    const cut = fitText(text, listColumns, glyphs.ellipsis);
    return [isHere ? { text: cut, style: 'inverse', cursor: true } : span(cut, inUse ? 'bold' : 'plain')];
  });
  const more = all.length > listRows ? `, ${at + 1} of ${all.length}` : '';
  const head = line(`   ${'scanner'.padEnd(18)} ${'field'.padStart(12)}  coil${more}`, 'quiet');
  const left = [head, ...fill(list, Math.min(listRows, wide ? listRows : all.length))];
  if (wide) return beside(fill(left, rows), changes, listColumns, glyphs.verticalRule, glyphs.ellipsis);
  return [...left, blank, ...changes];
}

function changeLines(state: State, look: Look, columns: number, roomy: boolean): Line[] {
  const { heading, facts, table, notes, coil, attention } = scannerWords(state);
  return [
    line(fitText(heading, columns, look.glyphs.ellipsis), 'bold'),
    ...facts.flatMap((words) => wrap(words, columns)).map((words) => line(words)),
    ...(table === null ? [] : tableLines(table, columns)),
    ...notes.flatMap((words) => wrap(words, columns)).map((words) => line(words, 'quiet')),
    ...(roomy && coil !== '' ? wrap(coil, columns).map((words) => line(words)) : []),
    ...(attention === '' ? [] : wrap(attention, columns).map((words) => line(words, 'attention'))),
  ];
}
