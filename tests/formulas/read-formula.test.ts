import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loadParser } from '../../src/formulas/load-parser.js';
import { printFormula } from '../../src/formulas/print-formula.js';
import { readFormula } from '../../src/formulas/read-formula.js';
import { arbitraryFormula } from './formula-arbitrary.js';

const parse = await loadParser();

function refusalOf(text: string): string {
  const reading = readFormula(text, parse);
  return reading.ok ? `accepted: ${printFormula(reading.value)}` : (reading.problems[0]?.code ?? 'no problem');
}

describe('readFormula accepts the grammar of rules', () => {
  it.each([
    ['voxelVolumeMm3 <= 4 and chemicalShiftPx < 1', 'voxelVolumeMm3 <= 4 and chemicalShiftPx < 1'],
    ['voxelReadMm * voxelPhaseMm <= 1.0', 'voxelReadMm * voxelPhaseMm <= 1'],
    ['scanTimeS / volumes <= 15', 'scanTimeS / volumes <= 15'],
    ['not (averages > 2) or ellipticalSampling', 'not (averages > 2) or ellipticalSampling'],
    ['not ellipticalSampling', 'not ellipticalSampling'],
    ['1 < averages <= 4', '1 < averages and averages <= 4'],
    ['1 < averages < rounds != 7', '(1 < averages and averages < rounds) and rounds != 7'],
    ['averages == 1', 'averages == 1'],
    ['-2 ^ 2 < averages', '-(2 ^ 2) < averages'],
    ['((averages)) > -(1)', 'averages > -1'],
    ['max(voxelReadMm, voxelPhaseMm, 1) <= sqrt(abs(-4))', 'max(voxelReadMm, voxelPhaseMm, 1) <= sqrt(abs(-4))'],
    ['min(2) > 1', 'min(2) > 1'],
    ['averages >= 1e-3', 'averages >= 0.001'],
    ['diffusion >= 1400', 'diffusion >= 1400'],
    ['averages\t<= 2', 'averages <= 2'],
    ['averages <= 1 or averages <= 2 and rounds <= 3', 'averages <= 1 or (averages <= 2 and rounds <= 3)'],
  ])('%s', (text, printed) => {
    const reading = readFormula(text, parse);
    expect(reading.ok ? printFormula(reading.value) : reading.problems).toBe(printed);
  });
});

