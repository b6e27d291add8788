import { describe, expect, it } from 'vitest';
import { geometryOf } from '../../src/calc/geometry.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { parametersOf } from './series-of.js';

const geometry = (acquisition: '2D' | '3D', given: GivenParameters) =>
  geometryOf(acquisition, parametersOf(acquisition === '2D' ? 'spin-echo/2D' : 'spin-echo/3D', given));

describe('geometryOf', () => {
  it('the voxel is field over matrix, and the phase matrix counts over a square field', () => {
    const square = geometry('2D', { fieldOfViewMm: 240, matrixRead: 320, matrixPhase: 256, sliceThicknessMm: 4 });
    expect(square).toMatchObject({ voxelReadMm: 0.75, voxelPhaseMm: 0.9375, voxelSliceMm: 4 });
    expect(square.voxelVolumeMm3).toBeCloseTo(2.8125, 12);
    const rectangular = geometry('2D', { fieldOfViewMm: 240, matrixRead: 320, matrixPhase: 256, phaseFieldOfViewPercent: 75 });
    expect(rectangular.voxelPhaseMm).toBe(0.9375);
    expect(rectangular.phaseExtentMm).toBe(180);
  });

  it('interpolation never counts as resolution (Bernstein, Fain & Riederer, J Magn Reson Imaging 2001;14:270; read in the source)', () => {
    const shown = geometry('2D', { fieldOfViewMm: 256, matrixRead: 256, matrixPhase: 128, displayMatrix: 512 });
    expect(shown).toMatchObject({ voxelReadMm: 1, voxelPhaseMm: 2, displayedVoxelReadMm: 0.5, displayedVoxelPhaseMm: 0.5 });
    const plain = geometry('2D', { fieldOfViewMm: 256, matrixRead: 256, matrixPhase: 128 });
    expect(plain).toMatchObject({ displayedVoxelReadMm: 1, displayedVoxelPhaseMm: 2 });
  });

  it('covers n thicknesses and n - 1 gaps in 2D, n partitions in 3D', () => {
    expect(geometry('2D', { sliceCount: 20, sliceThicknessMm: 5, sliceGapMm: 1 }).coverageMm).toBe(119);
    expect(geometry('2D', { sliceCount: 1, sliceThicknessMm: 5, sliceGapMm: 1 }).coverageMm).toBe(5);
    expect(geometry('3D', { sliceCount: 72, sliceThicknessMm: 3, sliceOversamplingPercent: 11, sliceGapMm: 1 }).coverageMm).toBe(216);
  });

  it('encodes the phase extent and its oversampling', () => {
    expect(geometry('2D', { fieldOfViewMm: 340, phaseOversamplingPercent: 14 }).encodedPhaseExtentMm).toBeCloseTo(387.6, 9);
    expect(
      geometry('2D', { fieldOfViewMm: 400, phaseFieldOfViewPercent: 75, phaseOversamplingPercent: 10 }).encodedPhaseExtentMm,
    ).toBeCloseTo(330, 9);
  });
});
