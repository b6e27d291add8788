import { describe, expect, it } from 'vitest';
import type { GivenParameters, Series } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';
import { cautionOf } from './caution-of.js';

const body = { frontBackMm: 430, leftRightMm: 400 };
const field: GivenParameters = { fieldOfViewMm: 340, matrixRead: 340, matrixPhase: 340 };
const wrapped = (given: GivenParameters, besides: Partial<Series> = {}, set: GivenParameters = {}, size = body) =>
  edit(seriesOf('spoiled-gradient-echo/2D', { ...field, ...given }, besides), set, { body: size });

describe('wrap at R 1: E < (body + kept field) / 2 (geometry)', () => {
  it.each<[string, GivenParameters, boolean]>([
    // body 430, field 340: 385 mm needed, 13.24 % oversampling
    ['13 % is not enough', { phaseOversamplingPercent: 13 }, true],
    ['14 % is', { phaseOversamplingPercent: 14 }, false],
    ['the exact extent is', { phaseOversamplingPercent: 100 * (385 / 340 - 1) }, false],
    ['left-right the body is smaller: 370 mm, 8.9 %', { phaseDirection: 'RL', phaseOversamplingPercent: 8 }, true],
    ['9 % is enough there', { phaseDirection: 'RL', phaseOversamplingPercent: 9 }, false],
    ['a rectangular field keeps less and needs less', { phaseFieldOfViewPercent: 50, phaseOversamplingPercent: 76 }, true],
    ['(430 + 170) / 2 = 300 mm, 76.5 %', { phaseFieldOfViewPercent: 50, phaseOversamplingPercent: 77 }, false],
  ])('%s', (_what, given, warns) => {
    const result = wrapped(given);
    expect(result.codes.includes('wrap')).toBe(warns);
    expect(result.codes).not.toContain('wrap-unfoldable');
    if (warns) expect(cautionOf(result, 'wrap')?.level).toBe('caution');
  });

  it('says that the body is taken as centred, and gives the numbers', () => {
    const caution = cautionOf(wrapped({}), 'wrap');
    expect(caution?.text).toContain('centred');
    expect(caution?.numbers).toEqual({ encodedMm: 340, keptMm: 340, bodyMm: 430, neededMm: 385 });
  });

  it('says nothing of a body whose size is not known', () => {
    expect(wrapped({}, {}, {}, { frontBackMm: null, leftRightMm: 400 } as never).codes).not.toContain('wrap');
  });
});

describe('wrap at R > 1: all of the body must be encoded', () => {
  it.each([
    [26, true],
    [27, false],
    [100 * (430 / 340 - 1), false],
  ])('%d %% oversampling', (phaseOversamplingPercent, fails) => {
    const result = wrapped({ phaseOversamplingPercent, parallelFactorPhase: 2 });
    expect(result.codes.includes('wrap-unfoldable')).toBe(fails);
    expect(result.codes).not.toContain('wrap');
    if (fails) expect(cautionOf(result, 'wrap-unfoldable')?.level).toBe('error');
  });
});

describe('wrap head-feet: the visible length of the scanner', () => {
  const sagittal = { plane: 'sagittal' };

  it('counts 500 mm, unless a saturation band on that side excuses it', () => {
    expect(wrapped({ phaseDirection: 'HF' }, sagittal).codes).toContain('wrap');
    expect(wrapped({ phaseDirection: 'HF', saturationBands: 1 }, sagittal).codes).not.toContain('wrap');
    // (500 + 340) / 2 = 420 mm: 23.5 %
    expect(wrapped({ phaseDirection: 'HF', phaseOversamplingPercent: 23 }, sagittal).codes).toContain('wrap');
    expect(wrapped({ phaseDirection: 'HF', phaseOversamplingPercent: 24 }, sagittal).codes).not.toContain('wrap');
  });

  it('a band excuses nothing along the body', () => {
    expect(wrapped({ saturationBands: 2 }).codes).toContain('wrap');
  });

  it('accelerated: a caution where the preset itself does so, an error where an edit causes it', () => {
    const preset = wrapped({ phaseDirection: 'HF', parallelFactorPhase: 2 }, sagittal);
    expect(cautionOf(preset, 'wrap-unfoldable')?.level).toBe('caution');
    const edited = wrapped({ phaseDirection: 'HF' }, sagittal, { parallelFactorPhase: 2 });
    expect(cautionOf(edited, 'wrap-unfoldable')?.level).toBe('error');
    const narrower = wrapped({ phaseDirection: 'HF', parallelFactorPhase: 2 }, sagittal, { phaseFieldOfViewPercent: 80 });
    expect(cautionOf(narrower, 'wrap-unfoldable')?.level).toBe('error');
    const swapped = wrapped({ phaseDirection: 'AP', parallelFactorPhase: 2, phaseOversamplingPercent: 30 }, sagittal, {
      phaseDirection: 'HF',
    });
    expect(cautionOf(swapped, 'wrap-unfoldable')?.level).toBe('error');
  });
});

describe('where no body axis lies along phase', () => {
  it.each(['sagittal oblique', 'short axis'])('%s is not checked, and says so when a size is known', (plane) => {
    const result = wrapped({}, { plane });
    expect(result.codes).toContain('wrap-not-checked');
    expect(result.codes).not.toContain('wrap');
    expect(wrapped({}, { plane }, {}, { frontBackMm: null, leftRightMm: null } as never).codes).not.toContain('wrap-not-checked');
  });

  it('axial is checked', () => {
    expect(wrapped({}).codes).not.toContain('wrap-not-checked');
  });

  it('rotating strips do not fold', () => {
    const strips = seriesOf('rotating-strip-fast-spin-echo/2D', { ...field, echoTrainLength: 20, repetitionTimeMs: 3000 });
    expect(edit(strips, {}, { body }).codes).not.toContain('wrap');
  });
});
