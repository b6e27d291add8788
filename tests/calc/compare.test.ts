import { describe, expect, it } from 'vitest';
import { baselineOf } from '../../src/calc/baseline.js';
import { compareWith } from '../../src/calc/compare.js';
import type { TissueSignal } from '../../src/calc/evaluate.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, seriesOf } from './series-of.js';

const spinEcho = (given: GivenParameters = {}) =>
  seriesOf('spin-echo/2D', { repetitionTimeMs: 600, echoTimeMs: 15, matrixPhase: 192, ...given });

describe('a series against itself', () => {
  it('has SNR, contrast and RF of 1 and no change', () => {
    expect(edit(spinEcho()).figures).toMatchObject({
      relativeSnr: 1,
      relativeContrast: 1,
      contrastRatioChange: 0,
      rfPowerTrend: 1,
      sarTrendLow: 1,
      sarTrendHigh: 1,
    });
  });
});

describe('relativeSnr', () => {
  it.each<[string, GivenParameters, number]>([
    // scaling factors (Macovski, Magn Reson Med 1996;36:494; Pruessmann, Magn Reson Med 1999;42:952; values computed)
    ['half both in-plane extents, same matrix', { fieldOfViewMm: 128 }, 0.25],
    ['both matrices doubled at the same Hz/px', { matrixRead: 512, matrixPhase: 384 }, 0.353553],
    ['both matrices doubled at the same total bandwidth', { matrixRead: 512, matrixPhase: 384, pixelBandwidthHz: 100 }, 0.5],
    ['averages 1 to 4', { averages: 4 }, 2],
    ['bandwidth twice', { pixelBandwidthHz: 400 }, Math.SQRT1_2],
    ['5 to 3 mm', { sliceThicknessMm: 3 }, 0.6],
    ['6/8 partial Fourier (sqrt f is the usual convention)', { partialFourierPhase: 0.75 }, 0.866025],
  ])('%s', (_what, set, ratio) => {
    // the carried TE would bring T2 decay in: the echo time is set
    expect(edit(spinEcho(), { echoTimeMs: 15, ...set }).figures.relativeSnr).toBeCloseTo(ratio, 6);
  });

  it('R 2 with g 1.1 keeps 0.642824', () => {
    const scanner = {
      ...plainScanner(1.5),
      coil: { name: 'invented', elements: { AP: 4, RL: 4, HF: 2 }, g: [{ phase: 2, slice: 1, g: 1.1 }] },
    };
    expect(edit(spinEcho(), { parallelFactorPhase: 2 }, { scanner }).figures.relativeSnr).toBeCloseTo(0.642824, 6);
  });

  it('R 2 without g costs 29 %, the same as halving averages (AJR 2003;181:277; read in the source)', () => {
    const scanner = {
      ...plainScanner(1.5),
      coil: { name: 'invented', elements: { AP: 4, RL: 4, HF: 2 }, g: [{ phase: 2, slice: 1, g: 1 }] },
    };
    const accelerated = edit(spinEcho({ averages: 2 }), { parallelFactorPhase: 2 }, { scanner }).figures.relativeSnr;
    expect(accelerated).toBeCloseTo(Math.SQRT1_2, 6);
    expect(accelerated).toBeCloseTo(edit(spinEcho({ averages: 2 }), { averages: 1 }, { scanner }).figures.relativeSnr as number, 12);
  });

  it('twice the partitions of the same slab keep 0.707', () => {
    const volume = seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 8, echoTimeMs: 3, sliceCount: 60, sliceThicknessMm: 2 });
    expect(edit(volume, { sliceCount: 120, sliceThicknessMm: 1 }).figures.relativeSnr).toBeCloseTo(Math.SQRT1_2, 6);
  });

  it('100 % phase oversampling costs and gains exactly what doubling averages does', () => {
    const oversampled = edit(spinEcho(), { phaseOversamplingPercent: 100 }).figures;
    const averaged = edit(spinEcho(), { averages: 2 }).figures;
    expect(oversampled.scanTimeS).toBe(averaged.scanTimeS);
    expect(oversampled.relativeSnr).toBeCloseTo(averaged.relativeSnr as number, 12);
  });

  it('simultaneous slices cost their g alone', () => {
    const scanner = { ...plainScanner(1.5), simultaneousSliceG: { 2: 1.25 } };
    const series = seriesOf('echo-planar-gradient-echo/2D', {
      repetitionTimeMs: 2000,
      echoTimeMs: 30,
      matrixPhase: 64,
      echoSpacingMs: 0.5,
      sliceCount: 20,
      volumes: 10,
    });
    expect(edit(series, { simultaneousSlices: 2, echoTimeMs: 30 }, { scanner }).figures.relativeSnr).toBeCloseTo(0.8, 9);
    expect(edit(series, { simultaneousSlices: 3, echoTimeMs: 30 }, { scanner }).figures.relativeSnr).toBeCloseTo(1, 9);
  });

  it('grows with B0 to the first power where relaxation is the same (exponent 0.96 to 0.98 measured from 0.55 to 3 T: Wang et al., Magn Reson Med 2025, doi 10.1002/mrm.70202; read in the source)', () => {
    const fixed = { liver: { t1Ms: 700, t2Ms: 50 } };
    const onto = plainScanner(3);
    expect(edit({ ...spinEcho(), tissueOverrides: fixed }, {}, { onto }).figures.relativeSnr).toBeCloseTo(2, 9);
  });

  it('is null beyond the coil table, and for a target that has no value', () => {
    expect(edit(spinEcho(), { parallelFactorPhase: 5 }).figures.relativeSnr).toBeNull();
    expect(edit({ ...spinEcho(), target: 'unobtainium' }).figures).toMatchObject({
      relativeSnr: null,
      relativeContrast: null,
      contrastRatio: null,
      contrastRatioChange: null,
    });
    expect(edit({ ...spinEcho(), comparison: 'unobtainium' }).figures).toMatchObject({
      relativeSnr: 1,
      relativeContrast: null,
      contrastRatio: null,
    });
  });
});

