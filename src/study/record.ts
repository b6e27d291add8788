import type { Figures } from '../calc/figures.js';
import type { GivenParameters } from '../calc/series.js';
import type { HoldState, Quality, Recommendation, SeriesOutcome } from './record-words.js';

/** Highest version of the record format that is read and written here. */
export const recordVersion = 1;

/** Which preset the session started from. */
export interface RecordedPreset {
  readonly id: string;
  readonly revision: number;
  /** SHA-256 of the preset file's bytes, hexadecimal. */
  readonly hash: string;
}

/** What this patient or implant allowed; null was not known or not asked. */
export interface RecordedLimits {
  readonly holdS: number | null;
  readonly holdsAvailable: number | null;
  readonly holdState: HoldState | null;
  readonly minutesLeft: number | null;
  /** No series longer than this. */
  readonly longestSeriesS: number | null;
  readonly b1rmsCapUt: number | null;
  /** Where the cap was read: implant label, card, letter. */
  readonly b1rmsReadFrom: string | null;
  readonly sarCapWkg: number | null;
  readonly sarReadFrom: string | null;
  /** Other conditions of the label, as typed. */
  readonly labelConditions: readonly string[];
  readonly frontBackMm: number | null;
  readonly leftRightMm: number | null;
  /** True once contrast was given; null when the session never said. */
  readonly contrastGiven: boolean | null;
}

/** A session that set no limits. */
export const noRecordedLimits: RecordedLimits = {
  holdS: null,
  holdsAvailable: null,
  holdState: null,
  minutesLeft: null,
  longestSeriesS: null,
  b1rmsCapUt: null,
  b1rmsReadFrom: null,
  sarCapWkg: null,
  sarReadFrom: null,
  labelConditions: [],
  frontBackMm: null,
  leftRightMm: null,
  contrastGiven: null,
};

/** Parameters and what the model made of them; a figure that does not apply is null. */
export interface RecordedValues {
  readonly parameters: GivenParameters;
  readonly figures: Partial<Figures>;
}

/** What a reading was taken with; for another coil, body or field it no longer holds. */
export interface ReadingConditions {
  /** Nickname; null where none is named. */
  readonly coil: string | null;
  readonly fieldT: number;
  /** Extents as typed then; null was not typed. */
  readonly frontBackMm: number | null;
  readonly leftRightMm: number | null;
}

/** A number of the scanner beside what was predicted for it. */
export interface ComparedReading {
  /** Of a predicted range the end that lies nearer, or what was read where it lies inside. */
  readonly predicted: number;
  readonly read: number;
  /** Read over predicted. */
  readonly ratio: number;
}

/** Readings of one series against what was predicted. */
export interface ComparedReadings {
  /** The preset's own, against the model alone. */
  readonly before: { readonly timeS?: ComparedReading; readonly b1rmsUt?: ComparedReading };
  /** As run, against the figures used; these scale from the readings before where there were any. */
  readonly after: { readonly timeS?: ComparedReading; readonly b1rmsUt?: ComparedReading; readonly sarWkg?: ComparedReading };
}

/** What the scanner displayed, as typed by the operator. */
export interface RecordedReading {
  /** Absent where an earlier program did not keep them. */
  readonly conditions?: ReadingConditions;
  readonly timeS?: number;
  readonly b1rmsUt?: number;
  readonly sarWkg?: number;
  /** Operating mode as displayed (normal, first level, second level). */
  readonly operatingMode?: string;
  /** What the scanner changed by itself. */
  readonly changedByScanner?: string;
  /** What was used that the figures do not know of. */
  readonly notModelled?: readonly string[];
}

/** A must-keep that was crossed, and the role that accepted it; null when nobody did. */
export interface CrossedMustKeep {
  readonly rule: string;
  readonly role: string | null;
}

/** One series of a finished session. */
export interface RecordedSeries {
  readonly id: string;
  /** Its class as `family/acquisition`; absent where an earlier program did not say it. */
  readonly class?: string;
  readonly outcome: SeriesOutcome;
  /** A code of the table of reasons, or free text; blank prints as NO REASON GIVEN. */
  readonly reason: string;
  readonly quality: Quality | null;
  readonly planned: RecordedValues;
  readonly used: RecordedValues;
  readonly crossed: readonly CrossedMustKeep[];
  readonly readings: {
    readonly before: RecordedReading | null;
    readonly after: RecordedReading | null;
    /** Left out where nothing was read that can be compared. */
    readonly compared?: ComparedReadings;
  };
}

/**
 * A finished session: what was planned, what was used, and why. It names presets, scanners and roles, never a patient;
 * it has a day at most, never a time. `sum` is no part of it: it belongs to the line.
 */
export interface SessionRecord {
  readonly format: 'holdfast record';
  readonly version: typeof recordVersion;
  /** Random; it points to nothing. */
  readonly id: string;
  /** Version of the program. */
  readonly tool: string;
  /** Version of the model. */
  readonly model: string;
  /** YYYY-MM-DD; null where the site's settings leave it out. */
  readonly day: string | null;
  readonly preset: RecordedPreset;
  readonly region: string;
  readonly fieldT: number;
  /** Nicknames, no serial numbers. */
  readonly scanner: string;
  readonly coil: string | null;
  readonly role: string;
  readonly initials: string | null;
  /** Codes of the table of reasons, or free text. */
  readonly reasons: readonly string[];
  readonly limits: RecordedLimits;
  readonly series: readonly RecordedSeries[];
  readonly recommendation: Recommendation | null;
}
