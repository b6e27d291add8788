import { Worker } from 'node:worker_threads';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { answerSearch } from './answer-search.js';
import type { SearchAnswer, SearchAsk, SearchReply } from './search-protocol.js';

/** What a running search tells. None is called after `stop`, or after a newer search began, save `answered` with `proven: false`. */
export interface SearchListener {
  readonly progress: (share: number) => void;
  readonly answered: (answer: SearchAnswer) => void;
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
  /** Ends the running search at once; it answers with what it has. */
  readonly stop: () => void;
  /** Ends everything: no search can be started any more. */
  readonly close: () => void;
}

interface Running {
  readonly number: number;
  readonly problem: SearchProblem;
  readonly listener: SearchListener;
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

  const finish = (of: number, tell: (listener: SearchListener) => void) => {
    if (running?.number !== of) return;
    const { listener } = running;
    running = null;
    tell(listener);
  };
  const hear = (reply: SearchReply) => {
    if (running?.number !== reply.number) return;
    if (reply.kind === 'progress') running.listener.progress(reply.share);
    else if (reply.kind === 'answer') finish(reply.number, ({ answered }) => answered(reply.answer));
    else finish(reply.number, ({ failed }) => failed(reply.message));
  };
  /** Here, in the program: stoppable only before it begins. */
  const runHere = ({ number: own, problem, flag }: Running) => {
    setImmediate(() => {
      if (running?.number !== own) return;
      try {
        const answer = answerSearch(problem, { stopped: () => Atomics.load(flag, 0) !== 0 });
        finish(own, ({ answered }) => answered(answer));
      } catch (error) {
        finish(own, ({ failed }) => failed(error instanceof Error ? error.message : String(error)));
      }
    });
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
    start: (problem, listener) => {
      if (running !== null) Atomics.store(running.flag, 0, 1);
      number += 1;
      const stop = new SharedArrayBuffer(4);
      running = { number, problem, listener, flag: new Int32Array(stop) };
      port ??= port === null ? null : openPort();
      if (port === null || port === undefined) runHere(running);
      else port.post({ number, problem, stop });
      return number;
    },
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
