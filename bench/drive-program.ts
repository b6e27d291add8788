import { readFileSync } from 'node:fs';
import { spawn } from '@lydell/node-pty';

/** What a program in a pseudo-terminal did. */
export interface Driven {
  /** From the start of the process to the first output that holds the text waited for, ms. */
  readonly firstFrameMs: number;
  /** Resident memory then, MB; null where the system does not say. */
  readonly memoryMb: number | null;
  /** From each key to the first output after it, ms. */
  readonly keyMs: readonly number[];
  /** Bytes written after each key, until the program was silent. */
  readonly keyBytes: readonly number[];
}

export interface DriveOptions {
  readonly columns: number;
  readonly rows: number;
  /** Text of the first whole frame. */
  readonly ready: string;
  /** Typed one by one, each when the program has been silent after the one before. */
  readonly keys: readonly string[];
  readonly quit: string;
  readonly env?: Readonly<Record<string, string>>;
}

const silenceMs = 12;
const givenUpMs = 20_000;

/** Starts a bundled program with Node in a pseudo-terminal that answers status queries, types keys, and measures. */
export async function driveProgram(file: string, args: readonly string[], options: DriveOptions): Promise<Driven> {
  const { columns, rows, ready, keys, quit, env = {} } = options;
  const started = performance.now();
  const pty = spawn(process.execPath, [file, ...args], {
    name: 'xterm-256color',
    cols: columns,
    rows,
    env: { PATH: process.env.PATH ?? '', HOME: process.env.HOME ?? '', TERM: 'xterm-256color', LANG: 'C.UTF-8', ...env },
  });
  let written = '';
  let bytes = 0;
  let lastMs = 0;
  let wake: () => void = () => {};
  pty.onData((data) => {
    lastMs = performance.now();
    bytes += Buffer.byteLength(data);
    if (written.length < 1e6) written += data;
    // A status query is answered at once, as terminals do.
    for (const query of data.split('\u001b[5n').slice(1)) if (query !== undefined) pty.write('\u001b[0n');
    wake();
  });
  const ended = new Promise<void>((resolve) => pty.onExit(() => resolve()));

  const until = async (holds: () => boolean): Promise<void> => {
    const since = performance.now();
    while (!holds()) {
      if (performance.now() - since > givenUpMs) throw new Error(`${file} did not answer within ${givenUpMs / 1000} s`);
      await new Promise<void>((resolve) => {
        wake = resolve;
        setTimeout(resolve, 4);
      });
    }
  };

  try {
    await until(() => written.includes(ready));
    const firstFrameMs = lastMs - started;
    const memoryMb = residentMb(pty.pid);
    const silent = () => performance.now() - lastMs >= silenceMs;
    const keyMs: number[] = [];
    const keyBytes: number[] = [];
    await until(silent);
    for (const key of keys) {
      const before = bytes;
      const pressed = performance.now();
      pty.write(key);
      await until(() => bytes > before);
      keyMs.push(lastMs - pressed);
      await until(silent);
      keyBytes.push(bytes - before);
    }
    pty.write(quit);
    await Promise.race([ended, new Promise((resolve) => setTimeout(resolve, 3000))]);
    return { firstFrameMs, memoryMb, keyMs, keyBytes };
  } finally {
    try {
      pty.kill('SIGKILL');
    } catch {
      // It ended by itself.
    }
  }
}

function residentMb(pid: number): number | null {
  try {
    const kb = /VmRSS:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1];
    return kb === undefined ? null : Number(kb) / 1024;
  } catch {
    return null;
  }
}
