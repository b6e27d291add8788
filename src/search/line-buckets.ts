import { signalFreeSnr } from '../calc/noise.js';
import type { Scanner } from '../calc/scanner.js';
import type { Parameters } from '../calc/series.js';
import type { LineShape } from './line-shapes.js';
import type { LineVoxel } from './line-states.js';

/** Line states that share voxel, averages and train: they differ in lines and noise alone. */
export class LineBucket {
  readonly train: string;
  /** Buckets with one of these play a count of lines in the same time. */
  readonly timeId: number;
  /** Buckets with one of these have the same estimates of the shortest timing. */
  readonly voxelId: number;
  readonly volumeMm3: number;
  readonly geometryLoss: number;
  readonly #fieldT: number;
  readonly #simultaneousG: number;

  constructor(
    { train, timeId, voxelId, volumeMm3, geometryLoss }: LineVoxel,
    /** A point of the bucket, for what its train does to the signal. */
    readonly point: readonly number[],
    /** Parameters of one state: voxel and averages are right for all, carried timing is not. */
    readonly parameters: Parameters,
    readonly shape: LineShape,
    scanner: Scanner,
    /** The whole point of a choice of the shape. */
    readonly pointAt: (at: number) => readonly number[],
  ) {
    this.train = train;
    this.timeId = timeId;
    this.voxelId = voxelId;
    this.volumeMm3 = volumeMm3;
    this.geometryLoss = geometryLoss;
    this.#fieldT = scanner.fieldT;
    const m = parameters.simultaneousSlices;
    this.#simultaneousG = m === 1 ? 1 : (scanner.simultaneousSliceG[m] ?? 1);
  }

  /** SNR without signal of lines that average noise. */
  signalFreeSnr(averagingLines: number): number {
    return signalFreeSnr(this.volumeMm3, averagingLines, this.parameters, this.#fieldT, this.#simultaneousG);
  }
}
