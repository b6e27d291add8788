import { type Command, only, pointAt } from '../change.js';
import { shelfText, textFrom, textRoom } from '../shelf-text.js';

/** Scrolls a text, no further than its end: by so many lines, or by a page. */
export const scrollShelf =
  (by: number | 'page-up' | 'page-down'): Command =>
  (state) => {
    const reader = state.defaults.reader === true;
    const room = textRoom(state);
    // The last row of a full screen says how much is below. A screen reader goes line by line, to the last one.
    const page = Math.max(1, room - 1);
    const last = Math.max(0, shelfText(state, reader).length - (reader ? 1 : room));
    const lines = by === 'page-up' ? -page : by === 'page-down' ? page : by;
    return only(pointAt({ ...state, notice: null }, String(Math.min(last, Math.max(0, textFrom(state) + lines)))));
  };
