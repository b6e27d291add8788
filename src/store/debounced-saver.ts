import type { Stored } from './problem-of-error.js';

export interface SaverOptions<T> {
  readonly save: (value: T) => Promise<Stored<void>>;
  /** Told when saving begins to fail, with the problems, and when it works again. */
  readonly onChange: (outcome: Stored<void>) => void;
  /** Quiet time after a change before it is saved. */
  readonly waitMs?: number;
  /** Longest time a change waits while others keep coming. */
  readonly longestWaitMs?: number;
}

/** Saves the latest value soon after it changed; never two saves at once. */
export interface DebouncedSaver<T> {
  change(value: T): void;
  /** Saves what waits at once; resolves when nothing waits any more, with how the last save went. */
  flush(): Promise<Stored<void>>;
  /** Forgets what waits; resolves when a save under way has ended. */
  forget(): Promise<void>;
}

/** Makes a saver. Its timers do not keep the program running: whoever ends it flushes. */
export function debouncedSaver<T>({ save, onChange, waitMs = 300, longestWaitMs = 1500 }: SaverOptions<T>): DebouncedSaver<T> {
  let waiting: { value: T } | null = null;
  let timer: NodeJS.Timeout | null = null;
  /** What the last save could not save: tried again when asked to flush. */
  let unsaved: { value: T } | null = null;
  let deadlineMs = 0;
  let saving: Promise<void> | null = null;
  let last: Stored<void> = { ok: true, value: undefined };

  function start(inMs: number): void {
    if (timer !== null) clearTimeout(timer);
    timer = setTimeout(() => void run(), inMs);
    timer.unref();
  }

  function stop(): void {
    if (timer !== null) clearTimeout(timer);
    timer = null;
  }

  async function run(): Promise<void> {
    stop();
    while (waiting !== null || saving !== null) {
      saving ??= saveWhatWaits().finally(() => {
        saving = null;
      });
      await saving;
    }
  }

  async function saveWhatWaits(): Promise<void> {
    if (waiting === null) return;
    const taken = waiting;
    waiting = null;
    const outcome = await save(taken.value);
    unsaved = outcome.ok ? null : taken;
    const before = last;
    last = outcome;
    if (codeOf(outcome) !== codeOf(before)) onChange(outcome);
  }

  return {
    change: (value) => {
      const nowMs = performance.now();
      if (waiting === null) deadlineMs = nowMs + longestWaitMs;
      waiting = { value };
      start(Math.max(0, Math.min(waitMs, deadlineMs - nowMs)));
    },
    flush: async () => {
      waiting ??= unsaved;
      await run();
      return last;
    },
    forget: async () => {
      stop();
      waiting = null;
      await saving;
      unsaved = null;
    },
  };
}

function codeOf(outcome: Stored<void>): string | null {
  return outcome.ok ? null : (outcome.problems[0]?.code ?? '');
}
