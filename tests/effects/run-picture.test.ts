import { describe, expect, it } from 'vitest';
import type { PictureAsk, PictureReply } from '../../src/effects/picture-protocol.js';
import { type PicturePort, pictureRunner } from '../../src/effects/run-picture.js';
import type { PictureProblem } from '../../src/picture/picture-problem.js';
import type { ObjectFile } from '../../src/study/object-file.js';
import { knownProblem } from '../session/drawn-picture.js';

/** A worker of plain objects: answers when it is told to. */
function fakeWorker() {
  const asks: PictureAsk[] = [];
  const told: { reply: (reply: PictureReply) => void; fault: () => void } = { reply: () => {}, fault: () => {} };
  let closed = 0;
  const port: PicturePort = {
    post: (ask) => void asks.push(ask),
    onReply: (listener) => {
      told.reply = listener;
    },
    onFault: (listener) => {
      told.fault = listener;
    },
    close: () => {
      closed += 1;
    },
  };
  const failed = (number: number): PictureReply => ({
    number,
    drawn: { ok: false, problems: [{ code: 'x', path: '', message: `reply ${number}`, hint: '' }] },
  });
  return { asks, port, reply: (number: number) => told.reply(failed(number)), fault: () => told.fault(), closed: () => closed };
}

const problem = {} as PictureProblem;
const object = {} as ObjectFile;
const messageOf = (drawn: Awaited<ReturnType<ReturnType<typeof pictureRunner>['draw']>>) =>
  drawn === null ? null : drawn.ok ? 'drawn' : drawn.problems[0]?.message;

describe('the runner of pictures', () => {
  it('draws one at a time, and of those that wait only the newest', async () => {
    const worker = fakeWorker();
    const runner = pictureRunner(() => worker.port);
    const [first, second, third] = [runner.draw(problem, object), runner.draw(problem, object), runner.draw(problem, object)];
    expect(worker.asks.map(({ number }) => number)).toEqual([1]);
    expect(messageOf(await second)).toBeNull();
    worker.reply(1);
    expect(messageOf(await first)).toBe('reply 1');
    expect(worker.asks.map(({ number }) => number)).toEqual([1, 3]);
    worker.reply(3);
    expect(messageOf(await third)).toBe('reply 3');
  });

  it('opens no worker before a picture is asked for', () => {
    let opened = 0;
    const runner = pictureRunner(() => {
      opened += 1;
      return fakeWorker().port;
    });
    expect(opened).toBe(0);
    void runner.draw(problem, object);
    expect(opened).toBe(1);
  });

  it('draws in the program where there is no worker, or where it cannot run: the same picture', async () => {
    const { problem: real, object: brain } = knownProblem();
    const here = await pictureRunner(() => null).draw(real, brain);
    const worker = fakeWorker();
    const runner = pictureRunner(() => worker.port);
    const asked = runner.draw(real, brain);
    worker.fault();
    const given = await asked;
    expect(here?.ok).toBe(true);
    expect(given).toEqual(here);
  });

  it('a fault of our own comes back as a problem', async () => {
    expect(messageOf(await pictureRunner(() => null).draw(problem, object))).toMatch(/^It could not be drawn: /);
  });

  it('answers nothing more once it is closed, and closes its worker', async () => {
    const worker = fakeWorker();
    const runner = pictureRunner(() => worker.port);
    const asked = [runner.draw(problem, object), runner.draw(problem, object)];
    runner.close();
    expect((await Promise.all(asked)).map(messageOf)).toEqual([null, null]);
    expect(worker.closed()).toBe(1);
  });
});
