import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';

/** What is not known is null, never a number made of nothing. */
describe('relative figures where a part of them is not known', () => {
  const spinEcho = (given: GivenParameters = {}) => seriesOf('spin-echo/2D', { repetitionTimeMs: 600, echoTimeMs: 15, ...given });
  const nothing = { relativeSnr: null, relativeContrast: null };

  it('noise beyond the coil table, before or after the edit', () => {
    expect(edit(spinEcho(), { parallelFactorPhase: 5 }).figures).toMatchObject(nothing);
    expect(edit(spinEcho({ parallelFactorPhase: 5 }), { parallelFactorPhase: 1 }).figures).toMatchObject(nothing);
  });

  it('no signal, before or after the edit, since the timing cannot be played', () => {
    expect(edit(spinEcho(), { repetitionTimeMs: 10 }).figures).toMatchObject({
      ...nothing,
      contrastRatio: null,
      contrastRatioChange: null,
    });
    expect(edit(spinEcho({ repetitionTimeMs: 10 }), { repetitionTimeMs: 600 }).figures).toMatchObject({
      ...nothing,
      contrastRatioChange: null,
    });
  });

  it('a target or a comparison that has no value', () => {
    expect(edit({ ...spinEcho(), target: 'unobtainium' }, { averages: 2 }).figures).toMatchObject(nothing);
    expect(edit({ ...spinEcho(), comparison: 'unobtainium' }, { averages: 2 }).figures.relativeContrast).toBeNull();
  });

  it('a target that gives nothing in the baseline', () => {
    const water = seriesOf(
      'spoiled-gradient-echo/3D',
      { repetitionTimeMs: 6, echoTimeMs: 2.4, fatSuppression: 'two-point' },
      { target: 'subcutaneous fat' },
    );
    expect(edit(water, { fatSuppression: 'none' }).figures).toMatchObject({ relativeSnr: null, contrastRatioChange: null });
  });
});
