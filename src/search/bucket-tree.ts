import type { LineBucket } from './line-buckets.js';

/** Some buckets: their least loss of geometry, and the most SNR without signal that lines up to each bin give; or one bucket. */
export type BucketNode =
  | {
      readonly geometryLoss: number;
      readonly signalFreeSnr: Float64Array;
      readonly children: readonly [BucketNode, BucketNode];
      readonly bucket: null;
    }
  | { readonly geometryLoss: number; readonly children: null; readonly bucket: LineBucket };

export interface BucketTree {
  /** Null where no bucket has lines whose noise is known. */
  readonly root: BucketNode | null;
  readonly firstBin: number;
  readonly bins: number;
}

/** Halves buckets by loss of geometry, down to single ones. */
export function treeOf(buckets: readonly LineBucket[]): BucketTree {
  let firstBin = Number.POSITIVE_INFINITY;
  let lastBin = 0;
  const known = buckets.filter(({ shape }) => {
    const { firstBin: first, roots } = shape.profile;
    if (roots.length === 0) return false;
    firstBin = Math.min(firstBin, first);
    lastBin = Math.max(lastBin, first + roots.length - 1);
    return true;
  });
  if (known.length === 0) return { root: null, firstBin: 0, bins: 0 };
  const bins = lastBin - firstBin + 1;
  known.sort((a, b) => a.geometryLoss - b.geometryLoss);

  const node = (from: number, to: number): BucketNode => {
    if (to - from === 1) {
      const bucket = known[from] as LineBucket;
      return { geometryLoss: bucket.geometryLoss, children: null, bucket };
    }
    const middle = (from + to) >> 1;
    const children = [node(from, middle), node(middle, to)] as const;
    const signalFreeSnr = new Float64Array(bins);
    for (const child of children) {
      if (child.bucket !== null) raiseToBucket(signalFreeSnr, child.bucket, firstBin);
      else raise(signalFreeSnr, child.signalFreeSnr);
    }
    return { geometryLoss: children[0].geometryLoss, signalFreeSnr, children, bucket: null };
  };
  return { root: node(0, known.length), firstBin, bins };
}

/** Rounding of the quicker product: never too narrow. */
const slack = 1 + 1e-12;

function raise(own: Float64Array, other: Float64Array): void {
  for (let bin = 0; bin < own.length; bin += 1) if ((other[bin] as number) > (own[bin] as number)) own[bin] = other[bin] as number;
}

function raiseToBucket(own: Float64Array, bucket: LineBucket, firstBin: number): void {
  const { firstBin: first, roots } = bucket.shape.profile;
  const scale = bucket.signalFreeSnr(1) * slack;
  const last = roots.length - 1;
  for (let bin = first - firstBin; bin < own.length; bin += 1) {
    const snr = scale * (roots[Math.min(last, bin + firstBin - first)] as number);
    if (snr > (own[bin] as number)) own[bin] = snr;
  }
}

/** The most SNR without signal that lines of a bucket up to a bin give; 0 where it has none. */
export function mostOfBins(bucket: LineBucket, bin: number): number {
  const { firstBin, roots } = bucket.shape.profile;
  const at = Math.min(roots.length - 1, bin - firstBin);
  return at < 0 ? 0 : bucket.signalFreeSnr(1) * slack * (roots[at] as number);
}
