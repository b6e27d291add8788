import type { Pulse } from './control.js';
import { Front } from './front.js';
import type { BucketBound, LineBucket, LineEntry } from './line-buckets.js';
import { countPoints, walkPoints } from './point-walk.js';
import type { SearchTables } from './search-tables.js';
import { joinedPoint, type SignalEntry, SignalLists, undominated } from './signal-lists.js';
import type { SignalState } from './signal-states.js';
import { WholeLines } from './whole-lines.js';

/** What is known of all points of a lattice together. */
export interface WholeLattice {
  /** Least time against most SNR, and against least balanced loss: within the bands and RF caps, whatever the time limits. */
  readonly timeSnr: Front;
  readonly timeLoss: Front;
  /** Points that fit or are too close; null where counting them would take too long. */
  readonly fitting: number | null;
  /** Point within the bands that is over its limits by the smallest ratio (or within them); null where none is within the bands. */
  readonly nearest: { readonly point: readonly number[]; readonly excess: number; readonly loss: number } | null;
}

/** Pairs of a bucket and a signal state, and entries of buckets, beyond which fitting points are not counted. */
const mostPairs = 2e6;
const mostEntries = 2e6;

/** Stretches of lines narrower than this are formed rather than bounded. */
const narrowest = 1.03;

/** What is asked of a whole lattice. */
export interface WholeParts {
  readonly fronts: boolean;
  readonly nearest: boolean;
  readonly count: boolean;
}

/** Goes over the whole lattice: fronts by branch and bound over lines within each pair of bucket and signal state, the count by sorting. */
export class WholeLatticeSearch {
  readonly timeSnr = new Front(1);
  readonly timeLoss = new Front(-1);
  #fitting = 0;
  #counted = true;
  readonly #lines: WholeLines;
  #nearest: { point: readonly number[]; excess: number; loss: number } | null = null;

  constructor(
    private readonly tables: SearchTables,
    private readonly pulse: Pulse,
    private readonly parts: WholeParts = { fronts: true, nearest: true, count: true },
    boundedFrom?: number,
  ) {
    this.#lines = new WholeLines(tables.setting, tables.groups, tables.lines, pulse, boundedFrom);
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
    const trains = new Map<string, { readonly best: readonly SignalEntry[]; readonly timed: readonly (readonly SignalEntry[])[] }>();
    const buckets = bothEndsFirst(this.#lines.buckets(point));
    if (this.parts.count && this.#counted) this.#counted = this.#canCount(buckets, lists, rounds);
    for (const [i, bucket] of buckets.entries()) {
      if (i > 0 && i % 16 === 0) report(i / buckets.length);
      const entries = lists.of(bucket);
      let train = trains.get(bucket.train);
      if (train === undefined) {
        train = { best: undominated(entries), timed: byTiming(entries) };
        trains.set(bucket.train, train);
      }
      if (this.parts.fronts) this.#fronts(bucket, train.best);
      if (this.parts.nearest) this.#seekNearest(bucket, entries);
      if (this.parts.count && this.#counted) this.#count(bucket, train.timed);
      bucket.release();
    }
    join.forget();
  }

  /** Whether counting stays within bounds, judged by the first choice of the shared variables. */
  #canCount(buckets: readonly LineBucket[], lists: SignalLists, rounds: number): boolean {
    const first = buckets[0];
    if (first === undefined) return true;
    const entries = buckets.reduce((sum, { entryCount }) => sum + entryCount, 0);
    return buckets.length * lists.of(first).length * rounds <= mostPairs && entries * rounds <= mostEntries;
  }

  #fronts(bucket: LineBucket, signals: readonly SignalEntry[]): void {
    let line: readonly LineEntry[] | null = null;
    for (const signal of signals) {
      this.pulse.beat();
      const { state } = signal;
      if (
        bucket.bound !== null &&
        line === null &&
        this.#beaten(bucket, bucket.bound, state, bucket.bound.fewestLines, bucket.bound.mostLines)
      )
        continue;
      if (!this.tables.signals.playable(state, bucket)) continue;
      line ??= skyline(bucket);
      if (line.length > 0) this.#branch(bucket, signal, line, 0, line.length);
    }
  }

  /** True when both fronts already beat whatever from..to lines of a bucket can give: then its entries need not be formed. */
  #beaten(bucket: LineBucket, bound: BucketBound, state: SignalState, from: number, to: number): boolean {
    const { join } = this.tables;
    const time = join.time(state, bucket, Math.floor(from));
    if (!time.kept) return true;
    const noise = join.noise(state, bound.noiseWithin(from, to));
    if (!join.audible(noise)) return true;
    const loss = join.loss(bucket, state, noise);
    if ((noise.snr === null || this.timeSnr.beats(time.timeS, noise.snr)) && this.timeLoss.beats(time.timeS, loss)) return true;
    if (to / from < narrowest) return false;
    const middle = Math.sqrt(from * to);
    return this.#beaten(bucket, bound, state, middle, to) && this.#beaten(bucket, bound, state, from, middle);
  }

