import { describe, expect, it } from 'vitest';
import { chartDotBit, chartDots } from '../../src/terminal/chart-dots.js';
import { isSureWidth } from '../../src/terminal/text-width.js';

const columns = [0, 1] as const;
const rows = [0, 1, 2, 3] as const;

describe('chart dots', () => {
  it('have one bit each', () => {
    const bits = columns.flatMap((column) => rows.map((row) => chartDotBit(column, row)));
    expect(bits.reduce((sum, bit) => sum + bit)).toBe(255);
    expect(new Set(bits).size).toBe(8);
  });

  // Unicode 16, code chart of the Braille Patterns: U+2801 is dot 1 (top left), U+2880 dot 8 (bottom right).
  it.each([
    [0, 0, '\u2801'],
    [0, 2, '\u2804'],
    [1, 0, '\u2808'],
    [0, 3, '\u2840'],
    [1, 3, '\u2880'],
  ] as const)('column %i, row %i is %s', (column, row, character) => {
    expect(chartDots(chartDotBit(column, row), 'unicode')).toBe(character);
  });

  it('are one sure column in both sets, and blank without dots', () => {
    for (let dots = 0; dots < 256; dots++) {
      for (const set of ['unicode', 'ascii'] as const) {
        expect(isSureWidth(chartDots(dots, set))).toBe(true);
        expect(chartDots(dots, set) === ' ').toBe(dots === 0);
      }
      expect(chartDots(dots, 'ascii')).toMatch(/^[ -~]$/);
    }
  });

  it('keep the height of a dot in ASCII', () => {
    expect(rows.map((row) => chartDots(chartDotBit(0, row), 'ascii'))).toEqual(["'", '-', '-', '.']);
  });
});
