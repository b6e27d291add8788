/** Where a bracketed search ended. */
export type RootSearch =
  | { readonly found: true; readonly x: number; readonly bracket: readonly [number, number]; readonly residual: number }
  | { readonly found: false; readonly low: End; readonly high: End };

/** The function at one end of what was looked through; null where it has no value there. */
interface End {
  readonly x: number;
  readonly value: number | null;
}

/** Intervals on either side of the start; the residual at which a root counts as found. */
const steps = 12;
const rootTolerance = 1e-4;

/**
 * The root of a function nearest to a start, between two bounds above zero: steps of equal ratio go outwards from the start until the sign
 * changes, then false position with halving (Illinois; Dowell & Jarratt, BIT 1971;11:168) closes in to a residual of 1e-4.
 * Where the sign never changes there is no root to be had between the bounds, and both ends are given.
 *
 * @example nearestRoot((x) => x * x - 2, 1, 0.5, 4) //=> { found: true, x: 1.4142..., bracket: [1.33..., 1.49...], residual: ... }
 */
export function nearestRoot(f: (x: number) => number | null, start: number, low: number, high: number): RootSearch {
  const at = f(start);
  if (at !== null && Math.abs(at) <= rootTolerance) return { found: true, x: start, bracket: [start, start], residual: at };
  const ends: { down: End; up: End } = { down: { x: start, value: at }, up: { x: start, value: at } };
  for (let i = 1; i <= steps; i += 1) {
    for (const way of ['up', 'down'] as const) {
      const bound = way === 'up' ? high : low;
      const x = start * (bound / start) ** (i / steps);
      if (way === 'up' ? x <= ends.up.x : x >= ends.down.x) continue;
      const value = f(x);
      const before = ends[way];
      ends[way] = { x, value };
      if (value !== null && before.value !== null && value * before.value <= 0) return close(f, before as Point, { x, value });
    }
  }
  return { found: false, low: ends.down, high: ends.up };
}

interface Point {
  readonly x: number;
  readonly value: number;
}

/** Closes in on a change of sign. */
function close(f: (x: number) => number | null, first: Point, second: Point): RootSearch {
  const bracket: readonly [number, number] = [Math.min(first.x, second.x), Math.max(first.x, second.x)];
  let [a, b] = [first, second];
  let best = Math.abs(a.value) < Math.abs(b.value) ? a : b;
  for (let i = 0; i < 60 && Math.abs(best.value) > rootTolerance; i += 1) {
    // Every third step halves, so that a flat side cannot hold the search up.
    const x = i % 3 === 2 ? (a.x + b.x) / 2 : b.x - (b.value * (b.x - a.x)) / (b.value - a.value);
    const value = f(x);
    if (value === null) break;
    const point = { x, value };
    if (Math.abs(value) < Math.abs(best.value)) best = point;
    if (value * b.value <= 0) a = b;
    else a = { x: a.x, value: a.value / 2 };
    b = point;
  }
  return { found: true, x: best.x, bracket, residual: best.value };
}
