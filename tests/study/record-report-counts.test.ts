import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { StepCounts } from '../../src/study/record-report-counts.js';
import { shareOf, shareWords } from '../../src/study/record-report-share.js';
import { Tally } from '../../src/study/record-report-tally.js';

/** Quantile of a list that is there whole (type 7 of Hyndman and Fan, Am Stat 1996;50:361). */
function quantileOf(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const place = (sorted.length - 1) * share;
  const [low, high] = [sorted[Math.floor(place)]!, sorted[Math.ceil(place)]!];
  return low + (high - low) * (place - Math.floor(place));
}

describe('StepCounts', () => {
  it('gives the median and quartiles that a sorted list gives', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -500, max: 500 }), { minLength: 1, maxLength: 300 }), (hundredths) => {
        const counts = new StepCounts(2);
        const values = hundredths.map((value) => value / 100);
        for (const value of values) counts.add(value);
        const spread = counts.spread()!;
        expect(spread.count).toBe(values.length);
        expect([spread.least, spread.most]).toEqual([Math.min(...values) + 0, Math.max(...values) + 0]);
        expect(spread.lowQuartile).toBeCloseTo(quantileOf(values, 0.25), 9);
        expect(spread.median).toBeCloseTo(quantileOf(values, 0.5), 9);
        expect(spread.highQuartile).toBeCloseTo(quantileOf(values, 0.75), 9);
      }),
    );
  });

  it('widens its steps instead of growing, and stays within one of them', () => {
    const counts = new StepCounts(3);
    const values = Array.from({ length: 20_000 }, (_, i) => ((i * 7919) % 20_000) / 1000);
    for (const value of values) counts.add(value);
    expect(counts.values().length).toBeLessThanOrEqual(512);
    expect(counts.count).toBe(20_000);
    // 20,000 steps of 0.001 in at most 512: steps of 0.064.
    expect(Math.abs(counts.spread()!.median - quantileOf(values, 0.5))).toBeLessThan(0.065);
  });

  it('has no spread where nothing was counted', () => {
    expect(new StepCounts(1).spread()).toBeNull();
  });
});

describe('Tally', () => {
  it('keeps what is frequent, and says how much it gave up', () => {
    const tally = new Tally();
    for (let i = 0; i < 5000; i += 1) {
      tally.add(`rare ${i}`);
      if (i % 10 === 0) tally.add('frequent');
    }
    const sorted = tally.sorted();
    expect(sorted[0]).toEqual({ word: 'frequent', count: 500 });
    expect(sorted.length).toBeLessThanOrEqual(400);
    expect(sorted.reduce((sum, { count }) => sum + count, 0) + tally.leftOut).toBe(5500);
  });
});

describe('shares', () => {
  it('are no rates where the whole is under five', () => {
    expect([shareOf(0, 0), shareOf(2, 4), shareOf(2, 5)]).toEqual([null, null, 0.4]);
    expect(shareWords(2, 4)).toBe('2 of 4 (too few for a rate)');
    expect(shareWords(3, 12)).toBe('3 of 12 (25 %, small count)');
    expect(shareWords(16, 40)).toBe('16 of 40 (40 %)');
  });
});
