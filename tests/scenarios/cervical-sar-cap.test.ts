import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { expectNoClearance, expectRatio, expectRf, wordFor } from './judge.js';

/** An invented preset: 3 T cervical T1; the scanner shows 2.6 W/kg, the site's cap for a fever is 2.0. */
const displayed = 2.6;
const cap = 2.0;
const preset = seriesOf(
  'fast-spin-echo/2D',
  {
    repetitionTimeMs: 600,
    echoTimeMs: 10,
    echoTrainLength: 3,
    echoSpacingMs: 10,
    refocusingAngleDeg: 150,
    sliceCount: 15,
    sliceThicknessMm: 3,
    sliceGapMm: 0.3,
    fieldOfViewMm: 240,
    matrixRead: 320,
    matrixPhase: 256,
    pixelBandwidthHz: 250,
  },
  { plane: 'sagittal', target: 'spinal cord (white matter)', comparison: 'skeletal muscle' },
);
const tried = (set: GivenParameters = {}, pair = {}) => edit({ ...preset, ...pair }, set, { fieldT: 3, readings: { sarWkg: displayed } });
const sar = (set: GivenParameters) => displayed * (tried(set).figures.sarTrendHigh as number);

describe('3 T cervical T1, fever: 2.6 W/kg displayed, 2.0 allowed', () => {
  it.each<[string, GivenParameters, number]>([
    ['TR 780', { repetitionTimeMs: 780 }, 0.77],
    ['refocusing 127', { refocusingAngleDeg: 127 }, 0.77],
    ['11 slices', { sliceCount: 11 }, 11 / 15],
  ])('%s is accepted, with little to spare', (_what, set, factor) => {
    const { figures, codes, cautions } = tried(set);
    expectRf(figures.rfPowerTrend, factor);
    expect(figures.sarTrendLow).toBe(figures.sarTrendHigh);
    expect(wordFor('rf', sar(set), cap)).toBe('TOO CLOSE');
    expect(codes).toEqual(expect.arrayContaining(['reading-used', 'read-scanner-again']));
    expectNoClearance(cautions);
  });

  it('131 degrees is the trap: 2.05 to 2.09', () => {
    expect(sar({ refocusingAngleDeg: 131 })).toBeGreaterThan(2.05);
    expect(sar({ refocusingAngleDeg: 131 })).toBeLessThan(2.1);
    expect(wordFor('rf', sar({ refocusingAngleDeg: 131 }), cap)).toBe('OVER');
  });

  it('the preset is over', () => {
    expect(wordFor('rf', sar({}), cap)).toBe('OVER');
  });

  it('each costs something else: TR moves contrast, the angle costs 14 % of the cord, fewer slices cost coverage', () => {
    expect(tried().figures.contrastRatio).toBeCloseTo(1.48, 1);
    expect(tried({ repetitionTimeMs: 780 }).figures.contrastRatio).toBeCloseTo(1.41, 2);
    const fat = { target: 'skeletal muscle', comparison: 'subcutaneous fat' };
    expect(tried({}, fat).figures.contrastRatio).toBeCloseTo(0.31, 2);
    expect(tried({ repetitionTimeMs: 780 }, fat).figures.contrastRatio).toBeCloseTo(0.35, 2);
    expectRatio(tried({ refocusingAngleDeg: 127 }).figures.relativeSnr, 0.86);
    const [all, fewer] = [tried().figures.coverageMm as number, tried({ sliceCount: 11 }).figures.coverageMm as number];
    expect(all - fewer).toBeCloseTo(4 * 3.3, 9);
    expect(tried({ sliceCount: 11 }).figures.relativeSnr).toBe(1);
    expect(tried({ sliceCount: 11 }).figures.scanTimeS).toBe(tried().figures.scanTimeS);
  });
});
