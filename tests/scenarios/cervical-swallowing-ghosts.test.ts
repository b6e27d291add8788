import { describe, expect, it } from 'vitest';
import { edit, seriesOf } from '../calc/series-of.js';

/** An invented preset: sagittal cervical T2, phase AP, two averages. */
const preset = seriesOf(
  'fast-spin-echo/2D',
  {
    repetitionTimeMs: 3000,
    echoTimeMs: 100,
    echoTrainLength: 16,
    sliceCount: 13,
    sliceThicknessMm: 3,
    sliceGapMm: 0.3,
    fieldOfViewMm: 240,
    matrixRead: 320,
    matrixPhase: 320,
    averages: 2,
  },
  { plane: 'sagittal', target: 'CSF', comparison: 'spinal cord (white matter)' },
);

describe('cervical T2, ghosts from swallowing: phase head-feet against two averages', () => {
  const swapped = edit(preset, { phaseDirection: 'HF', phaseOversamplingPercent: 100, averages: 1 });

  it('640 lines in trains of 16 at TR 3000 take 2:00, as two averages with phase AP do', () => {
    expect(swapped.figures.linesPhase).toBe(640);
    expect(swapped.figures.scanTimeS).toBe(120);
    expect(edit(preset).figures.scanTimeS).toBe(120);
  });

  it('the two are equal in signal to noise', () => {
    expect(swapped.figures.relativeSnr).toBeCloseTo(1, 9);
  });

  it('head-feet with 100 % oversampling does not wrap; without it does', () => {
    expect(swapped.codes).not.toContain('wrap');
    expect(edit(preset, { phaseDirection: 'HF' }).codes).toContain('wrap');
  });

  it('an anterior saturation band raises RF', () => {
    const band = edit(preset, { saturationBands: 1 });
    expect(band.figures.rfPowerTrend as number).toBeGreaterThan(1.02);
    expect(band.figures.scanTimeS).toBe(120);
    expect(swapped.figures.rfPowerTrend).toBe(1);
  });

  it('the voxel stays', () => {
    expect(swapped.figures).toMatchObject({ voxelReadMm: 0.75, voxelPhaseMm: 0.75, voxelSliceMm: 3 });
  });
});
