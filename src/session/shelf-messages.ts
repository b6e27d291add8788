import type { SessionRecord } from '../study/record.js';
import type { Finding } from '../study/release-checks.js';
import type { Release, Study } from '../study/study.js';
import type { PresetChoice } from './message.js';
import type { ReadList, ReadReport, TakenRevision } from './shelf.js';

/** What the screens of presets and records ask of the world outside. */
export type ShelfEffect =
  /** Reads the list of presets anew: others release too. It answers by the message that brings them at the start. */
  | { readonly kind: 'list-presets' }
  | { readonly kind: 'read-revisions'; readonly ask: number; readonly id: string }
  | { readonly kind: 'check-release'; readonly ask: number; readonly study: Study }
  /** `study` is what is released, `basedOn` the revision it was made from. */
  | {
      readonly kind: 'release';
      readonly ask: number;
      readonly study: Study;
      readonly basedOn: number;
      readonly said: Omit<Release, 'day'>;
    }
  | { readonly kind: 'list-records'; readonly ask: number; readonly typed: string }
  | { readonly kind: 'report-records'; readonly ask: number; readonly typed: string }
  | { readonly kind: 'read-record'; readonly ask: number; readonly file: string; readonly line: number }
  /** Ends the reading of records that runs; it answers with what it has. */
  | { readonly kind: 'stop-reading' };

/** What comes back. */
export type ShelfAnswer =
  | { readonly kind: 'revisions'; readonly presets: readonly PresetChoice[]; readonly notes: readonly string[] }
  | { readonly kind: 'checked'; readonly findings: readonly Finding[]; readonly newest: Study | null }
  | { readonly kind: 'released'; readonly study: Study; readonly path: string }
  | ({ readonly kind: 'taken' } & TakenRevision)
  | { readonly kind: 'record-list'; readonly list: ReadList }
  | { readonly kind: 'record-report'; readonly report: ReadReport }
  | { readonly kind: 'one-record'; readonly record: SessionRecord };

/** The kinds of asks of these screens, as `State.open` names them. */
export const shelfAsks = ['revisions', 'checks', 'release', 'list', 'one-record', 'report'] as const;
export type ShelfAsk = (typeof shelfAsks)[number];
