import { expect } from 'vitest';
import type { Caution } from '../../src/calc/caution.js';
import { type LimitKind, type VerdictWord, verdictOf } from '../../src/calc/verdict.js';

/** The word for a value under a limit, without a time reading and with the plain model error. */
export function wordFor(kind: LimitKind, value: number | null, limit: number): VerdictWord {
  return verdictOf(kind, value as number, limit, { modelErrorPercent: 5, hasTimeReading: false }).word;
}

/** A time within 5 % of what is expected. */
export function expectTime(seconds: number | null, expected: number): void {
  expect(Math.abs((seconds as number) / expected - 1)).toBeLessThan(0.05);
}

/** A signal-to-noise ratio within 0.05. */
export function expectRatio(ratio: number | null, expected: number): void {
  expect(Math.abs((ratio as number) - expected)).toBeLessThan(0.05);
}

/** A figure of RF within 2 %. */
export function expectRf(value: number | null, expected: number): void {
  expect(Math.abs((value as number) / expected - 1)).toBeLessThan(0.02);
}

/** It proposes, people decide: nothing is ever called safe, cleared or compliant. */
export function expectNoClearance(cautions: readonly Caution[]): void {
  for (const { text } of cautions) expect(text).not.toMatch(/\b(safe|cleared|compliant|compliance)\b/i);
}
