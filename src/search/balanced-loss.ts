import type { Figures } from '../calc/figures.js';

/** Square of the natural log of a ratio that says how many times worse, nothing on the winning side. */
function lost(timesWorse: number): number {
  return timesWorse > 1 ? Math.log(timesWorse) ** 2 : 0;
}

/** Figures the balanced loss is made of. */
export type LossFigures = Pick<
  Figures,
  'relativeSnr' | 'relativeContrast' | 'voxelReadMm' | 'voxelPhaseMm' | 'voxelSliceMm' | 'coverageMm' | 'blurFwhmPx' | 'rfPowerTrend'
>;

type Voxels = { readonly voxelReadMm: number; readonly voxelPhaseMm: number; readonly voxelSliceMm: number; readonly coverageMm: number };

/** Loss of voxel in each direction and of coverage. */
export function geometryLoss(now: Voxels, preset: Voxels): number {
  return (
    lost(now.voxelReadMm / preset.voxelReadMm) +
    lost(now.voxelPhaseMm / preset.voxelPhaseMm) +
    lost(now.voxelSliceMm / preset.voxelSliceMm) +
    lost(preset.coverageMm / now.coverageMm)
  );
}

/** Loss of sharpness along the train, and of RF where it is capped. */
export function trainLoss(
  blurFwhmPx: number | null,
  presetBlurFwhmPx: number | null,
  rfPowerTrend: number | null,
  capped: boolean,
): number {
  const blur = blurFwhmPx === null || presetBlurFwhmPx === null ? 0 : lost(blurFwhmPx / presetBlurFwhmPx);
  return blur + (capped && rfPowerTrend !== null ? lost(rfPowerTrend) : 0);
}

/** Loss of signal to noise and of contrast to noise. */
export function noiseLoss(relativeSnr: number | null, relativeContrast: number | null): number {
  return (relativeSnr === null ? 0 : lost(1 / relativeSnr)) + (relativeContrast === null ? 0 : lost(1 / relativeContrast));
}

/** The three parts, added in one order everywhere, so that the same way has the same loss to the last bit on every path. */
export function addLosses(geometry: number, train: number, noise: number): number {
  return geometry + train + noise;
}

/**
 * Balanced loss of a way against its preset: the sum of squares of natural-log ratios of SNR, contrast, voxel in each direction,
 * blur, coverage, and RF where it is capped, on the losing side only. 0 is nothing lost.
 *
 * @example balancedLoss({ ...preset, voxelSliceMm: 4 }, { ...preset, voxelSliceMm: 3 }, false) //=> 0.0828
 */
export function balancedLoss(now: LossFigures, preset: LossFigures, capped: boolean): number {
  return addLosses(
    geometryLoss(now as Voxels, preset as Voxels),
    trainLoss(now.blurFwhmPx, preset.blurFwhmPx, now.rfPowerTrend, capped),
    noiseLoss(now.relativeSnr, now.relativeContrast),
  );
}
