import type { Parameters } from '../calc/series.js';
import type { Pulse } from './control.js';
import type { Groups } from './groups.js';
import type { LineState, LineTable } from './line-states.js';
import { walkPoints } from './point-walk.js';
import type { SearchSetting } from './setting.js';

/** One choice of the line variables, or several that time and noise cannot tell apart. */
export interface LineEntry {
  readonly lineCount: number;
  readonly signalFreeSnr: number | null;
  /** Changed settings of the first such choice. */
  readonly changes: number;
  /** Choices that are the same to time and noise. */
  readonly multiplicity: number;
  /** The first such choice, a whole point whose shared variables are right. */
  readonly point: readonly number[];
}

/** What is known of a bucket before its entries are formed: never too narrow. */
export interface BucketBound {
  readonly fewestLines: number;
  readonly mostLines: number;
  /** Most SNR without signal that any count of lines from..to can give. */
  readonly noiseWithin: (from: number, to: number) => number;
}

/** Line states that share voxel, averages and train: they differ in lines and noise alone. */
export interface LineBucket {
  readonly train: string;
  /** A point of the bucket, for what its train does to the signal. */
  readonly point: readonly number[];
  /** Parameters of one state: voxel and averages are right for all, carried timing is not. */
  readonly parameters: Parameters;
  readonly volumeMm3: number;
  readonly geometryLoss: number;
  /** By lines upwards, then by SNR downwards. */
  readonly entries: readonly LineEntry[];
  readonly entryCount: number;
  /** Null where the entries are formed already. */
  readonly bound: BucketBound | null;
  /** Lets go of the entries: they are formed anew if asked for. */
  readonly release: () => void;
}

/** Order of entries in a bucket. */
export function compareEntries(a: LineEntry, b: LineEntry): number {
  return a.lineCount - b.lineCount || (b.signalFreeSnr ?? -1) - (a.signalFreeSnr ?? -1);
}

interface Growing extends LineBucket {
  readonly entries: LineEntry[];
  entryCount: number;
}

/**
 * The line states of one choice of the shared variables (which `point` holds), changing at most so many line variables, one entry each.
 * States that break a band or a must-keep are left out.
 */
export function lineBuckets(
  setting: SearchSetting,
  groups: Groups,
  table: LineTable,
  point: number[],
  mostChanges: number,
  pulse: Pulse,
): LineBucket[] {
  const buckets = new Map<string, Growing>();
  walkPoints(setting.variables, groups.lines, mostChanges, point, (changes) => {
    pulse.beat();
    const state = table.stateAt(point);
    if (state === null) return;
    const bucket = bucketOf(buckets, state, point, table.parameters);
    bucket.entries.push({ lineCount: state.lineCount, signalFreeSnr: state.signalFreeSnr, changes, multiplicity: 1, point: [...point] });
    bucket.entryCount += 1;
  });
  for (const { entries } of buckets.values()) entries.sort(compareEntries);
  return [...buckets.values()];
}

function bucketOf(buckets: Map<string, Growing>, state: LineState, point: readonly number[], parameters: Parameters): Growing {
  const known = buckets.get(state.bucket);
  if (known !== undefined) return known;
  const { train, volumeMm3, geometryLoss } = state;
  const bucket = {
    train,
    volumeMm3,
    geometryLoss,
    point: [...point],
    parameters: { ...parameters },
    entries: [],
    entryCount: 0,
    bound: null,
    release: () => {},
  };
  buckets.set(state.bucket, bucket);
  return bucket;
}
