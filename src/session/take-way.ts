import { classRow } from '../calc/classes.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';
import { classOf } from '../calc/series.js';
import { edit, say } from './change.js';
import { sessionSeries } from './results.js';
import { eachSeries, isLocked, pairedSeries } from './set-field.js';
import type { State } from './state.js';
import { baseSet } from './ways.js';

/** Sets what a way sets on a series, and what it changes in the pairs of that series too, as one step that can be undone. */
export function takeSet(state: State, id: string, given: GivenParameters, words: string): State {
  const base = baseSet(state, id);
  const keys = (Object.keys(given) as ParameterKey[]).filter((key) => JSON.stringify(given[key]) !== JSON.stringify(base[key]));
  const pairs = pairedSeries(state, id);
  if (JSON.stringify(sessionSeries(state, id).set) === JSON.stringify(given)) return say(state, 'These values are set already');
  const also = new Map<string, GivenParameters>();
  for (const pair of pairs) {
    const has = classRow(classOf(pair)).parameters;
    const entries = keys.filter((key) => has.includes(key) && !isLocked(state, pair.id, key)).map((key) => [key, given[key]]);
    if (entries.length > 0) also.set(pair.id, Object.fromEntries(entries) as GivenParameters);
  }
  const said = also.size === 0 ? words : `${words}, also in ${[...also.keys()].join(', ')}`;
  const next = edit(state, said, (session) =>
    eachSeries(session, new Set([id, ...also.keys()]), (series) => ({
      ...series,
      set: series.id === id ? given : { ...series.set, ...also.get(series.id) },
    })),
  );
  return { ...next, taken: { seriesId: id, base, given } };
}
