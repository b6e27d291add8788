import type { Parameters } from '../series.js';

/**
 * True when anything that shows in the picture differs: everything but how often and when it is taken (volumes, diffusion, pacing).
 * Written out name by name, because every evaluation of a dynamic series asks and a read by a fixed name is many times quicker than
 * one by a changing name; a test holds it against the table of parameters.
 */
export function changesPicture(p: Parameters, before: Parameters): boolean {
  return (
    p.fieldOfViewMm !== before.fieldOfViewMm ||
    p.phaseFieldOfViewPercent !== before.phaseFieldOfViewPercent ||
    p.phaseDirection !== before.phaseDirection ||
    p.phaseOversamplingPercent !== before.phaseOversamplingPercent ||
    p.matrixRead !== before.matrixRead ||
    p.matrixPhase !== before.matrixPhase ||
    p.displayMatrix !== before.displayMatrix ||
    p.sliceCount !== before.sliceCount ||
    p.sliceThicknessMm !== before.sliceThicknessMm ||
    p.sliceGapMm !== before.sliceGapMm ||
    p.sliceOversamplingPercent !== before.sliceOversamplingPercent ||
    p.slabs !== before.slabs ||
    p.rounds !== before.rounds ||
    p.averages !== before.averages ||
    p.dummyShots !== before.dummyShots ||
    p.parallelFactorPhase !== before.parallelFactorPhase ||
    p.parallelFactorSlice !== before.parallelFactorSlice ||
    p.referenceLines !== before.referenceLines ||
    p.referenceScanS !== before.referenceScanS ||
    p.partialFourierPhase !== before.partialFourierPhase ||
    p.partialFourierSlice !== before.partialFourierSlice ||
    p.ellipticalSampling !== before.ellipticalSampling ||
    p.simultaneousSlices !== before.simultaneousSlices ||
    p.repetitionTimeMs !== before.repetitionTimeMs ||
    p.echoTimeMs !== before.echoTimeMs ||
    p.secondEchoTimeMs !== before.secondEchoTimeMs ||
    p.inversionTimeMs !== before.inversionTimeMs ||
    p.echoTrainLength !== before.echoTrainLength ||
    p.echoSpacingMs !== before.echoSpacingMs ||
    p.pixelBandwidthHz !== before.pixelBandwidthHz ||
    p.linesPerBeat !== before.linesPerBeat ||
    p.flipAngleDeg !== before.flipAngleDeg ||
    p.refocusingAngleDeg !== before.refocusingAngleDeg ||
    p.fatSuppression !== before.fatSuppression ||
    p.fatSuppressionEveryLines !== before.fatSuppressionEveryLines ||
    p.saturationBands !== before.saturationBands ||
    p.flowCompensation !== before.flowCompensation ||
    p.slabSelective !== before.slabSelective ||
    p.rfPulseStretch !== before.rfPulseStretch ||
    p.reconstruction !== before.reconstruction ||
    p.roundsPerHold !== before.roundsPerHold
  );
}
