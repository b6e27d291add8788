import type { Pulse } from './control.js';
import { LineBucket } from './line-buckets.js';
import { LinePairs } from './line-pairs.js';
import { type Part, partsOf } from './line-parts.js';
import { LineShape } from './line-shapes.js';
import { walkPoints } from './point-walk.js';
import type { SearchTables } from './search-tables.js';
import { directionsOf } from './whole-lines.js';

/** One choice of the line variables. */
export interface FewLine {
  readonly lineCount: number;
  /** SNR without signal; null where the noise of this acceleration is not known. */
  readonly signalFreeSnr: number | null;
  readonly changes: number;
  /** The choice, a whole point whose shared variables are right. */
  readonly point: () => readonly number[];
}

/** A bucket of choices that change few line variables. */
export interface FewBucket {
  readonly bucket: LineBucket;
  /** The fewest changes of its choices. */
  readonly fewestChanges: number;
  /** No choice with at most so many changes has fewer lines; infinite where none has so few changes. */
  readonly fewestLines: readonly number[];
  /** Choices with at most so many lines and at most so many changes, fewest lines first. */
  readonly lines: (mostLines: number, mostChanges: number) => FewLine[];
}

const noShape = new LineShape({ size: 0, reach: () => {}, averagingAt: () => 0, lineCountAt: () => 0, multiplicityAt: () => 0 });

function byLines(a: FewLine, b: FewLine): number {
  return a.lineCount - b.lineCount;
}

/** Buckets of the choices of the line variables that change at most so many, for the shared variables that `point` holds. */
export function fewBuckets(tables: SearchTables, point: number[], mostChanges: number, pulse: Pulse): FewBucket[] {
  return tables.lines.factors ? ofParts(tables, point, mostChanges, pulse) : together(tables, point, mostChanges, pulse);
}

/** Directions are gone through apart, and their parts paired. */
function ofParts(tables: SearchTables, point: number[], mostChanges: number, pulse: Pulse): FewBucket[] {
  const { setting, groups, lines: table } = tables;
  const { plane, slice } = directionsOf(setting, groups);
  const { baseline, problem } = setting;
  const byChanges = (parts: Part[]) => parts.sort((a, b) => a.changes - b.changes);
  const planes = partsOf(setting, table, plane, mostChanges, point, 'phase', false, pulse).map(byChanges);
  const slices = partsOf(setting, table, slice, mostChanges, point, 'slice', false, pulse).map(byChanges);
  const shared = [...point];
  const pointOf = (a: Part, b: Part) => {
    const whole = [...shared];
    for (const at of plane) whole[at] = a.point[at] as number;
    for (const at of slice) whole[at] = b.point[at] as number;
    return whole;
  };
  const found: FewBucket[] = [];
  // Readouts of a cycle take no time of their own.
  const volume = problem.series.acquisition === '3D' && problem.series.family !== 'inversion-prepared-gradient-echo';
  const leastSlices = slices.map((parts) => leastOf(parts, mostChanges).map((least) => (volume || !Number.isFinite(least) ? least : 1)));
  for (const those of planes) {
    const leastPlane = leastOf(those, mostChanges);
    for (const [i, others] of slices.entries()) {
      const a = those[0] as Part;
      const b = others[0] as Part;
      if (a.changes + b.changes > mostChanges) continue;
      const first = pointOf(a, b);
      const voxel = table.voxelAt(first);
      if (voxel === null) continue;
      const parameters = { ...table.parameters };
      const bucket = new LineBucket(voxel, first, parameters, noShape, problem.scanner, () => first);
      const lines = (mostLines: number, most: number): FewLine[] => {
        const pairs = new LinePairs(baseline.model.key, problem.scanner.coil, parameters);
        const kept: FewLine[] = [];
        for (const other of others) {
          for (const one of those) {
            const changes = one.changes + other.changes;
            if (changes > most) break;
            pulse.beat();
            const averaging = pairs.join(one, other);
            const { lineCount } = pairs;
            if (lineCount > mostLines) continue;
            const signalFreeSnr = averaging < 0 ? null : bucket.signalFreeSnr(averaging);
            kept.push({ lineCount, signalFreeSnr, changes, point: () => pointOf(one, other) });
          }
        }
        return kept.sort(byLines);
      };
      found.push({ bucket, fewestChanges: a.changes + b.changes, fewestLines: leastOfBoth(leastPlane, leastSlices[i] as number[]), lines });
    }
  }
  return found;
}

/** A bound for each number of changes: no fewer lines are acquired along a direction than are encoded over its acceleration. */
function leastOf(parts: readonly Part[], mostChanges: number): number[] {
  const least = Array.from({ length: mostChanges + 1 }, () => Number.POSITIVE_INFINITY);
  for (const { encoded, factor, changes } of parts)
    least[changes] = Math.min(least[changes] as number, (encoded / Math.max(1, factor)) * (1 - 1e-9));
  return least;
}

/** The bound of two directions together, for at most so many changes of both. */
function leastOfBoth(plane: readonly number[], slice: readonly number[]): number[] {
  const least: number[] = [];
  for (let changes = 0; changes < plane.length; changes += 1) {
    let own = least.at(-1) ?? Number.POSITIVE_INFINITY;
    for (let i = 0; i <= changes; i += 1) own = Math.min(own, (plane[i] as number) * (slice[changes - i] as number));
    least.push(own);
  }
  return least;
}

/** Where something ties both directions, their choices are gone through together. */
function together(tables: SearchTables, point: number[], mostChanges: number, pulse: Pulse): FewBucket[] {
  const { setting, groups, lines: table } = tables;
  const found = new Map<string, { bucket: LineBucket; all: FewLine[] }>();
  walkPoints(setting.variables, groups.lines, mostChanges, point, (changes) => {
    pulse.beat();
    const voxel = table.voxelAt(point);
    if (voxel === null) return;
    const word = table.bucketWord();
    let one = found.get(word);
    if (one === undefined) {
      const first = [...point];
      one = { bucket: new LineBucket(voxel, first, { ...table.parameters }, noShape, setting.problem.scanner, () => first), all: [] };
      found.set(word, one);
    }
    const { lineCount, averagingLines } = table.noise();
    const whole = [...point];
    const signalFreeSnr = averagingLines === null ? null : one.bucket.signalFreeSnr(averagingLines);
    one.all.push({ lineCount, signalFreeSnr, changes, point: () => whole });
  });
  for (const { all } of found.values()) all.sort(byLines);
  return [...found.values()].map(({ bucket, all }) => ({
    bucket,
    fewestChanges: Math.min(...all.map(({ changes }) => changes)),
    fewestLines: Array.from({ length: mostChanges + 1 }, (_, most) =>
      Math.min(...all.filter(({ changes }) => changes <= most).map(({ lineCount }) => lineCount)),
    ),
    lines: (mostLines, most) => all.filter(({ lineCount, changes }) => lineCount <= mostLines && changes <= most),
  }));
}
