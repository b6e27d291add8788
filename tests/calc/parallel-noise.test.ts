import { describe, expect, it } from 'vitest';
import { parallelNoiseFactor } from '../../src/calc/parallel-noise.js';
import type { Coil } from '../../src/calc/scanner.js';

describe('the default g table (assumptions, values from memory)', () => {
  it.each<[number, number, number | null]>([
    [1, 1, 1],
    [2, 1, 1.05],
    [3, 1, 1.2],
    [4, 1, 1.7],
    [1, 2, 1.05],
    [1, 3, 1.2],
    [2, 2, 1.15],
    // straight between
    [1.5, 1, 1.025],
    [2.5, 1, 1.125],
    [3.5, 1, 1.45],
    [1, 2.5, 1.125],
    [1.5, 2, 1.1],
    [1.5, 1.5, 1.0625],
    // nothing beyond
    [4.1, 1, null],
    [1, 5, null],
    [2.1, 2, null],
    [2, 2.1, null],
    [3, 3, null],
  ])('R %d x %d has g %s', (phase, slice, g) => {
    const got = parallelNoiseFactor(null, phase, slice);
    if (g === null) expect(got).toBeNull();
    else expect(got).toBeCloseTo(g, 12);
  });
});

describe("a coil's own table", () => {
  const coil: Coil = {
    name: 'invented',
    elements: { AP: 4, RL: 4, HF: 2 },
    g: [
      { phase: 3, slice: 1, g: 1.5 },
      { phase: 2, slice: 1, g: 1.1 },
      { phase: 2, slice: 2, g: 1.4 },
      { phase: 3, slice: 2, g: 1.8 },
      { phase: 2, slice: 3, region: 'liver', g: 1.6 },
    ],
  };

  it('gives its rows, and straight between two rows of one slice factor', () => {
    expect(parallelNoiseFactor(coil, 2, 1)).toBe(1.1);
    expect(parallelNoiseFactor(coil, 2.5, 1)).toBeCloseTo(1.3, 12);
    expect(parallelNoiseFactor(coil, 2.25, 2)).toBeCloseTo(1.5, 12);
  });

  it('no acceleration is 1, and below its first row it is straight from there', () => {
    expect(parallelNoiseFactor(coil, 1, 1)).toBe(1);
    expect(parallelNoiseFactor(coil, 1.5, 1)).toBeCloseTo(1.05, 12);
  });

  it('says nothing beyond its rows', () => {
    expect(parallelNoiseFactor(coil, 4, 1)).toBeNull();
    expect(parallelNoiseFactor(coil, 1.5, 2)).toBeNull();
    expect(parallelNoiseFactor(coil, 2, 2.5)).toBeNull();
  });

  it('rows of another region do not count', () => {
    expect(parallelNoiseFactor(coil, 2, 3, 'brain')).toBeNull();
    expect(parallelNoiseFactor(coil, 2, 3, 'liver')).toBe(1.6);
    expect(parallelNoiseFactor(coil, 2, 3)).toBe(1.6);
    expect(parallelNoiseFactor(coil, 2, 1, 'brain')).toBe(1.1);
  });
});
