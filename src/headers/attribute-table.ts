/** How a value is stored (value representations of DICOM PS3.5, those that the table needs). */
export type Representation = 'CS' | 'SH' | 'DS' | 'IS' | 'US' | 'FD' | 'UI';

interface NumberRow {
  readonly kind: 'numbers';
  /** Group and element, eight lower-case hex digits; null for what stands in sidecars alone. */
  readonly tag: string | null;
  readonly vr: Representation;
}

interface WordRow {
  readonly kind: 'words';
  readonly tag: string | null;
  readonly vr: Representation;
  /** The only words that are taken; any other one is dropped, so that no text of a person's making gets through. */
  readonly words: readonly string[];
}

export type AttributeRow = NumberRow | WordRow;

const yesNo = ['YES', 'NO'] as const;
const numbers = (tag: string | null, vr: Representation): NumberRow => ({ kind: 'numbers', tag, vr });
const words = (tag: string, taken: readonly string[], vr: Representation = 'CS'): WordRow => ({ kind: 'words', tag, vr, words: taken });

/**
 * The allow-list: every attribute that is ever taken out of a file, by its keyword. What is not here stays in the file: names, ids,
 * dates, times, UIDs, serial numbers, places and free text have no row, and words are taken only where the standard lists them.
 * Keywords, tags and value representations: DICOM PS3.6; words: defined and enumerated terms of PS3.3, C.8.3.1 and C.8.13
 * (tags and representations are compared with an independent dictionary by a test).
 */
