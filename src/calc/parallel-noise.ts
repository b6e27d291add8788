import type { Coil } from './scanner.js';

/**
 * Default noise factors of acceleration (assumptions, values from memory): R 2 1.05, R 3 1.20, R 4 1.7 along one direction,
 * 2 x 2 1.15; straight between, nothing beyond the table.
 */
const alongOne = [1, 1.05, 1.2, 1.7] as const;
const twoByTwo = 1.15;

function between(low: number, high: number, share: number): number {
  return low + (high - low) * share;
}

/** Default g at R along one direction; null beyond R 4. */
function alongOneAt(factor: number): number | null {
  if (factor > 4 + 1e-9) return null;
  const index = Math.min(2, Math.floor(factor - 1));
  return between(alongOne[index] as number, alongOne[index + 1] as number, factor - 1 - index);
}

/** Noise factor g of acceleration R along phase and slice with the default table, or null where it is not known. */
function defaultG(phase: number, slice: number): number | null {
  if (slice <= 1) return alongOneAt(phase);
  if (phase <= 1) return alongOneAt(slice);
  if (phase > 2 + 1e-9 || slice > 2 + 1e-9) return null;
  // Bilinear between no acceleration, R 2 along one direction, and 2 x 2.
  return between(between(1, alongOne[1], phase - 1), between(alongOne[1], twoByTwo, phase - 1), slice - 1);
}

/** g from a coil's measured rows: the exact row, else straight between two rows along phase at the same slice factor. */
function coilG(coil: Coil, phase: number, slice: number, region: string | null): number | null {
  const rows = coil.g.filter((row) => row.region === undefined || region === null || row.region === region);
  const sameSlice = rows.filter((row) => Math.abs(row.slice - slice) < 1e-9);
  const exact = sameSlice.find((row) => Math.abs(row.phase - phase) < 1e-9);
  if (exact !== undefined) return exact.g;
  const known = [...sameSlice, ...(Math.abs(slice - 1) < 1e-9 ? [{ phase: 1, slice: 1, g: 1 }] : [])].sort((a, b) => a.phase - b.phase);
  for (let i = 1; i < known.length; i += 1) {
    const a = known[i - 1] as { phase: number; g: number };
    const b = known[i] as { phase: number; g: number };
    if (a.phase < phase && phase < b.phase) return between(a.g, b.g, (phase - a.phase) / (b.phase - a.phase));
  }
  return null;
}

/**
 * Noise factor g at acceleration R along phase and slice (Pruessmann, Magn Reson Med 1999;42:952: SNR falls by g sqrt R).
 * From the coil's measured table, else the default one; null where neither knows it. No acceleration is 1.
 *
 * @example parallelNoiseFactor(null, 2, 1) //=> 1.05
 */
export function parallelNoiseFactor(coil: Coil | null, phase: number, slice: number, region: string | null = null): number | null {
  if (phase <= 1 && slice <= 1) return 1;
  return coil === null ? defaultG(phase, slice) : coilG(coil, phase, slice, region);
}
