import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boundFormula } from '../../src/formulas/bound-formula.js';
import { evaluateFormula } from '../../src/formulas/evaluate-formula.js';
import { formulaNames } from '../../src/formulas/formula-names.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import type { ParsedNode } from '../../src/formulas/parsed-node.js';
import { readFormula } from '../../src/formulas/read-formula.js';

const parse = await loadParser();

const word = fc.constantFrom(
  'averages',
  'sliceThicknessMm',
  'scanTimeS',
  'ellipticalSampling',
  'mm',
  's',
  'min',
  'sqrt',
  'abs',
  'sin',
  'import',
  'constructor',
  '__proto__',
  'toString',
  'valueOf',
  'process',
  'globalThis',
  'this',
  'x',
  'pi',
  'true',
  'null',
  'NaN',
  'end',
);
const operator = fc.constantFrom(
  '+',
  '-',
  '*',
  '/',
  '^',
  '<',
  '<=',
  '>',
  '>=',
  '==',
  '!=',
  ' and ',
  ' or ',
  ' mod ',
  ' to ',
  '=',
  '.',
  ' xor ',
);

/** Random expressions as text: names allowed and not, calls, properties, assignments, units, chains. */
const { text } = fc.letrec<{ text: string }>((tie) => ({
  text: fc.oneof(
    { maxDepth: 4, depthSize: 'medium' },
    word,
    fc.integer({ min: -5, max: 5000 }).map(String),
    fc.double({ noNaN: true, min: -1e9, max: 1e9 }).map(String),
    fc.tuple(fc.integer({ min: 0, max: 50 }), word).map(([n, unit]) => `${n} ${unit}`),
    fc.tuple(tie('text'), operator, tie('text')).map(([a, sign, b]) => `${a}${sign}${b}`),
    tie('text').map((inner) => `(${inner})`),
    tie('text').map((inner) => `not ${inner}`),
    tie('text').map((inner) => `-${inner}`),
    fc.tuple(word, fc.array(tie('text'), { maxLength: 3 })).map(([name, args]) => `${name}(${args.join(', ')})`),
    fc.tuple(tie('text'), word).map(([inner, name]) => `${inner}.${name}`),
  ),
}));

const kind = fc.constantFrom(
  'ConstantNode',
  'SymbolNode',
  'OperatorNode',
  'ParenthesisNode',
  'FunctionNode',
  'RelationalNode',
  'AssignmentNode',
  'AccessorNode',
  'IndexNode',
  'ArrayNode',
  'ObjectNode',
  'RangeNode',
  'BlockNode',
  'ConditionalNode',
  'FunctionAssignmentNode',
  'made-up',
);
const fnName = fc.constantFrom(
  'add',
  'subtract',
  'multiply',
  'divide',
  'pow',
  'unaryMinus',
  'unaryPlus',
  'smaller',
  'smallerEq',
  'larger',
  'largerEq',
  'equal',
  'unequal',
  'and',
  'or',
  'not',
  'xor',
  'mod',
  'factorial',
  'constructor',
  'hasOwnProperty',
);

const value = fc.oneof(
  fc.double(),
  fc.integer(),
  fc.string({ maxLength: 5 }),
  fc.boolean(),
  fc.constant(null),
  fc.bigInt(),
  fc.func(fc.nat()),
);
const leaf: fc.Arbitrary<ParsedNode> = fc.record({ type: kind, name: word, value, fn: fnName, op: fc.constantFrom('+', '<', 'to') });

/** Random trees as no parser would give them: any kind with any fields. */
const { node } = fc.letrec<{ node: ParsedNode }>((tie) => ({
  node: fc.oneof(
    { maxDepth: 5, depthSize: 'small' },
    leaf,
    fc.record({
      type: kind,
      name: word,
      value,
      fn: fc.oneof(fnName, fc.record({ type: fc.constant('SymbolNode'), name: word })),
      implicit: fc.boolean(),
      args: fc.tuple(tie('node'), tie('node')),
      content: tie('node'),
      params: fc.tuple(tie('node'), tie('node'), tie('node')),
      conditionals: fc.tuple(fnName, fnName),
    }),
    fc.tuple(fnName, tie('node')).map(([fn, only]): ParsedNode => ({ type: 'OperatorNode', fn, args: [only] })),
    fc.tuple(fnName, tie('node'), tie('node')).map(([fn, a, b]): ParsedNode => ({ type: 'OperatorNode', fn, args: [a, b] })),
  ),
}));

/** Evaluates what was accepted, and holds that it asks for nothing but allowed names and answers nothing but a truth. */
function reachesOnlyNumbers(reading: ReturnType<typeof readFormula>): void {
  if (!reading.ok) {
    expect(reading.problems.length).toBeGreaterThan(0);
    for (const { code, message } of reading.problems) {
      expect(code).toMatch(/^formula-/);
      expect(message.length).toBeGreaterThan(0);
    }
    return;
  }
  const asked: string[] = [];
  const verdict = evaluateFormula(reading.value, (name) => {
    asked.push(name);
    return formulaNames.get(name) === 'flag' ? true : 3.5;
  });
  expect([true, false, null]).toContain(verdict.truth);
  expect(asked.filter((name) => !formulaNames.has(name))).toEqual([]);
  const bounds = boundFormula(reading.value, (name) => (formulaNames.get(name) === 'flag' ? [true] : { low: 3.5, high: 3.5, sure: true }));
  expect(Object.values(bounds).every((value) => typeof value === 'boolean')).toBe(true);
}

describe('formulas under fire', () => {
  it('5,000 random expressions never throw and never reach anything but numbers and flags of the tables', () => {
    let accepted = 0;
    fc.assert(
      fc.property(text, (given) => {
        const reading = readFormula(given, parse);
        if (reading.ok) accepted += 1;
        reachesOnlyNumbers(reading);
      }),
      { numRuns: 5000 },
    );
    // Some must get through, or nothing was evaluated.
    expect(accepted).toBeGreaterThan(20);
  });

  it('20,000 random trees of a parser gone wrong never throw either', () => {
    fc.assert(
      fc.property(node, (tree) => {
        reachesOnlyNumbers(readFormula('averages > 1', () => tree));
      }),
      { numRuns: 20_000 },
    );
  });
});
