import type { FigureKey } from './figures.js';
import type { ParameterKey } from './parameters.js';

/** How the slices of one acquisition share time. */
export type Interleaving =
  /** Several slices within one TR. */
  | 'interleaved'
  /** One slice after the other, each with all its shots. */
  | 'slice-by-slice'
  /** A volume encoded as a whole. */
  | 'volume';

interface ClassRow {
  /** Words on screen. */
  readonly label: string;
  readonly family: string;
  readonly acquisition: '2D' | '3D';
  readonly interleaving: Interleaving;
  /** Refocused echo trains: phase graph, T2 blur. */
  readonly train: boolean;
  /** No refocusing pulse: T2* decay, TR and TE follow the readout. */
  readonly gradientEcho: boolean;
  /** One excitation reads a train of gradient-echo lines. */
  readonly echoPlanar: boolean;
  /** Parameters this class has. */
  readonly parameters: readonly ParameterKey[];
  /** Figures this class can give; the others are null. */
  readonly figures: readonly FigureKey[];
  /** Values of what is left out, where the class decides (common practice, no source). */
  readonly otherwise: {
    readonly flipAngleDeg: number | 'required';
    /** `'lines'`: as many as there are lines or partitions to read. */
    readonly echoTrainLength: number | 'lines';
    readonly echoSpacingMs: number;
    readonly slabSelective: boolean;
  };
}

const extent = ['fieldOfViewMm', 'phaseFieldOfViewPercent', 'phaseDirection', 'phaseOversamplingPercent'] as const;
const grid = ['matrixRead', 'matrixPhase', 'displayMatrix'] as const;
const slices2D = ['sliceCount', 'sliceThicknessMm', 'sliceGapMm', 'rounds', 'simultaneousSlices'] as const;
const slices3D = ['sliceCount', 'sliceThicknessMm', 'sliceOversamplingPercent', 'slabs'] as const;
const repeats = ['averages', 'volumes', 'dummyShots'] as const;
const speed2D = ['parallelFactorPhase', 'referenceLines', 'referenceScanS', 'partialFourierPhase'] as const;
const speed3D = [...speed2D, 'parallelFactorSlice', 'partialFourierSlice', 'ellipticalSampling'] as const;
const timing = ['repetitionTimeMs', 'echoTimeMs', 'pixelBandwidthHz'] as const;
const trainTiming = ['echoTrainLength', 'echoSpacingMs', 'inversionTimeMs'] as const;
const preparation = ['fatSuppression', 'saturationBands', 'flowCompensation', 'rfPulseStretch', 'reconstruction', 'pacing', 'roundsPerHold'] as const;
const refocused = ['flipAngleDeg', 'refocusingAngleDeg'] as const;

const common2D = [...extent, ...grid, ...slices2D, ...repeats, ...speed2D, ...timing, ...preparation] as const;
const common3D = [...extent, ...grid, ...slices3D, ...repeats, ...speed3D, ...timing, ...preparation, 'slabSelective'] as const;

const always: readonly FigureKey[] = [
  'scanTimeS', 'holdTimeS', 'holds', 'tableTimeS', 'linesPhase', 'shots',
  'voxelReadMm', 'voxelPhaseMm', 'voxelSliceMm', 'voxelVolumeMm3', 'displayedVoxelReadMm', 'displayedVoxelPhaseMm', 'coverageMm',
  'relativeSnr', 'relativeContrast', 'contrastRatio', 'contrastRatioChange',
  'b1PlusRmsUt', 'rfPowerTrend', 'sarTrendLow', 'sarTrendHigh',
  'chemicalShiftPx', 'chemicalShiftMm', 'distortionPxPer100Hz', 'minimumEchoTimeMs', 'minimumRepetitionTimeMs', 'inPhaseMs', 'opposedPhaseMs',
];
const shared: readonly FigureKey[] = ['slicesPerRepetition', 'roundsNeeded'];
const cine: readonly FigureKey[] = ['temporalResolutionMs', 'cardiacPhases'];

const refocusedOtherwise = { flipAngleDeg: 90, echoTrainLength: 1, echoSpacingMs: 10, slabSelective: true } as const;
const gradientOtherwise = { flipAngleDeg: 'required', echoTrainLength: 1, echoSpacingMs: 10, slabSelective: true } as const;

/**
 * The table of classes: one row per family and acquisition. A new class is a row here and a file in `signal/`.
 */
