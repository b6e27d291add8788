import { binOf, fewestOfBin } from './line-bins.js';
import type { LinePairs, PairedPart } from './line-pairs.js';
import { MostByLines } from './most-by-lines.js';

/** Choices of lines that no other beats in fewer lines and more averaging: both rise from one to the next. */
export interface Skyline {
  readonly lineCounts: Float64Array;
  readonly averaging: Float64Array;
  /** Number of each choice within its shape. */
  readonly at: Int32Array;
}

/** All choices of a shape, fewest lines first. */
export interface ShapeEntries {
  readonly lineCounts: Float64Array;
  /** Lines that average noise; -1 where the noise of this acceleration is not known. */
  readonly averaging: Float64Array;
  readonly multiplicity: Float64Array;
}

/** The most averaging that lines up to each bin give, as its square root: what SNR follows. */
export interface ShapeProfile {
  readonly firstBin: number;
  readonly roots: Float64Array;
  /** Place in the skyline of the first lines of each bin, and its length at the end. */
  readonly start: Int32Array;
}

/** Parts of both directions, or choices that were gone through together. */
export interface ShapeSource {
  readonly size: number;
  /** For each count of lines the choice that averages most. */
  readonly reach: (into: MostByLines) => void;
  /** Lines that average noise of a choice; -1 where that is not known. */
  readonly averagingAt: (at: number) => number;
  readonly lineCountAt: (at: number) => number;
  readonly multiplicityAt: (at: number) => number;
}

/** Pairs of parts as the source of a shape. */
export function pairSource(
  planes: readonly (PairedPart & { readonly multiplicity: number })[],
  slices: typeof planes,
  pairs: LinePairs,
): ShapeSource {
  const planeOf = (at: number) => planes[at % planes.length] as (typeof planes)[number];
  const sliceOf = (at: number) => slices[Math.floor(at / planes.length)] as (typeof planes)[number];
  return {
    size: planes.length * slices.length,
    reach: (into) => {
      pairs.reach(planes, slices, into);
    },
    averagingAt: (at) => pairs.join(planeOf(at), sliceOf(at)),
    lineCountAt: (at) => {
      pairs.join(planeOf(at), sliceOf(at));
      return pairs.lineCount;
    },
    multiplicityAt: (at) => planeOf(at).multiplicity * sliceOf(at).multiplicity,
  };
}

const room = new MostByLines();

/** The lines that buckets of one voxel can have, whatever that voxel is: many buckets share a shape. Formed when asked for. */
export class LineShape {
  readonly #source: ShapeSource;
  #skyline: Skyline | null = null;
  #profile: ShapeProfile | null = null;
  #unknown: { readonly lineCount: number; readonly at: number } | null = null;

  constructor(source: ShapeSource) {
    this.#source = source;
  }

  get size(): number {
    return this.#source.size;
  }

  get skyline(): Skyline {
    this.#skyline ??= this.#formSkyline();
    return this.#skyline;
  }

  /** Of the choices whose noise is not known the one with fewest lines. */
  get unknown(): { readonly lineCount: number; readonly at: number } | null {
    this.#skyline ??= this.#formSkyline();
    return this.#unknown;
  }

  get profile(): ShapeProfile {
    this.#profile ??= this.#formProfile();
    return this.#profile;
  }

  /** All choices, formed anew each time: they are many. */
  entries(): ShapeEntries {
    const { size, lineCountAt, averagingAt, multiplicityAt } = this.#source;
    const order = Float64Array.from({ length: size }, (_, at) => lineCountAt(at) * 2 ** 26 + at).sort();
    return {
      lineCounts: order.map((word) => Math.floor(word / 2 ** 26)),
      averaging: order.map((word) => averagingAt(word % 2 ** 26)),
      multiplicity: order.map((word) => multiplicityAt(word % 2 ** 26)),
    };
  }

  #formSkyline(): Skyline {
    this.#source.reach(room);
    const { unknownLines, unknownAt } = room;
    if (unknownAt >= 0) this.#unknown = { lineCount: unknownLines, at: unknownAt };
    const { lineCounts, at } = room.take();
    const averaging = new Float64Array(at.length);
    for (let i = 0; i < at.length; i += 1) averaging[i] = this.#source.averagingAt(at[i] as number);
    return { lineCounts, averaging, at };
  }

  #formProfile(): ShapeProfile {
    const { lineCounts, averaging } = this.skyline;
    const count = lineCounts.length;
    if (count === 0) return { firstBin: 0, roots: new Float64Array(0), start: new Int32Array(1) };
    const firstBin = binOf(lineCounts[0] as number);
    const lastBin = binOf(lineCounts[count - 1] as number);
    const roots = new Float64Array(lastBin - firstBin + 1);
    const start = new Int32Array(roots.length + 1);
    let i = 0;
    for (let bin = firstBin; bin <= lastBin; bin += 1) {
      start[bin - firstBin] = i;
      const next = fewestOfBin(bin + 1);
      while (i < count && (lineCounts[i] as number) < next) i += 1;
      roots[bin - firstBin] = Math.sqrt(averaging[i - 1] as number);
    }
    start[roots.length] = i;
    return { firstBin, roots, start };
  }
}
