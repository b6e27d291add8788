import { describe, expect, it } from 'vitest';
import { answerSearch } from '../../src/effects/answer-search.js';
import { planBudget } from '../../src/search/budget.js';
import type { Effect, Message } from '../../src/session/message.js';
import { resultNow, sessionSeries } from '../../src/session/results.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { seriesHeadline } from '../../src/session/verdicts.js';
import { frontSet, listedWays, shownWays, wayHere } from '../../src/session/ways.js';
import { searchNotes, searchStatus } from '../../src/session/ways-words.js';
import { after, keyOf, onField, press, sessionOn } from './invented-state.js';

const key = (name: string): Message => ({ kind: 'key', key: keyOf(name), atMs: 1 });

/** Presses one key and keeps what it asked for. */
const pressed = (state: State, name: string) => after(state, [key(name)]);

const asked = <K extends Effect['kind']>(effects: readonly Effect[], kind: K) =>
  effects.find((effect): effect is Extract<Effect, { kind: K }> => effect.kind === kind);

/** Answers the newest search as the worker would. */
function answered(state: State): State {
  const { search } = state;
  if (search === null) throw new Error('no search is asked for');
  const ways = answerSearch(search.problem, {});
  return update(state, { kind: 'answer', ask: search.ask, answer: { kind: 'ways', ways } })[0];
}

/** The liver at 3 T for 11 s, its dynamic series open: over, so its search has begun. */
const liver = () => press(sessionOn('liver-3t'), 'p', '11', 'enter', 'escape', 'enter');
const found = answered(liver());
const ways = press(found, 'f');

describe('the search of a series', () => {
  it('starts by itself when the series is over, with what limits this patient', () => {
    const order = press(sessionOn('liver-3t'), 'p', '11', 'enter', 'escape');
    const { effects } = pressed(order, 'enter');
    expect(asked(effects, 'search')?.problem.limits).toEqual({ holdS: 11 });
  });

  it('does not start for a series within its limits, until it is asked for', () => {
    const state = press(sessionOn('liver-3t'), 'p', '30', 'enter', 'escape', 'enter');
    expect(state.search).toBeNull();
    expect(asked(pressed(state, 'f').effects, 'search')?.problem.limits).toEqual({ holdS: 30 });
  });

  it('begins anew with every edit, and an answer to an older ask is dropped', () => {
    const first = liver();
    const edited = pressed(onField(first, 'sliceCount'), '-');
    const newer = asked(edited.effects, 'search');
    expect(newer?.problem.set).toEqual({ sliceCount: 70 });
    const stale: Message = {
      kind: 'answer',
      ask: first.search?.ask ?? -1,
      answer: { kind: 'ways', ways: answerSearch(found.search!.problem, {}) },
    };
    expect(update(edited.state, stale)[0].search?.answer).toBeNull();
    expect(update(edited.state, { kind: 'progress', ask: first.search?.ask ?? -1, share: 0.5 })[0].search?.share).toBeNull();
    expect(update(edited.state, { kind: 'progress', ask: newer?.ask ?? -1, share: 0.5 })[0].search?.share).toBe(0.5);
  });

  it('is ended by an edit after which the series fits', () => {
    const state = press(onField(liver(), 'sliceThicknessMm'), '+', '+');
    const { state: fits, effects } = after(onField(state, 'sliceCount'), [...'30'].map(key).concat(key('enter')));
    expect(seriesHeadline(fits, 't1-3d').word).toBe('FITS');
    expect(effects.map(({ kind }) => kind)).toContain('stop-search');
    expect(fits.search).toBeNull();
  });

  it('goes on while other screens are looked at', () => {
    const state = liver();
    const { state: elsewhere, effects } = pressed(state, 'o');
    expect(elsewhere.search?.ask).toBe(state.search?.ask);
    expect(effects).toEqual(expect.not.arrayContaining([expect.objectContaining({ kind: 'stop-search' })]));
  });

  it('Escape on the ways ends it with what it has, not proven; the next Escape goes back', () => {
    const searching = press(liver(), 'f');
    const { state, effects } = pressed(searching, 'escape');
    expect(asked(effects, 'stop-search')).toBeDefined();
    expect(state.place.screen).toBe('ways');
    const partial = { ...answerSearch(state.search!.problem, {}) };
    const stopped = { result: { ...partial.result, proven: false, fitting: null }, nothing: null };
    const told = update(state, { kind: 'answer', ask: state.search!.ask, answer: { kind: 'ways', ways: stopped } })[0];
    expect(searchStatus(told).words).toContain('NOT PROVEN');
    expect(press(told, 'escape').place.screen).toBe('series');
  });

  it('a cap without its reading is not searched for, and that is said', () => {
    const state = press(sessionOn('lumbar-spine-1.5t'), 'p', 'down', 'down', 'down', 'down', 'down', '2', 'enter', 'escape', 'enter', 'f');
    expect(state.session?.limits.b1rmsCapUt).toBe(2);
    expect(state.search?.problem.limits).toEqual({});
    expect(searchNotes(state).join(' ')).toContain("B1+rms cap 2 uT is not searched for: type the scanner's number (d)");
  });
});

