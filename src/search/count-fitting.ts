import type { Pulse } from './control.js';
import type { LineBucket } from './line-buckets.js';
import type { SearchTables } from './search-tables.js';
import type { SignalEntry } from './signal-lists.js';

/** States that RF allows, those of one timing together. */
export function byTiming(entries: readonly SignalEntry[]): SignalEntry[][] {
  const groups = new Map<number, SignalEntry[]>();
  for (const entry of entries) {
    if (entry.state.rfRank === 2) continue;
    const group = groups.get(entry.state.timeId);
    if (group === undefined) groups.set(entry.state.timeId, [entry]);
    else group.push(entry);
  }
  return [...groups.values()];
}

/** Counts the points of a bucket that fit: under each timing the first so many lines, and of those the ones with enough signal. */
export function countFitting(
  { join, shortest, setting }: SearchTables,
  bucket: LineBucket,
  timings: readonly (readonly SignalEntry[])[],
  pulse: Pulse,
): number {
  const before = setting.baseline.model.signalFreeSnr ?? 1;
  const { lineCounts, averaging, multiplicity } = bucket.shape.entries();
  const size = lineCounts.length;
  const snrOf = (i: number) => ((averaging[i] as number) < 0 ? null : bucket.signalFreeSnr(averaging[i] as number));
  const byNoise = Array.from({ length: size }, (_, i) => i).sort((a, b) => (averaging[a] as number) - (averaging[b] as number));
  const noises = Float64Array.from(byNoise, (i) => snrOf(i) ?? -1);
  const sum = new Float64Array(size + 1);
  let fitting = 0;
  for (const states of timings) {
    pulse.beat();
    const { mostLines } = join.times((states[0] as SignalEntry).state, bucket);
    // sum[i]: points of the lines from the i-th weakest on that are in time.
    for (let i = size - 1; i >= 0; i -= 1) {
      const at = byNoise[i] as number;
      sum[i] = (sum[i + 1] as number) + ((lineCounts[at] as number) <= mostLines ? (multiplicity[at] as number) : 0);
    }
    if (sum[0] === 0) continue;
    for (const { state } of states) {
      let from = firstFrom(noises, state.quietFrom * before * (1 - 1e-9));
      // The threshold is right within a billionth: the bands themselves decide what lies that close.
      while (from < size && !join.audibleAt(state, snrOf(byNoise[from] as number))) from += 1;
      const points = sum[from] as number;
      if (points > 0 && shortest.playable(state, bucket)) fitting += points;
    }
  }
  return fitting;
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
