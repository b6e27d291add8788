import type { LatticeVariable } from './lattice.js';

/**
 * Goes through the points of some variables that change at most so many of them, in order: the first variable slowest, where it starts first.
 * The other entries of the point are left alone. `visit` may answer false to end the walk.
 */
export function walkPoints(
  variables: readonly LatticeVariable[],
  which: readonly number[],
  mostChanges: number,
  point: number[],
  visit: (changes: number) => boolean | undefined,
): boolean {
  const step = (depth: number, changes: number): boolean => {
    if (depth === which.length) return visit(changes) !== false;
    const at = which[depth] as number;
    const count = changes < mostChanges ? (variables[at] as LatticeVariable).values.length : 1;
    for (let i = 0; i < count; i += 1) {
      point[at] = i;
      if (!step(depth + 1, i === 0 ? changes : changes + 1)) return false;
    }
    point[at] = 0;
    return true;
  };
  return step(0, 0);
}

/** Sum over k up to `most` of the ways to change exactly k of these variables: what a walk visits. */
export function countPoints(variables: readonly LatticeVariable[], which: readonly number[], mostChanges: number): number {
  const sums = [1, ...which.map(() => 0)];
  for (const at of which) {
    const others = (variables[at] as LatticeVariable).values.length - 1;
    for (let k = which.length; k > 0; k -= 1) sums[k] = (sums[k] as number) + (sums[k - 1] as number) * others;
  }
  return sums.slice(0, mostChanges + 1).reduce((sum, count) => sum + count, 0);
}
