import type { Key } from './keys/key.js';
import { keyTiming } from './keys/key-timing.js';
import { listenForKeys } from './keys/listen-for-keys.js';
import type { LeaveReason } from './leave-reason.js';
import { createPainter } from './painter/painter.js';
import { holdScreen } from './screen-hold.js';
import { type Size, sizeOf } from './size.js';
import type { TerminalOptions } from './terminal-options.js';
import { endBySignal, stopProcess, watchWaysOut } from './ways-out.js';

/** A terminal that is ours. */
export interface OpenTerminal {
  readonly size: () => Size;
  /** The screen shall look like this: lines joined by `\n`, with SGR sequences. */
  readonly draw: (frame: string) => void;
  /** Tells of a new size, before anything is drawn in it. Returns how to stop telling. */
  readonly whenResized: (listener: (size: Size) => void) => () => void;
  /** Gives the terminal back as it was found. Resolves when nothing more is needed from it; calling it again does nothing. */
  readonly close: () => Promise<void>;
  /** Gives the terminal back because of an error, prints it and ends the process with exit code 70. */
  readonly fail: (error: unknown) => void;
  /** Resolves when the terminal has been given back for good. */
  readonly closed: Promise<LeaveReason>;
}

/** An answer that is still under way when the screen is left would be typed into the shell: it is waited for, this long at most. */
const lastAnswerMs = 250;
/** A stop that does not come (nobody could start the process again) must not leave it without its screen. */
const stopGraceMs = 200;
/** What is saved on the way out is waited for, this long at most: a disk that hangs must not keep the process. */
const savingMs = 2000;

function errorText(error: unknown): string {
  return `${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`;
}

/**
 * Takes the terminal: alternate screen, raw mode, keys one at a time, frames painted by cells. However the process ends, short of
 * SIGKILL, the terminal is given back as it was found.
 */
export function openTerminal(options: TerminalOptions): OpenTerminal {
  const { input = process.stdin, output = process.stdout, errors = process.stderr, environment = process.env } = options;
  const screen = holdScreen(input, output, errors);
  const painter = createPainter({ write: screen.write, size: sizeOf(output), paced: options.paced ?? true });
  const resizeListeners = new Set<(size: Size) => void>();
  let leaving: Promise<void> | null = null;
  let suspending = false;
  let onLastAnswer = () => {};
  let resolveClosed: (reason: LeaveReason) => void = () => {};
  const closed = new Promise<LeaveReason>((resolve) => {
    resolveClosed = resolve;
  });

  const enter = () => {
    screen.enter();
    painter.start();
  };
  const leaveScreen = () => {
    painter.pause();
    screen.leave();
  };
  const lastAnswer = async () => {
    if (!painter.awaitsAnswer()) return;
    await new Promise<void>((resolve) => {
      const timer = setTimeout(resolve, lastAnswerMs);
      onLastAnswer = () => {
        clearTimeout(timer);
        resolve();
      };
    });
  };

  const end = async (reason: LeaveReason) => {
    let problem: unknown;
    let saving: unknown;
    try {
      saving = options.onLeave?.(reason);
    } catch (error) {
      problem = error;
    }
    leaveScreen();
    await Promise.race([saving, new Promise((resolve) => setTimeout(resolve, savingMs).unref())]).catch((error: unknown) => {
      problem = error;
    });
    if (problem !== undefined) errors.write(errorText(problem));
    await lastAnswer();
    screen.cook();
    keys.stop();
    input.pause();
    stopWatching();
    resolveClosed(reason);
  };
  const leave = (reason: LeaveReason): Promise<void> => {
    leaving ??= end(reason);
    return leaving;
  };
  const endBy = (signal: NodeJS.Signals) => {
    void leave({ kind: 'signal', signal }).then(() => endBySignal(signal));
  };
  const fail = (error: unknown) => {
    void leave({ kind: 'error', error }).then(() => {
      errors.write(errorText(error));
      process.exit(70);
    });
  };

  const suspend = async (whom: 'self' | 'group') => {
    if (suspending || leaving !== null || !screen.entered()) return;
    suspending = true;
    options.onSuspend?.();
    leaveScreen();
    await lastAnswer();
    suspending = false;
    if (leaving !== null) return;
    keys.forget();
    screen.cook();
    stopProcess(whom, onStop);
    setTimeout(resume, stopGraceMs);
  };
  const resume = () => {
    if (suspending || leaving !== null) return;
    // After SIGSTOP, which nobody can catch, the shell has had the terminal without our giving it back.
    if (screen.entered()) {
      painter.pause();
      screen.leave();
      screen.cook();
    }
    enter();
    // The size may have changed while nobody told us.
    process.kill(process.pid, 'SIGWINCH');
  };
  const onStop = () => void suspend('self').catch(fail);

  const onKey = (key: Key) => {
    if (leaving !== null || suspending) return;
    if (key.name === 'control' && key.text === 'c') endBy('SIGINT');
    else if (key.name === 'control' && key.text === '\\') endBy('SIGQUIT');
    else if (key.name === 'control' && key.text === 'z') void suspend('group').catch(fail);
    else options.onKey(key);
  };
  const onAnswer = () => {
    painter.answered();
    if (!painter.awaitsAnswer()) onLastAnswer();
  };
  const onResize = () => {
    painter.resize(sizeOf(output));
    for (const listener of resizeListeners) listener(sizeOf(output));
  };
  const onGone = () => {
    screen.lose();
    endBy('SIGHUP');
  };
  const onExit = () => {
    try {
      if (leaving === null) void options.onLeave?.({ kind: 'closed' });
    } finally {
      leaveScreen();
      screen.cook();
    }
  };

  const keys = listenForKeys(input, { onKey, onAnswer }, keyTiming(environment, options.escapeMs));
  const stopWatchingProcess = watchWaysOut({ onSignal: endBy, onStop, onContinue: resume, onError: fail, onExit });
  output.on('resize', onResize);
  output.on('error', onGone);
  input.on('end', onGone);
  input.on('error', onGone);
  const stopWatching = () => {
    stopWatchingProcess();
    output.off('resize', onResize);
    output.off('error', onGone);
    input.off('end', onGone);
    input.off('error', onGone);
  };

  if (options.firstFrame !== undefined) painter.draw(options.firstFrame);
  enter();
  return {
    size: () => sizeOf(output),
    draw: painter.draw,
    whenResized: (listener) => {
      resizeListeners.add(listener);
      return () => resizeListeners.delete(listener);
    },
    close: () => leave({ kind: 'closed' }),
    fail,
    closed,
  };
}