describe('relativeContrast and contrastRatio', () => {
  const weighted = (tissue: TissueSignal) =>
    tissue.protonDensity * (tissue.signal as number) * tissue.suppression * (tissue.diffusionFactor as number);

  it('hold proton density, fat factor and diffusion', () => {
    const series = seriesOf(
      'spin-echo/2D',
      { repetitionTimeMs: 600, fatSuppression: 'spectral' },
      { target: 'skeletal muscle', comparison: 'subcutaneous fat' },
    );
    const { figures, signals } = edit(series, { repetitionTimeMs: 800 });
    const before = edit(series).signals;
    const [muscle, fat] = signals as [TissueSignal, TissueSignal];
    const [muscleBefore, fatBefore] = before as [TissueSignal, TissueSignal];
    expect(figures.contrastRatio).toBeCloseTo(weighted(muscle) / weighted(fat), 12);
    expect(figures.relativeContrast).toBeCloseTo(
      Math.abs(weighted(muscle) - weighted(fat)) / Math.abs(weighted(muscleBefore) - weighted(fatBefore)),
      12,
    );
    expect(figures.contrastRatioChange).toBeCloseTo(
      weighted(muscle) / weighted(fat) / (weighted(muscleBefore) / weighted(fatBefore)) - 1,
      12,
    );
    expect(fat.suppression).toBe(0.05);
  });

  it('contrast is to noise: averages 1 to 4 double it', () => {
    expect(edit(spinEcho(), { averages: 4 }).figures.relativeContrast).toBeCloseTo(2, 9);
  });

  it('relative contrast is null when the two differ by less than 1 % of the larger in the baseline', () => {
    const equal = (t1Ms: number) =>
      edit(
        seriesOf(
          'spin-echo/2D',
          {},
          { tissueOverrides: { liver: { t1Ms: 800, t2Ms: 50, protonDensity: 1 }, spleen: { t1Ms, t2Ms: 50, protonDensity: 1 } } },
        ),
      ).figures;
    expect(equal(800)).toMatchObject({ relativeContrast: null, contrastRatio: 1 });
    expect(equal(806).relativeContrast).toBeNull();
    expect(equal(820).relativeContrast).toBe(1);
  });

  it('a comparison that gives nothing has no ratio', () => {
    const series = seriesOf(
      'spoiled-gradient-echo/3D',
      { repetitionTimeMs: 6, echoTimeMs: 2.4, fatSuppression: 'two-point' },
      { comparison: 'subcutaneous fat' },
    );
    expect(edit(series).figures).toMatchObject({ contrastRatio: null, contrastRatioChange: null, relativeContrast: 1 });
  });
});

describe('target and comparison that are nearly equal in the baseline', () => {
  // A share of 1 % of the larger one, chosen here; at the share itself there is still a contrast to compare with.
  const series = spinEcho();
  const { model, ...rest } = baselineOf(series, plainScanner(1.5));
  const contrastAgainst = (targetSignal: number, comparisonSignal: number) =>
    compareWith(model, { ...rest, model, targetSignal, comparisonSignal }).relativeContrast;

  it.each([
    [100, 99],
    [99, 100],
  ])('%i and %i have a contrast', (target, comparison) => {
    expect(contrastAgainst(target, comparison)).toBeGreaterThan(0);
  });

  it.each([
    [100, 99.001],
    [99.001, 100],
    [1, 1],
    [0, 0],
  ])('%d and %d have none', (target, comparison) => {
    expect(contrastAgainst(target, comparison)).toBeNull();
  });
});
