import type { Evaluation } from '../calc/evaluate.js';
import { planBudget } from '../search/budget.js';
import { carryStudy, type StudyCarry } from '../search/carry-study.js';
import type { SearchControl } from '../search/control.js';
import { nothingFits } from '../search/nothing-fits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { search } from '../search/search.js';
import type { SearchAnswer, SearchAsk, SearchReply } from './search-protocol.js';

/** The search, and where nothing fits what binds: the one path that worker and program share, so that both give the same. */
export function answerSearch(problem: SearchProblem, control: SearchControl): SearchAnswer {
  const result = search(problem, control);
  const nothing = result.ways.length === 0 && result.proven ? nothingFits(problem, control, result.nearest) : null;
  return { result, nothing };
}

/** The same with cautions as plain data: a sentence that is put together when it is read does not go through a message. */
function plainCarry(carried: StudyCarry): StudyCarry {
  const plain = (evaluation: Evaluation): Evaluation => ({
    ...evaluation,
    cautions: evaluation.cautions.map(({ code, level, text, numbers }) => ({ code, level, text, numbers })),
  });
  const series = carried.series.map((one) => ({ ...one, before: plain(one.before), evaluation: plain(one.evaluation) }));
  return { ...carried, series };
}

/** Answers one ask by replies, the last of which is its answer. */
export function replyToAsk({ number, problem, stop }: SearchAsk, reply: (message: SearchReply) => void): void {
  const flag = new Int32Array(stop);
  const stopped = () => Atomics.load(flag, 0) !== 0;
  const progress = (share: number) => {
    reply({ number, kind: 'progress', share });
  };
  try {
    if ('carry' in problem) {
      reply({ number, kind: 'carried', carried: plainCarry(carryStudy(problem.carry, problem.circumstances)) });
      return;
    }
    if ('study' in problem) {
      reply({ number, kind: 'plan', plan: planBudget(problem, { stopped }) });
      return;
    }
    reply({ number, kind: 'answer', answer: answerSearch(problem, { stopped, progress }) });
  } catch (error) {
    reply({ number, kind: 'fault', message: error instanceof Error ? error.message : String(error) });
  }
}
