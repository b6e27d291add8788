import type { Pulse } from './control.js';
import { LineBucket } from './line-buckets.js';
import { LinePairs } from './line-pairs.js';
import { type Part, partsOf } from './line-parts.js';
import { LineShape } from './line-shapes.js';
import type { LineVoxel } from './line-states.js';
import { walkPoints } from './point-walk.js';
import type { SearchTables } from './search-tables.js';
import { directionsOf } from './whole-lines.js';

/** One choice of the line variables. */
export interface FewLine {
  readonly lineCount: number;
  /** Lines that average noise; -1 where the noise of this acceleration is not known. */
  readonly averaging: number;
  readonly changes: number;
  /** The choice, a whole point whose shared variables are right. */
  readonly point: () => readonly number[];
}

/** A bucket of choices that change few line variables. */
export interface FewBucket {
  readonly bucket: LineBucket;
  /** The fewest changes of its choices. */
  readonly fewestChanges: number;
  /** No choice has fewer lines. */
  readonly fewestLines: number;
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
  const leastSlices = slices.map(leastOf);
  for (const those of planes) {
    const leastPlane = leastOf(those);
    for (const [i, others] of slices.entries()) {
      const leastSlice = leastSlices[i] as number;
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
            if (lineCount <= mostLines) kept.push({ lineCount, averaging, changes, point: () => pointOf(one, other) });
          }
        }
        return kept.sort(byLines);
      };
      found.push({ bucket, fewestChanges: a.changes + b.changes, fewestLines: leastPlane * (volume ? leastSlice : 1), lines });
    }
  }
  return found;
}

/** A bound: no fewer lines are acquired along a direction than are encoded over its acceleration. */
function leastOf(parts: readonly Part[]): number {
  let least = Number.POSITIVE_INFINITY;
  for (const { encoded, factor } of parts) least = Math.min(least, encoded / Math.max(1, factor));
  return least * (1 - 1e-9);
}

/** Where something ties both directions, their choices are gone through together. */
function together(tables: SearchTables, point: number[], mostChanges: number, pulse: Pulse): FewBucket[] {
  const { setting, groups, lines: table } = tables;
  const found = new Map<string, { voxel: LineVoxel; parameters: typeof table.parameters; all: FewLine[] }>();
  walkPoints(setting.variables, groups.lines, mostChanges, point, (changes) => {
    pulse.beat();
    const voxel = table.voxelAt(point);
    if (voxel === null) return;
    const word = table.bucketWord();
    let one = found.get(word);
    if (one === undefined) {
      one = { voxel, parameters: { ...table.parameters }, all: [] };
      found.set(word, one);
    }
    const { lineCount, averagingLines } = table.noise();
    const whole = [...point];
    one.all.push({ lineCount, averaging: averagingLines ?? -1, changes, point: () => whole });
  });
  return [...found.values()].map(({ voxel, parameters, all }) => {
    const first = (all[0] as FewLine).point();
    all.sort(byLines);
    return {
      bucket: new LineBucket(voxel, first, parameters, noShape, setting.problem.scanner, () => first),
      fewestChanges: Math.min(...all.map(({ changes }) => changes)),
      fewestLines: (all[0] as FewLine).lineCount,
      lines: (mostLines, most) => all.filter(({ lineCount, changes }) => lineCount <= mostLines && changes <= most),
    };
  });
}
