import { describe, expect, it } from 'vitest';
import { type LimitKind, type VerdictWord, verdictMargin, verdictOf } from '../../src/calc/verdict.js';

const modelled = { modelErrorPercent: 5, hasTimeReading: false };
const read = { modelErrorPercent: 5, hasTimeReading: true };

describe('verdictOf', () => {
  it.each<[LimitKind, number, number, typeof modelled, VerdictWord]>([
    // breath-hold: 5 % of the limit without a time reading, 2 % with one (common practice, no source)
    ['hold', 10.5, 11, modelled, 'TOO CLOSE'],
    ['hold', 10.45, 11, modelled, 'FITS'],
    ['hold', 10.46, 11, modelled, 'TOO CLOSE'],
    ['hold', 11, 11, modelled, 'TOO CLOSE'],
    ['hold', 11.01, 11, modelled, 'OVER'],
    ['hold', 10.5, 11, read, 'FITS'],
    ['hold', 10.78, 11, read, 'FITS'],
    ['hold', 10.79, 11, read, 'TOO CLOSE'],
    ['hold', 10.5, 11, { modelErrorPercent: 3, hasTimeReading: false }, 'FITS'],
    // one series: 5 % of its limit
    ['series', 95, 100, modelled, 'FITS'],
    ['series', 95.1, 100, read, 'TOO CLOSE'],
    ['series', 100.1, 100, modelled, 'OVER'],
    // the clock: 20 s
    ['session', 291, 300, modelled, 'TOO CLOSE'],
    ['session', 280, 300, modelled, 'FITS'],
    ['session', 280.5, 300, read, 'TOO CLOSE'],
    ['session', 301, 300, modelled, 'OVER'],
    // RF cap: 5 %
    ['rf', 1.97, 2, modelled, 'TOO CLOSE'],
    ['rf', 1.9, 2, modelled, 'FITS'],
    ['rf', 1.91, 2, read, 'TOO CLOSE'],
    ['rf', 2.04, 2, modelled, 'OVER'],
  ])('%s: %d in %d', (kind, value, limit, margins, word) => {
    expect(verdictOf(kind, value, limit, margins).word).toBe(word);
  });

  it('forgives the last binary digit: 0.1 + 0.2 is not over 0.3', () => {
    expect(verdictOf('rf', 0.1 + 0.2, 0.3, modelled).word).toBe('TOO CLOSE');
  });

  it('says what is to spare, negative when over', () => {
    expect(verdictOf('hold', 9, 11, modelled)).toEqual({ word: 'FITS', kind: 'hold', value: 9, limit: 11, spare: 2 });
    expect(verdictOf('hold', 12, 11, modelled).spare).toBe(-1);
  });

  it('gives the margin in the unit of the limit', () => {
    expect(verdictMargin('hold', 20, modelled)).toBeCloseTo(1, 12);
    expect(verdictMargin('hold', 20, read)).toBeCloseTo(0.4, 12);
    expect(verdictMargin('session', 300, read)).toBe(20);
    expect(verdictMargin('series', 200, read)).toBeCloseTo(10, 12);
    expect(verdictMargin('rf', 2, read)).toBeCloseTo(0.1, 12);
  });
});
