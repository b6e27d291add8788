import { expect, it } from 'vitest';
import { plainScanner } from '../../../src/calc/scanner.js';

it('a scanner without a file has 40 mT/m, 150 T/m/s, 500 mm, 20 uT and 5 % (common practice, no source)', () => {
  expect(plainScanner(2.89)).toMatchObject({
    fieldT: 2.89,
    gradientMtPerM: 40,
    slewTPerMPerS: 150,
    visibleLengthMm: 500,
    maximumB1Ut: 20,
    modelErrorPercent: 5,
    coil: null,
  });
});
