import { type Command, only, open, say } from '../change.js';
import { type PictureEyes, plainEyes } from '../picture-eyes.js';

/** Opens the pictures of the series that is looked at, or of the way under the hand. */
export const showPicture: Command = (state) => only(open(state, 'picture'));

const look =
  (change: (eyes: PictureEyes) => PictureEyes): Command =>
  (state) =>
    only({ ...state, notice: null, pictureEyes: change(state.pictureEyes) });

/** Between the whole field and the square at the fine lines. */
export const turnClose: Command = look((eyes) => ({ ...eyes, close: !eyes.close }));

/** Between both side by side and one picture with a divider. */
export const turnDivider: Command = look((eyes) => ({ ...eyes, divider: eyes.divider === null ? 0.5 : plainEyes.divider }));

/** Keeps the pictures beside the series, or no longer. */
export const turnBeside: Command = (state) => {
  const beside = !state.pictureEyes.beside;
  const words = beside ? 'Pictures stay beside the series where the screen is wide' : 'The range chart stands beside the series again';
  return only(say({ ...state, pictureEyes: { ...state.pictureEyes, beside } }, words));
};

/** Moves the divider; with both side by side it is put in first. */
export const moveDivider = (by: number): Command =>
  look((eyes) => ({ ...eyes, divider: Math.min(1, Math.max(0, Math.round(((eyes.divider ?? 0.5) + by) * 20) / 20)) }));
