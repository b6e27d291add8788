import type { ParameterKey } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';
import type { Bands } from '../search/bands.js';
import { noRecordedLimits, type RecordedLimits, type RecordedReading } from '../study/record.js';
import type { Quality, Recommendation, SeriesOutcome } from '../study/record-words.js';
import { runningOrder } from '../study/running-order.js';
import type { Study } from '../study/study.js';
import type { Equipment } from './equipment.js';

/** Where a series stands in the running order. */
export const seriesStates = ['to-do', 'running', 'done', 'repeated', 'stopped-early', 'not-done'] as const;
export type SeriesState = (typeof seriesStates)[number];

/** A series while it is acquired. */
export interface Run {
  /** Breath-holds that are over. */
  readonly holdsDone: number;
  /** When the present hold, or the scan, was started (ms, clock of the program); null between two holds. */
  readonly sinceMs: number | null;
  /** It was acquired before: when it ends it is repeated, not done. */
  readonly again: boolean;
}

/** One series of the session: what was set over the preset, and how it went. */
export interface SessionSeries {
  readonly id: string;
  /** Values set by hand over the preset. What follows from them is always worked out anew. */
  readonly set: GivenParameters;
  /** Parameters locked in the preset that were opened by hand. */
  readonly opened: readonly ParameterKey[];
  readonly state: SeriesState;
  /** Keeps its place when others are moved. */
  readonly placeLocked: boolean;
  readonly run: Run | null;
  /** What the scanner displayed for the preset, and after the changes. */
  readonly before: RecordedReading | null;
  readonly after: RecordedReading | null;
  /** How it goes into the record; null: as its state says. */
  readonly outcome: SeriesOutcome | 'left-out' | null;
  readonly quality: Quality | null;
  readonly reason: string;
  /** Roles that accepted a crossed must-keep, by its words. */
  readonly accepted: Readonly<Record<string, string>>;
}

/** Everything that undo and redo go over. Plain data: it is saved as it stands. */
export interface Session {
  readonly limits: RecordedLimits;
  /** When contrast was given, ms. */
  readonly contrastAtMs: number | null;
  /** Since when the patient's minutes run, ms; null before the first series is started. */
  readonly clockFromMs: number | null;
  /** In running order. */
  readonly series: readonly SessionSeries[];
  readonly reasons: readonly string[];
  readonly role: string;
  readonly initials: string;
  readonly recommendation: Recommendation | null;
  /** How much of each figure every way keeps; left out: the usual bands. */
  readonly keep?: Bands;
  /** Which equipment it is done on: 0 or left out is what it was begun on, 1 the first of `Opened.others`. */
  readonly equipment?: number;
  /** True once this very session stands in the file of records. */
  readonly saved: boolean;
}

/** What a session starts from: its preset, and the equipment it was begun on. */
export interface Opened extends Equipment {
  /** As it is judged: with what the site keeps after the must-keeps of each series. */
  readonly study: Study;
  /** Must-keeps that each series has in the preset itself; left out where the site adds none. */
  readonly ownMustKeeps?: Readonly<Record<string, number>>;
  /** SHA-256 of the preset file. */
  readonly hash: string;
  /** Equipment that was chosen since; a session names the one it is done on by its place. */
  readonly others?: readonly Equipment[];
}

/** A session on a preset in which nothing was said or changed yet. */
export function newSession(study: Study, role: string): Session {
  return {
    limits: noRecordedLimits,
    contrastAtMs: null,
    clockFromMs: null,
    series: runningOrder(study.series).map(({ id }) => ({
      id,
      set: {},
      opened: [],
      state: 'to-do',
      placeLocked: false,
      run: null,
      before: null,
      after: null,
      outcome: null,
      quality: null,
      reason: '',
      accepted: {},
    })),
    reasons: [],
    role,
    initials: '',
    recommendation: null,
    saved: false,
  };
}
