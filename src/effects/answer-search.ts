import { planBudget } from '../search/budget.js';
import type { SearchControl } from '../search/control.js';
import { nothingFits } from '../search/nothing-fits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { search } from '../search/search.js';
import type { SearchAnswer, SearchAsk, SearchReply } from './search-protocol.js';

/** The search, and where nothing fits what binds: the one path that worker and program share, so that both give the same. */
export function answerSearch(problem: SearchProblem, control: SearchControl): SearchAnswer {
  const result = search(problem, control);
  const nothing = result.ways.length === 0 && result.proven ? nothingFits(problem, control) : null;
  return { result, nothing };
}

/** Answers one ask by replies, the last of which is its answer. */
export function replyToAsk({ number, problem, stop }: SearchAsk, reply: (message: SearchReply) => void): void {
  const flag = new Int32Array(stop);
  const stopped = () => Atomics.load(flag, 0) !== 0;
  const progress = (share: number) => {
    reply({ number, kind: 'progress', share });
  };
  try {
    if ('study' in problem) {
      reply({ number, kind: 'plan', plan: planBudget(problem, { stopped }) });
      return;
    }
    reply({ number, kind: 'answer', answer: answerSearch(problem, { stopped, progress }) });
  } catch (error) {
    reply({ number, kind: 'fault', message: error instanceof Error ? error.message : String(error) });
  }
}
