import { type ClassKey, classRow } from '../calc/classes.js';
import { ellipticalShare, type Lines } from '../calc/lines.js';
import { noiseAveragingLines } from '../calc/noise.js';
import { parallelNoiseFactor } from '../calc/parallel-noise.js';
import { guardedCeil } from '../calc/rounding.js';
import type { Coil } from '../calc/scanner.js';
import type { Parameters } from '../calc/series.js';
import type { LinePart } from './line-states.js';
import type { MostByLines } from './most-by-lines.js';

/** What of a part the lines of a pair follow. */
export type PairedPart = Pick<LinePart, 'encoded' | 'acquired' | 'factor' | 'reference' | 'referenceKept'>;

/** Parts of both directions put together: the lines of a pair and those that average noise, as `acquiredLines` and `noiseAveragingLines` give them. */
export class LinePairs {
  readonly #key: ClassKey;
  readonly #coil: Coil | null;
  readonly #kind: 'plane' | 'volume' | 'cycle';
  readonly #p: { -readonly [K in keyof Parameters]: Parameters[K] };
  readonly #lines: { -readonly [K in keyof Lines]: Lines[K] };
  readonly #g = new Map<number, number | null>();
  /** The count of lines that time follows, of the pair joined last. */
  lineCount = 0;

  /** `parameters` say what both directions share: elliptical sampling. */
  constructor(key: ClassKey, coil: Coil | null, parameters: Parameters) {
    this.#key = key;
    this.#coil = coil;
    this.#kind = classRow(key).acquisition === '2D' ? 'plane' : key === 'inversion-prepared-gradient-echo/3D' ? 'cycle' : 'volume';
    this.#p = { ...parameters };
    this.#lines = { fullPhase: 1, encodedPhase: 1, phase: 1, fullSlice: 1, encodedSlice: 1, slice: 1, reference: 0, total: 1 };
  }

  /** Joins two parts: sets `lineCount` and gives the lines that average noise; -1 where the noise of this acceleration is not known. */
  join(plane: PairedPart, slice: PairedPart): number {
    const lines = this.#lines;
    const p = this.#p;
    lines.encodedPhase = plane.encoded;
    lines.phase = plane.acquired;
    lines.encodedSlice = slice.encoded;
    p.parallelFactorPhase = plane.factor;
    p.parallelFactorSlice = slice.factor;
    if (this.#kind === 'plane') {
      lines.reference = plane.referenceKept;
      lines.total = plane.acquired;
    } else if (this.#kind === 'volume' && plane.factor > 1 && slice.factor > 1) {
      // One ceiling over both directions.
      const reference = plane.referenceKept * Math.min(plane.reference, slice.encoded);
      lines.reference = reference;
      lines.total = guardedCeil((plane.encoded * slice.encoded - reference) / (plane.factor * slice.factor)) + reference;
    } else {
      lines.reference = plane.referenceKept * (this.#kind === 'cycle' ? slice.acquired : slice.encoded);
      lines.total = plane.acquired * slice.acquired;
    }
    // Readouts of a cycle take no time of their own.
    this.lineCount = this.#kind === 'volume' ? lines.total : lines.phase;
    const g = this.noiseFactor(plane.factor, slice.factor);
    return g === null ? -1 : noiseAveragingLines(this.#key, p, lines, g);
  }

  /** Noise factor of accelerations along both directions; null where it is not known. */
  noiseFactor(phase: number, slice: number): number | null {
    const along = this.#kind === 'plane' ? 1 : slice;
    if (phase <= 1 && along <= 1) return 1;
    const key = phase * 1024 + along;
    let g = this.#g.get(key);
    if (g === undefined) {
      g = parallelNoiseFactor(this.#coil, phase, along);
      this.#g.set(key, g);
    }
    return g;
  }

  /**
   * For each count of lines the pair that averages most, numbered `b x planes + a`. The sums of `join` written out, because a lattice has millions
   * of pairs; whoever keeps one joins it again.
   */
  reach(planes: readonly PairedPart[], slices: readonly PairedPart[], into: MostByLines): void {
    if (this.#kind !== 'volume') {
      slices.forEach((slice, b) => {
        planes.forEach((plane, a) => {
          const averaging = this.join(plane, slice);
          into.offer(this.lineCount, averaging, b * planes.length + a);
        });
      });
      return;
    }
    const share = ellipticalShare(this.#p);
    const count = planes.length;
    const encoded = Float64Array.from(planes, (part) => part.encoded);
    const acquired = Float64Array.from(planes, (part) => part.acquired);
    const kept = Float64Array.from(planes, (part) => part.referenceKept);
    for (let b = 0; b < slices.length; b += 1) {
      const slice = slices[b] as PairedPart;
      for (let a = 0; a < count; ) {
        // Parts with one acceleration stand together.
        const { factor, reference: asked } = planes[a] as PairedPart;
        const g = this.noiseFactor(factor, slice.factor);
        const both = factor * slice.factor;
        const weight = g === null ? 0 : g * g * both;
        const referenced = factor > 1 && slice.factor > 1 ? Math.min(asked, slice.encoded) : slice.encoded;
        const together = factor > 1 && slice.factor > 1;
        for (; a < count && planes[a]?.factor === factor && planes[a]?.reference === asked; a += 1) {
          const all = (encoded[a] as number) * slice.encoded;
          const reference = (kept[a] as number) * referenced;
          const lines = together ? guardedCeil((all - reference) / both) + reference : (acquired[a] as number) * slice.acquired;
          const full = Math.min(all, reference);
          into.offer(lines, g === null ? -1 : ((all * all) / (full + weight * (all - full))) * share, b * count + a);
        }
      }
    }
  }
}
