import { type Change, only } from './change.js';
import type { Effect } from './message.js';
import { isWide } from './picture-eyes.js';
import { pictureKey, pictureProblemOf } from './picture-view.js';
import type { State } from './state.js';

/** True where pictures are on the screen: on their own, or beside the series of a wide screen when a person asked for that. */
export function showsPictures({ place, pictureEyes, size }: State): boolean {
  return place.screen === 'picture' || (place.screen === 'series' && pictureEyes.beside && isWide(size));
}

/** Asks for the pictures that the screen shows, when what they hang on changed. They are asked for on no other screen. */
export function keepDrawing(before: State, after: State): Change {
  const { place, picture } = after;
  if (!showsPictures(after)) return only(after);
  const shown = showsPictures(before);
  if (shown && before.session === after.session && before.place === place && before.search === after.search && before.rules === after.rules)
    return only(after);
  const problem = pictureProblemOf(after);
  if (problem === null) return only(after);
  const key = pictureKey(after, problem);
  if (picture?.key === key) return only(after);
  const ask = after.asks + 1;
  const drawn = picture?.seriesId === place.seriesId && before.opened === after.opened ? picture.drawn : null;
  const next: State = {
    ...after,
    asks: ask,
    open: { ...after.open, picture: ask },
    picture: { seriesId: place.seriesId, key, ask, drawn, trouble: null },
  };
  return [next, [{ kind: 'picture', ask, problem } satisfies Effect]];
}
