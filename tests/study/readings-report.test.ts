import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { modelErrorAdvice } from '../../src/study/model-error-advice.js';
import { classNotSaid, ReadingCounts, type ReadingsReport } from '../../src/study/readings-report.js';
import type { SessionRecord } from '../../src/study/record.js';
import { readTime, twelveTimes } from './read-times.js';

function reportOf(records: Iterable<SessionRecord>): ReadingsReport {
  const counts = new ReadingCounts();
  for (const record of records) counts.add(record);
  return counts.report();
}

describe('readings by scanner and class', () => {
  it('are counted as one counts them by hand', () => {
    const [scanner] = reportOf(twelveTimes()).scanners;
    const one = scanner?.classes[0];
    expect(scanner?.classes).toHaveLength(1);
    expect(one).toMatchObject({ class: 'spoiled-gradient-echo/3D', b1rms: null, sar: null });
    // 6th and 7th: 3.3 and 3.5; quartiles at 2.75 and 8.25 from 0; nine tenths at 9.9: between 4.5 and 5.
    expect(one?.time?.spread).toEqual({ count: 12, least: 0.01, lowQuartile: 0.02875, median: 0.034, highQuartile: 0.04125, most: 0.06 });
    // January 2.75, March 4.25.
    expect(one?.time?.drift).toEqual({ from: '2026-01', to: '2026-03', change: 0.015 });
    expect(one?.modelTime).toEqual(one?.time);
    expect(one?.modelTimeNinthTenth).toBeCloseTo(0.0495, 12);
  });

  it('are kept apart by scanner, whose name counts the same in large and small letters, and by class', () => {
    const records = [
      readTime(1, { scanner: 'Blue' }),
      readTime(2, { scanner: ' blue' }),
      readTime(3, { scanner: '' }),
      readTime(4, { scanner: '' }, 'fast-spin-echo/2D'),
      readTime(5, { scanner: '' }, 'a class of tomorrow/4D'),
    ];
    const { scanners } = reportOf(records);
    expect(scanners.map(({ scanner, classes }) => [scanner, classes.map((one) => [one.class, one.time?.spread.count])])).toEqual([
      [
        '',
        [
          ['fast-spin-echo/2D', 1],
          ['spoiled-gradient-echo/3D', 1],
          [classNotSaid, 1],
        ],
      ],
      ['Blue', [['spoiled-gradient-echo/3D', 2]]],
    ]);
  });

  it('do not hang on the order of the records', () => {
    const error = fc.double({ min: -0.5, max: 3, noNaN: true });
    fc.assert(
      fc.property(
        fc.array(fc.tuple(error, fc.constantFrom('a', 'b'), fc.constantFrom('spin-echo/2D', 'x')), { maxLength: 40 }),
        (given) => {
          const records = given.map(([percent, scanner, series]) => readTime(percent, { scanner }, series));
          const [there, back] = [reportOf(records), reportOf([...records].reverse())];
          const counted = there.scanners.flatMap(({ classes }) => classes.map(({ time }) => time?.spread.count ?? 0));
          expect(back).toEqual(there);
          expect(counted.reduce((sum, count) => sum + count, 0)).toBe(given.length);
        },
      ),
    );
  });

  it('are bounded: scanners beyond two hundred are counted together', () => {
    const { scanners, leftOut } = reportOf(Array.from({ length: 250 }, (_, i) => readTime(1, { scanner: `s${i}` })));
    expect([scanners.length, leftOut]).toEqual([200, 50]);
  });
});

describe('the model error of a scanner file', () => {
  const advice = (records: SessionRecord[], percent = 5) => modelErrorAdvice(reportOf(records).scanners[0]!, percent);
  const times = (percents: readonly number[], series?: string) => percents.map((percent) => readTime(percent, {}, series));

  it('suits where nine in ten times are within it', () => {
    expect(advice(twelveTimes())).toMatchObject({ kind: 'keep', suggestedPercent: 5, readings: 12 });
  });

  it('is to be raised where one class asks for it, from five readings on', () => {
    expect(advice(times([7, 7, 7, 7]))).toMatchObject({ kind: 'too-few', suggestedPercent: null, because: null, readings: 4 });
    expect(advice(times([7, 7, 7, 7, 7]))).toMatchObject({ kind: 'raise', suggestedPercent: 7, because: { readings: 5 } });
    const other = [...times([1, 1, 1, 1, 1, 1]), ...times([5.6, 5.6, 5.6, 5.6, 5.6], 'fast-spin-echo/2D')];
    expect(advice(other)).toMatchObject({ kind: 'raise', suggestedPercent: 6, because: { class: 'fast-spin-echo/2D' } });
    // A small class beside a large one does not make the answer.
    expect(advice([...times([1, 1, 1, 1, 1]), ...times([40], 'fast-spin-echo/2D')])).toMatchObject({ kind: 'keep' });
  });

  it('is to be lowered by one percent at least, from twenty readings on, never to nothing', () => {
    const many = (percent: number, count: number) => times(Array.from({ length: count }, () => percent));
    expect(advice(many(2, 19)).kind).toBe('keep');
    expect(advice(many(2, 20))).toMatchObject({ kind: 'lower', suggestedPercent: 2 });
    expect(advice(many(4.2, 20))).toMatchObject({ kind: 'keep', suggestedPercent: 4.5 });
    expect(advice(many(-3, 20))).toMatchObject({ kind: 'lower', suggestedPercent: 0.5 });
    expect(advice([...many(2, 20), ...times([2], 'fast-spin-echo/2D')]).kind).toBe('keep');
  });

  it('is never asked for beyond what a scanner file takes', () => {
    expect(advice(times([90, 90, 90, 90, 90]))).toMatchObject({ suggestedPercent: 50 });
  });
});
