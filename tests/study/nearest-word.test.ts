import { describe, expect, it } from 'vitest';
import { parameterKeys } from '../../src/calc/parameters.js';
import { nearestWord } from '../../src/study/nearest-word.js';
import { suggestParameter } from '../../src/study/suggest-key.js';

describe('nearestWord', () => {
  it.each([
    ['matrixReed', 'matrixRead'],
    ['matrixread', 'matrixRead'],
    ['matrix-phase', 'matrixPhase'],
    ['averges', 'averages'],
    ['avreages', 'averages'],
    ['sliceThicknes', 'sliceThicknessMm'],
    ['repetitionTime', 'repetitionTimeMs'],
    ['pixelBandwith', 'pixelBandwidthHz'],
    ['fieldOfView', 'fieldOfViewMm'],
    ['phaseOver', 'phaseOversamplingPercent'],
  ])('%s is near %s', (word, near) => {
    expect(nearestWord(word, parameterKeys)).toBe(near);
  });

  it.each(['colour', 'x', '', '   ', 'slice', 'z'.repeat(5000)])('nothing is near "%.20s"', (word) => {
    expect(nearestWord(word, parameterKeys)).toBe(null);
  });

  it('takes the nearest of several, and the first of equals', () => {
    expect(nearestWord('knee-2t', ['knee-1.5t', 'knee-3t'])).toBe('knee-3t');
    expect(nearestWord('abc', ['abd', 'abe', 'xbc'])).toBe('abd');
  });

  it('of two letters mends only the order', () => {
    expect(nearestWord('LR', ['AP', 'RL', 'HF'])).toBe('RL');
    expect(nearestWord('up', ['AP', 'RL', 'HF'])).toBe(null);
  });
});

describe('suggestParameter', () => {
  it.each([
    ['TR', 'repetitionTimeMs'],
    ['te', 'echoTimeMs'],
    ['RepetitionTime', 'repetitionTimeMs'],
    ['NumberOfAverages', 'averages'],
    ['bandwidth', 'pixelBandwidthHz'],
    ['matrixReed', 'matrixRead'],
  ])('%s suggests %s', (word, key) => {
    expect(suggestParameter(word)).toBe(key);
  });

  it('suggests nothing for a word that is near no key', () => {
    expect(suggestParameter('colour')).toBe(null);
  });
});
