import { gammaBarMhzPerT } from './constants.js';

/** Gradient strength in mT/m and slew rate in T/m/s (numerically mT/m/ms). */
export interface GradientLimits {
  readonly gradientMtPerM: number;
  readonly slewTPerMPerS: number;
}

/** Time to reach an amplitude, ms. */
export function rampMs(amplitudeMtPerM: number, limits: GradientLimits): number {
  return amplitudeMtPerM / limits.slewTPerMPerS;
}

/**
 * Shortest time in ms of a gradient lobe of this area in mT/m ms: a triangle while the slew rate allows, else a trapezoid.
 * Geometry of trapezoids (Bernstein, King & Zhou, Handbook of MRI Pulse Sequences, 2004; common to all textbooks).
 */
export function lobeMs(area: number, limits: GradientLimits): number {
  const fullRamp = rampMs(limits.gradientMtPerM, limits);
  const triangleArea = limits.gradientMtPerM * fullRamp;
  if (area <= triangleArea) return 2 * Math.sqrt(area / limits.slewTPerMPerS);
  return area / limits.gradientMtPerM + fullRamp;
}

/** Readout amplitude in mT/m: bandwidth x matrix / (gamma-bar x field of view). */
export function readoutMtPerM(pixelBandwidthHz: number, matrixRead: number, fieldOfViewMm: number): number {
  return (pixelBandwidthHz * matrixRead) / (gammaBarMhzPerT * fieldOfViewMm);
}

/** Area in mT/m ms that moves phase encoding to the edge of k-space for this voxel: 1 / (2 gamma-bar voxel). */
export function phaseEncodeArea(voxelMm: number): number {
  return 1e3 / (2 * gammaBarMhzPerT * voxelMm);
}

/** Slice-selection amplitude in mT/m of a pulse bandwidth in kHz over a thickness in mm. 2 mm at 10 mT/m is 0.8515 kHz. */
export function sliceSelectMtPerM(bandwidthKhz: number, thicknessMm: number): number {
  return (bandwidthKhz * 1e3) / (gammaBarMhzPerT * thicknessMm);
}
