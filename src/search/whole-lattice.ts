import type { Pulse } from './control.js';
import { Front } from './front.js';
import { type LineBucket, type LineEntry, lineBuckets } from './line-buckets.js';
import { countPoints, walkPoints } from './point-walk.js';
import type { SearchTables } from './search-tables.js';
import { joinedPoint, type SignalEntry, SignalLists, undominated } from './signal-lists.js';

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

/** Pairs of a bucket and a signal state beyond which fitting points are not counted. */
const mostPairs = 3e7;

/** Goes over the whole lattice: fronts by branch and bound over lines within each pair of bucket and signal state, the count by sorting. */
export class WholeLatticeSearch {
  readonly timeSnr = new Front(1);
  readonly timeLoss = new Front(-1);
  #fitting = 0;
  #counted = true;
  #pairs = 0;
  #nearest: { point: readonly number[]; excess: number; loss: number } | null = null;

  constructor(
    private readonly tables: SearchTables,
    private readonly pulse: Pulse,
    private readonly parts: 'all' | 'nearest alone' | 'fronts alone' = 'all',
  ) {}

  result(): WholeLattice {
    return { timeSnr: this.timeSnr, timeLoss: this.timeLoss, fitting: this.#counted ? this.#fitting : null, nearest: this.#nearest };
  }

  /** Runs to the end, or throws `SearchStopped`; what was found until then stays. */
  run(): void {
    const { setting, groups } = this.tables;
    const point = setting.variables.map(() => 0);
    const all = setting.variables.length;
    const rounds = countPoints(setting.variables, groups.shared, all);
    let done = 0;
    walkPoints(setting.variables, groups.shared, all, point, () => {
      this.#sharedPoint(point);
      done += 1;
      this.pulse.report(done / rounds);
    });
  }

  #sharedPoint(point: number[]): void {
    const { setting, groups, lines, signals, join } = this.tables;
    const all = setting.variables.length;
    const buckets = lineBuckets(setting, groups, lines, point, all, 'lines and noise', this.pulse);
    const lists = new SignalLists(setting, groups, signals, all, this.pulse);
    const reduced = new Map<string, SignalEntry[]>();
    for (const bucket of buckets) {
      const entries = lists.of(bucket);
      if (this.parts === 'nearest alone') {
        for (const signal of entries) this.#seekNearest(bucket, signal, skyline(bucket));
        continue;
      }
      let best = reduced.get(bucket.train);
      if (best === undefined) {
        best = undominated(entries);
        reduced.set(bucket.train, best);
      }
      const line = skyline(bucket);
      for (const signal of best) {
        this.pulse.beat();
        if (signals.playable(signal.state, bucket.train, bucket.parameters)) this.#branch(bucket, signal, line, 0, line.length);
      }
      if (this.parts === 'fronts alone') continue;
      for (const signal of entries) this.#seekNearest(bucket, signal, line);
      this.#count(bucket, entries);
    }
    join.forget();
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
  #seekNearest(bucket: LineBucket, signal: SignalEntry, line: readonly LineEntry[]): void {
    const { join, groups, signals } = this.tables;
    const { state } = signal;
    if (this.#nearest !== null && state.rfExcess > this.#nearest.excess) return;
    const at = firstAudible(line, (entry) => join.audible(join.noise(state, entry.signalFreeSnr)));
    const entry = line[at];
    if (entry === undefined) return;
    const time = join.time(state, bucket, entry.lineCount);
    if (!time.kept) return;
    const excess = Math.max(time.excess, state.rfExcess);
    if (this.#nearest !== null && excess > this.#nearest.excess) return;
    const loss = join.loss(bucket, state, join.noise(state, entry.signalFreeSnr));
    if (this.#nearest !== null && excess === this.#nearest.excess && loss >= this.#nearest.loss) return;
    if (!signals.playable(state, bucket.train, bucket.parameters)) return;
    this.#nearest = { excess, loss, point: joinedPoint(groups, entry.point, signal.point) };
  }

  /** Counts the points of a bucket that fit: under each timing the first so many lines, and of those the ones with enough signal. */
  #count(bucket: LineBucket, signals: readonly SignalEntry[]): void {
    if (!this.#counted) return;
    this.#pairs += signals.length;
    if (this.#pairs > mostPairs) {
      this.#counted = false;
      return;
    }
    const { join, signals: table } = this.tables;
    const { entries } = bucket;
    const byNoise = entries
      .map((_, i) => i)
      .sort((a, b) => ((entries[a] as LineEntry).signalFreeSnr ?? -1) - ((entries[b] as LineEntry).signalFreeSnr ?? -1));
    const ordered = byNoise.map((i) => entries[i] as LineEntry);
    const sums = new Map<string, Float64Array>();
    for (const { state } of signals) {
      this.pulse.beat();
      if (state.rfRank === 2) continue;
      let sum = sums.get(state.timeKey);
      if (sum === undefined) {
        const within = firstAudible(entries, ({ lineCount }) => {
          const time = join.time(state, bucket, lineCount);
          return time.rank === 2 || !time.kept;
        });
        // sum[i]: points of the lines from the i-th weakest on that are in time.
        sum = new Float64Array(entries.length + 1);
        for (let i = entries.length - 1; i >= 0; i -= 1) {
          const at = byNoise[i] as number;
          sum[i] = (sum[i + 1] as number) + (at < within ? (entries[at] as LineEntry).multiplicity : 0);
        }
        sums.set(state.timeKey, sum);
      }
      if (sum[0] === 0) continue;
      const from = firstAudible(ordered, (entry) => join.audible(join.noise(state, entry.signalFreeSnr)));
      const points = sum[from] as number;
      if (points > 0 && table.playable(state, bucket.train, bucket.parameters)) this.#fitting += points;
    }
  }
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
