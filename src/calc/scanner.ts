/** One row of a coil's measured noise table: g at R along phase and R along partitions. */
export interface NoiseFactorRow {
  readonly phase: number;
  readonly slice: number;
  readonly region?: string;
  readonly g: number;
}

/** A receive coil: elements along each body axis and its measured g table. */
export interface Coil {
  readonly name: string;
  readonly elements: { readonly AP: number; readonly RL: number; readonly HF: number };
  readonly g: readonly NoiseFactorRow[];
}

/** Duration and waveform of one RF pulse. */
export interface PulseShape {
  readonly durationMs: number;
  /** Time-bandwidth product of a Hann-windowed sinc; 0 is a hard pulse. */
  readonly timeBandwidth?: number;
  readonly gaussian?: true;
  /** Power factor when known without a waveform. */
  readonly powerFactor?: number;
}

/** Names of the pulses a scanner file may override. */
export const pulseNames = [
  'excitation',
  'refocusing',
  'gradientEcho2D',
  'gradientEcho3D',
  'nonSelective',
  'balanced',
  'echoPlanarExcitation',
  'echoPlanarRefocusing',
  'fatSaturation',
  'saturationBand',
] as const;
export type PulseName = (typeof pulseNames)[number];

/** What the model needs to know of a scanner. */
export interface Scanner {
  readonly name: string;
  /** Exact field: a magnet called 3 T may be 2.89 T. */
  readonly fieldT: number;
  readonly gradientMtPerM: number;
  readonly slewTPerMPerS: number;
  readonly visibleLengthMm: number;
  readonly maximumB1Ut: number;
  readonly modelErrorPercent: number;
  /** The coil in use; null takes the default g table. */
  readonly coil: Coil | null;
  /** g of simultaneous slices by their number; what is missing is not known. */
  readonly simultaneousSliceG: Readonly<Record<number, number>>;
  readonly pulses: Readonly<Partial<Record<PulseName, PulseShape>>>;
  /** Pauses that a site set, s; absent: common practice. */
  readonly pauses?: { readonly preparationS: number; readonly restS: number };
}

/** A scanner without a file: 40 mT/m, 150 T/m/s, 500 mm, 20 uT, 5 % (common practice, no source). */
export function plainScanner(fieldT: number): Scanner {
  return {
    name: 'no scanner file',
    fieldT,
    gradientMtPerM: 40,
    slewTPerMPerS: 150,
    visibleLengthMm: 500,
    maximumB1Ut: 20,
    modelErrorPercent: 5,
    coil: null,
    simultaneousSliceG: {},
    pulses: {},
  };
}
