import { type CarryRow, carryChoices, carryOverview, carryRow, carryRows } from '../session/carry-rows.js';
import { carryWhy } from '../session/carry-why.js';
import type { State } from '../session/state.js';
import { fitText, textWidth } from '../terminal/text-width.js';
import { beside, blank, fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';
import { tableLines } from './table-lines.js';

const valueColumns = 11;

/** Columns of the labels: more where there is room. */
function labelColumns(columns: number): number {
  return columns >= 90 ? 20 : 15;
}

/** A preset at another field or on another scanner: preset and carried value side by side, each with its reason. */
export function carryScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const wide = columns >= 140;
  const listColumns = wide ? Math.floor(columns * 0.6) : columns;
  const choices = carryChoices(state);
  const here = carryRow(state)?.field;
  const detailRows = wide ? 0 : rows >= 26 ? 9 : 7;
  const top = choices.map((row) => choiceLine(state, row, row.field === here, look, listColumns));
  const room = rows - top.length - 1;
  const overview = wide ? overviewLines(state, listColumns, room - carryRows(state).length) : [];
  const list = listLines(state, here, look, listColumns, wide ? room - overview.length : room - detailRows - 1);
  const left = [...top, headLine(list.hidden, look, listColumns), ...list.lines, ...overview];
  if (!wide) return [...left, line(look.glyphs.horizontalRule.repeat(columns), 'quiet'), ...detail(state, columns, detailRows)];
  const right = columns - listColumns - 1;
  return beside(fill(left, rows), detail(state, right, rows), listColumns, look.glyphs.verticalRule, look.glyphs.ellipsis);
}

function headLine(hidden: number, look: Look, columns: number): Line {
  const more = hidden === 0 ? '' : ` (${hidden} more lines)`;
  const titles = `  ${'parameter'.padEnd(labelColumns(columns))} ${'preset'.padStart(valueColumns)} ${'carried'.padStart(valueColumns)}  why${more}`;
  return line(fitText(titles, columns, look.glyphs.ellipsis), 'quiet');
}

/** All series under the one that is looked at, where the screen has room for them. */
function overviewLines(state: State, columns: number, rows: number): Line[] {
  const table = carryOverview(state);
  if (table === null || rows < table.length + 2) return [];
  return [blank, line('All series', 'quiet'), ...tableLines(table, columns)];
}

function choiceLine({ entry }: State, { field, label, after }: CarryRow, here: boolean, { glyphs }: Look, columns: number): Line {
  const text = here && entry !== null ? `${entry.text}_` : after;
  const style = here ? 'inverse' : 'plain';
  const value = fitText(text, columns - labelColumns(columns) - 3, glyphs.ellipsis);
  return [
    span(`${here ? glyphs.pointer : ' '} ${label.padEnd(labelColumns(columns))} `, here ? 'inverse' : field === 'to' ? 'bold' : 'plain'),
    here && entry === null ? { text: value, style, cursor: true } : span(value, style),
  ];
}

/** The lines that there is room for, and how many there are besides. */
function listLines(
  state: State,
  here: string | undefined,
  look: Look,
  columns: number,
  rows: number,
): { readonly lines: Line[]; readonly hidden: number } {
  const { carry } = state;
  if (carry?.trouble != null)
    return {
      lines: fill(
        wrap(carry.trouble, columns).map((each) => line(each, 'trouble')),
        rows,
      ),
      hidden: 0,
    };
  const all = carryRows(state);
  if (all.length === 0) return { lines: fill([line('  Being worked out', 'quiet')], rows), hidden: 0 };
  const at = Math.max(
    0,
    all.findIndex(({ field }) => field === here),
  );
  const { items } = windowOf(all, at, rows);
  const lines = items.map((row) => rowLine(row, row.field === here, look, columns));
  return { lines: fill(lines, rows), hidden: all.length - items.length };
}

function rowLine(row: CarryRow, here: boolean, { glyphs }: Look, columns: number): Line {
  const { kind, label, before, after, words, stands } = row;
  if (kind === 'heading') return line(label, 'quiet');
  const style = here ? 'inverse' : stands === 'attention' ? 'attention' : stands === 'moved' ? 'bold' : 'plain';
  const sign = `${here ? glyphs.pointer : ' '} ${fitText(label, labelColumns(columns), glyphs.ellipsis)} `;
  if (kind === 'words') {
    const text = fitText(words, columns - textWidth(sign), glyphs.ellipsis);
    return [span(sign, style), here ? { text, style, cursor: true } : span(text, stands === 'attention' && !here ? 'plain' : style)];
  }
  const values = `${fitText(before, valueColumns, glyphs.ellipsis, 'right')} ${fitText(after, valueColumns, glyphs.ellipsis, 'right')}  `;
  const room = columns - textWidth(sign) - textWidth(values);
  return [
    span(sign, style),
    here ? { text: values, style, cursor: true } : span(values, style),
    span(fitText(words, room, glyphs.ellipsis), here ? 'inverse' : 'quiet'),
  ];
}

/** Why, of the line under the hand: as much as there is room for, the rest by w. */
function detail(state: State, columns: number, rows: number): Line[] {
  const paragraphs = carryWhy(state);
  const tight = rows < 20;
  const lines = paragraphs.flatMap(({ words, style }, at): Line[] => {
    if (words === '' && tight) return [];
    const before = paragraphs[at - 1];
    const isTitle = style === 'quiet' && before?.words === '';
    // In little room the title of a part stands before its words.
    if (tight && isTitle) return [];
    const title = tight && before?.style === 'quiet' ? `${before.words}: ` : '';
    return wrap(`${title}${words}`, columns - 1).map((each) => line(each, style ?? 'plain'));
  });
  if (lines.length <= rows) return fill(lines, rows);
  return [...lines.slice(0, rows - 1), line('w: more', 'quiet')];
}
