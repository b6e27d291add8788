import { describe, expect, it } from 'vitest';
import { evaluateFormula, namesIn } from '../../src/formulas/evaluate-formula.js';
import type { Formula } from '../../src/formulas/formula.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { readFormula } from '../../src/formulas/read-formula.js';

const parse = await loadParser();

function tree(text: string): Formula {
  const reading = readFormula(text, parse);
  if (!reading.ok) throw new Error(JSON.stringify(reading.problems));
  return reading.value;
}

const values: Readonly<Record<string, number | boolean | null>> = {
  averages: 2,
  rounds: 3,
  voxelVolumeMm3: 4,
  blurFwhmPx: null,
  nullTimeMs: null,
  ellipticalSampling: true,
  flowCompensation: false,
  sliceGapMm: 0,
};
const truth = (text: string) => evaluateFormula(tree(text), (name) => values[name]).truth;

describe('evaluateFormula', () => {
  it.each([
    ['averages == 2', true],
    ['averages != 2', false],
    ['averages < 2', false],
    ['averages <= 2', true],
    ['averages > 2', false],
    ['averages >= 2', true],
    ['1 < averages < 3', true],
    ['2 < averages < 3', false],
    ['averages + rounds == 5 and averages - rounds == -1', true],
    ['averages * rounds == 6 and averages / rounds < 0.7', true],
    ['averages ^ rounds == 8', true],
    ['2 ^ 3 ^ 2 == 512', true],
    ['-averages ^ 2 == -4', true],
    ['min(averages, rounds) == 2 and max(averages, rounds, 7) == 7', true],
    ['abs(averages - rounds) == 1 and sqrt(voxelVolumeMm3) == 2', true],
    ['ellipticalSampling and not flowCompensation', true],
    ['not (averages == 2)', false],
    ['averages == 1 or rounds == 3', true],
  ])('%s is %s', (text, expected) => {
    expect(truth(text)).toBe(expected);
  });

  it('compares with the tolerance of rules: the last binary digit does not cross a limit', () => {
    expect(evaluateFormula(tree('averages <= 0.3'), () => 0.1 + 0.2).truth).toBe(true);
    expect(evaluateFormula(tree('averages < 0.3'), () => 0.3 - 1e-12).truth).toBe(false);
    expect(evaluateFormula(tree('averages == 1000000'), () => 1_000_000.0005).truth).toBe(true);
    expect(evaluateFormula(tree('averages <= 0.3'), () => 0.3 + 1e-8).truth).toBe(false);
  });

  it.each([
    ['blurFwhmPx < 2', null],
    ['blurFwhmPx < 2 or averages == 2', null],
    ['averages == 2 or blurFwhmPx < 2', null],
    ['blurFwhmPx < 2 and averages == 2', null],
    ['not (blurFwhmPx < 2)', null],
    ['min(blurFwhmPx, 1) < 2', null],
    ['-blurFwhmPx < 2', null],
    ['blurFwhmPx == nullTimeMs', null],
    ['blurFwhmPx < 2 and averages == 1', false],
    ['averages == 1 and blurFwhmPx < 2', false],
    ['averages / sliceGapMm > 1', null],
    ['sqrt(averages - rounds) > 1', null],
    ['(averages - rounds) ^ 0.5 > 1', null],
    ['10 ^ 300 * 10 ^ 300 > 1', null],
  ])('a missing value leaves a rule not checked, never passed: %s is %s', (text, expected) => {
    expect(truth(text)).toBe(expected);
  });

  it('names everything that is missing, each once', () => {
    const verdict = evaluateFormula(tree('blurFwhmPx < 2 or nullTimeMs > blurFwhmPx or averages / sliceGapMm > 1'), (name) => values[name]);
    expect(verdict).toEqual({ truth: null, missing: ['blurFwhmPx', 'nullTimeMs', 'averages / sliceGapMm'] });
  });

  it('takes NaN and infinite values as missing', () => {
    expect(evaluateFormula(tree('averages > 1'), () => Number.NaN).truth).toBe(null);
    expect(evaluateFormula(tree('averages > 1'), () => Number.POSITIVE_INFINITY).truth).toBe(null);
    expect(evaluateFormula(tree('averages > 1'), () => undefined).truth).toBe(null);
    expect(evaluateFormula(tree('averages > 1'), () => true).truth).toBe(null);
    expect(evaluateFormula(tree('ellipticalSampling'), () => 1).truth).toBe(null);
  });

  it('namesIn lists the names in order, each once', () => {
    expect(namesIn(tree('max(rounds, averages) > averages and not ellipticalSampling or -rounds < 2'))).toEqual([
      'rounds',
      'averages',
      'ellipticalSampling',
    ]);
  });
});