export const attributeTable = {
  // Beyond the first two words scanners write their own: those here tell components, diffusion and tiled slices (common practice).
  ImageType: words('00080008', ['ORIGINAL', 'DERIVED', 'PRIMARY', 'SECONDARY', 'M', 'P', 'R', 'I', 'DIFFUSION', 'MOSAIC', 'WATER', 'FAT']),
  Modality: words('00080060', [
    'MR',
    'CT',
    'US',
    'NM',
    'PT',
    'CR',
    'DX',
    'MG',
    'XA',
    'RF',
    'OT',
    'SR',
    'PR',
    'KO',
    'SEG',
    'REG',
    'RTSTRUCT',
    'RTPLAN',
    'RTDOSE',
  ]),
  ComplexImageComponent: words('00089208', ['MAGNITUDE', 'PHASE', 'REAL', 'IMAGINARY', 'MIXED']),
  BodyPartExamined: words('00180015', [
    'ABDOMEN',
    'BRAIN',
    'BREAST',
    'CSPINE',
    'HEAD',
    'HEART',
    'KNEE',
    'LIVER',
    'LSPINE',
    'NECK',
    'PELVIS',
    'PROSTATE',
    'SHOULDER',
    'SKULL',
    'SPINE',
    'TSPINE',
    'UTERUS',
  ]),
  ScanningSequence: words('00180020', ['SE', 'IR', 'GR', 'EP', 'RM']),
  SequenceVariant: words('00180021', ['SK', 'MTC', 'SS', 'TRSS', 'SP', 'MP', 'OSP', 'NONE']),
  ScanOptions: words('00180022', ['PER', 'RG', 'CG', 'PPG', 'FC', 'PFF', 'PFP', 'SP', 'FS']),
  MRAcquisitionType: words('00180023', ['2D', '3D']),
  SliceThickness: numbers('00180050', 'DS'),
  RepetitionTime: numbers('00180080', 'DS'),
  EchoTime: numbers('00180081', 'DS'),
  InversionTime: numbers('00180082', 'DS'),
  NumberOfAverages: numbers('00180083', 'DS'),
  ImagingFrequency: numbers('00180084', 'DS'),
  ImagedNucleus: words('00180085', ['1H', 'H', '13C', '17O', '19F', '23NA', '23Na', '31P', '129XE', '129Xe', '3HE', '3He'], 'SH'),
  MagneticFieldStrength: numbers('00180087', 'DS'),
  SpacingBetweenSlices: numbers('00180088', 'DS'),
  NumberOfPhaseEncodingSteps: numbers('00180089', 'IS'),
  EchoTrainLength: numbers('00180091', 'IS'),
  PercentSampling: numbers('00180093', 'DS'),
  PercentPhaseFieldOfView: numbers('00180094', 'DS'),
  PixelBandwidth: numbers('00180095', 'DS'),
  TriggerTime: numbers('00181060', 'DS'),
  NominalInterval: numbers('00181062', 'IS'),
  HeartRate: numbers('00181088', 'IS'),
  ReconstructionDiameter: numbers('00181100', 'DS'),
  AcquisitionMatrix: numbers('00181310', 'US'),
  InPlanePhaseEncodingDirection: words('00181312', ['ROW', 'COL', 'COLUMN', 'OTHER']),
  FlipAngle: numbers('00181314', 'DS'),
  EchoPulseSequence: words('00189008', ['SPIN', 'GRADIENT', 'BOTH']),
  InversionRecovery: words('00189009', yesNo),
  FlowCompensation: words('00189010', ['ACCELERATION', 'VELOCITY', 'OTHER', 'NONE']),
  MultipleSpinEcho: words('00189011', yesNo),
  PhaseContrast: words('00189014', yesNo),
  Spoiling: words('00189016', ['RF', 'GRADIENT', 'RF_AND_GRADIENT', 'NONE']),
  SteadyStatePulseSequence: words('00189017', ['FREE_PRECESSION', 'TRANSVERSE', 'TIME_REVERSED', 'LONGITUDINAL', 'NONE']),
  EchoPlanarPulseSequence: words('00189018', yesNo),
  SpectrallySelectedSuppression: words('00189025', ['FAT', 'WATER', 'FAT_AND_WATER', 'SILICON_GEL', 'NONE']),
  SpectrallySelectedExcitation: words('00189026', ['WATER', 'FAT', 'NONE']),
  SpatialPresaturation: words('00189027', ['SLAB', 'NONE']),
  OversamplingPhase: words('00189029', ['2D', '3D', '2D_3D', 'NONE']),
  GeometryOfKSpaceTraversal: words('00189032', ['RECTILINEAR', 'RADIAL', 'SPIRAL']),
  SegmentedKSpaceTraversal: words('00189033', ['SINGLE', 'PARTIAL', 'FULL']),
  RectilinearPhaseEncodeReordering: words('00189034', ['LINEAR', 'CENTRIC', 'SEGMENTED', 'REVERSE_LINEAR', 'REVERSE_CENTRIC', 'UNKNOWN']),
  PartialFourierDirection: words('00189036', ['PHASE', 'FREQUENCY', 'SLICE_SELECT', 'COMBINATION']),
  CardiacSynchronizationTechnique: words('00189037', ['NONE', 'REALTIME', 'PROSPECTIVE', 'RETROSPECTIVE', 'PACED']),
  MRAcquisitionFrequencyEncodingSteps: numbers('00189058', 'US'),
  ParallelReductionFactorInPlane: numbers('00189069', 'FD'),
  AcquisitionDuration: numbers('00189073', 'FD'),
  DiffusionDirectionality: words('00189075', ['DIRECTIONAL', 'BMATRIX', 'ISOTROPIC', 'NONE']),
  ParallelAcquisition: words('00189077', yesNo),
  InversionTimes: numbers('00189079', 'FD'),
  PartialFourier: words('00189081', yesNo),
  EffectiveEchoTime: numbers('00189082', 'FD'),
  DiffusionBValue: numbers('00189087', 'FD'),
  DiffusionGradientOrientation: numbers('00189089', 'FD'),
  NumberOfKSpaceTrajectories: numbers('00189093', 'US'),
  CoverageOfKSpace: words('00189094', ['FULL', 'CYLINDRICAL', 'ELLIPSOIDAL', 'WEDGE']),
  ResonantNucleus: words('00189100', ['1H', '3HE', '7LI', '13C', '19F', '23NA', '31P', '129XE']),
  ParallelReductionFactorOutOfPlane: numbers('00189155', 'FD'),
  RespiratoryMotionCompensationTechnique: words('00189170', [
    'NONE',
    'BREATH_HOLD',
    'REALTIME',
    'GATING',
    'TRACKING',
    'PHASE_ORDERING',
    'PHASE_SCANNING',
    'RETROSPECTIVE',
    'CORRECTION',
    'UNKNOWN',
  ]),
  MRAcquisitionPhaseEncodingStepsInPlane: numbers('00189231', 'US'),
  MRAcquisitionPhaseEncodingStepsOutOfPlane: numbers('00189232', 'US'),
  RFEchoTrainLength: numbers('00189240', 'US'),
  GradientEchoTrainLength: numbers('00189241', 'US'),
  SeriesNumber: numbers('00200011', 'IS'),
  ImagePositionPatient: numbers('00200032', 'DS'),
  ImageOrientationPatient: numbers('00200037', 'DS'),
  TemporalPositionIdentifier: numbers('00200100', 'IS'),
  NumberOfTemporalPositions: numbers('00200105', 'IS'),
  SliceLocation: numbers('00201041', 'DS'),
  NominalCardiacTriggerDelayTime: numbers('00209153', 'FD'),
  NumberOfFrames: numbers('00280008', 'IS'),
  Rows: numbers('00280010', 'US'),
  Columns: numbers('00280011', 'US'),
  PixelSpacing: numbers('00280030', 'DS'),
  /** Number of items in the sequence of saturation bands (0018,9107). */
  SaturationBandCount: numbers(null, 'US'),
  /** Words among ScanOptions that the standard does not list: their number, never they. */
  UnlistedScanOptions: numbers(null, 'US'),
  /** Sidecars alone: what the BIDS specification gives a name of its own. */
  PartialFourierFraction: numbers(null, 'FD'),
  EffectiveEchoSpacing: numbers(null, 'FD'),
  MultibandAccelerationFactor: numbers(null, 'FD'),
  NumberOfVolumesDiscardedByScanner: numbers(null, 'FD'),
  SliceTimingCount: numbers(null, 'FD'),
  RepetitionTimeExcitation: numbers(null, 'FD'),
  RepetitionTimePreparation: numbers(null, 'FD'),
} as const satisfies Readonly<Record<string, AttributeRow>>;

