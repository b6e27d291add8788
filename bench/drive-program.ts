import { readFileSync } from 'node:fs';
import { spawn } from '@lydell/node-pty';
import { createVirtualScreen } from '../tests/e2e/harness/virtual-screen.js';

export interface DriveOptions {
  readonly columns: number;
  readonly rows: number;
  readonly env?: Readonly<Record<string, string>>;
  /** Options of Node before the program. */
  readonly node?: readonly string[];
}

/** What one key did. */
export interface KeyAnswer {
  /** From the key to the first output after it, ms; null where nothing came. */
  readonly ms: number | null;
  /** Bytes written until the program was silent. */
  readonly bytes: number;
}

/** A bundled program run by Node in a pseudo-terminal, measured from outside. */
export interface DrivenProgram {
  press(keys: string): void;
  /** Waits for a text on the screen; the time since the process was started, ms. */
  shows(text: string): Promise<number>;
  /** Types one key, waits for its frame and then for silence. */
  key(key: string): Promise<KeyAnswer>;
  silence(): Promise<void>;
  /** Resident memory now, MB; null where the system does not say. */
  memoryMb(): number | null;
  close(): void;
}

/** Longer than the 33 ms of a frame at 30 a second: the next key is drawn at once, and not held back by the one before. */
const silenceMs = 45;
const noAnswerMs = 400;
const givenUpMs = 30_000;

/** Starts a program in a pseudo-terminal that answers what terminals answer. */
export function drive(file: string, args: readonly string[], { columns, rows, env = {}, node = [] }: DriveOptions): DrivenProgram {
  const screen = createVirtualScreen(columns, rows);
  const started = performance.now();
  const pty = spawn(process.execPath, [...node, file, ...args], {
    name: 'xterm-256color',
    cols: columns,
    rows,
    env: { PATH: process.env.PATH ?? '', HOME: process.env.HOME ?? '', TERM: 'xterm-256color', LANG: 'C.UTF-8', ...env },
  });
  let bytes = 0;
  let lastMs = started;
  let wake: () => void = () => {};
  pty.onData((data) => {
    lastMs = performance.now();
    bytes += Buffer.byteLength(data);
    void screen.write(data).then(() => wake());
    wake();
  });
  screen.terminal.onData((answer) => pty.write(answer));

  const until = async (holds: () => boolean, longestMs: number): Promise<boolean> => {
    const since = performance.now();
    while (!holds()) {
      if (performance.now() - since > longestMs) return false;
      await new Promise<void>((resolve) => {
        const timer = setTimeout(resolve, 5);
        wake = () => {
          clearTimeout(timer);
          resolve();
        };
      });
    }
    return true;
  };
  const silence = async () => {
    await until(() => performance.now() - lastMs >= silenceMs, givenUpMs);
  };

  return {
    press: (keys) => pty.write(keys),
    shows: async (text) => {
      const came = await until(() => screen.text().includes(text), givenUpMs);
      if (!came) throw new Error(`waited in vain for "${text}"; the screen shows:\n${screen.text()}`);
      return lastMs - started;
    },
    key: async (key) => {
      const before = bytes;
      const pressed = performance.now();
      let firstMs = 0;
      pty.write(key);
      const answered = await until(() => {
        if (bytes > before && firstMs === 0) firstMs = lastMs;
        return firstMs !== 0;
      }, noAnswerMs);
      await silence();
      return { ms: answered ? firstMs - pressed : null, bytes: bytes - before };
    },
    silence,
    memoryMb: () => residentMb(pty.pid),
    close: () => {
      try {
        pty.kill('SIGKILL');
      } catch {
        // It ended by itself.
      }
    },
  };
}

function residentMb(pid: number): number | null {
  try {
    const kb = /VmRSS:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1];
    return kb === undefined ? null : Number(kb) / 1024;
  } catch {
    return null;
  }
}
