import type { Pulse } from './control.js';
import { byTiming, countFitting } from './count-fitting.js';
import { Front } from './front.js';
import type { LineBucket } from './line-buckets.js';
import { addToLossFront } from './loss-front.js';
import { type NearestWay, nearerWay } from './nearest-way.js';
import { countPoints, walkPoints } from './point-walk.js';
import type { SearchTables } from './search-tables.js';
import { bucketFamilies } from './signal-groups.js';
import { type SignalEntry, SignalLists } from './signal-lists.js';
import { addToSnrFront } from './snr-front.js';
import { WholeLines } from './whole-lines.js';

/** What is known of all points of a lattice together. */
export interface WholeLattice {
  /** Least time against most SNR, and against least balanced loss: within the bands and RF caps, whatever the time limits. */
  readonly timeSnr: Front;
  readonly timeLoss: Front;
  /** Points that fit or are too close; null where counting them would take too long. */
  readonly fitting: number | null;
  /** Point within the bands that is over its limits by the smallest ratio (or within them); null where none is within the bands. */
  readonly nearest: NearestWay | null;
}

/** Pairs of a bucket and a signal state, and entries of buckets, beyond which fitting points are not counted. */
const mostPairs = 2e6;
const mostEntries = 2e6;

/** What is asked of a whole lattice. */
export interface WholeParts {
  readonly fronts: boolean;
  readonly nearest: boolean;
  readonly count: boolean;
}

/** Goes over the whole lattice: fronts by branch and bound over lines and buckets, the count by sorting. */
export class WholeLatticeSearch {
  readonly timeSnr = new Front(1);
  readonly timeLoss = new Front(-1);
  #fitting = 0;
  #counted = true;
  readonly #lines: WholeLines;
  #nearest: NearestWay | null = null;

  constructor(
    private readonly tables: SearchTables,
    private readonly pulse: Pulse,
    private readonly parts: WholeParts = { fronts: true, nearest: true, count: true },
  ) {
    this.#lines = new WholeLines(tables.setting, tables.groups, tables.lines, pulse);
  }

  result(): WholeLattice {
    return {
      timeSnr: this.timeSnr,
      timeLoss: this.timeLoss,
      fitting: this.parts.count && this.#counted ? this.#fitting : null,
      nearest: this.#nearest,
    };
  }

  /** Runs to the end, or throws `SearchStopped`; what was found until then stays. */
  run(): void {
    this.tables.signals.keepsOver = this.parts.nearest;
    const { setting, groups } = this.tables;
    const point = setting.variables.map(() => 0);
    const all = setting.variables.length;
    const rounds = countPoints(setting.variables, groups.shared, all);
    let done = 0;
    walkPoints(setting.variables, groups.shared, all, point, () => {
      this.#sharedPoint(point, rounds, (share) => {
        this.pulse.report((done + share) / rounds);
      });
      done += 1;
      this.pulse.report(done / rounds);
    });
  }

  #sharedPoint(point: number[], rounds: number, report: (share: number) => void): void {
    const { setting, groups, signals, join } = this.tables;
    const lists = new SignalLists(setting, groups, signals, setting.variables.length, this.pulse);
    const buckets = this.#lines.buckets(point);
    if (this.parts.count && this.#counted) this.#counted = this.#canCount(buckets, lists, rounds);
    if (this.parts.fronts) this.#fronts(buckets, lists, report);
    const done = this.parts.fronts ? 0.5 : 0;
    const timings = new Map<string, readonly (readonly SignalEntry[])[]>();
    for (const [i, bucket] of buckets.entries()) {
      if (!this.parts.nearest && !(this.parts.count && this.#counted)) break;
      if (i > 0 && i % 16 === 0) report(done + ((1 - done) * i) / buckets.length);
      const entries = lists.of(bucket);
      if (this.parts.nearest) this.#nearest = nearerWay(this.tables, bucket, entries, this.#nearest);
      if (!this.parts.count || !this.#counted) continue;
      const known = timings.get(bucket.train) ?? byTiming(entries);
      timings.set(bucket.train, known);
      this.#fitting += countFitting(this.tables, bucket, known, this.pulse);
    }
    join.forget();
  }

  #fronts(buckets: readonly LineBucket[], lists: SignalLists, report: (share: number) => void): void {
    const alone = !this.parts.nearest && !(this.parts.count && this.#counted);
    const families = bucketFamilies(this.tables, buckets, (bucket) => (alone ? lists.best(bucket) : lists.of(bucket)));
    for (const [i, { classes, envelopes }] of families.entries()) {
      // Half of the work where the nearest way or the count is asked for too.
      report((i / families.length) * (alone ? 1 : 0.5));
      for (const one of envelopes) addToSnrFront(this.tables, one, this.timeSnr, this.pulse);
      for (const one of classes) addToLossFront(this.tables, one, this.timeLoss, this.pulse);
    }
  }

  /** Whether counting stays within bounds, judged by the first choice of the shared variables. */
  #canCount(buckets: readonly LineBucket[], lists: SignalLists, rounds: number): boolean {
    const first = buckets[0];
    if (first === undefined) return true;
    const entries = buckets.reduce((sum, { shape }) => sum + shape.size, 0);
    return buckets.length * lists.of(first).length * rounds <= mostPairs && entries * rounds <= mostEntries;
  }
}