  /** Offers the ways of lines from..to of a bucket to both fronts; leaves out stretches that both fronts already beat. */
  #branch(bucket: LineBucket, signal: SignalEntry, line: readonly LineEntry[], from: number, to: number): void {
    const { join, groups } = this.tables;
    const { state } = signal;
    const first = line[from] as LineEntry;
    const last = line[to - 1] as LineEntry;
    const time = join.time(state, bucket, first.lineCount);
    if (!time.kept) return;
    // Least time stands at one end, least noise at the other.
    const noise = join.noise(state, last.signalFreeSnr);
    if (!join.audible(noise)) return;
    const loss = join.loss(bucket, state, noise);
    if ((noise.snr === null || this.timeSnr.beats(time.timeS, noise.snr)) && this.timeLoss.beats(time.timeS, loss)) return;
    if (to - from === 1) {
      this.pulse.formed += 1;
      const pointOf = () => joinedPoint(groups, first.point, signal.point);
      if (noise.snr !== null) this.timeSnr.offer(time.timeS, noise.snr, pointOf);
      this.timeLoss.offer(time.timeS, loss, pointOf);
      return;
    }
    const middle = (from + to) >> 1;
    this.#branch(bucket, signal, line, middle, to);
    this.#branch(bucket, signal, line, from, middle);
  }

  /** The fewest lines that keep within the noise bands are nearest to every time limit. */
  #seekNearest(bucket: LineBucket, entries: readonly SignalEntry[]): void {
    const { join, groups, signals } = this.tables;
    let line: readonly LineEntry[] | null = null;
    for (const signal of entries) {
      const { state } = signal;
      const held = this.#nearest;
      if (held !== null && state.rfExcess > held.excess) continue;
      if (
        bucket.bound !== null &&
        line === null &&
        held !== null &&
        join.time(state, bucket, Math.floor(bucket.bound.fewestLines)).excess > held.excess
      )
        continue;
      line ??= skyline(bucket);
      const entry = line[firstAudible(line, ({ signalFreeSnr }) => join.audibleAt(state, signalFreeSnr))];
      if (entry === undefined) continue;
      const time = join.time(state, bucket, entry.lineCount);
      if (!time.kept) continue;
      const excess = Math.max(time.excess, state.rfExcess);
      if (held !== null && excess > held.excess) continue;
      const loss = join.loss(bucket, state, join.noise(state, entry.signalFreeSnr));
      if (held !== null && excess === held.excess && loss >= held.loss) continue;
      if (signals.playable(state, bucket)) this.#nearest = { excess, loss, point: joinedPoint(groups, entry.point, signal.point) };
    }
  }

  /** Counts the points of a bucket that fit: under each timing the first so many lines, and of those the ones with enough signal. */
  #count(bucket: LineBucket, byTime: readonly (readonly SignalEntry[])[]): void {
    const { join, signals, setting } = this.tables;
    const { entries } = bucket;
    const before = setting.baseline.model.signalFreeSnr ?? 1;
    const byNoise = entries.map((_, i) => i).sort((a, b) => noiseOf(entries[a]) - noiseOf(entries[b]));
    const noises = Float64Array.from(byNoise, (i) => noiseOf(entries[i]));
    const sum = new Float64Array(entries.length + 1);
    for (const states of byTime) {
      this.pulse.beat();
      const first = (states[0] as SignalEntry).state;
      const within = firstAudible(entries, ({ lineCount }) => {
        const time = join.time(first, bucket, lineCount);
        return time.rank === 2 || !time.kept;
      });
      if (within === 0) continue;
      // sum[i]: points of the lines from the i-th weakest on that are in time.
      for (let i = entries.length - 1; i >= 0; i -= 1) {
        const at = byNoise[i] as number;
        sum[i] = (sum[i + 1] as number) + (at < within ? (entries[at] as LineEntry).multiplicity : 0);
      }
      for (const { state } of states) {
        let from = firstFrom(noises, state.quietFrom * before * (1 - 1e-9));
        // The threshold is right within a billionth: the bands themselves decide what lies that close.
        while (from < entries.length && !join.audibleAt(state, (entries[byNoise[from] as number] as LineEntry).signalFreeSnr)) from += 1;
        const points = sum[from] as number;
        if (points > 0 && signals.playable(state, bucket)) this.#fitting += points;
      }
    }
  }
}

function noiseOf(entry: LineEntry | undefined): number {
  return entry?.signalFreeSnr ?? -1;
}

/** Index of the first of ascending numbers that is at least `least`. */
function firstFrom(numbers: Float64Array, least: number): number {
  let low = 0;
  let high = numbers.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((numbers[middle] as number) >= least) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** States that RF allows, those of one timing together. */
function byTiming(entries: readonly SignalEntry[]): SignalEntry[][] {
  const groups = new Map<number, SignalEntry[]>();
  for (const entry of entries) {
    if (entry.state.rfRank === 2) continue;
    const group = groups.get(entry.state.timeId);
    if (group === undefined) groups.set(entry.state.timeId, [entry]);
    else group.push(entry);
  }
  return [...groups.values()];
}

/** Entries that no other of the bucket beats in lines and noise, fewest lines first, so least SNR first. */
function skyline({ entries }: LineBucket): LineEntry[] {
  const kept: LineEntry[] = [];
  let best = Number.NEGATIVE_INFINITY;
  for (const entry of entries) {
    const snr = entry.signalFreeSnr ?? -1;
    if (snr <= best) continue;
    kept.push(entry);
    best = snr;
  }
  return kept;
}

/** Index of the first entry for which a test holds that, once true, stays true; the length where it never does. */
function firstAudible(entries: readonly LineEntry[], test: (entry: LineEntry) => boolean): number {
  let low = 0;
  let high = entries.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (test(entries[middle] as LineEntry)) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** Buckets in an order that builds good fronts early: least loss of geometry and most signal in turns. */
function bothEndsFirst(buckets: readonly LineBucket[]): LineBucket[] {
  const byLoss = [...buckets].sort((a, b) => a.geometryLoss - b.geometryLoss);
  const bySignal = [...buckets].sort((a, b) => b.volumeMm3 - a.volumeMm3);
  return [...new Set(byLoss.flatMap((bucket, i) => [bucket, bySignal[i] as LineBucket]))];
}
