import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { debouncedSaver } from '../../src/store/debounced-saver.js';
import { type Stored, storeProblem } from '../../src/store/problem-of-error.js';

const fine: Stored<void> = { ok: true, value: undefined };
const full: Stored<void> = { ok: false, problems: [storeProblem('disk-full', 74, '/a', 'the disk is full.', 'Make room.')] };

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

/** A saver whose saves end when they are told to. */
function recordingSaver() {
  const saved: number[] = [];
  const told: boolean[] = [];
  const ends: ((outcome: Stored<void>) => void)[] = [];
  const saver = debouncedSaver<number>({
    save: (value) => {
      saved.push(value);
      return new Promise((resolve) => ends.push(resolve));
    },
    onChange: ({ ok }) => told.push(ok),
    waitMs: 300,
    longestWaitMs: 1000,
  });
  const endSave = async (outcome: Stored<void> = fine) => {
    ends.shift()!(outcome);
    await vi.advanceTimersByTimeAsync(0);
  };
  return { saver, saved, told, endSave };
}

describe('debouncedSaver', () => {
  it('saves the last of several changes once it is quiet', async () => {
    const { saver, saved } = recordingSaver();
    for (const value of [1, 2, 3]) {
      saver.change(value);
      await vi.advanceTimersByTimeAsync(200);
    }
    expect(saved).toEqual([]);
    await vi.advanceTimersByTimeAsync(100);
    expect(saved).toEqual([3]);
  });

  it('does not wait for ever while changes keep coming', async () => {
    const { saver, saved } = recordingSaver();
    for (let value = 0; value < 6; value += 1) {
      saver.change(value);
      await vi.advanceTimersByTimeAsync(200);
    }
    expect(saved).toEqual([4]);
  });

  it('never saves twice at once, and saves what came meanwhile afterwards', async () => {
    const { saver, saved, endSave } = recordingSaver();
    saver.change(1);
    await vi.advanceTimersByTimeAsync(300);
    saver.change(2);
    await vi.advanceTimersByTimeAsync(5000);
    expect(saved).toEqual([1]);
    await endSave();
    expect(saved).toEqual([1, 2]);
  });

  it('flushes at once what waits, and tells how it went', async () => {
    const { saver, saved, endSave } = recordingSaver();
    saver.change(1);
    const flushed = saver.flush();
    await vi.advanceTimersByTimeAsync(0);
    expect(saved).toEqual([1]);
    saver.change(2);
    await endSave();
    await endSave(full);
    expect(await flushed).toEqual(full);
    expect(saved).toEqual([1, 2]);
  });

  it('tells once when saving begins to fail and once when it works again', async () => {
    const { saver, told, endSave } = recordingSaver();
    for (const outcome of [fine, full, full, fine, fine]) {
      saver.change(1);
      await vi.advanceTimersByTimeAsync(300);
      await endSave(outcome);
    }
    expect(told).toEqual([false, true]);
  });

  it('tries again on a flush what could not be saved', async () => {
    const { saver, saved, endSave } = recordingSaver();
    saver.change(7);
    await vi.advanceTimersByTimeAsync(300);
    await endSave(full);
    const flushed = saver.flush();
    await endSave(fine);
    expect(await flushed).toEqual(fine);
    expect(saved).toEqual([7, 7]);
  });

  it('forgets what waits', async () => {
    const { saver, saved } = recordingSaver();
    saver.change(1);
    await saver.forget();
    await vi.advanceTimersByTimeAsync(5000);
    expect(saved).toEqual([]);
    expect(await saver.flush()).toEqual(fine);
  });
});
