/** Which way of a figure is the better one for the person on the table or the picture; `neither` is plain information. */
export type BetterWay = 'lower' | 'higher' | 'neither';

interface FigureRow {
  readonly label: string;
  readonly unit: 's' | 'ms' | 'mm' | 'mm3' | 'uT' | 'px' | 'deg' | '';
  readonly better: BetterWay;
  /** Digits after the point in a table; the screen has its own rules for times and percentages. */
  readonly digits: number;
  readonly help: string;
  /** A ratio to the baseline: shown in percent, and its own comparison. */
  readonly ratio?: true;
  /** Place on the common scale of consequences, smallest first, and a name of at most 11 characters where the label is longer; absent: not on it. */
  readonly scale?: { readonly place: number; readonly label?: string };
}

/** The table of figures: everything the model computes for one series, in column order. A figure that does not apply is null. */
export const figureTable = {
  scanTimeS: { label: 'scan time', unit: 's', better: 'lower', digits: 1, help: 'time of the whole series, holds and volumes included', scale: { place: 2 } },
  holdTimeS: { label: 'breath-hold', unit: 's', better: 'lower', digits: 1, help: 'longest single breath-hold', scale: { place: 1 } },
  holds: { label: 'breath-holds', unit: '', better: 'lower', digits: 0, help: 'number of breath-holds', scale: { place: 15, label: 'holds' } },
  tableTimeS: { label: 'time on the table', unit: 's', better: 'lower', digits: 0, help: 'scan time with preparation, instruction and rest between holds', scale: { place: 14, label: 'on table' } },
  linesPhase: { label: 'phase lines', unit: '', better: 'neither', digits: 0, help: 'lines acquired along phase' },
  linesSlice: { label: 'partition lines', unit: '', better: 'neither', digits: 0, help: '3D: lines acquired along partitions' },
  shots: { label: 'shots', unit: '', better: 'neither', digits: 0, help: 'excitations of one round, dummies included' },
  slicesPerRepetition: { label: 'slices per TR', unit: '', better: 'higher', digits: 0, help: 'slices that fit in one TR' },
  roundsNeeded: { label: 'rounds needed', unit: '', better: 'lower', digits: 0, help: 'separate acquisitions the slices need' },
  voxelReadMm: { label: 'voxel, read', unit: 'mm', better: 'lower', digits: 2, help: 'acquired, along readout', scale: { place: 3, label: 'voxel read' } },
  voxelPhaseMm: { label: 'voxel, phase', unit: 'mm', better: 'lower', digits: 2, help: 'acquired, along phase', scale: { place: 4, label: 'voxel phase' } },
  voxelSliceMm: { label: 'voxel, slice', unit: 'mm', better: 'lower', digits: 2, help: 'acquired, through the slice', scale: { place: 5, label: 'voxel slice' } },
  voxelVolumeMm3: { label: 'voxel volume', unit: 'mm3', better: 'lower', digits: 2, help: 'acquired', scale: { place: 17, label: 'voxel' } },
  displayedVoxelReadMm: { label: 'displayed, read', unit: 'mm', better: 'neither', digits: 2, help: 'pixel on screen: interpolation adds no resolution' },
  displayedVoxelPhaseMm: { label: 'displayed, phase', unit: 'mm', better: 'neither', digits: 2, help: 'pixel on screen: interpolation adds no resolution' },
  coverageMm: { label: 'coverage', unit: 'mm', better: 'higher', digits: 0, help: 'extent through the slices', scale: { place: 9 } },
  relativeSnr: { label: 'SNR', unit: '', better: 'higher', digits: 2, help: 'signal to noise of the target over that of the baseline', ratio: true, scale: { place: 6 } },
  relativeContrast: { label: 'contrast', unit: '', better: 'higher', digits: 2, help: 'contrast to noise of target and comparison over that of the baseline', ratio: true, scale: { place: 7 } },
  contrastRatio: { label: 'contrast ratio', unit: '', better: 'neither', digits: 3, help: 'signal of target over signal of comparison' },
  contrastRatioChange: { label: 'contrast ratio change', unit: '', better: 'neither', digits: 3, help: 'contrast ratio over that of the baseline, less one' },
  b1PlusRmsUt: { label: 'B1+rms', unit: 'uT', better: 'lower', digits: 2, help: 'of the pulses, over the worst 10 s: trend only', scale: { place: 12 } },
  rfPowerTrend: { label: 'RF power', unit: '', better: 'lower', digits: 2, help: 'B1+rms squared over that of the baseline', ratio: true, scale: { place: 8 } },
  sarTrendLow: { label: 'SAR trend, low', unit: '', better: 'lower', digits: 2, help: 'lower end of the SAR ratio to the baseline', ratio: true },
  sarTrendHigh: { label: 'SAR trend, high', unit: '', better: 'lower', digits: 2, help: 'upper end of the SAR ratio to the baseline', ratio: true },
  chemicalShiftPx: { label: 'chemical shift', unit: 'px', better: 'lower', digits: 2, help: 'displacement of fat, in pixels', scale: { place: 11, label: 'fat shift' } },
  chemicalShiftMm: { label: 'chemical shift', unit: 'mm', better: 'lower', digits: 2, help: 'displacement of fat' },
  distortionPxPer100Hz: { label: 'distortion', unit: 'px', better: 'lower', digits: 2, help: 'displacement at 100 Hz off resonance', scale: { place: 13 } },
  minimumEchoTimeMs: { label: 'shortest TE', unit: 'ms', better: 'neither', digits: 2, help: 'estimate from gradients and pulses' },
  minimumRepetitionTimeMs: { label: 'shortest TR', unit: 'ms', better: 'neither', digits: 2, help: 'estimate for one slice or one line, from gradients and pulses' },
  blurFwhmPx: { label: 'T2 blur', unit: 'px', better: 'lower', digits: 2, help: 'width of the point spread over the echo train, in acquired pixels', scale: { place: 10 } },
  nullTimeMs: { label: 'null TI', unit: 'ms', better: 'neither', digits: 0, help: 'inversion time that nulls the named tissue' },
  ernstAngleDeg: { label: 'Ernst angle', unit: 'deg', better: 'neither', digits: 1, help: 'angle of most signal of the target at this TR' },
  inPhaseMs: { label: 'in phase', unit: 'ms', better: 'neither', digits: 2, help: 'first echo time with water and fat in phase' },
  opposedPhaseMs: { label: 'opposed phase', unit: 'ms', better: 'neither', digits: 2, help: 'first echo time with water and fat opposed' },
  temporalResolutionMs: { label: 'temporal resolution', unit: 'ms', better: 'lower', digits: 0, help: 'cine: time of one phase of the beat', scale: { place: 16, label: 'beat phase' } },
  cardiacPhases: { label: 'cardiac phases', unit: '', better: 'higher', digits: 0, help: 'cine: phases that fit in the beat' },
} as const satisfies Readonly<Record<string, FigureRow>>;

export type FigureKey = keyof typeof figureTable;
export type Figures = { readonly [K in FigureKey]: number | null };

/** All figure keys in column order. */
export const figureKeys = Object.keys(figureTable) as readonly FigureKey[];

/** The row of a figure, with everything a row may say. */
export function figureRow(key: FigureKey): FigureRow {
  return figureTable[key];
}
