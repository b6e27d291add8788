import { type ChildProcess, spawn } from 'node:child_process';
import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';
import type { Readable, Writable } from 'node:stream';
import { onTestFinished } from 'vitest';
import { temporaryFolder } from '../../store/temporary-folder.js';

/** Names under which Linux systems install the browser. */
const names = ['chromium', 'chromium-browser'];

/** The path of the browser; says what to install where there is none, so that no test is left out in silence. */
function chromiumPath(): string {
  for (const folder of (process.env.PATH ?? '').split(delimiter)) {
    for (const name of names) {
      try {
        accessSync(join(folder, name), constants.X_OK);
        return join(folder, name);
      } catch {
        // The next one.
      }
    }
  }
  throw new Error('Chromium is needed to look at the HTML page, and none is on the path: apt-get install chromium (.ci/run does it).');
}

type Message = {
  readonly id?: number;
  readonly method?: string;
  readonly params?: unknown;
  readonly result?: unknown;
  readonly error?: { message: string };
};

/** One page in a headless browser, driven through the DevTools protocol over pipes: no port, no package. */
export interface BrowserPage {
  /** Calls a method of the protocol. */
  readonly call: <T>(method: string, params?: object) => Promise<T>;
  /** Evaluates an expression in the page. */
  readonly evaluate: <T>(expression: string) => Promise<T>;
  /** Resolves with the next event of that name. */
  readonly next: (method: string) => Promise<unknown>;
  /** All events so far. */
  readonly events: readonly { readonly method: string; readonly params: unknown }[];
}

/** Starts the browser with one blank page; it is gone when the test is. */
export async function openBrowser(): Promise<BrowserPage> {
  const profile = temporaryFolder();
  const options = [
    '--headless',
    '--no-sandbox',
    '--disable-gpu',
    '--disable-dev-shm-usage',
    '--no-first-run',
    `--user-data-dir=${profile}`,
  ];
  const child: ChildProcess = spawn(chromiumPath(), [...options, '--remote-debugging-pipe', 'about:blank'], {
    stdio: ['ignore', 'ignore', 'ignore', 'pipe', 'pipe'],
  });
  const ended = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  onTestFinished(async () => {
    child.kill('SIGKILL');
    await ended;
  });
  const send = child.stdio[3] as Writable;
  const events: { method: string; params: unknown }[] = [];
  const waiting = new Map<number, { resolve: (value: unknown) => void; reject: (error: Error) => void }>();
  const listeners: { method: string; resolve: (params: unknown) => void }[] = [];

  function take({ id, method, params, result, error }: Message): void {
    if (id !== undefined) {
      const call = waiting.get(id);
      waiting.delete(id);
      if (error === undefined) call?.resolve(result);
      else call?.reject(new Error(error.message));
    } else if (method !== undefined) {
      events.push({ method, params });
      for (const listener of listeners.splice(0)) {
        if (listener.method === method) listener.resolve(params);
        else listeners.push(listener);
      }
    }
  }

  let rest = '';
  (child.stdio[4] as Readable).setEncoding('utf8').on('data', (text: string) => {
    const parts = (rest + text).split('\0');
    rest = parts.pop() ?? '';
    for (const part of parts) take(JSON.parse(part) as Message);
  });

  let number = 0;
  const callOn = <T>(sessionId: string | undefined, method: string, params: object = {}) =>
    new Promise<T>((resolve, reject) => {
      number += 1;
      waiting.set(number, { resolve: resolve as (value: unknown) => void, reject });
      send.write(`${JSON.stringify({ id: number, method, params, ...(sessionId === undefined ? {} : { sessionId }) })}\0`);
    });
  const { targetId } = await callOn<{ targetId: string }>(undefined, 'Target.createTarget', { url: 'about:blank' });
  const { sessionId } = await callOn<{ sessionId: string }>(undefined, 'Target.attachToTarget', { targetId, flatten: true });
  const call = <T>(method: string, params?: object) => callOn<T>(sessionId, method, params);
  for (const domain of ['Page', 'Runtime', 'Log', 'Network']) await call(`${domain}.enable`);
  return {
    call,
    events,
    next: (method) => new Promise((resolve) => listeners.push({ method, resolve })),
    evaluate: async <T>(expression: string) => {
      const { result, exceptionDetails } = await call<{ result: { value: T }; exceptionDetails?: { text: string } }>('Runtime.evaluate', {
        expression,
        returnByValue: true,
      });
      if (exceptionDetails !== undefined) throw new Error(exceptionDetails.text);
      return result.value;
    },
  };
}
