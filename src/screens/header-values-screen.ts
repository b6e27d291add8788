import { classReason, type HeaderRow, headerRow, headerRows } from '../session/header-rows.js';
import { seriesHere } from '../session/header-view.js';
import { extraWords, seriesTitle } from '../session/header-words.js';
import type { State } from '../session/state.js';
import { fitText, textWidth } from '../terminal/text-width.js';
import { longNotice } from './common-lines.js';
import { beside, fill, type Line, line, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';

const valueColumns = 18;

/** One series value by value, missing ones first, each with where it comes from; of the line under the hand in full. */
export function headerValuesScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const isWide = columns >= 140;
  if (isWide) {
    const left = Math.floor(columns * 0.62);
    const right = detail(state, look, columns - left - 3, rows, true).map((each): Line => [span(' '), ...each]);
    return beside(headerValueLines(state, look, left, rows, true), right, left, look.glyphs.verticalRule, look.glyphs.ellipsis);
  }
  const detailRows = rows >= 26 ? 6 : 4;
  return [
    ...headerValueLines(state, look, columns, rows - detailRows - 1, true),
    line(look.glyphs.horizontalRule.repeat(columns), 'quiet'),
    ...detail(state, look, columns, detailRows, false),
  ];
}

/** The lines of the review that there is room for. `hasHand`: the hand is on one of them. */
export function headerValueLines(state: State, look: Look, columns: number, rows: number, hasHand: boolean): Line[] {
  const all = headerRows(state);
  if (all.length === 0) return fill([line('  No series was read')], rows);
  const here = hasHand ? headerRow(state)?.field : undefined;
  const at = Math.max(
    0,
    all.findIndex(({ field }) => field === here),
  );
  const { items } = windowOf(all, at, all.length <= rows ? rows : rows - 1);
  const lines = items.map((row) => rowLine(state, row, row.field === here, look, columns));
  const hidden = all.length - items.length;
  return fill(hidden === 0 ? lines : [...lines, line(`  ${hidden} more lines`, 'quiet')], rows);
}

function rowLine({ entry }: State, row: HeaderRow, here: boolean, { glyphs }: Look, columns: number): Line {
  const { kind, label, shown, origin, words, attention } = row;
  if (kind === 'heading') return line(fitText(label, columns, glyphs.ellipsis), 'quiet');
  const labels = columns >= 90 ? 26 : 22;
  const style = here ? 'inverse' : attention ? 'attention' : origin === 'typed' || origin === 'chosen' ? 'bold' : 'plain';
  const sign = `${here ? glyphs.pointer : ' '} ${fitText(label, labels, glyphs.ellipsis)} `;
  const isTyping = here && entry !== null;
  const wide = kind === 'class' ? valueColumns + 18 : valueColumns;
  const value = fitText(isTyping ? `${entry.text}_` : shown, wide, glyphs.ellipsis);
  const from = ` ${origin === '' || words === '' ? `${origin}${words}` : `${origin}: ${words}`}`;
  return [
    span(sign, style),
    here && !isTyping ? { text: value, style, cursor: true } : span(value, style),
    span(fitText(from, Math.max(1, columns - textWidth(sign) - wide), glyphs.ellipsis), here ? 'inverse' : 'quiet'),
  ];
}

/** The line under the hand in full; where there is room the series, too. */
function detail(state: State, { glyphs }: Look, columns: number, rows: number, hasSeries: boolean): Line[] {
  const one = seriesHere(state);
  const row = headerRow(state);
  if (one === undefined || row === undefined) return fill([], rows);
  const about = `${row.label} ${row.shown}${row.origin === '' ? '' : `, ${row.origin}`}: ${row.words}`;
  const words = hasSeries ? [seriesTitle(one.read), `Class: ${classReason(one)}`, extraWords(one.read), '', about] : [about];
  const lines = words.flatMap((each) => wrap(each, columns));
  const long = longNotice(state, columns);
  const room = rows - long.length;
  const shown =
    lines.length <= room
      ? lines
      : [...lines.slice(0, room - 1), fitText(`${lines[room - 1]} ${glyphs.ellipsis}`, columns, glyphs.ellipsis)];
  return fill([...shown.map((text) => line(text)), ...long], rows);
}
