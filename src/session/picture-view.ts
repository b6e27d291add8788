import type { GivenParameters } from '../calc/series.js';
import type { PictureProblem } from '../picture/picture-problem.js';
import { scannerNow } from './equipment.js';
import { bodyOf, resultWith, sessionSeries, studySeries } from './results.js';
import type { State } from './state.js';
import { frontSet, wayHere } from './ways.js';

/** What stands beside the preset: the way or the point of the front that the picture was opened from, else the series as it is now. */
export function pictureSet(state: State): { readonly set: GivenParameters; readonly of: 'now' | 'way' } {
  const { back, screen, seriesId } = state.place;
  const from = screen === 'picture' ? back.at(-1) : screen;
  const set = from === 'ways' ? wayHere(state)?.listed.way.given : from === 'front' ? frontSet(state) : null;
  return set == null ? { set: sessionSeries(state, seriesId).set, of: 'now' } : { set, of: 'way' };
}

/** Everything the pictures of the screen are asked with; null where no session is open. */
export function pictureProblemOf(state: State): PictureProblem | null {
  const { opened, session, place } = state;
  if (opened === null || session === null || !session.series.some(({ id }) => id === place.seriesId)) return null;
  const preset = studySeries(state, place.seriesId);
  const { parameters } = resultWith(state, place.seriesId, pictureSet(state).set);
  return {
    region: opened.study.region,
    preset,
    presetFieldT: opened.study.fieldT,
    parameters,
    scanner: scannerNow(state) ?? opened.scanner,
    body: bodyOf(state),
  };
}

/** Two asks with the same key have the same pictures. */
export function pictureKey({ opened, place }: State, { parameters, scanner, body }: PictureProblem): string {
  return JSON.stringify([
    opened?.study.id,
    opened?.study.revision,
    opened?.hash,
    place.seriesId,
    parameters,
    scanner.name,
    scanner.fieldT,
    scanner.coil?.name,
    body,
  ]);
}
