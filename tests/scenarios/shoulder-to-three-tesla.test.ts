import { describe, expect, it } from 'vitest';
import { fatShiftHz } from '../../src/calc/constants.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { expectRatio, expectTime } from './judge.js';

const joint = { fieldOfViewMm: 160, matrixRead: 320, matrixPhase: 256, sliceThicknessMm: 3, averages: 2, pixelBandwidthHz: 220 };
const protonDensity = seriesOf(
  'fast-spin-echo/2D',
  { ...joint, repetitionTimeMs: 3000, echoTimeMs: 36, echoTrainLength: 7, echoSpacingMs: 12, sliceCount: 20, fatSuppression: 'spectral' },
  { target: 'articular cartilage', comparison: 'synovial fluid' },
);
const t1 = seriesOf(
  'spin-echo/2D',
  { ...joint, repetitionTimeMs: 500, echoTimeMs: 12, sliceCount: 16 },
  { target: 'skeletal muscle', comparison: 'subcutaneous fat' },
);
const onto = plainScanner(3);

describe('shoulder carried from 1.5 to 3 T: chemical shift under one pixel, contrast equal', () => {
  it('the preset shifts fat by 0.99 px', () => {
    expect(edit(t1).figures.chemicalShiftPx).toBeCloseTo(0.99, 2);
  });

  it('under one pixel needs 435 Hz/px at 3.0 T and 419 at 2.89 T', () => {
    expect(Math.ceil(fatShiftHz(3))).toBe(435);
    expect(Math.ceil(fatShiftHz(2.89))).toBe(419);
    expect(edit(t1, { pixelBandwidthHz: 435 }, { onto }).figures.chemicalShiftPx as number).toBeLessThan(1);
    expect(edit(t1, { pixelBandwidthHz: 434 }, { onto }).figures.chemicalShiftPx as number).toBeGreaterThan(1);
    expect(edit(t1, { pixelBandwidthHz: 419 }, { onto: plainScanner(2.89) }).figures.chemicalShiftPx as number).toBeLessThan(1);
    expect(edit(t1, { pixelBandwidthHz: 418 }, { onto: plainScanner(2.89) }).figures.chemicalShiftPx as number).toBeGreaterThan(1);
  });

  it('field and bandwidth alone give SNR 1.41', () => {
    const same = { 'skeletal muscle': { t1Ms: 1200, t2Ms: 35 } };
    expectRatio(edit({ ...t1, tissueOverrides: same }, { pixelBandwidthHz: 435 }, { onto }).figures.relativeSnr, 1.41);
  });

  it('with relaxation, one average: PD cartilage 0.86 in half the time, T1 muscle 0.99 in 0.64 of it', () => {
    const pd = edit(protonDensity, { pixelBandwidthHz: 435, averages: 1, echoTimeMs: 36, echoSpacingMs: 12 }, { onto }).figures;
    expectRatio(pd.relativeSnr, 0.86);
    expectTime((pd.scanTimeS as number) / (edit(protonDensity).figures.scanTimeS as number), 0.5);
    const muscle = edit(t1, { pixelBandwidthHz: 435, averages: 1, repetitionTimeMs: 640 }, { onto }).figures;
    expectRatio(muscle.relativeSnr, 0.99);
    expectTime((muscle.scanTimeS as number) / (edit(t1).figures.scanTimeS as number), 0.64);
  });

  it('T1: TR 500 to 640 keeps muscle over fat at 0.312 to 0.311; unchanged it falls to 0.282, -9 %', () => {
    expect(edit(t1).figures.contrastRatio).toBeCloseTo(0.312, 2);
    expect(edit(t1, { pixelBandwidthHz: 435, repetitionTimeMs: 640 }, { onto }).figures.contrastRatio).toBeCloseTo(0.311, 2);
    const unchanged = edit(t1, { pixelBandwidthHz: 435 }, { onto }).figures;
    expect(unchanged.contrastRatio).toBeCloseTo(0.282, 2);
    expect(unchanged.contrastRatioChange).toBeCloseTo(-0.09, 1);
  });

  it('PD: cartilage over fluid stays at 0.382 to 0.385 with unchanged TR and TE', () => {
    expect(edit(protonDensity).figures.contrastRatio).toBeCloseTo(0.382, 2);
    expect(edit(protonDensity, { pixelBandwidthHz: 435, echoTimeMs: 36, echoSpacingMs: 12 }, { onto }).figures.contrastRatio).toBeCloseTo(
      0.385,
      2,
    );
    expect(edit(protonDensity, { pixelBandwidthHz: 435, echoTimeMs: 36, echoSpacingMs: 12 }, { onto }).codes).not.toContain(
      'contrast-drift',
    );
  });

  it('RF power: four times at the quasi-static upper bound; 130 degrees 2.1, 120 degrees 1.8', () => {
    const bare = { ...protonDensity, parameters: { ...protonDensity.parameters, fatSuppression: 'none' as const } };
    const high = (refocusingAngleDeg: number) =>
      edit(bare, { refocusingAngleDeg, echoSpacingMs: 12, echoTimeMs: 36 }, { onto }).figures.sarTrendHigh as number;
    expect(high(180)).toBeCloseTo(4, 6);
    // within 0.1 of the angles alone; the excitation counts too
    expect(Math.abs(high(130) / 2.1 - 1)).toBeLessThan(0.1);
    expect(Math.abs(high(120) / 1.8 - 1)).toBeLessThan(0.1);
    expect(edit(bare, {}, { onto }).figures.sarTrendLow as number).toBeLessThan(2);
  });

  it('fat null: TI 200 becomes about 257 ms by the tissue table, and the old one is an error', () => {
    const stir = seriesOf('fast-spin-echo/2D', {
      ...joint,
      repetitionTimeMs: 4000,
      inversionTimeMs: 200,
      echoTimeMs: 50,
      echoTrainLength: 10,
      sliceCount: 12,
      fatSuppression: 'inversion',
    });
    const result = edit(stir, {}, { onto });
    expect(Math.abs((result.figures.nullTimeMs as number) / 257 - 1)).toBeLessThan(0.03);
    expect(result.cautions.find(({ code }) => code === 'null-drift')?.level).toBe('error');
    expect(Math.abs((result.cautions.find(({ code }) => code === 'null-drift')?.numbers.wantedMs as number) / 257 - 1)).toBeLessThan(0.03);
  });
});
