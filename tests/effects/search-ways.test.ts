import { describe, expect, it } from 'vitest';
import { type SearchListener, type SearchPort, searchRunner } from '../../src/effects/run-search.js';
import type { SearchAnswer } from '../../src/effects/search-protocol.js';
import { planSession, searchWays } from '../../src/effects/search-ways.js';
import { usualBands } from '../../src/search/bands.js';
import { type BudgetProblem, planBudget } from '../../src/search/budget.js';
import type { Message } from '../../src/session/message.js';
import { liverProblem } from '../scenarios-search/problems.js';

const problem = liverProblem({ holdS: 11 });

/** A runner whose listener the test holds in its hands. */
function held() {
  const listeners: SearchListener[] = [];
  const told: Message[] = [];
  const searches = {
    start: (_problem: unknown, listener: SearchListener) => listeners.push(listener),
    plan: () => 0,
    carry: () => 0,
    stop: () => {},
    close: () => {},
  };
  return { world: { searches, tell: (message: Message) => void told.push(message) }, listeners, told };
}

describe('searchWays', () => {
  it('says nothing of its progress in its first moments', () => {
    const { world, listeners, told } = held();
    void searchWays(world, { kind: 'search', ask: 7, problem });
    listeners[0]?.progress(0.1);
    expect(told).toEqual([]);
  });

  it('answers with what the search found, or why it failed', async () => {
    const { world, listeners } = held();
    const answer = searchWays(world, { kind: 'search', ask: 7, problem });
    const found = { result: { ways: [] }, nothing: null } as unknown as SearchAnswer;
    listeners[0]?.answered(found);
    expect(await answer).toEqual({ kind: 'ways', ways: found });
    const failing = searchWays(world, { kind: 'search', ask: 8, problem });
    listeners[1]?.failed('it broke');
    expect(await failing).toMatchObject({ kind: 'failed', problems: [{ code: 'search-failed' }] });
  });
});

describe('planSession', () => {
  const { series, scanner, body, rules } = problem;
  const budget: BudgetProblem = {
    study: {
      format: 'holdfast preset',
      version: 1,
      id: 'one',
      title: 'one',
      region: 'liver',
      fieldT: 3,
      status: 'draft',
      revision: 1,
      notes: '',
      minimumSet: [],
      series: [series],
    },
    scanner,
    body,
    rules,
    minutes: 3,
    longestS: null,
    overheadS: 20,
    done: [],
    bands: usualBands,
    readings: {},
  };

  it('gives what the plan gives here, and a plan takes the place of a search', async () => {
    const closed: SearchPort | null = null;
    const searches = searchRunner(() => closed);
    const heard: string[] = [];
    searches.start(problem, { progress: () => {}, answered: () => heard.push('answered'), failed: () => heard.push('failed') });
    const answer = await planSession({ searches, tell: () => {} }, { kind: 'plan', ask: 1, problem: budget });
    expect(answer).toEqual({ kind: 'plan', plan: planBudget(budget) });
    expect(heard).toEqual([]);
  });

  it('keeps what was set by hand: a plan starts from it', () => {
    const set = { sliceThicknessMm: 4, sliceCount: 54 };
    const asSet = { [series.id]: { set, readings: {}, frozen: false } };
    const before = planBudget({ ...budget, minutes: 30 }).plan[0];
    const planned = planBudget({ ...budget, minutes: 30, asSet }).plan[0];
    expect(planned?.choice).toBe('as it is');
    expect(planned?.given).toMatchObject(set);
    expect(planned?.timeS).toBeLessThan(before?.timeS ?? 0);
    const frozen = planBudget({ ...budget, minutes: 2, asSet: { [series.id]: { set: {}, readings: {}, frozen: true } } });
    expect(frozen.plan[0]?.choice).not.toBe('shortened');
  });
});
