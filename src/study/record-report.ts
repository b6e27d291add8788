import type { SessionRecord } from './record.js';
import { SeriesCounts, type SeriesReport } from './record-report-series.js';
import { type CountedWord, Tally } from './record-report-tally.js';

/** Sessions that started from one revision of a preset. */
export interface RevisionCount {
  readonly revision: number;
  readonly sessions: number;
}

/** What the records say of one preset. */
export interface PresetReport {
  readonly preset: string;
  readonly region: string;
  readonly fieldT: number;
  readonly sessions: number;
  /** Days, YYYY-MM-DD; null where no record of it names one. */
  readonly from: string | null;
  readonly to: string | null;
  /** Rising. */
  readonly revisions: readonly RevisionCount[];
  readonly roles: readonly CountedWord[];
  readonly series: readonly SeriesReport[];
}

/** What a stream of records says. */
export interface RecordReport {
  readonly sessions: number;
  readonly from: string | null;
  readonly to: string | null;
  /** Sessions whose record names no day. */
  readonly withoutDay: number;
  /** Most sessions first. */
  readonly presets: readonly PresetReport[];
  /** Sessions of further presets, and series of further names, that were not counted apart. */
  readonly leftOut: { readonly sessions: number; readonly series: number };
}

/** Bounds on what is counted apart, so that no file can fill the memory. */
const mostPresets = 500;
const mostSeries = 200;
const mostRevisions = 2000;

interface PresetCounts {
  readonly region: string;
  readonly fieldT: number;
  sessions: number;
  from: string | null;
  to: string | null;
  readonly revisions: Map<number, number>;
  readonly roles: Tally;
  readonly series: Map<string, SeriesCounts>;
}

/**
 * Counts records one by one; memory does not grow with their number. Medians come from counts per step.
 *
 * @example const counts = new RecordCounts(); counts.add(record); counts.report().sessions //=> 1
 */
export class RecordCounts {
  private readonly presets = new Map<string, PresetCounts>();
  private sessions = 0;
  private withoutDay = 0;
  private readonly leftOut = { sessions: 0, series: 0 };

  add(record: SessionRecord): void {
    this.sessions += 1;
    if (record.day === null) this.withoutDay += 1;
    const counts = this.countsOf(record);
    if (counts === null) {
      this.leftOut.sessions += 1;
      return;
    }
    counts.sessions += 1;
    if (record.day !== null) {
      if (counts.from === null || record.day < counts.from) counts.from = record.day;
      if (counts.to === null || record.day > counts.to) counts.to = record.day;
    }
    const { revision } = record.preset;
    const before = counts.revisions.get(revision);
    if (before !== undefined || counts.revisions.size < mostRevisions) counts.revisions.set(revision, (before ?? 0) + 1);
    counts.roles.add(record.role);
    for (const series of record.series) {
      let known = counts.series.get(series.id);
      if (known === undefined) {
        if (counts.series.size >= mostSeries) {
          this.leftOut.series += 1;
          continue;
        }
        known = new SeriesCounts(series.id);
        counts.series.set(series.id, known);
      }
      known.add(record, series);
    }
  }

  report(): RecordReport {
    const presets = [...this.presets].map(([preset, counts]): PresetReport => {
      const revisions = [...counts.revisions].map(([revision, sessions]) => ({ revision, sessions }));
      return {
        preset,
        region: counts.region,
        fieldT: counts.fieldT,
        sessions: counts.sessions,
        from: counts.from,
        to: counts.to,
        revisions: revisions.sort((a, b) => a.revision - b.revision),
        roles: counts.roles.sorted(),
        series: [...counts.series.values()].map((series) => series.report()),
      };
    });
    presets.sort((a, b) => b.sessions - a.sessions || (a.preset < b.preset ? -1 : 1));
    const days = presets.flatMap(({ from, to }) => (from === null || to === null ? [] : [from, to])).sort();
    return {
      sessions: this.sessions,
      from: days[0] ?? null,
      to: days.at(-1) ?? null,
      withoutDay: this.withoutDay,
      presets,
      leftOut: this.leftOut,
    };
  }

  private countsOf({ preset, region, fieldT }: SessionRecord): PresetCounts | null {
    const known = this.presets.get(preset.id);
    if (known !== undefined) return known;
    if (this.presets.size >= mostPresets) return null;
    const counts: PresetCounts = {
      region,
      fieldT,
      sessions: 0,
      from: null,
      to: null,
      revisions: new Map(),
      roles: new Tally(),
      series: new Map(),
    };
    this.presets.set(preset.id, counts);
    return counts;
  }
}

/**
 * The revisions in words, against the current one.
 *
 * @example revisionWords([{ revision: 2, sessions: 8 }, { revision: 3, sessions: 32 }], 3) //=> '8 from rev 2, current rev 3 (32 sessions)'
 */
export function revisionWords(revisions: readonly RevisionCount[], current: number | null): string {
  const newest = current ?? Math.max(...revisions.map(({ revision }) => revision));
  const others = revisions
    .filter(({ revision }) => revision !== newest)
    .map(({ revision, sessions }) => `${sessions} from rev ${revision}`);
  const own = revisions.find(({ revision }) => revision === newest)?.sessions ?? 0;
  const words = current === null ? 'newest seen rev' : 'current rev';
  return [...others, `${words} ${newest} (${own} ${own === 1 ? 'session' : 'sessions'})`].join(', ');
}