describe('readFormula refuses everything else, with the part that is not allowed', () => {
  it.each([
    // Assignments and definitions.
    ['averages = 2', 'formula-part'],
    ['f(x) = x', 'formula-part'],
    ['averages <= (rounds = 3)', 'formula-part'],
    ['averages.x = 3', 'formula-part'],
    // Properties and indices.
    ['averages.constructor', 'formula-part'],
    ['x.constructor', 'formula-part'],
    ['averages.constructor.constructor(1)()', 'formula-syntax'],
    ['averages.toString() == 1', 'formula-part'],
    ['averages["constructor"] > 1', 'formula-character'],
    ['averages[1] > 1', 'formula-character'],
    ['pacing.periodMs > 1', 'formula-part'],
    ['constructor > 1', 'formula-name'],
    ['__proto__ > 1', 'formula-name'],
    ['hasOwnProperty < 2', 'formula-name'],
    ['toString', 'formula-name'],
    ['this > 1', 'formula-name'],
    // Functions.
    ['import(averages)', 'formula-part'],
    ['evaluate(1) > 0', 'formula-part'],
    ['parse(1) > 0', 'formula-part'],
    ['createUnit(1) > 0', 'formula-part'],
    ['sin(averages) > 0', 'formula-part'],
    ['random() < 1', 'formula-part'],
    ['cbrt(averages) > 0', 'formula-part'],
    ['averages(2) > 1', 'formula-part'],
    ['constructor(1) > 0', 'formula-part'],
    ['min.constructor(1) > 0', 'formula-part'],
    ['abs(1, 2) > 0', 'formula-part'],
    ['sqrt() > 0', 'formula-part'],
    ['min() > 0', 'formula-part'],
    ['abs > 1', 'formula-name'],
    // Strings, matrices, objects, ranges, choices, several expressions.
    ['"a" == "a"', 'formula-character'],
    ["'a' == 'a'", 'formula-character'],
    ['[1, 2] == 1', 'formula-character'],
    ['{a: 1} == 1', 'formula-character'],
    ['1:3 == 1', 'formula-character'],
    ['averages > 1 ? 1 : 2', 'formula-character'],
    ['averages > 1; rounds > 1', 'formula-character'],
    ['averages > 1\nrounds > 1', 'formula-character'],
    ['averages > 1 # and more', 'formula-character'],
    ['averages > 1 \\ 2', 'formula-character'],
    ['averages\u0000 > 1', 'formula-character'],
    ['averages \u202E> 1', 'formula-character'],
    ['averages \u2264 1', 'formula-character'],
    ['\u0430verages > 1', 'formula-character'],
    // Operators that are not on the list.
    ['averages! > 1', 'formula-part'],
    ['averages % 2 == 0', 'formula-character'],
    ['averages mod 2 == 0', 'formula-part'],
    ['averages xor rounds', 'formula-part'],
    ['averages > 1 xor rounds > 1', 'formula-part'],
    ['averages & 1 > 0', 'formula-character'],
    ['averages << 1 > 0', 'formula-part'],
    ['averages .* 2 > 0', 'formula-part'],
    ['+averages > 0', 'formula-part'],
    ['averages to mm > 0', 'formula-part'],
    // Units and numbers side by side.
    ['sliceThicknessMm <= 5 mm', 'formula-part'],
    ['2 averages > 1', 'formula-part'],
    // Values that are no plain number.
    ['averages < NaN', 'formula-part'],
    ['averages < Infinity', 'formula-part'],
    ['averages < 1e999', 'formula-part'],
    ['averages == true', 'formula-part'],
    ['averages == null', 'formula-part'],
    ['averages == undefined', 'formula-part'],
    ['averages < pi', 'formula-name'],
    ['averages < i', 'formula-name'],
    // Numbers and truths in each other's place.
    ['averages', 'formula-kind'],
    ['averages + 1', 'formula-kind'],
    ['averages and rounds', 'formula-kind'],
    ['not averages <= 4', 'formula-kind'],
    ['(averages > 1) + 1 > 1', 'formula-kind'],
    ['(1 < averages < 3) > 0', 'formula-kind'],
    ['ellipticalSampling == 1', 'formula-kind'],
    ['ellipticalSampling > averages', 'formula-kind'],
    ['fatSuppression == 1', 'formula-name'],
    ['pacing > 1', 'formula-name'],
    // No formula at all.
    ['', 'formula-empty'],
    ['   ', 'formula-empty'],
    ['averages >', 'formula-syntax'],
    ['(averages > 1', 'formula-syntax'],
    ['averages > 1)', 'formula-syntax'],
    [', > 1', 'formula-syntax'],
    // Size and depth.
    [`averages > ${'1'.repeat(10_240)}`, 'formula-length'],
    [`averages > 1${' '.repeat(9988)}`, 'formula-length'],
    [`${'('.repeat(41)}averages${')'.repeat(41)} > 1`, 'formula-depth'],
    [`${'('.repeat(4000)}averages${')'.repeat(4000)} > 1`, 'formula-depth'],
    [`averages > ${'-'.repeat(100)}1`, 'formula-depth'],
    [`averages > ${'-'.repeat(9000)}1`, 'formula-depth'],
    [`${'not '.repeat(2000)}ellipticalSampling`, 'formula-depth'],
    [`averages > 2${' ^ 2'.repeat(2000)}`, 'formula-depth'],
    [`averages > 1${' + 1'.repeat(50)}`, 'formula-depth'],
    [`averages > 1${' and averages > 1'.repeat(50)}`, 'formula-depth'],
    [`1${' < averages'.repeat(60)}`, 'formula-depth'],
  ])('%.60s', (text, code) => {
    expect(refusalOf(text)).toBe(code);
  });

  it('names the part and where it stands', () => {
    const reading = readFormula('averages <= 2 and sin(rounds) > 0', parse);
    expect(reading).toEqual({
      ok: false,
      problems: [
        {
          code: 'formula-part',
          path: '',
          message:
            'the function "sin" is not allowed in "sin(rounds)" at character 19; expected names of parameters and figures, numbers, comparisons, and, or, not, + - * / ^, parentheses, min, max, abs, sqrt.',
          hint: 'Write the rule with what is allowed.',
          part: 'sin(rounds)',
          given: 'the function "sin" is not allowed in "sin(rounds)" at character 19',
          expected: 'names of parameters and figures, numbers, comparisons, and, or, not, + - * / ^, parentheses, min, max, abs, sqrt',
        },
      ],
    });
  });

  it('accepts 40 levels and no more', () => {
    const nested = (levels: number) => `${'('.repeat(levels)}averages${')'.repeat(levels)} > 1`;
    expect(readFormula(nested(38), parse).ok).toBe(true);
    expect(readFormula(nested(39), parse).ok).toBe(false);
  });

  it('never throws for random text over the alphabet of formulas', () => {
    const piece = fc.constantFrom(
      'averages',
      'and ',
      'or ',
      'not ',
      '(',
      ')',
      '<',
      '<=',
      '=',
      '==',
      '!',
      '+',
      '-',
      '*',
      '/',
      '^',
      '.',
      ',',
      '1',
      '2.5',
      'e',
      'sqrt',
      'min',
      'x',
      ' ',
    );
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 25 }), (pieces) => {
        const reading = readFormula(pieces.join(''), parse);
        expect(reading.ok || reading.problems.length > 0).toBe(true);
      }),
      { numRuns: 3000 },
    );
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 60 }), (text) => {
        readFormula(text, parse);
      }),
      { numRuns: 1000 },
    );
  });

  it('reads back what printFormula writes', () => {
    fc.assert(
      fc.property(arbitraryFormula, (tree) => {
        const reading = readFormula(printFormula(tree), parse);
        expect(reading.ok ? reading.value : reading.problems).toEqual(tree);
      }),
      { numRuns: 2000 },
    );
  });
});
