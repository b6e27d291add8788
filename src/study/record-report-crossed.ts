import type { RecordedSeries, SessionRecord } from './record.js';
import { type CountedWord, Tally } from './record-report-tally.js';

/** Breaches that are named; more are only counted. */
const mostNamed = 20;

/** One must-keep that was crossed in one session. */
export interface Breach {
  readonly record: string;
  readonly day: string | null;
  readonly revision: number;
  readonly rule: string;
  /** Blank: NO REASON GIVEN. */
  readonly reason: string;
  /** Who accepted it; null: nobody. */
  readonly role: string | null;
}

/** Must-keeps crossed in one series, over all records. */
export interface CrossedReport {
  readonly times: number;
  readonly withReason: number;
  /** Accepted by a named role. */
  readonly withRole: number;
  readonly rules: readonly CountedWord[];
  /** The first twenty, those without reason or role before the others. */
  readonly breaches: readonly Breach[];
}

/** Crossed must-keeps of one series, counted. */
export class CrossedCounts {
  private times = 0;
  private withReason = 0;
  private withRole = 0;
  private readonly rules = new Tally();
  private readonly open: Breach[] = [];
  private readonly accounted: Breach[] = [];

  add(record: SessionRecord, { crossed }: RecordedSeries, reason: string): void {
    for (const { rule, role } of crossed) {
      const named = role !== null && role.trim() !== '';
      const reasoned = reason.trim() !== '';
      this.times += 1;
      if (named) this.withRole += 1;
      if (reasoned) this.withReason += 1;
      this.rules.add(rule);
      const list = named && reasoned ? this.accounted : this.open;
      if (list.length >= mostNamed) continue;
      list.push({ record: record.id, day: record.day, revision: record.preset.revision, rule, reason, role: named ? role : null });
    }
  }

  report(): CrossedReport {
    const { times, withReason, withRole } = this;
    return { times, withReason, withRole, rules: this.rules.sorted(), breaches: [...this.open, ...this.accounted].slice(0, mostNamed) };
  }
}