describe('the ways', () => {
  it('three come first, the rest on a key; what fits stands before what is too close', () => {
    expect(shownWays(ways)).toHaveLength(3);
    const all = shownWays(press(ways, 'm'));
    expect(all.length).toBeGreaterThan(3);
    const words = all.map(({ way }) => way.verdict);
    expect(words).toEqual([...words].sort((a, b) => ['FITS', 'TOO CLOSE', 'OVER'].indexOf(a) - ['FITS', 'TOO CLOSE', 'OVER'].indexOf(b)));
  });

  it('Enter takes the one under the hand: exactly what it sets, as one step that undo takes back', () => {
    const here = wayHere(press(ways, 'down'));
    const taken = press(ways, 'down', 'enter');
    expect(sessionSeries(taken, 't1-3d').set).toEqual(here?.listed.way.given);
    expect(resultNow(taken, 't1-3d').evaluation.figures).toEqual(here?.listed.way.figures);
    expect(seriesHeadline(taken, 't1-3d').word).toBe('FITS');
    expect(taken.place.screen).toBe('series');
    expect(sessionSeries(press(taken, 'u'), 't1-3d').set).toEqual({});
  });

  it('a digit takes the way of that number', () => {
    const listed = listedWays(found.search!.answer!)[1];
    expect(sessionSeries(press(ways, '2'), 't1-3d').set).toEqual(listed?.way.given);
    expect(press(press(liver(), 'f'), '9').notice?.words).toBe('There is no way 9');
  });

  it('after one is taken the list still stands, so that another can be taken instead', () => {
    const again = press(ways, '1', 'f');
    expect(shownWays(again)).toEqual(shownWays(ways));
    expect(sessionSeries(press(again, '3'), 't1-3d').set).toEqual(listedWays(found.search!.answer!)[2]?.way.given);
  });

  it('the way looked at last is called back, also after the list is gone', () => {
    const looked = press(ways, 'down', 'down', 'escape');
    const third = listedWays(found.search!.answer!)[2];
    expect(wayHere(press(looked, 'a'))?.listed).toEqual(third);
    const gone = press(onField(looked, 'sliceCount'), '-', 'a');
    expect(wayHere(gone)).toEqual({ number: null, listed: third });
    expect(sessionSeries(press(gone, 'enter'), 't1-3d').set).toEqual(third?.way.given);
  });

  it('values set by hand stay in every way', () => {
    const byHand = answered(press(onField(liver(), 'sliceThicknessMm'), '+'));
    for (const { way } of listedWays(byHand.search!.answer!)) expect(way.given.sliceThicknessMm).toBe(3.5);
  });

  it('a point of the front is taken with all its changes', () => {
    const front = press(ways, 'c', 'left');
    const set = frontSet(front);
    expect(seriesHeadline(front, 't1-3d').word).toBe('OVER');
    const taken = press(front, 'enter');
    expect(sessionSeries(taken, 't1-3d').set).toEqual(set);
    expect(seriesHeadline(taken, 't1-3d').word).not.toBe('OVER');
  });

  it('what is kept can be changed: the search begins anew with it, and undo brings the usual back', () => {
    const kept = press(ways, 'k', '90', 'enter');
    expect(kept.session?.keep?.relativeSnr).toBe(0.9);
    const { state, effects } = pressed(kept, 'escape');
    expect(asked(effects, 'search')?.problem.bands.relativeSnr).toBe(0.9);
    expect(press(state, 'u').session?.keep).toBeUndefined();
    for (const { way } of listedWays(answered(state).search!.answer!)) expect(way.figures.relativeSnr).toBeGreaterThanOrEqual(0.9 - 1e-9);
  });

  it('where nothing fits: what binds, the way that needs least, and it is no way that fits', () => {
    const none = answered(press(sessionOn('liver-3t'), 'p', '2', 'enter', 'escape', 'enter', 'f'));
    expect(searchStatus(none).words).toBe('Nothing fits.');
    const [first] = shownWays(none);
    expect(first?.binding?.binders.map(({ name }) => name)).toContain('holdS');
    expect(first?.way.verdict).toBe('OVER');
  });
});