export const classTable = {
  'spin-echo/2D': {
    label: 'spin echo', family: 'spin-echo', acquisition: '2D', interleaving: 'interleaved', train: false, gradientEcho: false, echoPlanar: false,
    parameters: [...common2D, ...refocused, 'secondEchoTimeMs', 'inversionTimeMs'],
    figures: [...always, ...shared, 'nullTimeMs'],
    otherwise: refocusedOtherwise,
  },
  'spin-echo/3D': {
    label: '3D spin echo', family: 'spin-echo', acquisition: '3D', interleaving: 'volume', train: false, gradientEcho: false, echoPlanar: false,
    parameters: [...common3D, ...refocused, 'secondEchoTimeMs', 'inversionTimeMs'],
    figures: [...always, 'linesSlice', 'nullTimeMs'],
    otherwise: refocusedOtherwise,
  },
  'fast-spin-echo/2D': {
    label: 'fast spin echo', family: 'fast-spin-echo', acquisition: '2D', interleaving: 'interleaved', train: true, gradientEcho: false, echoPlanar: false,
    parameters: [...common2D, ...refocused, ...trainTiming],
    figures: [...always, ...shared, 'blurFwhmPx', 'nullTimeMs'],
    otherwise: refocusedOtherwise,
  },
  'fast-spin-echo/3D': {
    label: '3D fast spin echo', family: 'fast-spin-echo', acquisition: '3D', interleaving: 'volume', train: true, gradientEcho: false, echoPlanar: false,
    parameters: [...common3D, ...refocused, ...trainTiming],
    figures: [...always, 'linesSlice', 'blurFwhmPx', 'nullTimeMs'],
    otherwise: { ...refocusedOtherwise, echoSpacingMs: 4 },
  },
  'single-shot-fast-spin-echo/2D': {
    label: 'single-shot fast spin echo', family: 'single-shot-fast-spin-echo', acquisition: '2D', interleaving: 'slice-by-slice', train: true, gradientEcho: false, echoPlanar: false,
    parameters: [...common2D, ...refocused, ...trainTiming],
    figures: [...always, 'blurFwhmPx', 'nullTimeMs'],
    otherwise: { ...refocusedOtherwise, echoTrainLength: 'lines', echoSpacingMs: 5 },
  },
  'rotating-strip-fast-spin-echo/2D': {
    label: 'rotating-strip fast spin echo', family: 'rotating-strip-fast-spin-echo', acquisition: '2D', interleaving: 'interleaved', train: true, gradientEcho: false, echoPlanar: false,
    parameters: [
      ...(['fieldOfViewMm', 'phaseDirection'] as const), ...grid, ...slices2D, ...repeats, 'parallelFactorPhase', 'referenceScanS',
      ...timing, ...preparation, ...refocused, ...trainTiming,
    ],
    figures: [...always, ...shared, 'blurFwhmPx', 'nullTimeMs'],
    otherwise: { ...refocusedOtherwise, echoSpacingMs: 5 },
  },
  'spoiled-gradient-echo/2D': {
    label: 'spoiled gradient echo', family: 'spoiled-gradient-echo', acquisition: '2D', interleaving: 'interleaved', train: false, gradientEcho: true, echoPlanar: false,
    parameters: [...common2D, 'flipAngleDeg', 'secondEchoTimeMs', 'linesPerBeat'],
    figures: [...always, ...shared, ...cine, 'ernstAngleDeg'],
    otherwise: gradientOtherwise,
  },
  'spoiled-gradient-echo/3D': {
    label: '3D spoiled gradient echo', family: 'spoiled-gradient-echo', acquisition: '3D', interleaving: 'volume', train: false, gradientEcho: true, echoPlanar: false,
    parameters: [...common3D, 'flipAngleDeg', 'secondEchoTimeMs', 'fatSuppressionEveryLines'],
    figures: [...always, 'linesSlice', 'ernstAngleDeg'],
    otherwise: gradientOtherwise,
  },
  'balanced-steady-state/2D': {
    label: 'balanced steady state', family: 'balanced-steady-state', acquisition: '2D', interleaving: 'slice-by-slice', train: false, gradientEcho: true, echoPlanar: false,
    parameters: [...common2D, 'flipAngleDeg', 'linesPerBeat'],
    figures: [...always, ...cine],
    otherwise: gradientOtherwise,
  },
  'balanced-steady-state/3D': {
    label: '3D balanced steady state', family: 'balanced-steady-state', acquisition: '3D', interleaving: 'volume', train: false, gradientEcho: true, echoPlanar: false,
    parameters: [...common3D, 'flipAngleDeg', 'fatSuppressionEveryLines'],
    figures: [...always, 'linesSlice'],
    otherwise: gradientOtherwise,
  },
  'inversion-prepared-gradient-echo/3D': {
    label: '3D inversion-prepared gradient echo', family: 'inversion-prepared-gradient-echo', acquisition: '3D', interleaving: 'volume', train: false, gradientEcho: true, echoPlanar: false,
    parameters: [...common3D, 'flipAngleDeg', 'inversionTimeMs', 'echoTrainLength', 'echoSpacingMs'],
    figures: [...always, 'linesSlice', 'nullTimeMs'],
    otherwise: { ...gradientOtherwise, echoTrainLength: 'lines', echoSpacingMs: 7, slabSelective: false },
  },
  'echo-planar-gradient-echo/2D': {
    label: 'echo-planar gradient echo', family: 'echo-planar-gradient-echo', acquisition: '2D', interleaving: 'interleaved', train: false, gradientEcho: true, echoPlanar: true,
    parameters: [...common2D, 'flipAngleDeg', 'echoTrainLength', 'echoSpacingMs'],
    figures: [...always, ...shared, 'ernstAngleDeg'],
    otherwise: { ...gradientOtherwise, echoTrainLength: 'lines', echoSpacingMs: 0.7 },
  },
  'echo-planar-spin-echo/2D': {
    label: 'echo-planar spin echo', family: 'echo-planar-spin-echo', acquisition: '2D', interleaving: 'interleaved', train: false, gradientEcho: false, echoPlanar: true,
    parameters: [...common2D, ...refocused, ...trainTiming, 'diffusion'],
    figures: [...always, ...shared, 'nullTimeMs'],
    otherwise: { ...refocusedOtherwise, echoTrainLength: 'lines', echoSpacingMs: 0.7 },
  },
} as const satisfies Readonly<Record<string, ClassRow>>;

