import { type ClassKey, classRow } from './classes.js';
import { gammaBarMhzPerT } from './constants.js';
import type { Geometry } from './geometry.js';
import { lobeMs, phaseEncodeArea, rampMs, readoutMtPerM, sliceSelectMtPerM } from './gradients.js';
import type { Lines } from './lines.js';
import { highestB } from './noise.js';
import { inversionPulseMs, type PlayedPulse, type SlotPulses } from './pulses.js';
import type { Scanner } from './scanner.js';
import type { Parameters } from './series.js';

/** Estimates of the fastest timing: cautions, never refusals. Times in ms. */
export interface MinimumTiming {
  readonly echoTimeMs: number;
  /** For one slice or one line. */
  readonly repetitionTimeMs: number;
  /** Null outside trains, echo-planar and inversion-prepared cycles. */
  readonly echoSpacingMs: number | null;
  /** What the shortest echo time hangs on. */
  readonly binding: string;
  readonly readoutMtPerM: number;
  /** True when the readout asks for more than the gradients give. */
  readonly readoutOverGradient: boolean;
}

/** The parts every class is built from, ms. */
interface Elements {
  readonly readoutMtPerM: number;
  readonly readoutMs: number;
  readonly readoutRampMs: number;
  readonly prephaseMs: number;
  readonly phaseEncodeMs: number;
  readonly partitionMs: number;
  readonly rephaseMs: number;
  readonly selectRampMs: number;
}

/** Slice-selection amplitude of the excitation, mT/m: 0 when nothing is selected, and never more than the gradients give. */
function selectionMtPerM(key: ClassKey, p: Parameters, pulse: PlayedPulse, scanner: Scanner): number {
  if (pulse.timeBandwidth === 0) return 0;
  const thicknessMm = classRow(key).acquisition === '3D' ? p.sliceCount * p.sliceThicknessMm : p.sliceThicknessMm;
  return Math.min(scanner.gradientMtPerM, sliceSelectMtPerM(pulse.timeBandwidth / pulse.durationMs, thicknessMm));
}

function elements(key: ClassKey, p: Parameters, geometry: Geometry, pulse: PlayedPulse, scanner: Scanner): Elements {
  const amplitude = readoutMtPerM(p.pixelBandwidthHz, p.matrixRead, p.fieldOfViewMm);
  const readoutMs = 1000 / p.pixelBandwidthHz;
  const readoutRampMs = rampMs(amplitude, scanner);
  const selection = selectionMtPerM(key, p, pulse, scanner);
  const selectRampMs = rampMs(selection, scanner);
  return {
    readoutMtPerM: amplitude,
    readoutMs,
    readoutRampMs,
    prephaseMs: lobeMs((amplitude * (readoutMs + readoutRampMs)) / 2, scanner),
    phaseEncodeMs: lobeMs(phaseEncodeArea(geometry.voxelPhaseMm), scanner),
    partitionMs: classRow(key).acquisition === '3D' ? lobeMs(phaseEncodeArea(geometry.voxelSliceMm), scanner) : 0,
    rephaseMs: selection === 0 ? 0 : lobeMs((selection * (pulse.durationMs + selectRampMs)) / 2, scanner),
    selectRampMs,
  };
}

/** Puts one estimate together. */
function estimate(
  echoTimeMs: number,
  repetitionTimeMs: number,
  echoSpacingMs: number | null,
  binding: string,
  amplitude: number,
  scanner: Scanner,
): MinimumTiming {
  return {
    echoTimeMs,
    repetitionTimeMs,
    echoSpacingMs,
    binding,
    readoutMtPerM: amplitude,
    readoutOverGradient: amplitude > scanner.gradientMtPerM * (1 + 1e-9),
  };
}

/** Which of the lobes before the readout is the longest, in words. */
function bindingOf(part: Elements, encodeMs: number): string {
  if (part.prephaseMs >= encodeMs) return 'readout prephasing';
  if (part.selectRampMs + part.rephaseMs >= encodeMs) return 'slice refocusing';
  return part.selectRampMs + part.phaseEncodeMs >= encodeMs ? 'phase encoding' : 'partition encoding';
}

/** Area of a spoiler or crusher that winds two cycles across a slice, mT/m ms (common practice, no source). */
function crusherMs(geometry: Geometry, scanner: Scanner): number {
  return lobeMs(2e3 / (gammaBarMhzPerT * geometry.voxelSliceMm), scanner);
}

/**
 * Time of one diffusion lobe in ms for b in s/mm2: the root of `b = (2 pi gamma-bar G d)^2 (D - d/3)` with the lobes
 * on either side of the refocusing pulse (Stejskal & Tanner, J Chem Phys 1965;42:288), gradient at its maximum on one axis.
 */
export function diffusionLobeMs(bSPerMm2: number, refocusingMs: number, scanner: Scanner): number {
  if (bSPerMm2 <= 0) return 0;
  const { gradientMtPerM } = scanner;
  const last = lastLobe;
  if (last.bSPerMm2 === bSPerMm2 && last.refocusingMs === refocusingMs && last.gradientMtPerM === gradientMtPerM) return last.lobeMs;
  lastLobe = { bSPerMm2, refocusingMs, gradientMtPerM, lobeMs: rootOfLobeMs(bSPerMm2, refocusingMs, gradientMtPerM) };
  return lastLobe.lobeMs;
}

/** The edits of a series seldom touch its b-values. */
let lastLobe = { bSPerMm2: 0, refocusingMs: 0, gradientMtPerM: 0, lobeMs: 0 };

