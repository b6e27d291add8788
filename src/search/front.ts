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
  readonly #better: 1 | -1;
  /** By time upwards. */
  readonly #times: number[] = [];
  readonly #values: number[] = [];
  /** Values as grains, larger is better. */
  readonly #grains: number[] = [];
  /** Points are put together at the end: most are beaten before. */
  readonly #pointsOf: (() => readonly number[])[] = [];
  #points: FrontPoint[] | null = null;

  constructor(better: 1 | -1) {
    this.#better = better;
  }

  get points(): readonly FrontPoint[] {
    this.#points ??= this.#times.map((timeS, i) => ({
      timeS,
      value: this.#values[i] as number,
      point: (this.#pointsOf[i] as () => readonly number[])(),
    }));
    return this.#points;
  }

  /** Index of the first point with more time. */
  #after(timeS: number): number {
    const times = this.#times;
    let low = 0;
    let high = times.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((times[middle] as number) <= timeS) low = middle + 1;
      else high = middle;
    }
    return low;
  }

  /** True when a point in at most this time reaches at least this value. */
  beats(timeS: number, value: number): boolean {
    const at = this.#after(timeS) - 1;
    return at >= 0 && (this.#grains[at] as number) >= this.#better * grain(value);
  }

  /** Offers ways of rising time and better and better value, all at once: quicker than one by one where they are many. */
  offerAll(times: readonly number[], values: readonly number[], pointOf: (i: number) => readonly number[]): void {
    if (times.length === 0) return;
    const held = [this.#times.splice(0), this.#values.splice(0), this.#grains.splice(0)] as const;
    const heldPoints = this.#pointsOf.splice(0);
    this.#points = null;
    let reached = Number.NEGATIVE_INFINITY;
    const keep = (timeS: number, value: number, own: number, point: () => readonly number[]) => {
      if (own <= reached) return;
      reached = own;
      const last = this.#times.length - 1;
      const place = last >= 0 && this.#times[last] === timeS ? last : last + 1;
      this.#times[place] = timeS;
      this.#values[place] = value;
      this.#grains[place] = own;
      this.#pointsOf[place] = point;
    };
    let k = 0;
    for (let i = 0; i < times.length; i += 1) {
      const timeS = times[i] as number;
      for (; k < heldPoints.length && (held[0][k] as number) <= timeS; k += 1)
        keep(held[0][k] as number, held[1][k] as number, held[2][k] as number, heldPoints[k] as () => readonly number[]);
      const value = values[i] as number;
      keep(timeS, value, this.#better * grain(value), () => pointOf(i));
    }
    for (; k < heldPoints.length; k += 1)
      keep(held[0][k] as number, held[1][k] as number, held[2][k] as number, heldPoints[k] as () => readonly number[]);
  }

  offer(timeS: number, value: number, pointOf: () => readonly number[]): void {
    const after = this.#after(timeS);
    const own = this.#better * grain(value);
    if (after > 0 && (this.#grains[after - 1] as number) >= own) return;
    // What takes as long or longer and reaches no more is beaten now.
    let from = after;
    while (from > 0 && this.#times[from - 1] === timeS) from -= 1;
    let to = from;
    while (to < this.#times.length && (this.#grains[to] as number) <= own) to += 1;
    this.#points = null;
    if (to - from === 1) {
      this.#times[from] = timeS;
      this.#values[from] = value;
      this.#grains[from] = own;
      this.#pointsOf[from] = pointOf;
      return;
    }
    this.#times.splice(from, to - from, timeS);
    this.#values.splice(from, to - from, value);
    this.#grains.splice(from, to - from, own);
    this.#pointsOf.splice(from, to - from, pointOf);
  }
}
