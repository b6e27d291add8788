import { classRow } from '../calc/classes.js';
import { geometryOf } from '../calc/geometry.js';
import { type MinimumTiming, minimumTiming } from '../calc/minimum-timing.js';
import type { LineBucket } from './line-buckets.js';
import { keepsShortfall, type SearchSetting } from './setting.js';
import type { SignalState } from './signal-state.js';

/** Whether timing is no further under the estimates of the shortest one than the preset's: by voxel and by `minimumId`, each estimate once. */
export class ShortestTiming {
  readonly #setting: SearchSetting;
  readonly #byVoxel: (MinimumTiming | undefined)[][] = [];

  constructor(setting: SearchSetting) {
    this.#setting = setting;
  }

  /** True when a state can be played with the voxel of a bucket. */
  playable(state: SignalState, bucket: LineBucket): boolean {
    let row = this.#byVoxel[bucket.voxelId];
    if (row === undefined) {
      row = [];
      this.#byVoxel[bucket.voxelId] = row;
    }
    let minimum = row[state.minimumId];
    if (minimum === undefined) {
      const { baseline, problem } = this.#setting;
      const { key } = baseline.model;
      const { fieldOfViewMm, matrixPhase, sliceThicknessMm, sliceCount } = bucket.parameters;
      const p = { ...state.parameters, fieldOfViewMm, matrixPhase, sliceThicknessMm, sliceCount };
      minimum = minimumTiming(key, p, state.lines, geometryOf(classRow(key).acquisition, p), state.pulses, problem.scanner);
      row[state.minimumId] = minimum;
    }
    return keepsShortfall(state, minimum, this.#setting.shortfall);
  }
}
