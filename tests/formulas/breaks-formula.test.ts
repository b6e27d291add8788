import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { breaksFormula } from '../../src/formulas/breaks-formula.js';
import { evaluateFormula } from '../../src/formulas/evaluate-formula.js';
import { formulaNames } from '../../src/formulas/formula-names.js';
import { arbitraryFormula } from './formula-arbitrary.js';

describe('breaksFormula', () => {
  it('says false where the whole evaluation says false, for any values, missing ones too', () => {
    const value = fc.oneof(
      fc.integer({ min: -20, max: 20 }),
      fc.double({ min: -1e6, max: 1e6, noNaN: true }),
      fc.constantFrom(null, undefined, Number.NaN, Number.POSITIVE_INFINITY, true, false),
    );
    const broken = new Set<boolean>();
    fc.assert(
      fc.property(arbitraryFormula, fc.dictionary(fc.constantFrom(...formulaNames.keys()), value), (formula, values) => {
        const valueNamed = (name: string) => (Object.hasOwn(values, name) ? values[name] : formulaNames.get(name) === 'flag' ? true : 2.5);
        const breaks = breaksFormula(formula, valueNamed);
        broken.add(breaks);
        expect(breaks).toBe(evaluateFormula(formula, valueNamed).truth === false);
      }),
      { numRuns: 5000 },
    );
    expect(broken.size).toBe(2);
  });
});
