/** One line of the benchmark: a subject measured against a yardstick in the same run, so that the machine cancels out. */
export interface Row {
  readonly name: string;
  /** What the subject is divided by. */
  readonly against: string;
  readonly unit: 'us' | 'ms' | 'MB' | 'bytes' | 'ways';
  /** Highest ratio allowed (subject / yardstick), or highest subject where there is no yardstick; null is printed only. */
  readonly budget: number | null;
  measure(): Promise<Measured>;
}

export interface Measured {
  /** In the row's unit. */
  readonly subject: number;
  /** In the row's unit; null where the budget is an absolute one. */
  readonly yardstick: number | null;
  readonly ratio: number;
}

/** True when a row keeps its budget, or has none. */
export function keepsBudget(row: Row, measured: Measured): boolean {
  return row.budget === null || measured.ratio <= row.budget;
}
