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

/** Processor time of this process, which a busy machine does not stretch, ms. */
function spentMs(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

const warmMs = 1500;

/** Runs until the code is compiled as far as it gets, then counts how often it runs in one batch. */
function batchSize(work: Work, batchMs: number): number {
  const warmAt = spentMs() + warmMs;
  let count = 16;
  for (;;) {
    const ms = (timeOf(work, count) * count) / 1e6;
    if (spentMs() >= warmAt && ms >= batchMs) return Math.max(1, Math.round((count * batchMs) / ms));
    if (ms < 4 * batchMs) count *= 2;
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
