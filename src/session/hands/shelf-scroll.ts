import { type Command, only, pointAt } from '../change.js';
import { shelfText, textFrom } from '../shelf-text.js';

/** Rows of a screen that are no text: verdict, title, message, keys; and one that says how much is below. */
const otherRows = 5;

/** Scrolls a text, no further than its end: by so many lines, or by a page. */
export const scrollShelf =
  (by: number | 'page-up' | 'page-down'): Command =>
  (state) => {
    const page = Math.max(1, state.size.rows - otherRows);
    // As many lines as a screen of one column shows; where two stand beside each other the end comes sooner.
    const last = Math.max(0, shelfText(state, false).length - page);
    const lines = by === 'page-up' ? -page : by === 'page-down' ? page : by;
    return only(pointAt({ ...state, notice: null }, String(Math.min(last, Math.max(0, textFrom(state) + lines)))));
  };
