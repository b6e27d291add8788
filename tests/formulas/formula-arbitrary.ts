import fc from 'fast-check';
import type { Formula, NumberTree } from '../../src/formulas/formula.js';
import { formulaNames } from '../../src/formulas/formula-names.js';

const names = [...formulaNames];
const numbers = names.filter(([, kind]) => kind === 'number').map(([name]) => name);
const flags = names.filter(([, kind]) => kind === 'flag').map(([name]) => name);

const constant = fc.oneof(
  fc.integer({ min: 0, max: 1000 }),
  fc.double({ min: 0, max: 1e6, noNaN: true, noDefaultInfinity: true }).map((x) => x + 0),
);

const { number } = fc.letrec<{ number: NumberTree }>((tie) => ({
  number: fc.oneof(
    { maxDepth: 3, depthSize: 'small' },
    constant.map((value): NumberTree => ({ kind: 'number', value })),
    fc.constantFrom(...numbers.slice(0, 6)).map((name): NumberTree => ({ kind: 'name', name })),
    tie('number').map((of): NumberTree => ({ kind: 'negate', of })),
    fc
      .tuple(fc.constantFrom('+' as const, '-' as const, '*' as const, '/' as const, '^' as const), tie('number'), tie('number'))
      .map(([operator, left, right]): NumberTree => ({ kind: 'arithmetic', operator, left, right })),
    fc
      .tuple(fc.constantFrom('min' as const, 'max' as const), fc.array(tie('number'), { minLength: 1, maxLength: 3 }))
      .map(([name, of]): NumberTree => ({ kind: 'call', name, of })),
    fc
      .tuple(fc.constantFrom('abs' as const, 'sqrt' as const), tie('number'))
      .map(([name, of]): NumberTree => ({ kind: 'call', name, of: [of] })),
  ),
}));

const { formula } = fc.letrec<{ formula: Formula }>((tie) => ({
  formula: fc.oneof(
    { maxDepth: 3, depthSize: 'small' },
    fc
      .tuple(fc.constantFrom('<' as const, '<=' as const, '>' as const, '>=' as const, '==' as const, '!=' as const), number, number)
      .map(([operator, left, right]): Formula => ({ kind: 'compare', operator, left, right })),
    fc.constantFrom(...flags).map((name): Formula => ({ kind: 'flag', name })),
    tie('formula').map((of): Formula => ({ kind: 'not', of })),
    fc
      .tuple(fc.constantFrom('and' as const, 'or' as const), tie('formula'), tie('formula'))
      .map(([kind, left, right]): Formula => ({ kind, left, right })),
  ),
}));

/** Random rules over the first number names and all flags. */
export const arbitraryFormula = formula;
