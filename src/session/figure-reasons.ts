import type { FigureKey } from '../calc/figures.js';

/** What stands behind a figure: the formula, where it comes from, and what it leaves out. */
export interface FigureReason {
  /** What moves it, one sentence. */
  readonly sentence: string;
  readonly formula: string;
  readonly source: string;
  readonly ignores: string;
}

const voxel: FigureReason = {
  sentence: 'The acquired voxel is the extent over the matrix: a smaller field or a larger matrix makes it smaller, and noisier.',
  formula: 'field of view / matrix; through the slice, its thickness',
  source: 'Bernstein, Fain and Riederer, J Magn Reson Imaging 2001;14:270 (interpolation is no resolution)',
  ignores: 'slice profile, partial Fourier, T2 blur along the train',
};

const rf: FigureReason = {
  sentence:
    'The power of the pulses: it rises with the square of the angles, with more pulses in the same time, and falls with longer pulses and longer TR.',
  formula: 'B1+rms = sqrt(sum of pulse energies / time), over the worst 10 s; power is its square, over the preset',
  source: 'McRobbie, Essentials of MRI Safety, eq. 1.9; IEC 60601-2-33 for the quantity',
  ignores:
    "the scanner's own pulse shapes, unless its number was typed; the patient (SAR); acceleration shortens the exposure and does not lower B1+rms",
};

/** Reasons of the figures on the common scale. */
export const figureReasons: Readonly<Partial<Record<FigureKey, FigureReason>>> = {
  scanTimeS: {
    sentence: 'Time is TR for every shot that is played: fewer lines, fewer averages, a shorter TR or a longer train make it shorter.',
    formula: 'TR x shots x averages x splits x volumes; shots are the acquired lines over the train length',
    source: 'definition; public protocols with stated times agree within 3 %',
    ignores: "the scanner's own preparation and reference lines: real times run 3 to 6 % longer (common practice, no source)",
  },
  holdTimeS: {
    sentence:
      'One breath-hold lasts as long as one volume or one split: fewer lines, fewer slices in 3D, more splits in 2D make it shorter.',
    formula: 'scan time / breath-holds, dummies included',
    source: 'definition',
    ignores: "the scanner's own preparation; what the patient can do varies from hold to hold",
  },
  holds: {
    sentence: 'Each split and each volume is a breath-hold of its own.',
    formula: 'splits / splits in one hold x volumes',
    source: 'definition',
    ignores: 'a missed hold, which is acquired again',
  },
  tableTimeS: {
    sentence: 'Time on the table is the scan with its preparation, and instruction and rest around every breath-hold.',
    formula: 'scan time + 20 s + (10 s + 20 s) per breath-hold',
    source: 'common practice, no source',
    ignores: 'positioning, coil changes, talking',
  },
  voxelReadMm: voxel,
  voxelPhaseMm: voxel,
  voxelSliceMm: voxel,
  voxelVolumeMm3: voxel,
  relativeSnr: {
    sentence:
      'Signal to noise against the preset: larger voxels, more lines and averages, and lower bandwidth raise it; acceleration lowers it twice, by fewer lines and by g.',
    formula: 'signal of the target x voxel volume x sqrt(acquired samples x averages / bandwidth) / g x B0, over the same of the preset',
    source:
      'Macovski, Magn Reson Med 1996;36:494; Edelstein et al. 1986 (from memory); Pruessmann et al., Magn Reson Med 1999;42:952 for g',
    ignores:
      "coil loading, reconstruction filters, noise of the patient's motion; g comes from a table, not from this coil, unless a scanner file has it; sqrt of the fraction is the usual convention for partial Fourier",
  },
  relativeContrast: {
    sentence:
      'Contrast to noise of the named pair of tissues against the preset: the difference of their signals, with the same noise as SNR.',
    formula: '|signal of target - signal of comparison| x noise factor, over the same of the preset',
    source: 'signal equations of the class; tissue values from published tables',
    ignores:
      'that T1 is published between 0.6 and 1.1 s for white matter at 3 T alone (Asslander 2024): only the comparison with the preset is shown',
  },
  rfPowerTrend: rf,
  b1PlusRmsUt: rf,
  coverageMm: {
    sentence: 'Coverage is what the slices span: fewer or thinner slices lose the ends.',
    formula: '2D: n x thickness + (n - 1) x gap; 3D: n x thickness',
    source: 'definition',
    ignores: 'the weak ends of a 3D slab',
  },
  blurFwhmPx: {
    sentence: 'T2 decay along the train blurs along phase: longer trains and wider spacing blur more, most for short T2.',
    formula:
      'width of the point spread at half height over the train T, for T/T2 of the target; linear or centric order by the place of TE',
    source: 'Constable and Gore, Magn Reson Med 1992;28:9',
    ignores: 'partial Fourier, and the order the scanner really uses',
  },
  chemicalShiftPx: {
    sentence: 'Fat is displaced along the readout: higher bandwidth displaces it less.',
    formula: '3.4 ppm x Larmor frequency / bandwidth per pixel',
    source: 'shift of the main fat line (value from memory); CODATA 2022',
    ignores: 'the smaller fat lines, temperature',
  },
  distortionPxPer100Hz: {
    sentence: 'Field errors displace tissue along phase in echo-planar series: shorter spacing and more acceleration displace it less.',
    formula: '100 Hz x echo spacing / R x lines',
    source: 'definition',
    ignores: 'how large the field errors of this patient are',
  },
  temporalResolutionMs: {
    sentence: 'Each phase of the beat gathers its lines for this long.',
    formula: 'lines per beat x TR',
    source: 'definition',
    ignores: 'view sharing',
  },
};
