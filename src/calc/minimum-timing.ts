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
    readoutMs,
    readoutRampMs,
    prephaseMs: lobeMs((amplitude * (readoutMs + readoutRampMs)) / 2, scanner),
    phaseEncodeMs: lobeMs(phaseEncodeArea(geometry.voxelPhaseMm), scanner),
    partitionMs: classRow(key).acquisition === '3D' ? lobeMs(phaseEncodeArea(geometry.voxelSliceMm), scanner) : 0,
    rephaseMs: selection === 0 ? 0 : lobeMs((selection * (pulse.durationMs + selectRampMs)) / 2, scanner),
    selectRampMs,
  };
}

/** The longest of several named times. */
function longest(parts: readonly (readonly [string, number])[]): readonly [string, number] {
  let worst = parts[0] as readonly [string, number];
  for (const part of parts) if (part[1] > worst[1]) worst = part;
  return worst;
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
  const wave = 2 * Math.PI * gammaBarMhzPerT * scanner.gradientMtPerM * 1e-3; // rad per ms per mm
  const weight = (d: number) => (wave * d) ** 2 * (d + refocusingMs - d / 3) * 1e-3; // s/mm2
  let low = 0;
  let high = 500;
  for (let i = 0; i < 60; i += 1) {
    const middle = (low + high) / 2;
    if (weight(middle) < bSPerMm2) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Time from the first echo of an echo-planar train to the centre of k-space, ms. */
export function echoPlanarLeadMs(p: Parameters, lines: Lines): number {
  return ((p.partialFourierPhase - 0.5) * lines.fullPhase * p.echoSpacingMs) / p.parallelFactorPhase;
}

/**
 * Fastest timing of a series on this scanner, from trapezoids of its gradient strength and slew rate.
 * Flow compensation adds one more prephasing lobe (common practice, no source).
 */
export function minimumTiming(key: ClassKey, p: Parameters, lines: Lines, geometry: Geometry, pulses: SlotPulses, scanner: Scanner): MinimumTiming {
  const row = classRow(key);
  const part = elements(key, p, geometry, pulses.excitation, scanner);
  const amplitude = readoutMtPerM(p.pixelBandwidthHz, p.matrixRead, p.fieldOfViewMm);
  const shared = { readoutMtPerM: amplitude, readoutOverGradient: amplitude > scanner.gradientMtPerM * (1 + 1e-9) };
  const flowMs = p.flowCompensation ? part.prephaseMs : 0;
  const encode = longest([
    ['slice refocusing', part.selectRampMs + part.rephaseMs],
    ['phase encoding', part.selectRampMs + part.phaseEncodeMs],
    ['partition encoding', part.selectRampMs + part.partitionMs],
    ['readout prephasing', part.prephaseMs],
  ]);
  const halfPulse = pulses.excitation.durationMs / 2;
  const half = part.readoutMs / 2;
  const lead = part.readoutRampMs + half;

  if (row.family.startsWith('echo-planar')) {
    // Lines may be sampled on the ramps: the lobe itself must fit, and one line takes at least 1 / bandwidth.
    const spacing = Math.max(part.readoutMs, lobeMs(amplitude * part.readoutMs, scanner));
    const centreMs = echoPlanarLeadMs(p, lines);
    const tail = (lines.fullPhase * p.echoSpacingMs) / p.parallelFactorPhase / 2;
    if (pulses.refocusing === null) {
      const te = halfPulse + encode[1] + flowMs + centreMs + half;
      return { ...shared, echoTimeMs: te, repetitionTimeMs: halfPulse + te + tail, echoSpacingMs: spacing, binding: 'the lines before the centre of k-space' };
    }
    const lobe = diffusionLobeMs(highestB(p), pulses.refocusing.durationMs, scanner);
    const before = halfPulse + encode[1] + flowMs + lobe;
    const after = lobe + centreMs + half;
    const te = 2 * (pulses.refocusing.durationMs / 2 + Math.max(before, after));
    const binding = after >= before ? 'the lines before the centre of k-space' : 'the first half of the echo';
    return { ...shared, echoTimeMs: te, repetitionTimeMs: halfPulse + te + tail, echoSpacingMs: spacing, binding };
  }

  if (pulses.refocusing !== null) {
    const crusher = crusherMs(geometry, scanner);
    const side = longest([
      ['crusher', crusher + part.selectRampMs],
      ['phase encoding', part.phaseEncodeMs],
      ['partition encoding', part.partitionMs],
      ['readout ramp', part.readoutRampMs],
    ]);
    // Left of the refocusing pulse: excitation and its rephasing; right of it: encoding and half of the readout.
    const left = halfPulse + Math.max(encode[1] + flowMs, crusher);
    const right = side[1] + half;
    const spacing = pulses.refocusing.durationMs + 2 * side[1] + part.readoutMs;
    const te = row.train ? Math.max(spacing, pulses.refocusing.durationMs + 2 * left) : pulses.refocusing.durationMs + 2 * Math.max(left, right);
    const last = row.train ? p.echoTrainLength * p.echoSpacingMs : Math.max(te, p.secondEchoTimeMs ?? 0);
    const repetitionTimeMs = halfPulse + last + half + crusher + (p.inversionTimeMs === undefined ? 0 : p.inversionTimeMs + inversionPulseMs / 2);
    return { ...shared, echoTimeMs: te, repetitionTimeMs, echoSpacingMs: row.train ? spacing : null, binding: side[0] };
  }

  const te = halfPulse + encode[1] + flowMs + lead;
  const afterReadout = Math.max(part.phaseEncodeMs, part.partitionMs, row.family === 'balanced-steady-state' ? part.prephaseMs : crusherMs(geometry, scanner));
  const lastEchoMs = Math.max(te, p.secondEchoTimeMs ?? 0);
  const line = halfPulse + lastEchoMs + half + part.readoutRampMs + afterReadout;
  if (row.family === 'inversion-prepared-gradient-echo') {
    const centre = (p.partialFourierSlice - 0.5) * (lines.fullSlice / p.parallelFactorSlice);
    const cycle = (p.inversionTimeMs ?? 0) + Math.max(0, p.echoTrainLength - centre) * p.echoSpacingMs;
    return { ...shared, echoTimeMs: te, repetitionTimeMs: cycle, echoSpacingMs: line, binding: encode[0] };
  }
  return { ...shared, echoTimeMs: te, repetitionTimeMs: line, echoSpacingMs: null, binding: encode[0] };
}
