import type { Evaluation } from '../calc/evaluate.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { Parameters } from '../calc/series.js';
import type { MustKeepResult } from '../study/must-keep.js';
import type { StudySeries } from '../study/study.js';

/**
 * What is held equal when a study moves to another field. `contrast`: the contrast ratio of the named pair. `snr`: the same, and averages
 * and bandwidth spend what SNR is gained. `shift`: the displacement of fat in pixels, and nothing else is solved. `time`: no series takes longer.
 */
export const carryAims = ['contrast', 'snr', 'shift', 'time'] as const;
export type CarryAim = (typeof carryAims)[number];

/** Fields between which a study is carried, tesla: where the model's sources reach. */
export const carryFields = { min: 0.5, max: 3 } as const;

/** One parameter: what it was, what it becomes, and why. */
export interface CarriedValue {
  readonly key: ParameterKey;
  readonly from: unknown;
  readonly to: unknown;
  /** One sentence with its numbers. */
  readonly why: string;
  readonly formula: string;
  readonly source: string;
  readonly numbers: Readonly<Record<string, number>>;
}

/** What became of the contrast ratio. */
export interface ContrastCarry {
  readonly status: 'unchanged' | 'solved' | 'unsolvable' | 'not asked' | 'not known';
  readonly from: number | null;
  readonly to: number | null;
  /** The parameters that were solved for, and between which bounds. */
  readonly solved: readonly {
    readonly key: ParameterKey;
    readonly x: number;
    readonly bracket: readonly [number, number];
    readonly residual: number;
  }[];
  /** One sentence. */
  readonly words: string;
}

/** Inversion time by null, ms: the class's own equation, and the textbook's. */
export interface NullCarry {
  readonly tissue: string;
  readonly ownFromMs: number;
  readonly ownToMs: number;
  readonly simpleFromMs: number;
  readonly simpleToMs: number;
}

/** RF against the preset: a range, and the angle that brings its upper end back to the preset's. */
export interface RfCarry {
  readonly low: number;
  readonly high: number;
  readonly b1RmsRatio: number;
  /** Null where the range does not reach above the preset, or no angle brings it back. */
  readonly back: {
    readonly key: 'flipAngleDeg' | 'refocusingAngleDeg';
    readonly fromDeg: number;
    readonly upperDeg: number;
    readonly lowerDeg: number | null;
    readonly snr: number | null;
  } | null;
  readonly words: string;
}

/** What the SNR gained or lost is worth in averages. */
export interface AveragesCarry {
  /** SNR with the carried parameters over the preset's, at the preset's averages. */
  readonly snr: number | null;
  /** Averages, times those of the preset, that give the preset's SNR. */
  readonly factor: number | null;
  readonly choices: readonly { readonly averages: number; readonly snr: number; readonly scanTimeS: number }[];
  readonly words: string;
}

/** Something that does not move by itself. */
export interface CarryGap {
  readonly what: string;
  readonly why: string;
}

/** One series at its new field: a proposal. */
export interface SeriesCarry {
  readonly series: StudySeries;
  readonly parameters: Parameters;
  readonly values: readonly CarriedValue[];
  /** Against the preset at its own field. */
  readonly evaluation: Evaluation;
  /** The preset at its own field. */
  readonly before: Evaluation;
  readonly contrast: ContrastCarry;
  readonly nulls: NullCarry | null;
  readonly rf: RfCarry;
  readonly averages: AveragesCarry;
  readonly mustKeeps: readonly MustKeepResult[];
  /** What cannot be carried, and why. */
  readonly gaps: readonly CarryGap[];
  /** Tissues whose relaxation at the new field lies beyond the measured fields. */
  readonly extrapolated: readonly string[];
}
