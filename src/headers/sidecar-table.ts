import type { Keyword } from './attribute-table.js';

/** A field of a sidecar that the BIDS specification defines: what attribute it stands for, and what its numbers are multiplied by. */
export interface SidecarRow {
  readonly keyword: Keyword;
  /** Seconds become ms. */
  readonly times: number;
  /** What the attribute is when the field is a flag. */
  readonly flag?: { readonly yes: string; readonly no: string };
}

const plain = (keyword: Keyword): SidecarRow => ({ keyword, times: 1 });
const seconds = (keyword: Keyword): SidecarRow => ({ keyword, times: 1000 });

/**
 * Fields of the Brain Imaging Data Structure specification, version 1, "Magnetic Resonance Imaging" (scanner hardware, sequence
 * specifics, in-plane spatial encoding, timing parameters, RF and contrast, slice acceleration), with the units given there: times in
 * seconds, angles in degrees, fields in tesla. Names and units from memory of that table. `AcquisitionDuration` is left out: there it
 * is the time of one volume, in DICOM that of the series.
 */
export const sidecarTable: Readonly<Record<string, SidecarRow>> = {
  MagneticFieldStrength: plain('MagneticFieldStrength'),
  BodyPart: plain('BodyPartExamined'),
  ScanningSequence: plain('ScanningSequence'),
  SequenceVariant: plain('SequenceVariant'),
  ScanOptions: plain('ScanOptions'),
  MRAcquisitionType: plain('MRAcquisitionType'),
  SpoilingState: { keyword: 'Spoiling', times: 1, flag: { yes: 'RF_AND_GRADIENT', no: 'NONE' } },
  SpoilingType: plain('Spoiling'),
  ParallelReductionFactorInPlane: plain('ParallelReductionFactorInPlane'),
  ParallelReductionFactorOutOfPlane: plain('ParallelReductionFactorOutOfPlane'),
  PartialFourier: plain('PartialFourierFraction'),
  PartialFourierDirection: plain('PartialFourierDirection'),
  EffectiveEchoSpacing: seconds('EffectiveEchoSpacing'),
  EchoTime: seconds('EchoTime'),
  InversionTime: seconds('InversionTime'),
  RepetitionTime: seconds('RepetitionTime'),
  RepetitionTimeExcitation: seconds('RepetitionTimeExcitation'),
  RepetitionTimePreparation: seconds('RepetitionTimePreparation'),
  FlipAngle: plain('FlipAngle'),
  MultibandAccelerationFactor: plain('MultibandAccelerationFactor'),
  NumberOfVolumesDiscardedByScanner: plain('NumberOfVolumesDiscardedByScanner'),
  SliceThickness: plain('SliceThickness'),
  ParallelAcquisitionTechnique: plain('ParallelAcquisition'),
};

/**
 * DICOM keywords that a sidecar may carry beside the fields above, in DICOM's own units (the specification asks to name what it does
 * not define by its DICOM keyword).
 */
export const sidecarKeywords: readonly Keyword[] = [
  'ImageType',
  'Modality',
  'BodyPartExamined',
  'NumberOfAverages',
  'ImagingFrequency',
  'SpacingBetweenSlices',
  'NumberOfPhaseEncodingSteps',
  'EchoTrainLength',
  'PercentSampling',
  'PercentPhaseFieldOfView',
  'PixelBandwidth',
  'ReconstructionDiameter',
  'AcquisitionMatrix',
  'InPlanePhaseEncodingDirection',
  'EchoPulseSequence',
  'InversionRecovery',
  'FlowCompensation',
  'MultipleSpinEcho',
  'SteadyStatePulseSequence',
  'EchoPlanarPulseSequence',
  'SpectrallySelectedSuppression',
  'SpectrallySelectedExcitation',
  'SpatialPresaturation',
  'OversamplingPhase',
  'GeometryOfKSpaceTraversal',
  'SegmentedKSpaceTraversal',
  'RectilinearPhaseEncodeReordering',
  'CoverageOfKSpace',
  'EffectiveEchoTime',
  'RFEchoTrainLength',
  'GradientEchoTrainLength',
  'NumberOfTemporalPositions',
  'NumberOfKSpaceTrajectories',
  'RespiratoryMotionCompensationTechnique',
  'CardiacSynchronizationTechnique',
  'ImageOrientationPatient',
  'Rows',
  'Columns',
  'PixelSpacing',
];
