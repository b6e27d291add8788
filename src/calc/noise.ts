import { type ClassKey, classRow } from './classes.js';
import { ellipticalShare, type Lines } from './lines.js';
import type { Parameters } from './series.js';

/**
 * Samples that average noise, `S^2 / (C + g^2 R (S - C))` with S encoded and C fully sampled lines:
 * g acts on skipped lines only, and without reference lines this is S / (g^2 R).
 * Padding, dummies and volumes never count.
 */
export function noiseAveragingLines(key: ClassKey, p: Parameters, lines: Lines, g: number): number {
  if (key === 'rotating-strip-fast-spin-echo/2D') {
    // Strips overlap in the middle: a quarter of their lines repeats what is known (common practice, no source).
    return (0.75 * lines.total) / (g * g);
  }
  const encoded = lines.encodedPhase * lines.encodedSlice;
  // Reference lines are acquired along phase only, or as a block of both directions; more of them than lines changes nothing.
  const reference = Math.min(encoded, lines.reference);
  const factor = p.parallelFactorPhase * (classRow(key).acquisition === '3D' ? p.parallelFactorSlice : 1);
  return ((encoded * encoded) / (reference + g * g * factor * (encoded - reference))) * ellipticalShare(p);
}

/** Averages that count for noise: those of the highest b-value times its directions in diffusion, else the series' own. */
export function noiseAverages(p: Parameters): number {
  if (p.diffusion === undefined) return p.averages;
  const { bValuesSPerMm2, directions, averages } = p.diffusion;
  let highest = 0;
  for (let i = 1; i < bValuesSPerMm2.length; i += 1) {
    if ((bValuesSPerMm2[i] as number) > (bValuesSPerMm2[highest] as number)) highest = i;
  }
  return (averages[highest] ?? 1) * ((bValuesSPerMm2[highest] ?? 0) > 0 ? directions : 1);
}

/** Highest b-value of a series in s/mm2, 0 without diffusion. */
export function highestB(p: Parameters): number {
  if (p.diffusion === undefined) return 0;
  const { bValuesSPerMm2 } = p.diffusion;
  let highest = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < bValuesSPerMm2.length; i += 1) highest = Math.max(highest, bValuesSPerMm2[i] as number);
  return highest;
}

/**
 * SNR without signal: voxel volume x sqrt(lines x averages / bandwidth) x B0 / g of simultaneous slices
 * (Macovski, Magn Reson Med 1996;36:494; Edelstein 1986; values from memory. B0 to the first power up to 3 T:
 * Wang et al., Magn Reson Med 2025, doi 10.1002/mrm.70202).
 */
export function signalFreeSnr(
  voxelVolumeMm3: number,
  averagingLines: number,
  p: Parameters,
  fieldT: number,
  simultaneousG: number,
): number {
  return (voxelVolumeMm3 * Math.sqrt((averagingLines * noiseAverages(p)) / p.pixelBandwidthHz) * fieldT) / simultaneousG;
}
