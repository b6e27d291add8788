import type { Pulse } from './control.js';
import type { Front } from './front.js';
import type { LineBucket } from './line-buckets.js';
import { MostByLines } from './most-by-lines.js';
import type { SearchTables } from './search-tables.js';
import type { PlayedTogether, SignalGroup } from './signal-groups.js';
import { joinedPoint, type SignalEntry } from './signal-lists.js';
import type { TimeFamily } from './time-family.js';

/** Lines of all buckets that no other beats in fewer lines and less noise: both rise from one to the next. */
interface Envelope {
  readonly lineCounts: Float64Array;
  readonly signalFreeSnr: Float64Array;
  readonly pointAt: (i: number) => readonly number[];
}

/** Rounding of bounds: never too narrow. */
const slack = 1 + 1e-12;

/** Adds ways to the front of time and SNR: SNR follows voxel and lines by noise alone, so the envelope of all buckets is enough. */
export function addToSnrFront(tables: SearchTables, { buckets, groups }: PlayedTogether, front: Front, pulse: Pulse): void {
  const { join, groups: variables } = tables;
  const { signalFreeBefore: before, targetBefore, contrastBefore } = join;
  if (before === null || targetBefore === null || targetBefore === 0) return;
  const envelope = envelopeOf(buckets);
  const { lineCounts, signalFreeSnr } = envelope;
  if (lineCounts.length === 0) return;
  /** Ways of one group, by time upwards. */
  let times: number[] = [];
  let snrs: number[] = [];
  let found: { readonly entry: SignalEntry; readonly i: number }[] = [];

  const branch = (group: SignalGroup, family: TimeFamily, from: number, to: number): void => {
    pulse.beat();
    const timeS = family.comparedS(lineCounts[from] as number);
    if (timeS === Number.POSITIVE_INFINITY) return;
    const ratio = ((signalFreeSnr[to - 1] as number) / before) * slack;
    const snr = group.target === null ? Number.POSITIVE_INFINITY : (ratio * group.target) / targetBefore;
    const contrast = group.difference === null || contrastBefore === null ? null : (ratio * group.difference) / contrastBefore;
    if (front.beats(timeS, snr) || !join.audible({ snr, contrast })) return;
    if (to - from === 1) {
      form(group.entries, from, timeS);
      return;
    }
    const middle = (from + to) >> 1;
    branch(group, family, from, middle);
    branch(group, family, middle, to);
  };
  /** Entries stand by signal: the first that is audible has the most. */
  const form = (entries: readonly SignalEntry[], i: number, timeS: number): void => {
    for (const entry of entries) {
      pulse.formed += 1;
      const noise = join.noise(entry.state, signalFreeSnr[i] as number);
      if (noise.snr === null) return;
      if (noise.snr <= (snrs.at(-1) ?? Number.NEGATIVE_INFINITY)) return;
      if (!join.audible(noise)) continue;
      times.push(timeS);
      snrs.push(noise.snr);
      found.push({ entry, i });
      return;
    }
  };
  for (const group of groups) {
    branch(group, join.times((group.entries[0] as SignalEntry).state, buckets[0] as LineBucket), 0, lineCounts.length);
    const own = found;
    front.offerAll(times, snrs, (k) => {
      const { entry, i } = own[k] as (typeof own)[number];
      return joinedPoint(variables, envelope.pointAt(i), entry.point);
    });
    if (own.length > 0) [times, snrs, found] = [[], [], []];
  }
}

const room = new MostByLines();

/** Of the buckets of one shape only the one with most signal of its voxel reaches an envelope. */
function envelopeOf(buckets: readonly LineBucket[]): Envelope {
  const strongest = new Map<LineBucket['shape'], LineBucket>();
  for (const bucket of buckets) {
    const held = strongest.get(bucket.shape);
    if (held === undefined || bucket.signalFreeSnr(1) > held.signalFreeSnr(1)) strongest.set(bucket.shape, bucket);
  }
  const some = [...strongest.values()];
  const starts: number[] = [];
  let choices = 0;
  for (const bucket of some) {
    starts.push(choices);
    const { lineCounts, averaging } = bucket.shape.skyline;
    for (let i = 0; i < lineCounts.length; i += 1)
      room.offer(lineCounts[i] as number, bucket.signalFreeSnr(averaging[i] as number), choices + i);
    choices += lineCounts.length;
  }
  const { lineCounts, at } = room.take();
  const which = new Int32Array(choices);
  for (let b = 0; b < some.length; b += 1) which.fill(b, starts[b] as number);
  const bucketAt = (i: number) => some[which[at[i] as number] as number] as LineBucket;
  const choiceAt = (i: number) => (at[i] as number) - (starts[which[at[i] as number] as number] as number);
  const signalFreeSnr = new Float64Array(at.length);
  for (let i = 0; i < at.length; i += 1) {
    const bucket = bucketAt(i);
    signalFreeSnr[i] = bucket.signalFreeSnr(bucket.shape.skyline.averaging[choiceAt(i)] as number);
  }
  return {
    lineCounts,
    signalFreeSnr,
    pointAt: (i) => {
      const bucket = bucketAt(i);
      return bucket.pointAt(bucket.shape.skyline.at[choiceAt(i)] as number);
    },
  };
}
