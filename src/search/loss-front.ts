import { addLosses, noiseLoss } from './balanced-loss.js';
import { type BucketNode, mostOfBins, treeOf } from './bucket-tree.js';
import type { Pulse } from './control.js';
import type { Front } from './front.js';
import type { JoinedNoise } from './join.js';
import { fewestOfBin } from './line-bins.js';
import type { LineBucket } from './line-buckets.js';
import type { SearchTables } from './search-tables.js';
import type { PlayedTogether, SignalGroup } from './signal-groups.js';
import { joinedPoint, type SignalEntry } from './signal-lists.js';
import type { TimeFamily } from './time-family.js';

/** Rounding of bounds: never too narrow. */
const slack = 1 + 1e-12;
/** Bins of lines that are gone through together before buckets are told apart. */
const fewBins = 8;

/**
 * Adds the ways of a class to the front of time and balanced loss. Buckets stand in a tree by loss of geometry: stretches of lines of many buckets
 * are left out together where the front beats their least time with their least loss and least noise.
 */
export function addToLossFront(tables: SearchTables, { buckets, groups }: PlayedTogether, front: Front, pulse: Pulse): void {
  const { join, groups: variables } = tables;
  const { signalFreeBefore: before, targetBefore, contrastBefore } = join;
  const { root, firstBin, bins } = treeOf(buckets);

  /** The best noise that a group can give with this much SNR without signal. */
  const bestNoise = ({ target, difference }: SignalGroup, signalFreeSnr: number): JoinedNoise => {
    if (before === null) return { snr: null, contrast: null };
    const ratio = (signalFreeSnr / before) * slack;
    return {
      snr: target === null || targetBefore === null || targetBefore === 0 ? null : (ratio * target) / targetBefore,
      contrast: difference === null || contrastBefore === null ? null : (ratio * difference) / contrastBefore,
    };
  };
  /** True where nothing of some buckets with this noise is worth forming: bands are broken, or the front is better. */
  const isBeaten = (geometryLoss: number, group: SignalGroup, timeS: number, signalFreeSnr: number): boolean => {
    if (timeS === Number.POSITIVE_INFINITY) return true;
    const noise = bestNoise(group, signalFreeSnr);
    if (!join.audible(noise)) return true;
    return front.beats(timeS, addLosses(geometryLoss, group.trainLoss, noiseLoss(noise.snr, noise.contrast)) - 1e-13);
  };
  const seek = (node: BucketNode, group: SignalGroup, times: TimeFamily, from: number, to: number): void => {
    pulse.beat();
    const top = node.bucket === null ? (node.signalFreeSnr[to - 1] as number) : mostOfBins(node.bucket, firstBin + to - 1);
    if (top === 0 || isBeaten(node.geometryLoss, group, times.comparedS(fewestOfBin(firstBin + from)), top)) return;
    if (to - from > fewBins) {
      const middle = (from + to) >> 1;
      seek(node, group, times, middle, to);
      seek(node, group, times, from, middle);
    } else if (node.children !== null) {
      for (const child of node.children) seek(child, group, times, from, to);
    } else {
      const { profile } = node.bucket.shape;
      const start = (bin: number) =>
        profile.start[Math.max(0, Math.min(profile.start.length - 1, firstBin + bin - profile.firstBin))] as number;
      branch(node.bucket, group, times, start(from), start(to));
    }
  };
  const branch = (bucket: LineBucket, group: SignalGroup, times: TimeFamily, from: number, to: number): void => {
    if (to <= from) return;
    pulse.beat();
    const { lineCounts, averaging } = bucket.shape.skyline;
    const timeS = times.comparedS(lineCounts[from] as number);
    const top = bucket.signalFreeSnr(averaging[to - 1] as number);
    if (isBeaten(bucket.geometryLoss, group, timeS, top)) return;
    if (to - from === 1) {
      for (const entry of group.entries) offer(bucket, entry, from, timeS, top);
      return;
    }
    const middle = (from + to) >> 1;
    branch(bucket, group, times, middle, to);
    branch(bucket, group, times, from, middle);
  };
  const offer = (bucket: LineBucket, entry: SignalEntry, i: number, timeS: number, signalFreeSnr: number): void => {
    pulse.formed += 1;
    const noise = join.noise(entry.state, signalFreeSnr);
    if (!join.audible(noise)) return;
    const at = bucket.shape.skyline.at[i] as number;
    front.offer(timeS, join.loss(bucket, entry.state, noise), () => joinedPoint(variables, bucket.pointAt(at), entry.point));
  };
  const timesOf = (group: SignalGroup) => join.times((group.entries[0] as SignalEntry).state, buckets[0] as LineBucket);
  for (const group of groups) if (root !== null) seek(root, group, timesOf(group), 0, bins);

  // Without bands of noise, lines whose noise is not known are ways too: their loss follows voxel and train alone.
  if (join.noiseBands.length > 0) return;
  for (const bucket of buckets) {
    const { unknown } = bucket.shape;
    if (unknown === null) continue;
    for (const group of groups) {
      const timeS = timesOf(group).comparedS(unknown.lineCount);
      for (const { state, point } of timeS === Number.POSITIVE_INFINITY ? [] : group.entries) {
        pulse.formed += 1;
        const loss = join.loss(bucket, state, join.noise(state, null));
        front.offer(timeS, loss, () => joinedPoint(variables, bucket.pointAt(unknown.at), point));
      }
    }
  }
}
