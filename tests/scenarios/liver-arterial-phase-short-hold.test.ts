import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../src/calc/series.js';
import type { VerdictWord } from '../../src/calc/verdict.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { liverArterialPhase } from './invented-parameters.js';
import { expectNoClearance, expectRatio, expectTime, wordFor } from './judge.js';

/** An invented preset: 17 s at 3 T, 1.2 x 1.9 x 3 mm, 80 x 60 lines. The patient holds 11 s. */
const preset = seriesOf('spoiled-gradient-echo/3D', liverArterialPhase, { purpose: 'dynamic' });
const holdS = 11;
const tried = (set: GivenParameters = {}) => edit(preset, set, { fieldT: 3 });

describe('3 T liver, arterial phase of 17 s, a patient who holds 11 s', () => {
  it('the preset takes 17.0 s for 80 x 60 lines and is over', () => {
    const { figures } = tried();
    expectTime(figures.holdTimeS, 17);
    expect([figures.linesPhase, figures.linesSlice, figures.holds]).toEqual([80, 60, 1]);
    expect(wordFor('hold', figures.holdTimeS, holdS)).toBe('OVER');
  });

  it.each<[string, GivenParameters, readonly [number, number], number, number, VerdictWord]>([
    ['4 mm and 6/8 along phase', { sliceThicknessMm: 4, sliceCount: 54, partialFourierPhase: 0.75 }, [60, 45], 9.6, 1, 'FITS'],
    ['4 mm and a phase voxel of 2.3 mm', { sliceThicknessMm: 4, sliceCount: 54, matrixPhase: 165 }, [66, 45], 10.5, 1.27, 'TOO CLOSE'],
    ['5 mm, as thick as may be', { sliceThicknessMm: 5, sliceCount: 44 }, [80, 37], 10.5, 1.31, 'TOO CLOSE'],
    ['3.6 mm and R 3', { sliceThicknessMm: 3.6, sliceCount: 60, parallelFactorPhase: 3 }, [54, 51], 9.8, 0.79, 'FITS'],
    ['R 3 alone: the trap', { parallelFactorPhase: 3 }, [54, 60], 11.5, 0.71, 'OVER'],
    ['4.5 mm alone just misses', { sliceThicknessMm: 4.5, sliceCount: 48 }, [80, 40], 11.4, 1.22, 'OVER'],
    ['bandwidth x 1.4 is not enough', { pixelBandwidthHz: 889 }, [80, 60], 14.9, 0.76, 'OVER'],
  ])('%s', (_what, set, lines, seconds, snr, word) => {
    const { figures, cautions } = tried(set);
    expect([figures.linesPhase, figures.linesSlice]).toEqual(lines);
    expectTime(figures.holdTimeS, seconds);
    expectRatio(figures.relativeSnr, snr);
    expect(wordFor('hold', figures.holdTimeS, holdS)).toBe(word);
    expectNoClearance(cautions);
  });

  it('bandwidth x 1.4 brings TR to about 3.1 ms', () => {
    expect(Math.abs(tried({ pixelBandwidthHz: 889 }).parameters.repetitionTimeMs / 3.1 - 1)).toBeLessThan(0.05);
  });

  it('partial Fourier in two directions says what it leaves out', () => {
    expect(tried({ sliceThicknessMm: 4, sliceCount: 54, partialFourierPhase: 0.75 }).codes).toContain('partial-fourier-two-directions');
    expect(tried({ sliceThicknessMm: 5, sliceCount: 44 }).codes).not.toContain('partial-fourier-two-directions');
  });

  it('every change says that all phases must match, and that oxygen or rehearsal may restore the preset', () => {
    const result = tried({ sliceThicknessMm: 5, sliceCount: 44 });
    expect(result.codes).toContain('phases-must-match');
    expect(result.cautions.find(({ code }) => code === 'phases-must-match')?.text).toMatch(/Oxygen or a practised hold/);
    expect(tried().codes).not.toContain('phases-must-match');
  });

  it('44 slices of 5 mm still cover 220 mm', () => {
    expect(tried({ sliceThicknessMm: 5, sliceCount: 44 }).figures.coverageMm).toBe(220);
  });

  it('more acceleration shortens the exposure but not B1+rms, and says so', () => {
    const result = tried({ parallelFactorPhase: 3 });
    expect(result.codes).toContain('rf-per-exposure');
    expect(result.figures.rfPowerTrend).toBe(1);
  });
});
