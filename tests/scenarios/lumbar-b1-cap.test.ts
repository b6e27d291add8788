import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../src/calc/series.js';
import type { VerdictWord } from '../../src/calc/verdict.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { lumbarTrain } from './invented-parameters.js';
import { expectNoClearance, expectRatio, expectRf, expectTime, wordFor } from './judge.js';

/** An invented preset: sagittal lumbar T2 at 1.5 T; the scanner shows 2.8 uT, the implant's label says 2.0. */
const preset = seriesOf('fast-spin-echo/2D', lumbarTrain, {
  plane: 'sagittal',
  target: 'CSF',
  comparison: 'intervertebral disc (nucleus)',
});
const cap = 2;
const readings = { b1rmsUt: 2.8 };
const tried = (set: GivenParameters = {}, target = 'CSF') => edit({ ...preset, target }, set, { readings });

describe('1.5 T lumbar T2, implant label B1+rms 2.0 uT, 2.8 uT displayed', () => {
  it('the preset takes 1:56 (16 x 2 + 1 shots), reads 2.8 uT and is over', () => {
    const { figures, fromReading } = tried();
    expectTime(figures.scanTimeS, 116);
    expect(figures.shots).toBe(33);
    expect(figures.b1PlusRmsUt).toBe(2.8);
    expect(fromReading).toEqual(['b1PlusRmsUt']);
    expect(wordFor('rf', figures.b1PlusRmsUt, cap)).toBe('OVER');
  });

  it.each<[string, GivenParameters, number, number, VerdictWord]>([
    ['refocusing 125', { refocusingAngleDeg: 125 }, 1.97, 116, 'TOO CLOSE'],
    ['refocusing 120', { refocusingAngleDeg: 120 }, 1.89, 116, 'FITS'],
    ['150 and TR 5000', { refocusingAngleDeg: 150, repetitionTimeMs: 5000 }, 1.96, 165, 'TOO CLOSE'],
    ['130 and TR 4000', { refocusingAngleDeg: 130, repetitionTimeMs: 4000 }, 1.91, 132, 'TOO CLOSE'],
    ['130 alone: a trap', { refocusingAngleDeg: 130 }, 2.04, 116, 'OVER'],
    ['150 and TR 4800: a trap', { refocusingAngleDeg: 150, repetitionTimeMs: 4800 }, 2.0, 158.4, 'OVER'],
  ])('%s', (_what, set, ut, seconds, word) => {
    const { figures, cautions } = tried(set);
    expectRf(figures.b1PlusRmsUt, ut);
    expectTime(figures.scanTimeS, seconds);
    expect(wordFor('rf', figures.b1PlusRmsUt, cap)).toBe(word);
    expectNoClearance(cautions);
  });

  it.each([
    ['CSF', 0.9],
    ['intervertebral disc (nucleus)', 0.99],
    ['spinal cord (white matter)', 1.04],
  ])('125 degrees give %s %d of its signal at 180', (target, ratio) => {
    expectRatio(tried({ refocusingAngleDeg: 125 }, target).figures.relativeSnr, ratio);
  });

  it('pulses twice as long lower RF, lengthen the spacing and blur more', () => {
    const [plain, long] = [tried(), tried({ rfPulseStretch: 2 })];
    expect(long.figures.b1PlusRmsUt as number).toBeLessThan(cap);
    expect(long.parameters.echoSpacingMs).toBeGreaterThan(plain.parameters.echoSpacingMs);
    expect(long.figures.blurFwhmPx as number).toBeGreaterThan(plain.figures.blurFwhmPx as number);
  });

  it("says that it is scaled from the scanner's own number, to be read again before starting", () => {
    const result = tried({ refocusingAngleDeg: 125 });
    expect(result.codes).toEqual(expect.arrayContaining(['reading-used', 'read-scanner-again']));
  });

  it('the T1 series needs its own reading: without one nothing is scaled', () => {
    const t1 = edit(
      seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 600, echoTimeMs: 10, echoTrainLength: 3, sliceCount: 11, sliceGapMm: 1 }),
    );
    expect(t1.fromReading).toEqual([]);
    expect(t1.codes).not.toContain('reading-used');
  });
});
