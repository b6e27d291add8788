/** How a person thinks of a parameter: the groups of the series screen, in their order. */
export const parameterGroups = ['extent', 'grid', 'slices', 'repeats', 'speed', 'timing', 'contrast', 'pacing'] as const;
export type ParameterGroup = (typeof parameterGroups)[number];

/** Units that values carry; `''` is a plain number. */
export type Unit = 'ms' | 's' | 'mm' | 'deg' | '%' | 'Hz/px' | '';

interface Row {
  readonly group: ParameterGroup;
  /** Words on screen. */
  readonly label: string;
  /** DICOM keyword (PS3.6) that holds it, or null where the standard has none. */
  readonly dicom: string | null;
  /** One line of help. */
  readonly help: string;
}

interface NumberRow extends Row {
  readonly kind: 'number';
  readonly unit: Unit;
  readonly min: number;
  readonly max: number;
  /** True when `min` itself is not allowed. */
  readonly aboveMin?: true;
  readonly whole?: true;
  /** Value when left out; `'required'` must be given; `'absent'` stays away; `'by-class'` stands in the table of classes. */
  readonly otherwise: number | 'required' | 'absent' | 'by-class';
  /** One small and one large step of the keyboard. */
  readonly step: number;
  readonly bigStep: number;
  /** Digits after the point on screen. */
  readonly digits: number;
}

interface FlagRow extends Row {
  readonly kind: 'flag';
  readonly otherwise: boolean | 'by-class';
}

interface ChoiceRow extends Row {
  readonly kind: 'choice';
  readonly choices: readonly string[];
  readonly otherwise: string | 'absent';
}

interface ObjectRow extends Row {
  readonly kind: 'object';
  readonly otherwise: 'none' | 'absent';
}

export type ParameterRow = NumberRow | FlagRow | ChoiceRow | ObjectRow;

/**
 * The table of parameters: every key of a series, in the order a person types them.
 * Types, defaults, the JSON Schema, help text and column order derive from it.
 * Ranges bound what a file may say, not what is sensible; defaults are common practice, no source.
 */
