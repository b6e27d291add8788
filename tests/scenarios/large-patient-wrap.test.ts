import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { expectRatio, expectTime } from './judge.js';

/** An invented series, field 340 mm; the patient is 430 mm along phase, 370 mm across. */
const preset = (given: GivenParameters = {}) =>
  seriesOf('spoiled-gradient-echo/2D', {
    repetitionTimeMs: 170,
    echoTimeMs: 3,
    flipAngleDeg: 70,
    sliceCount: 20,
    sliceGapMm: 1,
    fieldOfViewMm: 340,
    matrixRead: 256,
    matrixPhase: 256,
    pixelBandwidthHz: 500,
    ...given,
  });
const body = { frontBackMm: 430, leftRightMm: 370 };
const tried = (set: GivenParameters, given: GivenParameters = {}) => edit(preset(given), set, { body });
const timeRatio = (set: GivenParameters, given: GivenParameters = {}) =>
  (tried(set, given).figures.scanTimeS as number) / (edit(preset(given)).figures.scanTimeS as number);

describe('430 mm along phase, field 340 mm', () => {
  it('at R 1 the fold stays outside from 14 % oversampling: time x 1.14, SNR x 1.07', () => {
    expect(tried({ phaseOversamplingPercent: 13 }).codes).toContain('wrap');
    const enough = tried({ phaseOversamplingPercent: 14 });
    expect(enough.codes).not.toContain('wrap');
    expectTime(timeRatio({ phaseOversamplingPercent: 14 }), 1.14);
    expectRatio(enough.figures.relativeSnr, 1.07);
  });

  it('at R 2 all of the body must be encoded: 27 %, time x 1.27, and less is an error', () => {
    const r2 = { parallelFactorPhase: 2 };
    const less = tried({ phaseOversamplingPercent: 26 }, r2);
    expect(less.cautions.find(({ code }) => code === 'wrap-unfoldable')?.level).toBe('error');
    expect(tried({ phaseOversamplingPercent: 27 }, r2).codes).not.toContain('wrap-unfoldable');
    expect(tried({ phaseOversamplingPercent: 20 }, r2).codes).toContain('wrap-unfoldable');
    expect(tried({ phaseOversamplingPercent: 30 }, r2).codes).not.toContain('wrap-unfoldable');
    expectTime(timeRatio({ phaseOversamplingPercent: 27 }, r2), 1.27);
  });

  it('swapping the phase direction needs less where the other extent is smaller', () => {
    expect(tried({ phaseDirection: 'RL' }).codes).toContain('wrap');
    expect(tried({ phaseDirection: 'RL', phaseOversamplingPercent: 5 }).codes).not.toContain('wrap');
  });

  it('a field of 430 mm with the same voxel costs the same as encoding all of the body', () => {
    const wide: GivenParameters = { fieldOfViewMm: 430, matrixRead: 324, matrixPhase: 324, echoTimeMs: 3, repetitionTimeMs: 170 };
    expectTime(timeRatio(wide), 1.27);
    expect(tried(wide).codes).not.toContain('wrap');
    expectRatio(tried(wide).figures.relativeSnr, tried({ phaseOversamplingPercent: 27 }).figures.relativeSnr as number);
  });
});
