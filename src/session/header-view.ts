import type { ClassKey } from '../calc/classes.js';
import type { GivenParameters } from '../calc/series.js';
import { draftOfHeaders, type HeaderDraft, type SeriesToDraft } from '../headers/draft-of-headers.js';
import type { ReadSeries } from '../headers/read-series.js';
import type { State } from './state.js';

/** What reading a folder gave. Nothing in it names a file: a file may be called after a person. */
export interface HeadersFound {
  readonly series: readonly ReadSeries[];
  readonly files: number;
  /** Files that gave at least one header. */
  readonly read: number;
  readonly passedOver: number;
  /** What could not be read, by kind. */
  readonly notes: readonly string[];
  /** Ended by hand before the last file. */
  readonly isStopped: boolean;
}

/** What the screens of headers show, and what a person did there. */
export interface HeaderView {
  /** The path as it was typed last; shown nowhere but where it is typed. */
  readonly path: string;
  /** A reading that runs: files so far, once it has taken a while. */
  readonly reading: { readonly files: number | null } | null;
  readonly found: HeadersFound | null;
  readonly picked: readonly string[];
  readonly typed: Readonly<Record<string, GivenParameters>>;
  /** Field of the draft that a person typed, T. */
  readonly fieldT: number | null;
  /** The series that is reviewed. */
  readonly seriesId: string;
}

/** What the screens of headers ask of the world outside. */
export type HeaderEffect =
  | { readonly kind: 'read-headers'; readonly ask: number; readonly path: string }
  /** Reads a series as of another class; null: of the one that its headers say. */
  | { readonly kind: 'class-headers'; readonly ask: number; readonly id: string; readonly key: ClassKey | null }
  /** Ends the reading that runs; it answers with what it has. */
  | { readonly kind: 'stop-headers' };

/** What comes back. */
export type HeaderAnswer =
  | { readonly kind: 'headers'; readonly found: HeadersFound }
  | { readonly kind: 'header-series'; readonly series: ReadSeries };

/** The kinds of asks of these screens, as `State.open` names them. */
export type HeaderAsk = 'headers' | 'headerClass';

export const emptyHeaderView: HeaderView = { path: '', reading: null, found: null, picked: [], typed: {}, fieldT: null, seriesId: '' };

/** Every series that was read, with what was typed for it. */
export function seriesRead({ found, typed }: HeaderView): readonly SeriesToDraft[] {
  return (found?.series ?? []).map((read) => ({ read, typed: typed[read.id] ?? {} }));
}

/** The series that the hand is on, in the list or in its review. */
export function seriesHere({ headers, place }: State): SeriesToDraft | undefined {
  const all = seriesRead(headers);
  const id = place.screen === 'headers' ? place.fields.headers : headers.seriesId;
  return all.find(({ read }) => read.id === id) ?? all[0];
}

/** Drafts by what they are made from: they are asked for with every frame. */
const drafts = new WeakMap<HeaderView, HeaderDraft>();

/** The draft of the series that are picked. */
export function headerDraft(view: HeaderView): HeaderDraft {
  const known = drafts.get(view);
  if (known !== undefined) return known;
  const picked = new Set(view.picked);
  const draft = draftOfHeaders(
    seriesRead(view).filter(({ read }) => picked.has(read.id)),
    view.fieldT ?? undefined,
  );
  drafts.set(view, draft);
  return draft;
}

/** Picked series that the draft leaves out, each with why. */
export function leftOutWords(view: HeaderView): readonly string[] {
  const { study, leftOut } = headerDraft(view);
  const beyond = view.picked.length - leftOut.length - (study?.series.length ?? 0);
  return [
    ...leftOut.map(({ id, why }) => `${id} is left out: ${why}`),
    ...(study === null || beyond === 0 ? [] : [`${beyond} more are left out: a preset holds ${study.series.length}`]),
  ];
}
