import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import type { RecordedSeries } from './record.js';
import { parameterWords } from './record-changes.js';
import { type CountedValue, type Spread, StepCounts } from './record-report-counts.js';
import { type CountedWord, Tally } from './record-report-tally.js';

/** What happened to one parameter over all records of a series. */
export interface ParameterChanges {
  readonly key: ParameterKey;
  /** How often it was changed. */
  readonly times: number;
  readonly up: number;
  readonly down: number;
  /** Used less planned, in the parameter's unit; null for words and flags. */
  readonly difference: Spread | null;
  /** Values used where it was changed; none for words and flags. */
  readonly used: readonly CountedValue[];
  /** `AP to RL` and how often: words, flags, and numbers that came or went. */
  readonly words: readonly CountedWord[];
}

/** Changes of one parameter, counted. */
class ParameterCounts {
  private readonly difference: StepCounts;
  private readonly used: StepCounts;
  private readonly words = new Tally();
  private times = 0;
  private up = 0;
  private down = 0;

  constructor(private readonly key: ParameterKey) {
    const row = parameterRow(key);
    const digits = row.kind === 'number' ? Math.max(2, row.digits) : 0;
    this.difference = new StepCounts(digits);
    this.used = new StepCounts(digits);
  }

  add(planned: unknown, used: unknown): void {
    this.times += 1;
    if (typeof planned !== 'number' || typeof used !== 'number') {
      this.words.add(`${parameterWords(this.key, planned)} to ${parameterWords(this.key, used)}`);
      return;
    }
    if (used > planned) this.up += 1;
    else this.down += 1;
    this.difference.add(used - planned);
    this.used.add(used);
  }

  report(): ParameterChanges {
    const { key, times, up, down } = this;
    return { key, times, up, down, difference: this.difference.spread(), used: this.used.values(), words: this.words.sorted() };
  }
}

/** Changed parameters of one series, counted. */
export class ChangeCounts {
  private readonly parameters = new Map<ParameterKey, ParameterCounts>();

  /** Counts what differs between planned and used, and gives the keys; none where nothing differs. */
  add({ planned, used }: RecordedSeries): readonly ParameterKey[] {
    const changed: ParameterKey[] = [];
    for (const key of parameterKeys) {
      const before = planned.parameters[key];
      const after = used.parameters[key];
      if (before === after || (typeof before === 'object' && JSON.stringify(before) === JSON.stringify(after))) continue;
      changed.push(key);
      let counts = this.parameters.get(key);
      if (counts === undefined) {
        counts = new ParameterCounts(key);
        this.parameters.set(key, counts);
      }
      counts.add(before, after);
    }
    return changed;
  }

  /** In the order of the table of parameters. */
  report(): ParameterChanges[] {
    return parameterKeys.flatMap((key) => this.parameters.get(key)?.report() ?? []);
  }
}
