import type { Parameters } from './series.js';

/** Acquired voxel, displayed pixel and coverage, mm. Interpolation never counts as resolution (Bernstein, Fain & Riederer, J Magn Reson Imaging 2001;14:270). */
export interface Geometry {
  readonly voxelReadMm: number;
  readonly voxelPhaseMm: number;
  readonly voxelSliceMm: number;
  readonly voxelVolumeMm3: number;
  readonly displayedVoxelReadMm: number;
  readonly displayedVoxelPhaseMm: number;
  readonly coverageMm: number;
  readonly phaseExtentMm: number;
  readonly encodedPhaseExtentMm: number;
}

/** Geometry of a series: voxel `fov / matrix` (the phase matrix counts over a square field); 3D has no gap. */
export function geometryOf(acquisition: '2D' | '3D', p: Parameters): Geometry {
  const voxelReadMm = p.fieldOfViewMm / p.matrixRead;
  const voxelPhaseMm = p.fieldOfViewMm / p.matrixPhase;
  const voxelSliceMm = p.sliceThicknessMm;
  const phaseExtentMm = p.fieldOfViewMm * (p.phaseFieldOfViewPercent / 100);
  const displayed = p.displayMatrix === undefined ? null : p.fieldOfViewMm / p.displayMatrix;
  return {
    voxelReadMm,
    voxelPhaseMm,
    voxelSliceMm,
    voxelVolumeMm3: voxelReadMm * voxelPhaseMm * voxelSliceMm,
    displayedVoxelReadMm: displayed ?? voxelReadMm,
    displayedVoxelPhaseMm: displayed ?? voxelPhaseMm,
    coverageMm: p.sliceCount * p.sliceThicknessMm + (acquisition === '3D' ? 0 : (p.sliceCount - 1) * p.sliceGapMm),
    phaseExtentMm,
    encodedPhaseExtentMm: phaseExtentMm * (1 + p.phaseOversamplingPercent / 100),
  };
}
