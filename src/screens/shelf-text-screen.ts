import { pageColumns, shelfText, textFrom, textPages } from '../session/shelf-text.js';
import type { State } from '../session/state.js';
import { beside, fill, type Line, line } from './line.js';
import type { Look } from './look.js';
import { shareBar } from './share-bar.js';

/** A comparison, a record or the report, as text that is scrolled. */
export function shelfTextScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const lines = shelfText(state, false).map(({ text, heading }) => line(text, heading ? 'bold' : 'plain'));
  if (lines.length === 0) return fill(waiting(state, look, columns), rows);
  const pages = textPages(state);
  const room = pages * rows;
  const at = Math.min(textFrom(state), Math.max(0, lines.length - room));
  const shown = lines.slice(at, at + room);
  const below = lines.length - at - room;
  if (below > 0) shown[room - 1] = line(`${below + 1} more lines: down`, 'quiet');
  if (pages === 1) return fill(shown, rows);
  return beside(
    fill(shown.slice(0, rows), rows),
    fill(shown.slice(rows), rows),
    pageColumns,
    look.glyphs.verticalRule,
    look.glyphs.ellipsis,
  );
}

/** What stands there until there is something to read. */
function waiting(state: State, look: Look, columns: number): Line[] {
  const { screen } = state.place;
  const reading = screen === 'report' ? state.shelf.report : screen === 'past-record' ? state.shelf.record : null;
  if (reading === null) return [line('Nothing to show: Esc goes back.')];
  if (reading.trouble !== null) return [line(reading.trouble, 'trouble')];
  return [
    line(screen === 'report' ? 'Reading the records' : 'Reading the record'),
    ...shareBar(reading.share, look, columns),
    line('Esc stops the reading.'),
  ];
}