describe('where nothing fits', () => {
  const none = press(sessionOn('liver-3t'), 'p', '2', 'enter', 'escape', 'enter', 'f');
  const told = (nothing: { readonly bindings: []; readonly proven: boolean }) => {
    const { result } = answerSearch(none.search!.problem, {});
    return update(none, { kind: 'answer', ask: none.search!.ask, answer: { kind: 'ways', ways: { result, nothing } } })[0];
  };

  it('what binds is said to be not proven where the search for it was stopped', () => {
    expect(searchStatus(told({ bindings: [], proven: false })).words).toBe(
      'Nothing fits. What binds is not proven: the search for it was stopped.',
    );
  });

  it('says that no limit is what stands against it where nothing helps', () => {
    expect(searchStatus(told({ bindings: [], proven: true })).words).toBe(
      'Nothing fits. Not even without any limit: the series itself is in error.',
    );
  });
});

describe('the budget', () => {
  const lumbar = press(sessionOn('lumbar-spine-1.5t'), 'p', ...Array<string>(3).fill('down'), '8', 'enter', 'escape');

  it('without minutes it says what is missing', () => {
    expect(press(sessionOn('liver-3t'), 'b').notice?.words).toContain('No minutes are said');
  });

  it('plans what is still to do, and taking it is one step', () => {
    expect(lumbar.session?.limits.minutesLeft).toBe(8);
    const { state, effects } = pressed(lumbar, 'b');
    const plan = asked(effects, 'plan');
    expect(plan?.problem.minutes).toBe(8);
    const told = update(state, {
      kind: 'answer',
      ask: plan?.ask ?? -1,
      answer: { kind: 'plan', plan: planBudget(plan!.problem) },
    })[0];
    expect(told.plan?.answer?.verdict.word).not.toBe('OVER');
    const taken = press(told, 'enter');
    const rows = told.plan?.answer?.plan ?? [];
    for (const { series, choice, given } of rows) {
      const own = sessionSeries(taken, series.id);
      expect(own.state).toBe(choice === 'skipped' ? 'not-done' : 'to-do');
      if (choice !== 'skipped') expect(own.set).toEqual(choice === 'shortened' ? given : {});
    }
    expect(taken.past).toHaveLength(told.past.length + 1);
    expect(press(taken, 'u').session?.series).toEqual(told.session?.series);
    expect(taken.place.screen).toBe('order');
  });

  it('what is done and what was skipped by hand is not planned again', () => {
    const { effects } = pressed(press(lumbar, 'd', 'down', 'k'), 'b');
    const problem = asked(effects, 'plan')?.problem;
    expect(problem?.done).toEqual([lumbar.session?.series[0]?.id]);
    expect(problem?.study.series.map(({ id }) => id)).not.toContain(lumbar.session?.series[1]?.id);
  });

  it('Escape ends a plan that is worked out', () => {
    const { state, effects } = pressed(press(lumbar, 'b'), 'escape');
    expect(asked(effects, 'stop-search')).toBeDefined();
    expect([state.plan, state.place.screen]).toEqual([null, 'order']);
  });
});
