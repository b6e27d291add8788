import { PassThrough } from 'node:stream';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Key } from '../../../src/terminal/keys/key.js';
import { keyTiming } from '../../../src/terminal/keys/key-timing.js';
import { type KeyListening, listenForKeys } from '../../../src/terminal/keys/listen-for-keys.js';

describe('listening to a stream', () => {
  let input: PassThrough;
  let keys: Key[];
  let answers: number;
  let listening: KeyListening;

  beforeEach(() => {
    vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout', 'setImmediate', 'clearImmediate', 'performance'] });
    input = new PassThrough();
    keys = [];
    answers = 0;
    listening = listenForKeys(input, { onKey: (key) => keys.push(key), onAnswer: () => answers++ }, keyTiming({}));
  });
  afterEach(() => {
    listening.stop();
    vi.useRealTimers();
  });

  it('gives a lone ESC out as Escape once the time is up', () => {
    input.emit('data', Buffer.from('\u001b'));
    vi.advanceTimersByTime(45);
    expect(keys).toEqual([]);
    vi.advanceTimersByTime(20);
    expect(keys).toEqual([{ name: 'escape' }]);
  });

  it('joins the parts of an arrow', () => {
    input.emit('data', Buffer.from('\u001b'));
    vi.advanceTimersByTime(30);
    input.emit('data', Buffer.from('[A'));
    vi.advanceTimersByTime(500);
    expect(keys).toEqual([{ name: 'up' }]);
  });

  it('reads what is there already before it takes the time as up', () => {
    input.emit('data', Buffer.from('\u001b'));
    // The loop was busy: the timer is late, and the rest of the arrow is read right after it.
    vi.setSystemTime(Date.now());
    vi.advanceTimersToNextTimer();
    input.emit('data', Buffer.from('[A'));
    vi.advanceTimersByTime(500);
    expect(keys).toEqual([{ name: 'up' }]);
  });

  it('hands answers on', () => {
    input.emit('data', Buffer.from('\u001b[0n'));
    expect(answers).toBe(1);
    expect(keys).toEqual([]);
  });

  it('forgets a sequence that had begun', () => {
    input.emit('data', Buffer.from('\u001b'));
    listening.forget();
    vi.advanceTimersByTime(500);
    input.emit('data', Buffer.from('j'));
    expect(keys).toEqual([{ name: 'text', text: 'j' }]);
  });

  it('gives nothing out after it was stopped, not even the rest of the read', () => {
    listening.stop();
    const seen: Key[] = [];
    const again = listenForKeys(
      input,
      {
        onKey: (key) => {
          seen.push(key);
          again.stop();
        },
        onAnswer: () => {},
      },
      keyTiming({}),
    );
    input.emit('data', Buffer.from('abc'));
    input.emit('data', Buffer.from('d'));
    expect(seen).toEqual([{ name: 'text', text: 'a' }]);
  });
});
