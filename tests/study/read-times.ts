import type { SessionRecord } from '../../src/study/record.js';
import { inventedRecord, inventedSeries } from './records.js';

/** Errors of twelve times in percent, six of January and six of March 2026, rising. Invented. */
const twelveErrors = [1, 2, 2.5, 3, 3.2, 3.3, 3.5, 4, 4, 4.5, 5, 6];

/** A record of one series whose scan time of 10 s was read so many percent longer, with nothing read before. */
export function readTime(percent: number, more: Partial<SessionRecord> = {}, series = 'spoiled-gradient-echo/3D'): SessionRecord {
  const figures = { scanTimeS: 10, b1PlusRmsUt: 2 };
  const values = { parameters: {}, figures };
  const read = { before: null, after: { timeS: Number((10 * (1 + percent / 100)).toPrecision(12)) } };
  return {
    ...inventedRecord,
    tool: '0.1.0 invented',
    scanner: 'demo-3t',
    reasons: [],
    ...more,
    series: [{ ...inventedSeries, class: series, reason: '', crossed: [], planned: values, used: values, readings: read }],
  };
}

/** The twelve on one scanner. */
export function twelveTimes(scanner = 'demo-3t'): SessionRecord[] {
  return twelveErrors.map((percent, i) => readTime(percent, { scanner, day: `2026-0${i < 6 ? 1 : 3}-0${(i % 6) + 1}` }));
}

/** The records of `scripts/invented-readings.jsonl`: the twelve, one of another class, and five on a scanner that nobody named. */
export function countedByHand(): SessionRecord[] {
  const slow = Array.from({ length: 5 }, () => readTime(8, { scanner: '', day: '2026-02-02' }, 'fast-spin-echo/2D'));
  return [...twelveTimes(), readTime(-7, { day: '2026-03-09' }, 'fast-spin-echo/2D'), ...slow];
}
