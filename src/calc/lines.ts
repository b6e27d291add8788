import { type ClassKey, classRow } from './classes.js';
import { guardedCeil, roundHalfUp } from './rounding.js';
import type { Parameters } from './series.js';

/** Lines along phase and partitions, before and after acceleration. All are counts. */
export interface Lines {
  /** Full lines along phase, oversampling included. */
  readonly fullPhase: number;
  /** After partial Fourier, before acceleration. */
  readonly encodedPhase: number;
  /** Acquired along phase. */
  readonly phase: number;
  /** Full partitions, oversampling included (1 in 2D). */
  readonly fullSlice: number;
  readonly encodedSlice: number;
  readonly slice: number;
  /** Fully sampled reference lines among the acquired ones (product of both directions in 3D). */
  readonly reference: number;
  /** Lines of one volume in both directions: the count that time follows. */
  readonly total: number;
}

/** Blades of a rotating-strip acquisition: `ceil(pi/2 x matrix / (train x R))`, full field (geometry of a rotating strip; common practice). */
export function bladeCount(matrixPhase: number, echoTrainLength: number, parallelFactor: number): number {
  return guardedCeil(((Math.PI / 2) * matrixPhase) / (echoTrainLength * parallelFactor));
}

/** Lines along one direction: `ceil((Lp - ref) / R) + ref`, never more than Lp. */
function accelerated(encoded: number, reference: number, factor: number): number {
  if (factor <= 1) return encoded;
  const kept = Math.min(reference, encoded);
  return guardedCeil((encoded - kept) / factor) + kept;
}

/**
 * Lines that a series acquires: rectangular field, oversampling, partial Fourier, acceleration with reference lines.
 * A rectangular field keeps the voxel and drops lines (Bernstein, Fain & Riederer, J Magn Reson Imaging 2001;14:270).
 *
 * @example acquiredLines('fast-spin-echo/2D', { ...p, matrixPhase: 200, phaseFieldOfViewPercent: 80, parallelFactorPhase: 2 }).phase //=> 80
 */
export function acquiredLines(key: ClassKey, p: Parameters): Lines {
  if (key === 'rotating-strip-fast-spin-echo/2D') {
    const lines = bladeCount(p.matrixPhase, p.echoTrainLength, p.parallelFactorPhase) * p.echoTrainLength;
    return {
      fullPhase: p.matrixPhase,
      encodedPhase: p.matrixPhase,
      phase: lines,
      fullSlice: 1,
      encodedSlice: 1,
      slice: 1,
      reference: 0,
      total: lines,
    };
  }
  const fullPhase = Math.max(1, roundHalfUp(p.matrixPhase * (p.phaseFieldOfViewPercent / 100) * (1 + p.phaseOversamplingPercent / 100)));
  const encodedPhase = guardedCeil(p.partialFourierPhase * fullPhase);
  const phase = accelerated(encodedPhase, p.referenceLines, p.parallelFactorPhase);
  const referencePhase = p.parallelFactorPhase > 1 ? Math.min(p.referenceLines, encodedPhase) : 0;
  if (classRow(key).acquisition === '2D') {
    return { fullPhase, encodedPhase, phase, fullSlice: 1, encodedSlice: 1, slice: 1, reference: referencePhase, total: phase };
  }
  const fullSlice = Math.max(1, roundHalfUp(p.sliceCount * (1 + p.sliceOversamplingPercent / 100)));
  const encodedSlice = guardedCeil(p.partialFourierSlice * fullSlice);
  if (key === 'inversion-prepared-gradient-echo/3D') {
    // One ceiling over the whole product: the readouts of a cycle are counted once.
    const readouts = guardedCeil((p.partialFourierSlice * fullSlice) / p.parallelFactorSlice);
    return {
      fullPhase,
      encodedPhase,
      phase,
      fullSlice,
      encodedSlice,
      slice: readouts,
      reference: referencePhase * readouts,
      total: phase * readouts,
    };
  }
  if (p.parallelFactorPhase > 1 && p.parallelFactorSlice > 1) {
    const referenceSlice = Math.min(p.referenceLines, encodedSlice);
    const reference = referencePhase * referenceSlice;
    const total = guardedCeil((encodedPhase * encodedSlice - reference) / (p.parallelFactorPhase * p.parallelFactorSlice)) + reference;
    return {
      fullPhase,
      encodedPhase,
      phase,
      fullSlice,
      encodedSlice,
      slice: accelerated(encodedSlice, p.referenceLines, p.parallelFactorSlice),
      reference,
      total,
    };
  }
  const slice = accelerated(encodedSlice, 0, p.parallelFactorSlice);
  return { fullPhase, encodedPhase, phase, fullSlice, encodedSlice, slice, reference: referencePhase * encodedSlice, total: phase * slice };
}

/** Share of the lines that elliptical sampling keeps: an ellipse in its rectangle. */
export function ellipticalShare(p: Pick<Parameters, 'ellipticalSampling'>): number {
  return p.ellipticalSampling ? Math.PI / 4 : 1;
}
