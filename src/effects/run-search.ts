import { Worker } from 'node:worker_threads';
import type { Budget, BudgetProblem } from '../search/budget.js';
import type { CarryProblem, StudyCarry } from '../search/carry-study.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { replyToAsk } from './answer-search.js';
import type { Job, SearchAnswer, SearchAsk, SearchReply } from './search-protocol.js';

/** What a running search tells. None is called after `stop`, or after a newer search began, save `answered` with `proven: false`. */
export interface SearchListener {
  readonly progress: (share: number) => void;
  readonly answered: (answer: SearchAnswer) => void;
  readonly failed: (message: string) => void;
}

/** What a plan that is worked out tells. A plan that was stopped fails. */
export interface PlanListener {
  readonly planned: (plan: Budget) => void;
  readonly failed: (message: string) => void;
}

/** What a preset that is carried tells. */
export interface CarryListener {
  readonly carried: (carried: StudyCarry) => void;
  readonly failed: (message: string) => void;
}

/** The part of a worker that a search needs; tests hand in plain objects. */
export interface SearchPort {
  readonly post: (ask: SearchAsk) => void;
  readonly onReply: (listener: (reply: SearchReply) => void) => void;
  readonly onFault: (listener: (message: string) => void) => void;
  readonly close: () => void;
}

/** Runs searches beside the program, one at a time: starting another stops the one before. */
export interface SearchRunner {
  /** Starts a search and answers its number. */
  readonly start: (problem: SearchProblem, listener: SearchListener) => number;
  /** Starts to plan a session, in the place of what runs, and answers its number. */
  readonly plan: (problem: BudgetProblem, listener: PlanListener) => number;
  /** Carries a preset, in the place of what runs, and answers its number. */
  readonly carry: (problem: CarryProblem, listener: CarryListener) => number;
  /** Ends the running search at once; it answers with what it has. */
  readonly stop: () => void;
  /** Ends everything: no search can be started any more. */
  readonly close: () => void;
}

interface Running {
  readonly number: number;
  readonly ask: SearchAsk;
  readonly hear: (reply: SearchReply) => void;
  readonly flag: Int32Array;
}

/** A worker of the second bundle, beside the program's own file; null where there is none, as when sources run unbundled. */
export function openSearchWorker(programUrl: string): SearchPort | null {
  try {
    const worker = new Worker(new URL('./search-worker.js', programUrl));
    // A search never keeps the program alive.
    worker.unref();
    return {
      post: (ask) => {
        worker.postMessage(ask);
      },
      onReply: (listener) => {
        worker.on('message', listener);
      },
      onFault: (listener) => {
        worker.on('error', (error: unknown) => {
          listener(error instanceof Error ? error.message : String(error));
        });
      },
      close: () => {
        void worker.terminate();
      },
    };
  } catch {
    return null;
  }
}

/** A runner on a worker, or without one: then a search runs in the program itself, after the current turn, with the same result. */
export function searchRunner(open: () => SearchPort | null): SearchRunner {
  let port: SearchPort | null | undefined;
  let running: Running | null = null;
  let number = 0;

  const hear = (reply: SearchReply) => {
    if (running?.number !== reply.number) return;
    const { hear: told } = running;
    if (reply.kind !== 'progress') running = null;
    told(reply);
  };
  /** Here, in the program: stoppable only before it begins. */
  const runHere = ({ number: own, ask }: Running) => {
    setImmediate(() => {
      if (running?.number === own) replyToAsk(ask, hear);
    });
  };
  const begin = (problem: Job, told: Running['hear']): number => {
    if (running !== null) Atomics.store(running.flag, 0, 1);
    number += 1;
    const stop = new SharedArrayBuffer(4);
    running = { number, ask: { number, problem, stop }, hear: told, flag: new Int32Array(stop) };
    port ??= port === null ? null : openPort();
    if (port === null || port === undefined) runHere(running);
    else port.post(running.ask);
    return number;
  };
  const openPort = (): SearchPort | null => {
    const opened = open();
    opened?.onReply(hear);
    opened?.onFault(() => {
      // A worker that cannot run is given up: the search runs here instead.
      if (port === opened) port = null;
      if (running !== null) runHere(running);
    });
    return opened;
  };

  return {
    start: (problem, listener) =>
      begin(problem, (reply) => {
        if (reply.kind === 'progress') listener.progress(reply.share);
        else if (reply.kind === 'answer') listener.answered(reply.answer);
        else if (reply.kind === 'fault') listener.failed(reply.message);
      }),
    plan: (problem, listener) =>
      begin(problem, (reply) => {
        if (reply.kind === 'plan') listener.planned(reply.plan);
        else if (reply.kind === 'fault') listener.failed(reply.message);
      }),
    carry: (problem, listener) =>
      begin(problem, (reply) => {
        if (reply.kind === 'carried') listener.carried(reply.carried);
        else if (reply.kind === 'fault') listener.failed(reply.message);
      }),
    stop: () => {
      if (running !== null) Atomics.store(running.flag, 0, 1);
    },
    close: () => {
      if (running !== null) Atomics.store(running.flag, 0, 1);
      running = null;
      port?.close();
      port = null;
    },
  };
}
