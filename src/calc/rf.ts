import { type ClassKey, classRow } from './classes.js';
import type { Lines } from './lines.js';
import { effectiveRepetitionTimeMs } from './pacing.js';
import { inversionEnergyUt2Ms, type SlotPulses } from './pulses.js';
import { guardedCeil } from './rounding.js';
import type { Parameters } from './series.js';

/** Averaging time of B1+rms, ms: any 10 s (IEC 60601-2-33; read in a secondary page). */
export const b1RmsWindowMs = 10000;

/** Refocusing pulses that one excitation is followed by. */
function refocusingCount(key: ClassKey, p: Parameters): number {
  if (classRow(key).train) return p.echoTrainLength;
  if (classRow(key).gradientEcho) return 0;
  return p.secondEchoTimeMs === undefined ? 1 : 2;
}

/** Excitations of one slot: the readouts of an inversion-prepared cycle, else one. */
function excitationCount(key: ClassKey, lines: Lines): number {
  return key === 'inversion-prepared-gradient-echo/3D' ? lines.slice : 1;
}

/**
 * RF energy of one TR, uT^2 ms. `slices` share the TR in groups of `simultaneousSlices`; a group takes that many times the energy
 * of its excitation and refocusing (Barth, Magn Reson Med 2016;75:63, law from memory), each with its bands and one fat saturation.
 */
export function repetitionEnergyUt2Ms(key: ClassKey, p: Parameters, lines: Lines, pulses: SlotPulses, slices: number): number {
  const slots = guardedCeil(slices / p.simultaneousSlices);
  const imaging =
    excitationCount(key, lines) * pulses.excitation.energyUt2Ms + refocusingCount(key, p) * (pulses.refocusing?.energyUt2Ms ?? 0);
  const volume = classRow(key).interleaving === 'volume';
  const bands = pulses.band === null ? 0 : p.saturationBands * pulses.band.energyUt2Ms * bandShare(key, p);
  const fat = pulses.fatSaturation === null ? 0 : pulses.fatSaturation.energyUt2Ms * fatShare(key, p);
  // All pulses of a stretched series last longer, the inversion among them: its energy falls alike.
  const inversions = p.inversionTimeMs === undefined ? 0 : (inversionEnergyUt2Ms / p.rfPulseStretch) * (volume ? 1 : slices);
  return slots * (p.simultaneousSlices * imaging + bands + fat) + inversions;
}

/** True where each slot has time for its own fat saturation and bands: everything but gradient echoes that repeat within milliseconds. */
export function preparesEverySlot(key: ClassKey): boolean {
  const row = classRow(key);
  return !row.gradientEcho || row.interleaving === 'interleaved' || row.family === 'inversion-prepared-gradient-echo';
}

/**
 * Fat-saturation pulses per slot. A gradient echo that repeats within milliseconds cannot play one before every line:
 * it plays one every `fatSuppressionEveryLines`, and none is counted where that is not stated.
 */
function fatShare(key: ClassKey, p: Parameters): number {
  if (preparesEverySlot(key)) return 1;
  return p.fatSuppressionEveryLines === undefined ? 0 : 1 / p.fatSuppressionEveryLines;
}

/** Bands per slot: as often as the fat suppression where that is stated, else before every line, an upper bound that a caution names. */
function bandShare(key: ClassKey, p: Parameters): number {
  if (preparesEverySlot(key) || p.fatSuppressionEveryLines === undefined) return 1;
  return 1 / p.fatSuppressionEveryLines;
}

/** Root mean square of B1+ in uT of an energy in uT^2 ms repeated every TR: over min(TR, 10 s), an upper bound beyond 10 s. */
export function b1PlusRmsUt(energyUt2Ms: number, repetitionMs: number): number {
  return Math.sqrt(energyUt2Ms / Math.min(repetitionMs, b1RmsWindowMs));
}

/** B1+rms in uT of a series with `slices` in each TR. It depends on the pulses, not on the patient. */
export function seriesB1PlusRmsUt(key: ClassKey, p: Parameters, lines: Lines, pulses: SlotPulses, slices: number): number {
  return b1PlusRmsUt(repetitionEnergyUt2Ms(key, p, lines, pulses, slices), effectiveRepetitionTimeMs(p));
}

/** Exponents of SAR over field at equal B1+: quasi-static upper bound, and full-wave whole-body models from 1.5 to 3 T (IEEE Rev Biomed Eng 2017;10:95, table VI). */
const fieldExponents = [2, 0.85] as const;

/** Range of the SAR ratio to the baseline, sorted: equal to the RF power trend within one field. */
export function sarTrend(powerTrend: number, fieldRatio: number): { readonly low: number; readonly high: number } {
  const a = powerTrend * fieldRatio ** fieldExponents[0];
  const b = powerTrend * fieldRatio ** fieldExponents[1];
  return { low: Math.min(a, b), high: Math.max(a, b) };
}
