import type { LineBucket } from './line-buckets.js';
import type { SearchTables } from './search-tables.js';
import { joinedPoint, type SignalEntry } from './signal-lists.js';

/** A point within its bands, and how far over its limits it is. */
export interface NearestWay {
  readonly point: readonly number[];
  /** Largest value over its limit. */
  readonly excess: number;
  readonly loss: number;
}

/** The nearer of a way and of those of a bucket: the fewest lines that keep within the noise bands are nearest to every time limit. */
export function nearerWay(
  { join, groups, shortest }: SearchTables,
  bucket: LineBucket,
  entries: readonly SignalEntry[],
  before: NearestWay | null,
): NearestWay | null {
  const { skyline, unknown } = bucket.shape;
  const { lineCounts, averaging, at } = skyline;
  let held = before;
  const offer = (signal: SignalEntry, lineCount: number, signalFreeSnr: number | null, which: number) => {
    const { state } = signal;
    const time = join.times(state, bucket).at(lineCount);
    if (!time.kept) return;
    const excess = Math.max(time.excess, state.rfExcess);
    if (held !== null && excess > held.excess) return;
    const loss = join.loss(bucket, state, join.noise(state, signalFreeSnr));
    if (held !== null && excess === held.excess && loss >= held.loss) return;
    if (shortest.playable(state, bucket)) held = { excess, loss, point: joinedPoint(groups, bucket.pointAt(which), signal.point) };
  };
  for (const signal of entries) {
    const { state } = signal;
    if (held !== null && state.rfExcess > held.excess) continue;
    // Without bands of noise, lines whose noise is not known are ways too.
    if (unknown !== null && join.noiseBands.length === 0) offer(signal, unknown.lineCount, null, unknown.at);
    let low = 0;
    let high = lineCounts.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (join.audibleAt(state, bucket.signalFreeSnr(averaging[middle] as number))) high = middle;
      else low = middle + 1;
    }
    if (low < lineCounts.length)
      offer(signal, lineCounts[low] as number, bucket.signalFreeSnr(averaging[low] as number), at[low] as number);
  }
  return held;
}
