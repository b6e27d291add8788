/** Most different values that are kept apart; beyond, neighbours are put together two by two. */
const mostBins = 512;

/** One value and how often it came. */
export interface CountedValue {
  readonly value: number;
  readonly count: number;
}

/** Median and quartiles (linear between neighbours, as most programs have them), smallest and largest. */
export interface Spread {
  readonly count: number;
  readonly least: number;
  readonly lowQuartile: number;
  readonly median: number;
  readonly highQuartile: number;
  readonly most: number;
}

/**
 * Values counted in steps, so that medians and quartiles need no list of them: memory is bounded however many there are.
 * Values are told apart to so many digits after the point; where there are more than 512 different ones, steps are doubled.
 */
export class StepCounts {
  private readonly perUnit: number;
  private width = 1;
  private bins = new Map<number, number>();
  private total = 0;

  constructor(digits: number) {
    this.perUnit = 10 ** digits;
  }

  add(value: number): void {
    const bin = Math.round((value * this.perUnit) / this.width);
    this.bins.set(bin, (this.bins.get(bin) ?? 0) + 1);
    this.total += 1;
    if (this.bins.size > mostBins) this.widen();
  }

  get count(): number {
    return this.total;
  }

  /** The values in rising order. */
  values(): CountedValue[] {
    const sorted = [...this.bins].sort(([a], [b]) => a - b);
    return sorted.map(([bin, count]) => ({ value: (bin * this.width) / this.perUnit, count }));
  }

  /** Null where nothing was counted. */
  spread(): Spread | null {
    if (this.total === 0) return null;
    const values = this.values();
    return {
      count: this.total,
      least: values[0]!.value,
      lowQuartile: quantile(values, this.total, 0.25),
      median: quantile(values, this.total, 0.5),
      highQuartile: quantile(values, this.total, 0.75),
      most: values.at(-1)!.value,
    };
  }

  /** Quantile, linear between neighbours; null where nothing was counted. */
  quantile(share: number): number | null {
    return this.total === 0 ? null : quantile(this.values(), this.total, share);
  }

  private widen(): void {
    const wider = new Map<number, number>();
    for (const [bin, count] of this.bins) {
      const half = Math.round(bin / 2);
      wider.set(half, (wider.get(half) ?? 0) + count);
    }
    this.bins = wider;
    this.width *= 2;
  }
}

/** Quantile of counted values in rising order, linear between the two neighbours (type 7 of Hyndman and Fan, Am Stat 1996;50:361). */
function quantile(values: readonly CountedValue[], total: number, share: number): number {
  const place = (total - 1) * share;
  const low = valueAt(values, Math.floor(place));
  const high = valueAt(values, Math.ceil(place));
  const between = low + (high - low) * (place - Math.floor(place));
  // A median of 4.1 and 4.2 is 4.15, not 4.1499999999999995.
  return Number(between.toPrecision(12));
}

function valueAt(values: readonly CountedValue[], place: number): number {
  let passed = 0;
  for (const { value, count } of values) {
    passed += count;
    if (place < passed) return value;
  }
  return values.at(-1)?.value ?? Number.NaN;
}
