import type { Answer, Effect } from '../session/message.js';
import type { InterfaceWorld } from './interface-world.js';

/** How long a search runs before its progress is said, and how often then, ms. */
const quietMs = 200;
const everyMs = 100;

type Part = Pick<InterfaceWorld, 'searches' | 'tell'>;

/** Searches ways beside the program. A newer search, or a stop, ends it; one that gave way to another never answers. */
export function searchWays({ searches, tell }: Part, { ask, problem }: Extract<Effect, { kind: 'search' }>): Promise<Answer> {
  const begunMs = performance.now();
  let toldMs = begunMs + quietMs - everyMs;
  return new Promise((resolve) => {
    searches.start(problem, {
      progress: (share) => {
        const nowMs = performance.now();
        if (nowMs - toldMs < everyMs) return;
        toldMs = nowMs;
        tell({ kind: 'progress', ask, share });
      },
      answered: ({ result, nothing }) => resolve({ kind: 'ways', ways: { result, nothing } }),
      failed: (message) => resolve(failure('search-failed', message)),
    });
  });
}

/** Plans the session beside the program. */
export function planSession({ searches }: Part, { problem }: Extract<Effect, { kind: 'plan' }>): Promise<Answer> {
  return new Promise((resolve) => {
    searches.plan(problem, {
      planned: (plan) => resolve({ kind: 'plan', plan }),
      failed: (message) => resolve(failure('plan-failed', message)),
    });
  });
}

function failure(code: string, message: string): Answer {
  return {
    kind: 'failed',
    problems: [{ code, path: '', message: `It could not be worked out: ${message}.`, hint: 'Set values by hand.' }],
  };
}
