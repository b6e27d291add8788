import { type Command, only, pointAt } from '../change.js';

/** Scrolls a text; the screen keeps it within its ends. */
export const scrollText =
  (by: number): Command =>
  (state) => {
    const at = Number(state.place.fields[state.place.screen] ?? 0);
    return only(pointAt(state, String(Math.min(400, Math.max(0, at + by)))));
  };
