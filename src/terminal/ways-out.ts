/** What happens to the process, told to whoever holds the terminal. */
export interface WaysOut {
  /** A signal that ends the process. */
  readonly onSignal: (signal: NodeJS.Signals) => void;
  /** SIGTSTP from outside. */
  readonly onStop: () => void;
  /** The process goes on after a stop. */
  readonly onContinue: () => void;
  readonly onError: (error: unknown) => void;
  /** The process is about to exit: only synchronous work gets done. */
  readonly onExit: () => void;
}

/** Signals that end a process and can be caught. The first four are those that people and systems send. */
const endingSignals: readonly NodeJS.Signals[] = [
  'SIGINT',
  'SIGTERM',
  'SIGHUP',
  'SIGQUIT',
  'SIGABRT',
  'SIGALRM',
  'SIGUSR2',
  'SIGVTALRM',
  'SIGXCPU',
  'SIGTRAP',
  'SIGSYS',
  'SIGIO',
];

/** If the process still runs so long after it sent itself a signal, somebody else caught it. */
const signalGraceMs = 500;

/** Watches every way out of the process that can be watched. Returns how to stop watching. */
export function watchWaysOut(ways: WaysOut): () => void {
  const onSignal = (signal: NodeJS.Signals) => ways.onSignal(signal);
  for (const signal of endingSignals) process.on(signal, onSignal);
  process.on('SIGTSTP', ways.onStop);
  process.on('SIGCONT', ways.onContinue);
  process.on('uncaughtException', ways.onError);
  process.on('unhandledRejection', ways.onError);
  process.on('exit', ways.onExit);
  return () => {
    for (const signal of endingSignals) process.off(signal, onSignal);
    process.off('SIGTSTP', ways.onStop);
    process.off('SIGCONT', ways.onContinue);
    process.off('uncaughtException', ways.onError);
    process.off('unhandledRejection', ways.onError);
    process.off('exit', ways.onExit);
  };
}

/** Ends the process by a signal that nobody here listens to any more, so that its parent sees that signal. */
export function endBySignal(signal: NodeJS.Signals): void {
  process.kill(process.pid, signal);
  setTimeout(() => {
    process.removeAllListeners(signal);
    process.kill(process.pid, signal);
  }, signalGraceMs);
}

/**
 * Stops the process as Ctrl-Z does where a terminal handles it.
 *
 * @param whom The process itself, or its whole group: what was started together stops together.
 * @param onStop The listener that `watchWaysOut` was given; while it listens, the signal would not stop anything.
 */
export function stopProcess(whom: 'self' | 'group', onStop: () => void): void {
  process.off('SIGTSTP', onStop);
  process.kill(whom === 'self' ? process.pid : 0, 'SIGTSTP');
  process.on('SIGTSTP', onStop);
}
