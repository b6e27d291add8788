import { type Change, only } from './change.js';
import type { Effect } from './message.js';
import { pictureKey, pictureProblemOf } from './picture-view.js';
import type { State } from './state.js';

/** Asks for the pictures that the picture screen shows, when what they hang on changed. They are asked for on no other screen. */
export function keepDrawing(before: State, after: State): Change {
  const { place, picture } = after;
  if (place.screen !== 'picture') return only(after);
  if (before.session === after.session && before.place === place && before.search === after.search && before.rules === after.rules)
    return only(after);
  const problem = pictureProblemOf(after);
  if (problem === null) return only(after);
  const key = pictureKey(place.seriesId, problem);
  if (picture?.key === key) return only(after);
  const ask = after.asks + 1;
  const drawn = picture?.seriesId === place.seriesId ? picture.drawn : null;
  const next: State = {
    ...after,
    asks: ask,
    open: { ...after.open, picture: ask },
    picture: { seriesId: place.seriesId, key, ask, drawn, trouble: null },
  };
  return [next, [{ kind: 'picture', ask, problem } satisfies Effect]];
}