function rootOfLobeMs(bSPerMm2: number, refocusingMs: number, gradientMtPerM: number): number {
  const wave = 2 * Math.PI * gammaBarMhzPerT * gradientMtPerM * 1e-3; // rad per ms per mm
  const wanted = (bSPerMm2 * 1e3) / (wave * wave); // ms3
  // (2/3) d^3 + refocusing d^2 = wanted: either term alone gives too long a lobe, and from there Newton's steps only fall.
  let d = Math.min(Math.cbrt(1.5 * wanted), Math.sqrt(wanted / refocusingMs));
  for (let i = 0; i < 40; i += 1) {
    const step = (d * d * ((2 / 3) * d + refocusingMs) - wanted) / (2 * d * (d + refocusingMs));
    d -= step;
    if (step <= 1e-13 * d) break;
  }
  return d;
}

/** Time from the first echo of an echo-planar train to the centre of k-space, ms. */
export function echoPlanarLeadMs(p: Parameters, lines: Lines): number {
  return ((p.partialFourierPhase - 0.5) * lines.fullPhase * p.echoSpacingMs) / p.parallelFactorPhase;
}

/**
 * Fastest timing of a series on this scanner, from trapezoids of its gradient strength and slew rate.
 * Flow compensation adds one more prephasing lobe (common practice, no source).
 */
export function minimumTiming(
  key: ClassKey,
  p: Parameters,
  lines: Lines,
  geometry: Geometry,
  pulses: SlotPulses,
  scanner: Scanner,
): MinimumTiming {
  const row = classRow(key);
  const part = elements(key, p, geometry, pulses.excitation, scanner);
  const amplitude = part.readoutMtPerM;
  const flowMs = p.flowCompensation ? part.prephaseMs : 0;
  // Slice refocusing, phase and partition encoding and readout prephasing run side by side: the longest counts.
  const sliceSideMs = part.selectRampMs + Math.max(part.rephaseMs, part.phaseEncodeMs, part.partitionMs);
  const encodeMs = Math.max(sliceSideMs, part.prephaseMs);
  const halfPulse = pulses.excitation.durationMs / 2;
  const half = part.readoutMs / 2;
  const lead = part.readoutRampMs + half;

  if (row.echoPlanar) {
    // Lines may be sampled on the ramps: the lobe itself must fit, and one line takes at least 1 / bandwidth.
    const spacing = Math.max(part.readoutMs, lobeMs(amplitude * part.readoutMs, scanner));
    const centreMs = echoPlanarLeadMs(p, lines);
    const tail = (lines.fullPhase * p.echoSpacingMs) / p.parallelFactorPhase / 2;
    if (pulses.refocusing === null) {
      const te = halfPulse + encodeMs + flowMs + centreMs + half;
      return estimate(te, halfPulse + te + tail, spacing, 'the lines before the centre of k-space', amplitude, scanner);
    }
    const lobe = diffusionLobeMs(highestB(p), pulses.refocusing.durationMs, scanner);
    const before = halfPulse + encodeMs + flowMs + lobe;
    const after = lobe + centreMs + half;
    const te = 2 * (pulses.refocusing.durationMs / 2 + Math.max(before, after));
    const binding = after >= before ? 'the lines before the centre of k-space' : 'the first half of the echo';
    return estimate(te, halfPulse + te + tail, spacing, binding, amplitude, scanner);
  }

  if (pulses.refocusing !== null) {
    const crusher = crusherMs(geometry, scanner);
    const sideMs = Math.max(crusher + part.selectRampMs, part.phaseEncodeMs, part.partitionMs, part.readoutRampMs);
    // Left of the refocusing pulse: excitation and its rephasing; right of it: encoding and half of the readout.
    const left = halfPulse + Math.max(encodeMs + flowMs, crusher);
    const right = sideMs + half;
    const spacing = pulses.refocusing.durationMs + 2 * sideMs + part.readoutMs;
    const te = row.train
      ? Math.max(spacing, pulses.refocusing.durationMs + 2 * left)
      : pulses.refocusing.durationMs + 2 * Math.max(left, right);
    const last = row.train ? p.echoTrainLength * p.echoSpacingMs : Math.max(te, p.secondEchoTimeMs ?? 0);
    const repetitionTimeMs =
      halfPulse + last + half + crusher + (p.inversionTimeMs === undefined ? 0 : p.inversionTimeMs + inversionPulseMs / 2);
    return estimate(
      te,
      repetitionTimeMs,
      row.train ? spacing : null,
      sideMs > crusher + part.selectRampMs ? 'phase encoding' : 'crushers and refocusing pulse',
      amplitude,
      scanner,
    );
  }

  const te = halfPulse + encodeMs + flowMs + lead;
  const afterReadout = Math.max(
    part.phaseEncodeMs,
    part.partitionMs,
    row.family === 'balanced-steady-state' ? part.prephaseMs : crusherMs(geometry, scanner),
  );
  const lastEchoMs = Math.max(te, p.secondEchoTimeMs ?? 0);
  const line = halfPulse + lastEchoMs + half + part.readoutRampMs + afterReadout;
  if (row.family === 'inversion-prepared-gradient-echo') {
    const centre = (p.partialFourierSlice - 0.5) * (lines.fullSlice / p.parallelFactorSlice);
    const cycle = (p.inversionTimeMs ?? 0) + Math.max(0, p.echoTrainLength - centre) * p.echoSpacingMs;
    return estimate(te, cycle, line, bindingOf(part, encodeMs), amplitude, scanner);
  }
  return estimate(te, line, null, bindingOf(part, encodeMs), amplitude, scanner);
}
