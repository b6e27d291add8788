import type { FigureKey } from '../calc/figures.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { Series } from '../calc/series.js';

/** Values a parameter may take in a search: an evenly stepped stretch, or a list. */
export type Range = { readonly min: number; readonly max: number; readonly step: number } | readonly (number | string | boolean)[];

/**
 * One thing the site or a published source asks to keep: limits on a figure or a parameter, or a rule in words of the tables.
 * The parameter `diffusion` stands for its highest b-value, s/mm2.
 */
export interface MustKeep {
  readonly figure?: FigureKey;
  readonly parameter?: ParameterKey;
  readonly atMost?: number;
  readonly atLeast?: number;
  readonly between?: readonly [number, number];
  /** Formula over parameter and figure keys. */
  readonly rule?: string;
  /** Formula that says when the must-keep applies; always where it is left out. */
  readonly when?: string;
  readonly source: string;
}

/** One series as a preset holds it. */
export interface StudySeries extends Series {
  readonly id: string;
  readonly title: string;
  /** Place in the running order: lower is earlier. */
  readonly priority: number;
  readonly mustKeep: readonly MustKeep[];
  readonly ranges: Readonly<Record<string, Range>>;
  /** Ids of series that change together with this one. */
  readonly pairedWith: readonly string[];
  /** Parameters that a search may not touch, beyond the class's defaults. */
  readonly locked: readonly ParameterKey[];
  /** Parameters that a search may touch although the class locks them. */
  readonly opened: readonly ParameterKey[];
}

/** Who made a revision the reviewed one, when and why. Roles, never names. */
export interface Release {
  readonly role: string;
  /** A second role that agreed, where the site asks for one. */
  readonly secondRole?: string;
  /** YYYY-MM-DD. */
  readonly day: string;
  readonly reason: string;
}

export const studyStates = ['draft', 'starter', 'reviewed'] as const;

/** One study: what a preset file says, defaults filled in. */
export interface Study {
  readonly format: 'holdfast preset';
  readonly version: 1;
  readonly id: string;
  readonly title: string;
  readonly region: string;
  readonly fieldT: number;
  readonly status: (typeof studyStates)[number];
  readonly revision: number;
  /** Absent where nobody released it through the program. */
  readonly released?: Release;
  readonly notes: string;
  /** Ids that must be acquired; of a list any one serves. */
  readonly minimumSet: readonly (string | readonly string[])[];
  /** In the order of the file. */
  readonly series: readonly StudySeries[];
}
