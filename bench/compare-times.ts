import { median } from './median.js';
import type { Measured } from './row.js';

/** Something to time: it runs once for a running number, and gives a number that is kept so that the work cannot be left out. */
export type Work = (turn: number) => number;

export interface CompareOptions {
  /** Batches of each, taken in turns. */
  readonly rounds?: number;
  /** Length of one batch, ms. */
  readonly batchMs?: number;
  /** How many yardsticks one subject stands for (two tissues: 2). */
  readonly yardsticksPerSubject?: number;
}

let kept = 0;

function timeOf(work: Work, count: number): number {
  const start = process.hrtime.bigint();
  let sum = 0;
  for (let turn = 0; turn < count; turn += 1) sum += work(turn);
  const nanoseconds = Number(process.hrtime.bigint() - start);
  kept += sum;
  return nanoseconds / count;
}

/** Repeats until one batch lasts as long as asked, which also warms the code up. */
function batchSize(work: Work, batchMs: number): number {
  const warmUntil = process.hrtime.bigint() + 150_000_000n;
  let count = 16;
  for (;;) {
    const ms = (timeOf(work, count) * count) / 1e6;
    if (ms >= batchMs && process.hrtime.bigint() > warmUntil) return Math.max(1, Math.round((count * batchMs) / ms));
    if (ms < batchMs) count *= 2;
  }
}

/**
 * Times a subject against a yardstick: batches of both in turns, the order swapped each round. The ratio is the median of the
 * rounds' own ratios, so that a slow stretch of the machine weighs on both sides of it. Times are in microseconds.
 */
export function compareTimes(subject: Work, yardstick: Work, options: CompareOptions = {}): Measured {
  const { rounds = 201, batchMs = 1, yardsticksPerSubject = 1 } = options;
  const subjects = batchSize(subject, batchMs);
  const yardsticks = batchSize(yardstick, batchMs);
  const subjectNs: number[] = [];
  const yardstickNs: number[] = [];
  const ratios: number[] = [];
  for (let round = 0; round < rounds; round += 1) {
    const first = round % 2 === 0;
    const a = first ? timeOf(subject, subjects) : 0;
    const b = timeOf(yardstick, yardsticks);
    const ns = first ? a : timeOf(subject, subjects);
    subjectNs.push(ns);
    yardstickNs.push(b);
    ratios.push(ns / (b * yardsticksPerSubject));
  }
  if (Number.isNaN(kept)) throw new Error('a measured function gave no number');
  return { subject: median(subjectNs) / 1000, yardstick: median(yardstickNs) / 1000, ratio: median(ratios) };
}
