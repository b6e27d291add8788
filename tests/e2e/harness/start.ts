import { type IPty, spawn } from '@lydell/node-pty';
import { createVirtualScreen, type ScreenCell, type VirtualScreen } from './virtual-screen.js';

/** How a program is started. */
export interface StartOptions {
  readonly columns?: number;
  readonly rows?: number;
  /** Added to a bare environment: PATH, HOME, TERM, LANG. A value of undefined takes one away. */
  readonly env?: Readonly<Record<string, string | undefined>>;
  readonly cwd?: string;
  /** Whether the terminal answers status queries, as real ones do. True unless told otherwise. */
  readonly answers?: boolean;
}

/** How a program ended: an exit code, or the number of the signal that killed it. */
export interface ProgramEnd {
  readonly exitCode: number;
  readonly signal: number;
}

/** A program that runs in a pseudo-terminal. */
export interface RunningProgram {
  /** Types: any text, with `keyBytes` for the keys that are none. One call is one write. */
  readonly press: (keys: string) => void;
  readonly text: () => string;
  readonly cell: (x: number, y: number) => ScreenCell;
  readonly screen: VirtualScreen;
  /** Waits until the screen holds a text, or a test of the program holds. Fails with the screen in the message. */
  readonly waitFor: (wanted: string | RegExp | ((program: RunningProgram) => boolean), timeoutMs?: number) => Promise<void>;
  readonly resize: (columns: number, rows: number) => void;
  /** Sends a signal to the process that was started. */
  readonly kill: (signal: NodeJS.Signals) => void;
  readonly pid: number;
  /** Null while it runs. */
  readonly exitCode: () => number | null;
  readonly exited: Promise<ProgramEnd>;
  /** Bytes that the program has written so far, and all that it wrote. */
  readonly bytesWritten: () => number;
  readonly output: () => string;
  /** Status queries that the terminal has been asked and has not answered; with `answers: false` the test answers them. */
  readonly heldAnswers: () => number;
  readonly answer: () => void;
  /** Takes the terminal away, as when a window is closed or a line breaks. */
  readonly hangUp: () => void;
  /** Ends the program if it still runs. Call it in every test. */
  readonly close: () => Promise<void>;
}

const pollMs = 10;

function bareEnvironment(added: StartOptions['env']): Record<string, string> {
  const bare = { PATH: process.env.PATH, HOME: process.env.HOME, TERM: 'xterm-256color', LANG: 'C.UTF-8', ...added };
  return Object.fromEntries(Object.entries(bare).filter((entry): entry is [string, string] => entry[1] !== undefined));
}

/**
 * Starts a program in a pseudo-terminal and rebuilds its screen as cells.
 *
 * @example
 * const program = start('node', ['dist/holdfast.js'], { columns: 80, rows: 24 });
 * await program.waitFor('FITS');
 * program.press(keyBytes.down);
 */
export function start(command: string, args: readonly string[], options: StartOptions = {}): RunningProgram {
  const { columns = 80, rows = 24, answers = true } = options;
  const screen = createVirtualScreen(columns, rows);
  const pty: IPty = spawn(command, [...args], {
    name: 'xterm-256color',
    cols: columns,
    rows,
    cwd: options.cwd ?? process.cwd(),
    env: bareEnvironment(options.env),
    encoding: null,
  });
  const chunks: Buffer[] = [];
  const held: string[] = [];
  let end: ProgramEnd | null = null;
  const running: { writes: Promise<void> } = { writes: Promise.resolve() };

  // With no encoding the chunks are bytes, whatever the type says.
  pty.onData((data) => {
    const chunk = Buffer.from(data);
    chunks.push(chunk);
    running.writes = screen.write(chunk);
  });
  screen.terminal.onData((answer) => {
    if (answers) pty.write(answer);
    else held.push(answer);
  });
  const exited = new Promise<ProgramEnd>((resolve) => {
    pty.onExit(({ exitCode, signal }) => {
      // What it wrote last may still be on its way through the pseudo-terminal.
      setTimeout(() => {
        end = { exitCode, signal: signal ?? 0 };
        void running.writes.then(() => resolve({ exitCode, signal: signal ?? 0 }));
      }, 20);
    });
  });

  const program: RunningProgram = {
    press: (keys) => pty.write(keys),
    text: screen.text,
    cell: screen.cell,
    screen,
    waitFor: async (wanted, timeoutMs = 10_000) => {
      const deadline = Date.now() + timeoutMs;
      const holds = () =>
        typeof wanted === 'function'
          ? wanted(program)
          : wanted instanceof RegExp
            ? wanted.test(screen.text())
            : screen.text().includes(wanted);
      while (!holds()) {
        if (Date.now() > deadline)
          throw new Error(`waited ${timeoutMs} ms in vain for ${String(wanted)}; the screen shows:\n${screen.text()}`);
        await new Promise((resolve) => setTimeout(resolve, pollMs));
      }
    },
    resize: (nextColumns, nextRows) => {
      screen.terminal.resize(nextColumns, nextRows);
      pty.resize(nextColumns, nextRows);
    },
    kill: (signal) => {
      process.kill(pty.pid, signal);
    },
    pid: pty.pid,
    exitCode: () => end?.exitCode ?? null,
    exited,
    bytesWritten: () => chunks.reduce((sum, chunk) => sum + chunk.length, 0),
    output: () => Buffer.concat(chunks).toString('utf8'),
    heldAnswers: () => held.length,
    answer: () => {
      const answer = held.shift();
      if (answer !== undefined) pty.write(answer);
    },
    hangUp: () => {
      // Not in the types of node-pty: it closes the master side.
      (pty as IPty & { destroy: () => void }).destroy();
    },
    close: async () => {
      if (end === null) pty.kill('SIGKILL');
      await exited;
      screen.terminal.dispose();
    },
  };
  return program;
}