export const parameterTable = {
  fieldOfViewMm: { kind: 'number', group: 'extent', label: 'field of view', unit: 'mm', min: 10, max: 1000, otherwise: 'required', step: 10, bigStep: 50, digits: 0, dicom: 'ReconstructionDiameter', help: 'extent along readout' },
  phaseFieldOfViewPercent: { kind: 'number', group: 'extent', label: 'phase field of view', unit: '%', min: 5, max: 400, otherwise: 100, step: 5, bigStep: 20, digits: 2, dicom: 'PercentPhaseFieldOfView', help: 'phase extent over readout extent: a rectangular field keeps the voxel and drops lines' },
  phaseDirection: { kind: 'choice', group: 'extent', label: 'phase direction', choices: ['AP', 'RL', 'HF'], otherwise: 'AP', dicom: 'InPlanePhaseEncodingDirection', help: 'body axis of phase encoding: ghosts and wrap lie along it' },
  phaseOversamplingPercent: { kind: 'number', group: 'extent', label: 'phase oversampling', unit: '%', min: 0, max: 400, otherwise: 0, step: 10, bigStep: 50, digits: 0, dicom: 'OversamplingPhase', help: 'extra phase extent encoded and discarded: against wrap, and it averages' },
  matrixRead: { kind: 'number', group: 'grid', label: 'read matrix', unit: '', min: 8, max: 4096, whole: true, otherwise: 'required', step: 16, bigStep: 64, digits: 0, dicom: 'AcquisitionMatrix', help: 'samples along readout' },
  matrixPhase: { kind: 'number', group: 'grid', label: 'phase matrix', unit: '', min: 8, max: 4096, whole: true, otherwise: 'required', step: 16, bigStep: 64, digits: 0, dicom: 'AcquisitionMatrix', help: 'phase lines over a square field' },
  displayMatrix: { kind: 'number', group: 'grid', label: 'display matrix', unit: '', min: 8, max: 8192, whole: true, otherwise: 'absent', step: 64, bigStep: 256, digits: 0, dicom: 'Rows', help: 'interpolated matrix on screen: adds no resolution' },
  sliceCount: { kind: 'number', group: 'slices', label: 'slices', unit: '', min: 1, max: 2048, whole: true, otherwise: 'required', step: 1, bigStep: 4, digits: 0, dicom: null, help: 'slices, or kept partitions in 3D' },
  sliceThicknessMm: { kind: 'number', group: 'slices', label: 'slice thickness', unit: 'mm', min: 0.05, max: 500, otherwise: 'required', step: 0.5, bigStep: 1, digits: 2, dicom: 'SliceThickness', help: 'slice, or partition in 3D' },
  sliceGapMm: { kind: 'number', group: 'slices', label: 'slice gap', unit: 'mm', min: 0, max: 500, otherwise: 0, step: 0.1, bigStep: 0.5, digits: 2, dicom: 'SpacingBetweenSlices', help: 'edge to edge: spacing of centres less thickness' },
  sliceOversamplingPercent: { kind: 'number', group: 'slices', label: 'slice oversampling', unit: '%', min: 0, max: 400, otherwise: 0, step: 10, bigStep: 50, digits: 1, dicom: null, help: '3D: extra partitions encoded and discarded' },
  slabs: { kind: 'number', group: 'slices', label: 'slabs', unit: '', min: 1, max: 64, whole: true, otherwise: 1, step: 1, bigStep: 2, digits: 0, dicom: null, help: '3D slabs acquired one after the other' },
  rounds: { kind: 'number', group: 'slices', label: 'split into', unit: '', min: 1, max: 256, whole: true, otherwise: 1, step: 1, bigStep: 2, digits: 0, dicom: null, help: 'separate acquisitions the slices are split over; each may be its own breath-hold' },
  averages: { kind: 'number', group: 'repeats', label: 'averages', unit: '', min: 0.1, max: 256, otherwise: 1, step: 1, bigStep: 2, digits: 1, dicom: 'NumberOfAverages', help: 'times each line is acquired; may be fractional' },
  volumes: { kind: 'number', group: 'repeats', label: 'volumes', unit: '', min: 1, max: 10000, whole: true, otherwise: 1, step: 1, bigStep: 10, digits: 0, dicom: 'NumberOfTemporalPositions', help: 'repeated volumes: dynamic phases or an echo-planar series' },
  dummyShots: { kind: 'number', group: 'repeats', label: 'dummy shots', unit: '', min: 0, max: 1000, whole: true, otherwise: 0, step: 1, bigStep: 4, digits: 0, dicom: null, help: 'shots played before data are kept' },
  diffusion: { kind: 'object', group: 'repeats', label: 'diffusion', otherwise: 'absent', dicom: 'DiffusionBValue', help: 'b-values, directions and averages of each b-value' },
  parallelFactorPhase: { kind: 'number', group: 'speed', label: 'acceleration, phase', unit: '', min: 1, max: 16, otherwise: 1, step: 1, bigStep: 2, digits: 1, dicom: 'ParallelReductionFactorInPlane', help: 'undersampling R along phase' },
  parallelFactorSlice: { kind: 'number', group: 'speed', label: 'acceleration, slice', unit: '', min: 1, max: 16, otherwise: 1, step: 1, bigStep: 2, digits: 1, dicom: 'ParallelReductionFactorOutOfPlane', help: 'undersampling R along partitions' },
  referenceLines: { kind: 'number', group: 'speed', label: 'reference lines', unit: '', min: 0, max: 1024, whole: true, otherwise: 0, step: 4, bigStep: 16, digits: 0, dicom: null, help: 'fully sampled central lines acquired with the series' },
  referenceScanS: { kind: 'number', group: 'speed', label: 'reference scan', unit: 's', min: 0, max: 600, otherwise: 0, step: 1, bigStep: 10, digits: 0, dicom: null, help: 'fixed time of a separate reference scan' },
  partialFourierPhase: { kind: 'number', group: 'speed', label: 'partial Fourier, phase', unit: '', min: 0.5, aboveMin: true, max: 1, otherwise: 1, step: 0.125, bigStep: 0.25, digits: 3, dicom: 'PartialFourier', help: 'fraction of phase lines acquired' },
  partialFourierSlice: { kind: 'number', group: 'speed', label: 'partial Fourier, slice', unit: '', min: 0.5, aboveMin: true, max: 1, otherwise: 1, step: 0.125, bigStep: 0.25, digits: 3, dicom: 'PartialFourier', help: 'fraction of partitions acquired' },
  ellipticalSampling: { kind: 'flag', group: 'speed', label: 'elliptical sampling', otherwise: false, dicom: 'CoverageOfKSpace', help: '3D: corners of k-space left out' },
  simultaneousSlices: { kind: 'number', group: 'speed', label: 'simultaneous slices', unit: '', min: 1, max: 16, whole: true, otherwise: 1, step: 1, bigStep: 1, digits: 0, dicom: null, help: 'slices excited together' },
  repetitionTimeMs: { kind: 'number', group: 'timing', label: 'TR', unit: 'ms', min: 0.5, max: 60000, otherwise: 'required', step: 10, bigStep: 100, digits: 2, dicom: 'RepetitionTime', help: 'repetition time; the whole cycle in the inversion-prepared class' },
  echoTimeMs: { kind: 'number', group: 'timing', label: 'TE', unit: 'ms', min: 0.01, max: 5000, otherwise: 'required', step: 1, bigStep: 10, digits: 2, dicom: 'EchoTime', help: 'echo time; effective in echo trains' },
  secondEchoTimeMs: { kind: 'number', group: 'timing', label: 'second TE', unit: 'ms', min: 0.01, max: 5000, otherwise: 'absent', step: 1, bigStep: 10, digits: 2, dicom: 'EchoTime', help: 'second echo of a dual-echo series' },
  inversionTimeMs: { kind: 'number', group: 'timing', label: 'TI', unit: 'ms', min: 1, max: 20000, otherwise: 'absent', step: 10, bigStep: 100, digits: 0, dicom: 'InversionTime', help: 'inversion time' },
  echoTrainLength: { kind: 'number', group: 'timing', label: 'echo train', unit: '', min: 1, max: 2048, whole: true, otherwise: 'by-class', step: 1, bigStep: 4, digits: 0, dicom: 'EchoTrainLength', help: 'refocused echoes, or readouts per cycle' },
  echoSpacingMs: { kind: 'number', group: 'timing', label: 'echo spacing', unit: 'ms', min: 0.05, max: 500, otherwise: 'by-class', step: 0.1, bigStep: 1, digits: 2, dicom: null, help: 'time between echoes' },
  pixelBandwidthHz: { kind: 'number', group: 'timing', label: 'bandwidth', unit: 'Hz/px', min: 5, max: 50000, otherwise: 'required', step: 10, bigStep: 100, digits: 0, dicom: 'PixelBandwidth', help: 'receiver bandwidth per pixel' },
  linesPerBeat: { kind: 'number', group: 'pacing', label: 'lines per beat', unit: '', min: 1, max: 512, whole: true, otherwise: 'absent', step: 1, bigStep: 4, digits: 0, dicom: null, help: 'gated: lines of one slice acquired per heartbeat' },
  flipAngleDeg: { kind: 'number', group: 'contrast', label: 'excitation angle', unit: 'deg', min: 0.1, max: 180, otherwise: 'by-class', step: 1, bigStep: 5, digits: 0, dicom: 'FlipAngle', help: 'excitation angle' },
  refocusingAngleDeg: { kind: 'number', group: 'contrast', label: 'refocusing angle', unit: 'deg', min: 1, max: 180, otherwise: 180, step: 5, bigStep: 20, digits: 0, dicom: null, help: 'refocusing angle; long 3D trains: their mean' },
  fatSuppression: { kind: 'choice', group: 'contrast', label: 'fat suppression', choices: ['none', 'spectral', 'inversion', 'water-excitation', 'two-point'], otherwise: 'none', dicom: 'SpectrallySelectedSuppression', help: 'how fat is kept out' },
  fatSuppressionEveryLines: { kind: 'number', group: 'contrast', label: 'fat block every', unit: '', min: 1, max: 1024, whole: true, otherwise: 'absent', step: 4, bigStep: 16, digits: 0, dicom: null, help: '3D gradient echo: lines between fat-suppression blocks' },
  saturationBands: { kind: 'number', group: 'contrast', label: 'saturation bands', unit: '', min: 0, max: 8, whole: true, otherwise: 0, step: 1, bigStep: 1, digits: 0, dicom: 'SpatialPresaturation', help: 'bands in which signal is saturated' },
  flowCompensation: { kind: 'flag', group: 'contrast', label: 'flow compensation', otherwise: false, dicom: 'FlowCompensation', help: 'gradient moments nulled' },
  slabSelective: { kind: 'flag', group: 'contrast', label: 'slab-selective', otherwise: 'by-class', dicom: null, help: '3D: excitation selects a slab' },
  rfPulseStretch: { kind: 'number', group: 'contrast', label: 'pulse stretch', unit: '', min: 0.25, max: 8, otherwise: 1, step: 0.25, bigStep: 1, digits: 2, dicom: null, help: 'all RF pulses last this many times longer' },
  reconstruction: { kind: 'choice', group: 'contrast', label: 'reconstruction', choices: ['learned'], otherwise: 'absent', dicom: null, help: 'learned reconstruction: its gain is not modelled' },
  pacing: { kind: 'object', group: 'pacing', label: 'pacing', otherwise: 'none', dicom: 'ScanOptions', help: 'what starts each shot' },
  roundsPerHold: { kind: 'number', group: 'pacing', label: 'rounds per hold', unit: '', min: 1, max: 256, whole: true, otherwise: 'absent', step: 1, bigStep: 1, digits: 0, dicom: null, help: 'rounds in one breath-hold; slices per hold in single-shot and balanced stacks' },
} as const satisfies Readonly<Record<string, ParameterRow>>;

export type ParameterTable = typeof parameterTable;
export type ParameterKey = keyof ParameterTable;
export type NumberParameterKey = { [K in ParameterKey]: ParameterTable[K]['kind'] extends 'number' ? K : never }[ParameterKey];

/** All parameter keys in table order. */
export const parameterKeys = Object.keys(parameterTable) as readonly ParameterKey[];

/** The row of a key, widened for code that handles any row. */
export function parameterRow(key: ParameterKey): ParameterRow {
  return parameterTable[key];
}
