import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { atLeast, atMost, below, guardedCeil, guardedFloor, roundHalfUp, same } from '../../src/calc/rounding.js';

describe('guardedCeil', () => {
  it.each([
    [0.55 * 100, 55],
    [55.00000000000001, 55],
    [55.1, 56],
    [54.9999999999, 55],
    [55 + 1e-8, 56],
    [0, 0],
  ])('guardedCeil(%d) is %d', (x, whole) => {
    expect(guardedCeil(x)).toBe(whole);
  });

  it('never gives minus zero', () => {
    expect(Object.is(guardedCeil(-0.5), 0)).toBe(true);
  });
});

describe('guardedFloor', () => {
  it.each([
    [2.9999999999, 3],
    [2.99999, 2],
    [3, 3],
    [3.2, 3],
    [3 - 1e-8, 2],
  ])('guardedFloor(%d) is %d', (x, whole) => {
    expect(guardedFloor(x)).toBe(whole);
  });
});

describe('roundHalfUp', () => {
  it.each([
    [2.5, 3],
    [2.4999999999, 3],
    [2.49, 2],
    [-0.5, 0],
    [-1.5, -1],
    [3.2, 3],
  ])('roundHalfUp(%d) is %d', (x, whole) => {
    expect(roundHalfUp(x)).toBe(whole);
  });
});

describe('comparisons for rules and limits', () => {
  it.each([
    [0.1 + 0.2, 0.3, true],
    [11.0, 11, true],
    [11.000001, 11, false],
    [1e9 + 0.5, 1e9, true],
    [1e9 + 2, 1e9, false],
    [-1e9 + 0.5, -1e9, true],
    [2e-9, 0, false],
    [0.5e-9, 0, true],
  ])('%d is at most %d: %s', (a, b, holds) => {
    expect(atMost(a, b)).toBe(holds);
    expect(below(b, a)).toBe(!holds);
    expect(atLeast(b, a)).toBe(holds);
  });

  it('same holds where neither is below the other', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), fc.double({ noNaN: true, noDefaultInfinity: true }), (a, b) => {
        expect(same(a, b)).toBe(!below(a, b) && !below(b, a));
        expect(same(a, a)).toBe(true);
      }),
    );
    expect(same(1, 1 + 1e-8)).toBe(false);
    expect(same(1, 1 + 1e-10)).toBe(true);
  });
});