export type ClassKey = keyof typeof classTable;
export type Family = (typeof classTable)[ClassKey]['family'];
export type Acquisition = (typeof classTable)[ClassKey]['acquisition'];

/** All class keys (`family/acquisition`) in table order. */
export const classKeys = Object.keys(classTable) as readonly ClassKey[];

/** The families in table order, each once. */
export const families: readonly Family[] = [...new Set(classKeys.map((key) => classTable[key].family))];

const keyByFamily: Readonly<Record<string, Readonly<Partial<Record<Acquisition, ClassKey>>>>> = Object.fromEntries(
  families.map((family) => [
    family,
    Object.fromEntries(classKeys.filter((key) => classTable[key].family === family).map((key) => [classTable[key].acquisition, key])),
  ]),
);

/** The class of a family and acquisition that are known to stand together in the table. */
export function knownClass(family: Family, acquisition: Acquisition): ClassKey {
  // The edits of a series ask for the same class again and again.
  if (family !== lastFamily || acquisition !== lastAcquisition) {
    lastFamily = family;
    lastAcquisition = acquisition;
    lastClass = keyByFamily[family]?.[acquisition] as ClassKey;
  }
  return lastClass;
}
let lastFamily: Family = 'spin-echo';
let lastAcquisition: Acquisition = '2D';
let lastClass: ClassKey = 'spin-echo/2D';

/** The row of a class, widened for code that handles any class. */
export function classRow(key: ClassKey): ClassRow {
  // One evaluation asks for the same row some thirty times.
  if (key !== lastKey) {
    lastKey = key;
    lastRow = classTable[key];
  }
  return lastRow;
}
let lastKey: ClassKey = 'spin-echo/2D';
let lastRow: ClassRow = classTable[lastKey];

/** The class of a family and an acquisition, or null where the trade has no such class. */
export function classKeyOf(family: string, acquisition: string): ClassKey | null {
  const key = `${family}/${acquisition}`;
  return Object.hasOwn(classTable, key) ? (key as ClassKey) : null;
}

/** Figures that need more than the right class: the words say what is missing when they are null. */
export const figureNeeds: Readonly<Partial<Record<FigureKey, string>>> = {
  holdTimeS: 'the series is not acquired in breath-holds',
  holds: 'the series is not acquired in breath-holds',
  slicesPerRepetition: 'a gated cine takes one slice at a time',
  roundsNeeded: 'a gated cine takes one slice at a time, or not one slice fits in TR',
  nullTimeMs: 'the series has no inversion time, or the tissue is never nulled by one',
  temporalResolutionMs: 'the series is not a gated cine',
  cardiacPhases: 'the series is not a gated cine',
  relativeSnr: 'the target has no value, the acceleration is beyond the coil table, or the timing is impossible',
  relativeContrast: 'target and comparison are equal in the baseline, or one of them has no value',
  contrastRatio: 'the comparison gives no signal, or one of the two tissues has no value',
  contrastRatioChange: 'the comparison gives no signal, or one of the two tissues has no value',
};
