import type { Acquisition, Family } from '../calc/classes.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { GivenParameters, TissueOverride } from '../calc/series.js';
import type { MustKeep, Range, Release, Study } from './study.js';

/** One series as the file gives it, its structure checked. */
export interface SeriesFile {
  readonly id: string;
  readonly title: string;
  readonly plane?: string;
  readonly purpose?: string;
  readonly priority?: number;
  readonly family: Family;
  readonly acquisition: Acquisition;
  readonly target: string;
  readonly comparison: string;
  readonly contrastAgent?: boolean;
  readonly nullTissue?: string;
  readonly tissueOverrides?: Readonly<Record<string, TissueOverride>>;
  readonly parameters: GivenParameters;
  readonly ranges?: Readonly<Record<string, Range>>;
  readonly mustKeep?: readonly MustKeep[];
  readonly pairedWith?: readonly string[];
  readonly locked?: readonly ParameterKey[];
  readonly opened?: readonly ParameterKey[];
}

/** A preset file, its structure checked, defaults not yet filled in. */
export interface PresetFile {
  readonly format: 'holdfast preset';
  readonly version: 1;
  readonly id: string;
  readonly title: string;
  readonly region: string;
  readonly fieldT: number;
  readonly status?: Study['status'];
  readonly revision?: number;
  readonly released?: Release;
  readonly notes?: string;
  readonly minimumSet?: readonly (string | readonly string[])[];
  readonly series: readonly SeriesFile[];
}
