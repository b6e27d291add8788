import { type ClassKey, classRow } from './classes.js';
import { fatShiftHz } from './constants.js';
import type { Geometry } from './geometry.js';
import type { Lines } from './lines.js';
import type { Parameters } from './series.js';

/** Pixels that one hertz of frequency offset moves the picture: along readout, or along phase in echo-planar (spacing / R x full lines; Mansfield 1977). */
function pixelsPerHz(key: ClassKey, p: Parameters, lines: Lines): number {
  if (!classRow(key).echoPlanar) return 1 / p.pixelBandwidthHz;
  return ((p.echoSpacingMs / 1000) * lines.fullPhase) / p.parallelFactorPhase;
}

/** Displacement of fat and of 100 Hz off resonance. Fat lies 3.4 ppm from water; 33.4 px at 3 T, 0.6 ms, 128 lines, R 1. */
export function displacement(key: ClassKey, p: Parameters, lines: Lines, geometry: Geometry, fieldT: number) {
  const perHz = pixelsPerHz(key, p, lines);
  const shiftPx = fatShiftHz(fieldT) * perHz;
  const pixelMm = classRow(key).echoPlanar ? geometry.voxelPhaseMm : geometry.voxelReadMm;
  return { chemicalShiftPx: shiftPx, chemicalShiftMm: shiftPx * pixelMm, distortionPxPer100Hz: 100 * perHz };
}

/** First echo times with water and fat in phase and opposed, ms (Dixon 1984): 4.605 and 2.303 at 1.5 T. */
export function phaseTimesMs(fieldT: number): { readonly inPhaseMs: number; readonly opposedPhaseMs: number } {
  const inPhaseMs = 1000 / fatShiftHz(fieldT);
  return { inPhaseMs, opposedPhaseMs: inPhaseMs / 2 };
}
