import { describe, expect, it } from 'vitest';
import { answerSearch, replyToAsk } from '../../src/effects/answer-search.js';
import { type SearchListener, type SearchPort, searchRunner } from '../../src/effects/run-search.js';
import type { SearchAnswer, SearchAsk, SearchReply } from '../../src/effects/search-protocol.js';
import { liverProblem } from '../scenarios-search/problems.js';

/** A port that works through asks when told to, as a worker does; messages are cloned on their way, as between threads. */
function port(): { readonly port: SearchPort; readonly work: () => void; readonly asks: SearchAsk[] } {
  const asks: SearchAsk[] = [];
  let hear: (reply: SearchReply) => void = () => {};
  return {
    asks,
    port: {
      post: (ask) => {
        asks.push({ ...structuredClone({ number: ask.number, problem: ask.problem }), stop: ask.stop });
      },
      onReply: (listener) => {
        hear = listener;
      },
      onFault: () => {},
      close: () => {},
    },
    work: () => {
      const ask = asks.shift();
      if (ask !== undefined) replyToAsk(ask, (reply) => hear(structuredClone(reply)));
    },
  };
}

function listener(): SearchListener & { readonly answers: SearchAnswer[]; readonly shares: number[] } {
  const answers: SearchAnswer[] = [];
  const shares: number[] = [];
  return {
    answers,
    shares,
    progress: (share) => {
      shares.push(share);
    },
    answered: (answer) => {
      answers.push(answer);
    },
    failed: (message) => {
      throw new Error(message);
    },
  };
}

const problem = liverProblem({ holdS: 11 });

describe('searchRunner', () => {
  it('gives through a worker what the search gives here', () => {
    const { port: open, work } = port();
    const runner = searchRunner(() => open);
    const heard = listener();
    runner.start(problem, heard);
    work();
    expect(heard.answers).toEqual([structuredClone(answerSearch(problem, {}))]);
    expect(heard.shares.at(-1)).toBe(1);
  });

  it('gives the same without a worker', async () => {
    const runner = searchRunner(() => null);
    const answer = await new Promise<SearchAnswer>((resolve, reject) => {
      runner.start(problem, { progress: () => {}, answered: resolve, failed: reject });
    });
    expect(answer).toEqual(answerSearch(problem, {}));
  });

  it('only the newest ask is answered, and the one before is stopped', () => {
    const { port: open, work, asks } = port();
    const runner = searchRunner(() => open);
    const [first, second] = [listener(), listener()];
    runner.start(problem, first);
    runner.start(liverProblem({ holdS: 12 }), second);
    expect(Atomics.load(new Int32Array((asks[0] as SearchAsk).stop), 0)).toBe(1);
    work();
    work();
    expect([first.answers.length, second.answers.length]).toEqual([0, 1]);
  });

  it('stop ends a search with what it has, not proven', () => {
    const { port: open, work } = port();
    const runner = searchRunner(() => open);
    const heard = listener();
    runner.start(problem, heard);
    runner.stop();
    work();
    expect(heard.answers.map(({ result, nothing }) => [result.proven, nothing])).toEqual([[false, null]]);
  });
});