export type AttributeTable = typeof attributeTable;
export type Keyword = keyof AttributeTable;

/** All keywords in table order. */
export const keywords = Object.keys(attributeTable) as readonly Keyword[];

/** What was taken of one image or sidecar. Lists are never empty; times in ms, lengths in mm, angles in degrees, as DICOM has them. */
export type Attributes = {
  readonly [K in Keyword]?: AttributeTable[K]['kind'] extends 'numbers' ? readonly number[] : readonly string[];
};

/** The row of a keyword, widened for code that handles any row. */
export function attributeRow(keyword: Keyword): AttributeRow {
  return attributeTable[keyword];
}

/**
 * The keyword as a page names it: with its tag where it has one.
 *
 * @example keywordWithTag('EchoTime') //=> 'EchoTime (0018,0081)'
 */
export function keywordWithTag(keyword: Keyword): string {
  const { tag } = attributeRow(keyword);
  return tag === null ? keyword : `${keyword} (${tag.slice(0, 4)},${tag.slice(4)})`;
}

/**
 * Sequences that are looked into: functional groups of enhanced objects (PS3.3, C.7.6.16 and C.8.13.5) and what they nest. All others are passed over.
 */
export const openedSequences = {
  SharedFunctionalGroupsSequence: '52009229',
  PerFrameFunctionalGroupsSequence: '52009230',
  MRImagingModifierSequence: '00189006',
  MRDiffusionSequence: '00189117',
  DiffusionGradientDirectionSequence: '00189076',
  MRImageFrameTypeSequence: '00189226',
  MRTimingAndRelatedParametersSequence: '00189112',
  MRModifierSequence: '00189115',
  MREchoSequence: '00189114',
  MRFOVGeometrySequence: '00189125',
  MRAveragesSequence: '00189119',
  CardiacSynchronizationSequence: '00189118',
  PixelMeasuresSequence: '00289110',
  PlanePositionSequence: '00209113',
  PlaneOrientationSequence: '00209116',
  FrameAnatomySequence: '00209071',
} as const;

/** Sequence whose items are counted and not read: saturation bands. */
export const saturationBandSequence = '00189107';
