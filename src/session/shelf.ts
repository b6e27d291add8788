import type { SessionRecord } from '../study/record.js';
import type { NamedRecord } from '../study/record-meant.js';
import type { Finding } from '../study/release-checks.js';
import type { Study } from '../study/study.js';
import type { PresetChoice } from './message.js';
import type { ReportedRecords } from './report-page.js';

/** Two studies beside each other; `words` says in the title which. */
export interface Compared {
  readonly from: Study;
  readonly to: Study;
}

/** All revisions of one preset, in the folders where they were found, newest first. */
export interface ShownRevisions {
  readonly id: string;
  /** Null while they are read. */
  readonly presets: readonly PresetChoice[] | null;
  /** What is wrong with files among them. */
  readonly notes: readonly string[];
}

/** Somebody else released first. */
export interface TakenRevision {
  readonly theirs: Study;
  /** The revision that both started from; null where it is not there any more. */
  readonly base: Study | null;
}

/** A release that is being prepared. Nothing in it comes from settings: whoever releases types it. */
export interface ReleaseForm {
  readonly study: Study;
  /** Id under which it is released. */
  readonly id: string;
  /** Revision that the changes were made from; null where nobody said it yet. 0: there was none. */
  readonly basedOn: number | null;
  readonly role: string;
  readonly secondRole: string;
  readonly reason: string;
  /** What the checks found; null while they run. */
  readonly findings: readonly Finding[] | null;
  /** Why it could not be checked. */
  readonly trouble: string | null;
  /** Newest revision of the site under this id; null where there is none, or the checks still run. */
  readonly newest: Study | null;
  readonly taken: TakenRevision | null;
  /** What was taken over on top of another revision, or stands against it. */
  readonly notes: readonly string[];
}

/** One line of the list of records. */
export interface RecordRow extends NamedRecord {
  readonly file: string;
  readonly line: number;
  readonly id: string;
  readonly revision: number;
  readonly series: number;
  readonly rewritten: number;
}

/** What was met while reading records. */
export interface ReadCounts {
  readonly records: number;
  /** Among those, the ones that were meant. */
  readonly meant: number;
  readonly damaged: number;
  /** Ended by hand before the last record. */
  readonly stopped: boolean;
  /** What could not be read, and the first damaged lines. */
  readonly notes: readonly string[];
}

/** Something that is read from the files of records: a share while it is read, then what was read, or why not. */
export interface Reading<T> {
  readonly ask: number;
  /** 0 to 1, once the reading has taken a while. */
  readonly share: number | null;
  readonly read: T | null;
  readonly trouble: string | null;
}

export interface ReadList extends ReadCounts {
  /** What had been typed when the list was read: fewer words mean more records than are here. */
  readonly typed: string;
  /** Newest first; the newest alone where there are more. */
  readonly rows: readonly RecordRow[];
}

export interface ReadReport extends ReadCounts {
  readonly shown: ReportedRecords;
}

/** What lies outside the session: the site's presets and the records, as the screens show them. */
export interface Shelf {
  /** What narrows the list of presets, and that of records. */
  readonly narrowing: string;
  readonly typed: string;
  readonly revisions: ShownRevisions | null;
  /** A revision that was marked, to compare another one with it. */
  readonly marked: Study | null;
  readonly compared: Compared | null;
  readonly release: ReleaseForm | null;
  readonly list: Reading<ReadList> | null;
  readonly record: Reading<SessionRecord> | null;
  readonly report: Reading<ReadReport> | null;
}

export const emptyShelf: Shelf = {
  narrowing: '',
  typed: '',
  revisions: null,
  marked: null,
  compared: null,
  release: null,
  list: null,
  record: null,
  report: null,
};
