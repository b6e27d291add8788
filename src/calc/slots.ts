import { type ClassKey, classRow } from './classes.js';
import { acquisitionWindowMs, effectiveRepetitionTimeMs, isCine } from './pacing.js';
import { inversionPulseMs, type SlotPulses } from './pulses.js';
import { guardedCeil, guardedFloor } from './rounding.js';
import type { Parameters } from './series.js';

/** Spoiling at the end of a slot, time of one saturation band, ms (common practice, no source). */
const spoilingMs = 2;
const bandMs = 10;

/** Half of the readout, ms: half a spacing in trains, half of the full line train in echo-planar, else half of one line. */
function halfReadoutMs(key: ClassKey, p: Parameters, fullLines: number): number {
  const row = classRow(key);
  if (row.train) return p.echoSpacingMs / 2;
  if (row.echoPlanar) return (p.echoSpacingMs * fullLines) / p.parallelFactorPhase / 2;
  return 500 / p.pixelBandwidthHz;
}

/**
 * Time one slice takes within TR, ms: fat saturation + 10 per band + half the excitation + last echo + half the readout + 2,
 * and 10 for an inversion pulse (common practice, no source).
 */
export function slotMs(key: ClassKey, p: Parameters, pulses: SlotPulses, fullLines: number): number {
  const lastEchoMs = classRow(key).train ? p.echoTrainLength * p.echoSpacingMs : Math.max(p.echoTimeMs, p.secondEchoTimeMs ?? 0);
  return (
    (pulses.fatSaturation?.durationMs ?? 0) +
    bandMs * p.saturationBands +
    pulses.excitation.durationMs / 2 +
    lastEchoMs +
    halfReadoutMs(key, p, fullLines) +
    spoilingMs +
    (p.inversionTimeMs === undefined ? 0 : inversionPulseMs)
  );
}

/**
 * Slices whose inversions interleave within TR: the largest over p = 1, 2, ... of
 * `p x min(max(1, floor(TI / slot)), floor((TR / p - TI) / slot))` with TR/p - TI >= slot.
 *
 * @example inversionCapacity(9000, 2500, 180) //=> 22
 */
export function inversionCapacity(repetitionMs: number, inversionMs: number, slot: number): number {
  let best = 0;
  for (let passes = 1; repetitionMs / passes - inversionMs >= slot - 1e-9; passes += 1) {
    const within = Math.max(1, guardedFloor(inversionMs / slot));
    best = Math.max(best, passes * Math.min(within, guardedFloor((repetitionMs / passes - inversionMs) / slot)));
  }
  return best;
}

/** Slices that fit in one TR, a count; 0 when not even one does. Null where slices do not share TR. */
export function capacity(key: ClassKey, p: Parameters, slot: number): number | null {
  if (classRow(key).interleaving !== 'interleaved' || isCine(p)) return null;
  const windowMs = acquisitionWindowMs(p);
  const trains =
    p.inversionTimeMs === undefined
      ? guardedFloor(windowMs / slot)
      : inversionCapacity(effectiveRepetitionTimeMs(p), p.inversionTimeMs, slot);
  return p.simultaneousSlices * trains;
}

/**
 * Factor by which the modelled slot must shrink for a preset's own split to fit: 1 when it fits as modelled.
 * What a site runs is a fact; the factor then holds for every edit of that preset.
 */
export function slotFactor(key: ClassKey, p: Parameters, slot: number): number {
  const wanted = guardedCeil(p.sliceCount / p.rounds);
  const fits = (factor: number) => (capacity(key, p, slot * factor) ?? wanted) >= wanted;
  if (fits(1)) return 1;
  let low = 0;
  let high = 1;
  for (let i = 0; i < 60; i += 1) {
    const middle = (low + high) / 2;
    if (fits(middle)) low = middle;
    else high = middle;
  }
  // No slot is short enough where TI alone fills TR: nothing can be kept for edits then.
  return low === 0 ? 1 : low;
}
