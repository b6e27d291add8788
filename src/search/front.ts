import { grain } from './candidate.js';

/** One point of a front: a time, what is reached in it, and a point of the lattice that does so. */
export interface FrontPoint {
  readonly timeS: number;
  readonly value: number;
  readonly point: readonly number[];
}

/**
 * Points that no other beats: each has less time, or a better value, than every other. `better` 1 wants large values, -1 small ones.
 * Values under a billionth apart are equal. Of ways with equal time and value the one offered first stands.
 */
export class Front {
  readonly points: FrontPoint[] = [];
  readonly #better: 1 | -1;
  /** Values as grains, larger is better. */
  readonly #grains: number[] = [];

  constructor(better: 1 | -1) {
    this.#better = better;
  }

  /** Index of the first point with more time. */
  #after(timeS: number): number {
    let low = 0;
    let high = this.points.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((this.points[middle] as FrontPoint).timeS <= timeS) low = middle + 1;
      else high = middle;
    }
    return low;
  }

  /** True when a point in at most this time reaches at least this value. */
  beats(timeS: number, value: number): boolean {
    const at = this.#after(timeS) - 1;
    return at >= 0 && (this.#grains[at] as number) >= this.#better * grain(value);
  }

  offer(timeS: number, value: number, pointOf: () => readonly number[]): void {
    if (this.beats(timeS, value)) return;
    const own = this.#better * grain(value);
    const after = this.#after(timeS);
    // What takes as long or longer and reaches no more is beaten now.
    let from = after;
    while (from > 0 && (this.points[from - 1] as FrontPoint).timeS === timeS) from -= 1;
    let to = from;
    while (to < this.points.length && (this.#grains[to] as number) <= own) to += 1;
    this.points.splice(from, to - from, { timeS, value, point: pointOf() });
    this.#grains.splice(from, to - from, own);
  }
}
