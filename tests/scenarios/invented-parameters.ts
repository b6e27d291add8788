import type { GivenParameters } from '../../src/calc/series.js';

/** Invented: 3D T1 of the liver at 3 T, 17 s a hold, 1.2 x 1.9 x 3 mm, 80 x 60 lines. */
export const liverArterialPhase = {
  repetitionTimeMs: 3.55,
  echoTimeMs: 1.2,
  flipAngleDeg: 10,
  pixelBandwidthHz: 635,
  fieldOfViewMm: 380,
  phaseFieldOfViewPercent: 80,
  matrixRead: 320,
  matrixPhase: 200,
  sliceCount: 72,
  sliceThicknessMm: 3,
  sliceOversamplingPercent: 11,
  partialFourierSlice: 0.75,
  parallelFactorPhase: 2,
  fatSuppression: 'spectral',
  pacing: { kind: 'breath-hold' },
} as const satisfies GivenParameters;

/** Invented: sagittal T2 of the lumbar spine at 1.5 T, 15 slices, train 20, 180 degrees, 1:56. */
export const lumbarTrain = {
  repetitionTimeMs: 3500,
  echoTimeMs: 100,
  echoTrainLength: 20,
  echoSpacingMs: 10,
  sliceCount: 15,
  sliceThicknessMm: 4,
  sliceGapMm: 0.4,
  fieldOfViewMm: 280,
  matrixRead: 320,
  matrixPhase: 320,
  averages: 2,
  dummyShots: 1,
  pixelBandwidthHz: 200,
  refocusingAngleDeg: 180,
} as const satisfies GivenParameters;
