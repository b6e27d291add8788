import { describe, expect, it } from 'vitest';
import { sayChange, sayFigure } from '../../src/session/say-figure.js';
import { sayParameter } from '../../src/session/say-parameter.js';
import { sayRatio } from '../../src/session/say-ratio.js';
import { sayTime } from '../../src/session/say-time.js';
import { sayVerdict } from '../../src/session/say-verdict.js';

describe('numbers as the trade writes them', () => {
  it.each([
    [0, '0.0 s'],
    [17.04, '17.0 s'],
    [59.94, '59.9 s'],
    [59.96, '1:00'],
    [60, '1:00'],
    [230.4, '3:50'],
    [3599.6, '1:00:00'],
    [3725, '1:02:05'],
    [-90, '-1:30'],
  ])('%d s is %s', (seconds, words) => expect(sayTime(seconds)).toBe(words));

  it.each([
    [1, '100 %'],
    [1.274, '127 %'],
    [0.005, '1 %'],
    [2, '200 %'],
    [2.41, 'x 2.4'],
  ])('a ratio of %d is %s', (ratio, words) => expect(sayRatio(ratio)).toBe(words));

  it.each([
    [0.27, '+27 %'],
    [-0.094, '-9 %'],
    [0.001, '0 %'],
    [-0.001, '0 %'],
  ])('a change of %d is %s', (change, words) => expect(sayChange(change)).toBe(words));

  it.each([
    ['voxelReadMm', 0.9766, '0.98 mm'],
    ['voxelPhaseMm', 1.9, '1.9 mm'],
    ['b1PlusRmsUt', 1.968, '1.97 uT'],
    ['relativeSnr', 1.274, '127 %'],
    ['holds', 4, '4'],
    ['holdTimeS', null, '-'],
  ] as const)('%s of %d is %s', (key, value, words) => expect(sayFigure(key, value)).toBe(words));

  it('a parameter has no more digits than a person types', () => {
    expect(sayParameter('repetitionTimeMs', 3.19526)).toBe('3.2 ms');
    expect(sayParameter('repetitionTimeMs', 3.5549)).toBe('3.55 ms');
    expect(sayParameter('partialFourierSlice', 0.625)).toBe('0.625');
    expect(sayParameter('displayMatrix', undefined)).toBe('none');
  });

  it('a verdict leaves nothing to subtract', () => {
    expect(sayVerdict({ word: 'OVER', kind: 'hold', value: 17, limit: 11, spare: -6 })).toBe('OVER by 6.0 s');
    expect(sayVerdict({ word: 'FITS', kind: 'session', value: 700, limit: 1500, spare: 800 })).toBe('FITS, 13:20 to spare');
    expect(sayVerdict({ word: 'OVER', kind: 'hold', value: 11.01, limit: 11, spare: -0.01 })).toBe('OVER by less than 0.1 s');
    expect(sayVerdict({ word: 'TOO CLOSE', kind: 'rf', value: 1.97, limit: 2, spare: 0.03 })).toBe('TOO CLOSE, 0.03 to spare');
  });
});
