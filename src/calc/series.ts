import { type Acquisition, type ClassKey, classRow, type Family, knownClass } from './classes.js';
import { acquiredLines, type Lines } from './lines.js';
import { type NumberParameterKey, type ParameterKey, type ParameterTable, parameterKeys, parameterRow } from './parameters.js';

export type PhaseDirection = ParameterTable['phaseDirection']['choices'][number];
export type FatSuppression = ParameterTable['fatSuppression']['choices'][number];

/** b-values with the averages of each; one average list entry per b-value; directions count 1 at b 0. */
export interface Diffusion {
  readonly bValuesSPerMm2: readonly number[];
  readonly directions: number;
  readonly averages: readonly number[];
}

export const pacingKinds = ['none', 'breath-hold', 'respiratory-trigger', 'cardiac-gate'] as const;

/** What starts each shot. */
export interface Pacing {
  readonly kind: (typeof pacingKinds)[number];
  /** Breath interval, or RR interval. */
  readonly periodMs?: number;
  /** Quiet part of the breath in which slices may be acquired. */
  readonly windowMs?: number;
  /** Gated series acquired in breath-holds. */
  readonly breathHold?: boolean;
}

type AbsentKey = { [K in NumberParameterKey]: ParameterTable[K]['otherwise'] extends 'absent' ? K : never }[NumberParameterKey];
type PresentKey = Exclude<NumberParameterKey, AbsentKey>;

/** Every parameter of a series, defaults filled in; what a class does not have keeps its neutral value. */
export type Parameters = { readonly [K in PresentKey]: number } & { readonly [K in AbsentKey]: number | undefined } & {
  readonly phaseDirection: PhaseDirection;
  readonly fatSuppression: FatSuppression;
  readonly ellipticalSampling: boolean;
  readonly flowCompensation: boolean;
  readonly slabSelective: boolean;
  readonly reconstruction: 'learned' | undefined;
  readonly diffusion: Diffusion | undefined;
  readonly pacing: Pacing;
};

/** Parameters as a file gives them: only what differs from the defaults. */
export type GivenParameters = { readonly [K in ParameterKey]?: Parameters[K] };

/** Values that replace a tissue's own. */
export interface TissueOverride {
  readonly t1Ms?: number;
  readonly t2Ms?: number;
  readonly t2StarMs?: number;
  readonly protonDensity?: number;
}

/** What the model needs to know of one series. */
export interface Series {
  readonly family: Family;
  readonly acquisition: Acquisition;
  /** `axial`, `sagittal oblique`, `short axis`... as a person writes it. */
  readonly plane: string;
  /** `dynamic` marks a timed contrast phase. */
  readonly purpose: string | null;
  readonly target: string;
  readonly comparison: string;
  readonly contrastAgent: boolean;
  readonly nullTissue: string | null;
  readonly tissueOverrides: Readonly<Record<string, TissueOverride>>;
  readonly parameters: Parameters;
}

/** The class of a series. A series is only ever built with a family and acquisition that stand together in the table. */
export function classOf(series: Pick<Series, 'family' | 'acquisition'>): ClassKey {
  return knownClass(series.family, series.acquisition);
}

/**
 * All keys in table order, nothing in them. Objects copied from one that was parsed share one layout in memory,
 * which makes every read of a parameter several times quicker than from an object that grew key by key.
 */
const blank = JSON.parse(JSON.stringify(Object.fromEntries(parameterKeys.map((key) => [key, null])))) as Readonly<Record<string, unknown>>;

/** A copy that has held every kind of value: the layout is then settled, and does not move on with the first preset that differs. */
const seasoned: Record<string, unknown> = { ...blank };
for (const key of parameterKeys) for (const value of [1, 0.5, true, 'text', blank, undefined]) seasoned[key] = value;

/**
 * Fills in what a file leaves out: the defaults of the parameter table, then those of the class.
 * Trains that read all lines in one go (single-shot, echo-planar, inversion-prepared) take their length from the lines.
 */
export function fillDefaults(key: ClassKey, given: GivenParameters): Parameters {
  const row = classRow(key);
  const filled: Record<string, unknown> = { ...seasoned };
  for (const name of parameterKeys) {
    const value = given[name];
    filled[name] = value === undefined ? defaultOf(name, key) : value;
  }
  const parameters = filled as unknown as Parameters;
  if (row.otherwise.echoTrainLength === 'lines' && given.echoTrainLength === undefined) {
    filled.echoTrainLength = linesInOneTrain(key, acquiredLines(key, parameters));
  }
  return parameters;
}

/** Value of a parameter that was left out, before anything that depends on the lines. */
export function defaultOf(name: ParameterKey, key: ClassKey): unknown {
  const row = parameterRow(name);
  const otherwise = classRow(key).otherwise;
  if (row.kind === 'object') return row.otherwise === 'none' ? { kind: 'none' } : undefined;
  if (row.otherwise === 'absent' || row.otherwise === 'required') return undefined;
  if (row.otherwise !== 'by-class') return row.otherwise;
  if (name === 'flipAngleDeg') return otherwise.flipAngleDeg === 'required' ? undefined : otherwise.flipAngleDeg;
  if (name === 'echoTrainLength') return otherwise.echoTrainLength === 'lines' ? 1 : otherwise.echoTrainLength;
  if (name === 'echoSpacingMs') return otherwise.echoSpacingMs;
  return otherwise.slabSelective;
}

/** Readouts of a train that takes all its lines in one go: partitions inside the cycle, or the phase lines. */
export function linesInOneTrain(key: ClassKey, lines: Lines): number {
  return key === 'inversion-prepared-gradient-echo/3D' ? lines.slice : lines.phase;
}
