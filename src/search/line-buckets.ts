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
  multiplicity: number;
  /** The first such choice, a whole point. */
  readonly point: readonly number[];
}

/** Line states that share voxel, averages and train: they differ in lines and noise alone. */
export interface LineBucket {
  readonly train: string;
  /** Parameters of the first state: lines and voxel are right, carried timing is not. */
  readonly parameters: Parameters;
  readonly volumeMm3: number;
  readonly geometryLoss: number;
  /** By lines upwards, then by SNR downwards. */
  readonly entries: LineEntry[];
}

/** How entries of a bucket are kept apart. */
export type Sameness = 'every point' | 'lines and noise';

/** Collects line states into buckets. */
class Collector {
  readonly buckets = new Map<string, LineBucket & { readonly byKey: Map<string, LineEntry> }>();

  add(state: LineState, point: readonly number[], parameters: Parameters, changes: number, sameness: Sameness, multiplicity = 1): void {
    let bucket = this.buckets.get(state.bucket);
    if (bucket === undefined) {
      const { train, volumeMm3, geometryLoss } = state;
      bucket = { train, volumeMm3, geometryLoss, parameters: { ...parameters }, entries: [], byKey: new Map() };
      this.buckets.set(state.bucket, bucket);
    }
    const { lineCount, signalFreeSnr } = state;
    if (sameness === 'lines and noise') {
      const key = `${lineCount}|${signalFreeSnr}`;
      const known = bucket.byKey.get(key);
      if (known !== undefined) {
        known.multiplicity += multiplicity;
        return;
      }
      const entry = { lineCount, signalFreeSnr, changes, multiplicity, point: [...point] };
      bucket.byKey.set(key, entry);
      bucket.entries.push(entry);
    } else bucket.entries.push({ lineCount, signalFreeSnr, changes, multiplicity, point: [...point] });
  }

  sorted(): LineBucket[] {
    const buckets = [...this.buckets.values()];
    for (const { entries } of buckets)
      entries.sort((a, b) => a.lineCount - b.lineCount || (b.signalFreeSnr ?? -1) - (a.signalFreeSnr ?? -1));
    return buckets;
  }
}

/**
 * The line states of one choice of the shared variables (which `point` holds), changing at most so many line variables.
 * States that break a band or a must-keep are left out.
 */
export function lineBuckets(
  setting: SearchSetting,
  groups: Groups,
  table: LineTable,
  point: number[],
  mostChanges: number,
  sameness: Sameness,
  pulse: Pulse,
): LineBucket[] {
  const collector = new Collector();
  walkPoints(setting.variables, groups.lines, mostChanges, point, (changes) => {
    pulse.beat();
    const state = table.stateAt(point);
    if (state !== null) collector.add(state, point, table.parameters, changes, sameness);
  });
  return collector.sorted();
}
