import { type Change, only } from './change.js';
import type { Effect } from './message.js';
import { searchKey, searchProblemOf } from './search-problem.js';
import type { ScreenName, State } from './state.js';
import { seriesVerdicts } from './verdicts.js';

/** Screens on which a series is looked at: over its limits, its search starts by itself. */
const ofSeries: readonly ScreenName[] = ['series', 'why', 'type-these', 'chart', 'readings'];
/** Screens that show a search. */
const ofWays: readonly ScreenName[] = ['ways', 'front'];

/** Starts the search that the screen asks for, and ends one that an edit made stale. What is still on its way then counts no more. */
export function keepSearching(before: State, after: State): Change {
  const { session, place, search, rules, plan, taken } = after;
  const same =
    session === before.session &&
    rules === before.rules &&
    taken === before.taken &&
    place.screen === before.place.screen &&
    place.seriesId === before.place.seriesId;
  if (same || session === null) return only(session === null && search !== null ? { ...after, search: null } : after);
  const { screen, seriesId } = place;
  const wanted =
    ofWays.includes(screen) || (ofSeries.includes(screen) && seriesVerdicts(after, seriesId)[0]?.verdict.word === 'OVER') ? seriesId : null;
  // Elsewhere a search goes on as long as nothing it hangs on was changed.
  const of = wanted ?? search?.seriesId ?? null;
  const problem = of === null || !session.series.some(({ id }) => id === of) ? null : searchProblemOf(after, of);
  const key = problem === null ? null : searchKey(problem);
  if (search !== null && key === search.key) return only(after);
  const running = search !== null && after.open.search === search.ask;
  if (wanted === null || problem === null || key === null) {
    if (!running) return only(after);
    return [{ ...after, search: null, open: withoutSearch(after.open) }, [{ kind: 'stop-search' }]];
  }
  const ask = after.asks + 1;
  // One worker serves both: a plan that is on its way gives way.
  const planGone = plan !== null && after.open.plan === plan.ask;
  const begun: State = {
    ...after,
    asks: ask,
    open: { ...withoutCarry(after.open), search: ask },
    search: { seriesId: wanted, problem, key, ask, share: null, answer: null, trouble: null },
    plan: planGone ? null : plan,
    allWays: false,
    front: { ...after.front, at: 0 },
    place: after.place.fields.ways === undefined || after.place.fields.ways === 'last' ? place : atFirstWay(place),
  };
  return [begun, [{ kind: 'search', ask, problem } satisfies Effect]];
}

function atFirstWay(place: State['place']): State['place'] {
  return { ...place, fields: { ...place.fields, ways: '0' } };
}

/** A preset that is being carried gives way too; its screen asks again. */
function withoutCarry({ carry: _gone, ...open }: State['open']): State['open'] {
  return open;
}

function withoutSearch({ search: _gone, ...open }: State['open']): State['open'] {
  return open;
}
