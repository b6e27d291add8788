import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { expectTime, wordFor } from './judge.js';

/** An invented axial 3D preset of 17 s, phase AP over 300 of 400 mm; the ghost of the aorta lies over the left lobe. */
const preset = seriesOf('spoiled-gradient-echo/3D', {
  repetitionTimeMs: 3.55,
  echoTimeMs: 1.2,
  flipAngleDeg: 10,
  pixelBandwidthHz: 635,
  fieldOfViewMm: 400,
  phaseFieldOfViewPercent: 75,
  matrixRead: 320,
  matrixPhase: 213,
  sliceCount: 72,
  sliceThicknessMm: 3,
  sliceOversamplingPercent: 11,
  partialFourierSlice: 0.75,
  parallelFactorPhase: 2,
  pacing: { kind: 'breath-hold' },
});
const body = { frontBackMm: 290, leftRightMm: 390 };
const tried = (set: GivenParameters) => edit(preset, set, { fieldT: 3, body });

describe('ghost of the aorta over the left lobe, axial 3D of 17 s, phase AP', () => {
  const swap: GivenParameters = { phaseDirection: 'RL', phaseFieldOfViewPercent: 100 };

  it('the preset takes 17 s', () => {
    expectTime(tried({}).figures.holdTimeS, 17);
  });

  it('phase right-left goes from 300 to 400 mm: 22.7 s, over a hold of 11 or 15 s', () => {
    const { figures } = tried(swap);
    expectTime(figures.holdTimeS, 22.7);
    expect(wordFor('hold', figures.holdTimeS, 15)).toBe('OVER');
    expect(wordFor('hold', figures.holdTimeS, 11)).toBe('OVER');
    expect([figures.voxelReadMm, figures.voxelPhaseMm]).toEqual([tried({}).figures.voxelReadMm, tried({}).figures.voxelPhaseMm]);
  });

  it('without the wider extent right-left cannot be unfolded', () => {
    expect(tried({ phaseDirection: 'RL' }).codes).toContain('wrap-unfoldable');
    expect(tried(swap).codes).not.toContain('wrap-unfoldable');
  });

  it('saturation bands above and below cost no time, only RF', () => {
    const bands = tried({ saturationBands: 2 });
    expect(bands.figures.holdTimeS).toBe(tried({}).figures.holdTimeS);
    expect(bands.figures.rfPowerTrend as number).toBeGreaterThan(1);
  });
});
