import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loadParser } from '../../src/formulas/load-parser.js';
import { printFormula } from '../../src/formulas/print-formula.js';
import { readFormula } from '../../src/formulas/read-formula.js';
import { arbitraryFormula } from './formula-arbitrary.js';
import { hostileFormulas } from './hostile-formulas.js';

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
    ['sliceThicknessMm <= 0.5 cm', 'sliceThicknessMm <= 5'],
    ['scanTimeS <= 2 min and repetitionTimeMs >= 1.5 s', 'scanTimeS <= 120 and repetitionTimeMs >= 1500'],
    ['1 mm < voxelReadMm <= 2 mm', '1 < voxelReadMm and voxelReadMm <= 2'],
    ['voxelReadMm * voxelPhaseMm <= 1 mm2', 'voxelReadMm * voxelPhaseMm <= 1'],
    ['voxelReadMm ^ 2 <= 0.01 cm2', 'voxelReadMm ^ 2 <= 1'],
    ['voxelVolumeMm3 / voxelSliceMm <= 1 mm2', 'voxelVolumeMm3 / voxelSliceMm <= 1'],
    ['voxelVolumeMm3 <= 0.004 ml', 'voxelVolumeMm3 <= 4'],
    ['sliceGapMm - 1 >= -5 mm', 'sliceGapMm - 1 >= -5'],
    ['max(voxelReadMm, voxelPhaseMm, 1 mm) <= 0.2 cm', 'max(voxelReadMm, voxelPhaseMm, 1) <= 2'],
    ['min(scanTimeS, 3 min) <= 3 min', 'min(scanTimeS, 180) <= 180'],
    ['pixelBandwidthHz >= 0.4 kHz', 'pixelBandwidthHz >= 400'],
    ['b1PlusRmsUt <= 2.8 uT and chemicalShiftPx < 1 px', 'b1PlusRmsUt <= 2.8 and chemicalShiftPx < 1'],
    ['abs(sliceGapMm) <= 1 mm', 'abs(sliceGapMm) <= 1'],
    ['phaseFieldOfViewPercent >= 75 percent', 'phaseFieldOfViewPercent >= 75'],
  ])('%s', (text, printed) => {
    const reading = readFormula(text, parse);
    expect(reading.ok ? printFormula(reading.value) : reading.problems).toBe(printed);
  });
});

describe('readFormula refuses everything else, with the part that is not allowed', () => {
  it.each(hostileFormulas)('%.60s', (text, code) => {
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
            'the function "sin" is not allowed in "sin(rounds)" at character 19; expected names of parameters and figures, numbers, comparisons, and, or, not, + - * / ^, parentheses, min, max, abs, sqrt, units after numbers.',
          hint: 'Write the rule with what is allowed.',
          part: 'sin(rounds)',
          given: 'the function "sin" is not allowed in "sin(rounds)" at character 19',
          expected:
            'names of parameters and figures, numbers, comparisons, and, or, not, + - * / ^, parentheses, min, max, abs, sqrt, units after numbers',
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
