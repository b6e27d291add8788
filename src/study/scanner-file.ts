import { type Coil, type NoiseFactorRow, type PulseName, type PulseShape, plainScanner, type Scanner } from '../calc/scanner.js';
import { presetLimits } from './limits.js';

/** A coil as a scanner file gives it. */
export interface CoilFile extends Coil {
  /** g of simultaneous slices with this coil; wins over that of the scanner. */
  readonly simultaneousSliceG?: Readonly<Record<string, number>>;
}

/** A scanner as its file gives it, structure checked; what is left out takes the values of a scanner without a file. */
export interface ScannerFile {
  readonly format: 'holdfast scanner';
  readonly version: 1;
  /** Nickname by which it is chosen. */
  readonly name: string;
  readonly notes?: string;
  readonly fieldT: number;
  readonly gradientMtPerM?: number;
  readonly slewTPerMPerS?: number;
  readonly visibleLengthMm?: number;
  readonly maximumB1Ut?: number;
  readonly modelErrorPercent?: number;
  readonly coils?: readonly CoilFile[];
  readonly simultaneousSliceG?: Readonly<Record<string, number>>;
  readonly pulses?: Readonly<Partial<Record<PulseName, PulseShape>>>;
}

/** Bounds on a scanner file. */
export const scannerLimits = { bytes: 200_000, nesting: 8, name: 40, coils: 40, noiseRows: 200 } as const;

interface NumberRow {
  readonly label: string;
  readonly unit: string;
  readonly min: number;
  readonly max: number;
  /** Value of a scanner without a file; null must be given. */
  readonly otherwise: number | null;
  readonly help: string;
}

const plain = plainScanner(1.5);

/** The numbers of a scanner file, in their order. Ranges bound what a file may say, not what is sensible. */
export const scannerNumbers = {
  fieldT: { label: 'field', unit: 'T', ...presetLimits.fieldT, otherwise: null, help: 'exact field, T: a magnet called 3 T may be 2.89 T' },
  gradientMtPerM: {
    label: 'gradient amplitude',
    unit: 'mT/m',
    min: 1,
    max: 1000,
    otherwise: plain.gradientMtPerM,
    help: 'largest gradient of one axis, mT/m',
  },
  slewTPerMPerS: {
    label: 'slew rate',
    unit: 'T/m/s',
    min: 1,
    max: 2000,
    otherwise: plain.slewTPerMPerS,
    help: 'slew rate of one axis, T/m/s',
  },
  visibleLengthMm: {
    label: 'visible length',
    unit: 'mm',
    min: 50,
    max: 2000,
    otherwise: plain.visibleLengthMm,
    help: 'head to feet, what the magnet can see at once, mm',
  },
  maximumB1Ut: { label: 'maximum B1', unit: 'uT', min: 1, max: 200, otherwise: plain.maximumB1Ut, help: 'peak B1+ of a pulse, uT' },
  modelErrorPercent: {
    label: 'model error',
    unit: '%',
    min: 0,
    max: 50,
    otherwise: plain.modelErrorPercent,
    help: 'how far real times may run over the computed ones, %',
  },
} as const satisfies Readonly<Record<string, NumberRow>>;

export type ScannerNumber = keyof typeof scannerNumbers;

/** Slices excited together that a noise factor may be given for. */
export const simultaneousCounts = [2, 3, 4, 5, 6, 7, 8] as const;

/** g of simultaneous slices by number. */
function byCount(given: Readonly<Record<string, number>>): Readonly<Record<number, number>> {
  return Object.fromEntries(Object.entries(given).map(([key, g]) => [Number(key), g]));
}

/** Rows of a g table for one region: those measured in it, then those of any region where it has none. Rows of other regions are left out. */
function rowsFor(rows: readonly NoiseFactorRow[], region: string | null): readonly NoiseFactorRow[] {
  const here = rows.filter((row) => row.region !== undefined && sameWord(row.region, region ?? ''));
  const anywhere = rows.filter(
    (row) => row.region === undefined && !here.some(({ phase, slice }) => phase === row.phase && slice === row.slice),
  );
  return [...here, ...anywhere];
}

function sameWord(a: string, b: string): boolean {
  return a.trim().toLowerCase() === b.trim().toLowerCase();
}

/** The coil of a scanner file by its name, upper and lower case alike; the first where none is named; null where there is none. */
export function coilNamed(file: ScannerFile, name: string | null): CoilFile | null {
  const coils = file.coils ?? [];
  return (name === null ? coils[0] : coils.find((coil) => sameWord(coil.name, name))) ?? null;
}

/**
 * The scanner that the model works with: a file, one of its coils, a body region. A file without coils leaves the usual g table in force;
 * a coil's own table is all that is known of it, so that an acceleration beyond it has no noise factor.
 *
 * @param coilName Null takes the first coil of the file.
 * @param region Body region of the preset: of measured rows, those of another region are left out. Null takes rows of any region only.
 */
export function scannerOf(file: ScannerFile, coilName: string | null = null, region: string | null = null): Scanner {
  const coil = coilNamed(file, coilName);
  const plainOne = plainScanner(file.fieldT);
  const { name, fieldT, gradientMtPerM, slewTPerMPerS, visibleLengthMm, maximumB1Ut, modelErrorPercent } = { ...plainOne, ...file };
  return {
    name,
    fieldT,
    gradientMtPerM,
    slewTPerMPerS,
    visibleLengthMm,
    maximumB1Ut,
    modelErrorPercent,
    coil: coil === null ? null : { name: coil.name, elements: coil.elements, g: rowsFor(coil.g, region) },
    simultaneousSliceG: byCount({ ...file.simultaneousSliceG, ...coil?.simultaneousSliceG }),
    pulses: file.pulses ?? {},
  };
}
