import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boundFormula, type Interval } from '../../src/formulas/bound-formula.js';
import { evaluateFormula } from '../../src/formulas/evaluate-formula.js';
import type { Formula } from '../../src/formulas/formula.js';
import { formulaNames } from '../../src/formulas/formula-names.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { readFormula } from '../../src/formulas/read-formula.js';
import { arbitraryFormula } from './formula-arbitrary.js';

const parse = await loadParser();

function tree(text: string): Formula {
  const reading = readFormula(text, parse);
  if (!reading.ok) throw new Error(JSON.stringify(reading.problems));
  return reading.value;
}

const between = (low: number, high: number): Interval => ({ low, high, sure: true });

describe('boundFormula', () => {
  it.each([
    ['averages <= 4', between(1, 4), { canHold: true, canFail: false, canMiss: false }],
    ['averages <= 4', between(1, 5), { canHold: true, canFail: true, canMiss: false }],
    ['averages <= 4', between(5, 6), { canHold: false, canFail: true, canMiss: false }],
    ['averages < 4', between(4, 5), { canHold: false, canFail: true, canMiss: false }],
    ['not (averages < 4)', between(4, 5), { canHold: true, canFail: false, canMiss: false }],
    ['averages == 4', between(4, 4), { canHold: true, canFail: false, canMiss: false }],
    ['averages != 4', between(5, 6), { canHold: true, canFail: false, canMiss: false }],
    ['averages ^ 2 >= 0', between(-3, 2), { canHold: true, canFail: false, canMiss: false }],
    ['averages ^ 2 >= 3', between(-3, 2), { canHold: true, canFail: true, canMiss: false }],
    ['averages ^ 3 >= -27', between(-3, 2), { canHold: true, canFail: false, canMiss: false }],
    ['averages - rounds >= 0', between(1, 2), { canHold: true, canFail: true, canMiss: false }],
    ['10 - averages >= 4', between(1, 6), { canHold: true, canFail: false, canMiss: false }],
    ['averages * rounds <= 36', between(-3, 6), { canHold: true, canFail: false, canMiss: false }],
    ['averages ^ 0.5 <= 3', between(4, 8), { canHold: true, canFail: false, canMiss: false }],
    ['-averages <= -4', between(4, 8), { canHold: true, canFail: false, canMiss: false }],
    ['min(averages, 3) <= 3', between(4, 8), { canHold: true, canFail: false, canMiss: false }],
    ['abs(averages) <= 3', between(-3, 2), { canHold: true, canFail: false, canMiss: false }],
    ['1 / averages > 0', between(-1, 1), { canHold: true, canFail: true, canMiss: true }],
    ['1 / averages > 0', between(1, 2), { canHold: true, canFail: false, canMiss: false }],
    ['sqrt(averages) > 3', between(-1, 4), { canHold: false, canFail: true, canMiss: true }],
    ['max(averages, 7) > 6', between(0, 1), { canHold: true, canFail: false, canMiss: false }],
    ['averages > 1 and averages < 9', between(2, 3), { canHold: true, canFail: false, canMiss: false }],
    ['averages > 5 or averages < 1', between(2, 3), { canHold: false, canFail: true, canMiss: false }],
  ])('%s over %o', (text, bounds, expected) => {
    expect(boundFormula(tree(text), () => bounds)).toEqual(expected);
  });

  it('knows nothing of names without bounds', () => {
    expect(boundFormula(tree('averages <= 4'), () => null)).toEqual({ canHold: true, canFail: true, canMiss: true });
    expect(boundFormula(tree('ellipticalSampling'), () => null)).toEqual({ canHold: true, canFail: true, canMiss: true });
    expect(boundFormula(tree('ellipticalSampling'), () => [true])).toEqual({ canHold: true, canFail: false, canMiss: false });
  });

  it('never excludes what a point in the box gives', () => {
    const end = fc.oneof(fc.integer({ min: -20, max: 20 }), fc.double({ min: -1e6, max: 1e6, noNaN: true }));
    const box = fc.dictionary(
      fc.constantFrom(...formulaNames.keys()),
      fc.tuple(end, end, fc.double({ min: 0, max: 1, noNaN: true }), fc.boolean()),
    );
    fc.assert(
      fc.property(arbitraryFormula, box, (formula, ends) => {
        const bounds = boundFormula(formula, (name) => {
          const known = ends[name];
          if (known === undefined) return null;
          if (formulaNames.get(name) === 'flag') return known[3] ? [true, false] : [false];
          return between(Math.min(known[0], known[1]), Math.max(known[0], known[1]));
        });
        const { truth, missing } = evaluateFormula(formula, (name) => {
          const known = ends[name];
          if (formulaNames.get(name) === 'flag') return known === undefined ? true : known[3] && known[2] > 0.5;
          if (known === undefined) return 3.5;
          const [low, high] = [Math.min(known[0], known[1]), Math.max(known[0], known[1])];
          return Math.min(high, Math.max(low, low + (high - low) * known[2]));
        });
        if (missing.length > 0) expect(bounds.canMiss).toBe(true);
        if (truth === true) expect(bounds.canHold).toBe(true);
        if (truth === false) expect(bounds.canFail).toBe(true);
      }),
      { numRuns: 5000 },
    );
  });
});
