import type { Answer, Key } from './key.js';
import { type KeyState, noKeys } from './key-state.js';
import { expireKeys, type KeyReading, keyDeadlineMs, readKeys } from './key-stream.js';
import type { KeyTiming } from './key-timing.js';

/** Where keys and answers go. */
export interface KeyListener {
  readonly onKey: (key: Key) => void;
  readonly onAnswer: (answer: Answer) => void;
}

/** A stream of keys that is being listened to. */
export interface KeyListening {
  /** Forgets a sequence that has begun, as after a pause in which somebody else had the terminal. */
  readonly forget: () => void;
  readonly stop: () => void;
}

/**
 * Reads a terminal's input and gives out one key at a time.
 *
 * @param input Standard input; it is in raw mode already, or will be.
 */
export function listenForKeys(input: NodeJS.ReadableStream, listener: KeyListener, timing: KeyTiming): KeyListening {
  let state: KeyState = noKeys;
  let timer: NodeJS.Timeout | undefined;
  let stopped = false;
  const clock = () => performance.now();

  const take = (reading: KeyReading) => {
    state = reading.state;
    clearTimeout(timer);
    const deadlineMs = keyDeadlineMs(state, timing);
    // After the timer, bytes that have come in already are read first: a busy moment must not tear a sequence apart.
    if (deadlineMs !== null) timer = setTimeout(() => setImmediate(expire), Math.max(1, Math.ceil(deadlineMs - clock())));
    for (const answer of reading.answers) listener.onAnswer(answer);
    for (const key of reading.keys) if (!stopped) listener.onKey(key);
  };
  const expire = () => take(expireKeys(state, clock(), timing));
  const onData = (chunk: Buffer | string) => take(readKeys(state, typeof chunk === 'string' ? Buffer.from(chunk) : chunk, clock(), timing));
  const forget = () => {
    clearTimeout(timer);
    state = noKeys;
  };

  input.on('data', onData);
  return {
    forget,
    stop: () => {
      stopped = true;
      forget();
      input.off('data', onData);
    },
  };
}
