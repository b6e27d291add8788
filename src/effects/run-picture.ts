import { Worker } from 'node:worker_threads';
import type { Outcome } from '../calc/problem.js';
import type { DrawnPictures, PictureProblem } from '../picture/picture-problem.js';
import type { ObjectFile } from '../study/object-file.js';
import { replyToPictureAsk } from './answer-picture.js';
import type { PictureAsk, PictureReply } from './picture-protocol.js';

/** The part of a worker that pictures need; tests hand in plain objects. */
export interface PicturePort {
  readonly post: (ask: PictureAsk) => void;
  readonly onReply: (listener: (reply: PictureReply) => void) => void;
  readonly onFault: (listener: () => void) => void;
  readonly close: () => void;
}

/** Draws pictures beside the program, one at a time. */
export interface PictureRunner {
  /** Draws; null where a newer ask took the place of this one before it was begun. */
  readonly draw: (problem: PictureProblem, object: ObjectFile) => Promise<Outcome<DrawnPictures> | null>;
  readonly close: () => void;
}

/** A worker of its own bundle, beside the program's file; null where there is none, as when sources run unbundled. */
export function openPictureWorker(programUrl: string): PicturePort | null {
  try {
    const worker = new Worker(new URL('./picture-worker.js', programUrl));
    worker.unref();
    return {
      post: (ask) => worker.postMessage(ask),
      onReply: (listener) => void worker.on('message', listener),
      onFault: (listener) => void worker.on('error', listener),
      close: () => void worker.terminate(),
    };
  } catch {
    return null;
  }
}

interface Waiting {
  readonly ask: PictureAsk;
  readonly tell: (drawn: Outcome<DrawnPictures> | null) => void;
}

/** A runner on a worker, opened on first need, or without one: then it draws in the program itself, after the current turn. */
export function pictureRunner(open: () => PicturePort | null): PictureRunner {
  let port: PicturePort | null | undefined;
  let running: Waiting | null = null;
  let waiting: Waiting | null = null;
  let number = 0;
  let closed = false;

  const hear = ({ number: of, drawn }: PictureReply) => {
    if (running?.ask.number !== of) return;
    const { tell } = running;
    running = null;
    tell(drawn);
    next();
  };
  const drawHere = ({ ask }: Waiting) => {
    setImmediate(() => {
      if (!closed) hear(replyToPictureAsk(ask));
    });
  };
  const openPort = (): PicturePort | null => {
    const opened = open();
    opened?.onReply(hear);
    opened?.onFault(() => {
      // A worker that cannot run is given up: pictures are drawn here instead.
      if (port === opened) port = null;
      if (running !== null) drawHere(running);
    });
    return opened;
  };
  /** One is drawn at a time; of those that wait only the newest is kept. */
  const next = () => {
    if (running !== null || waiting === null || closed) return;
    running = waiting;
    waiting = null;
    if (port === undefined) port = openPort();
    if (port === null) drawHere(running);
    else port.post(running.ask);
  };
  return {
    draw: (problem, object) =>
      new Promise((resolve) => {
        number += 1;
        waiting?.tell(null);
        waiting = { ask: { number, problem, object }, tell: resolve };
        next();
      }),
    close: () => {
      closed = true;
      waiting?.tell(null);
      running?.tell(null);
      waiting = null;
      running = null;
      if (port != null) port.close();
    },
  };
}
