import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';
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
    const changed = differingKeys(planned.parameters, used.parameters);
    for (const key of changed) {
      let counts = this.parameters.get(key);
      if (counts === undefined) {
        counts = new ParameterCounts(key);
        this.parameters.set(key, counts);
      }
      counts.add(planned.parameters[key], used.parameters[key]);
    }
    return changed;
  }

  /** In the order of the table of parameters. */
  report(): ParameterChanges[] {
    return parameterKeys.flatMap((key) => this.parameters.get(key)?.report() ?? []);
  }
}

const knownKeys: ReadonlySet<string> = new Set(parameterKeys);
const noKeys: readonly ParameterKey[] = [];

/** Known keys whose values differ, in the order of the record. */
function differingKeys(planned: GivenParameters, used: GivenParameters): readonly ParameterKey[] {
  if (planned === used) return noKeys;
  const keys = Object.keys(planned);
  // Nearly always both have the same keys in the same order. A hundred thousand records ask this a million times, and lists are
  // walked several times as fast as keys are looked for.
  if (!sameWords(keys, Object.keys(used)))
    return known([...new Set([...keys, ...Object.keys(used)])].filter((key) => differ(planned, used, key)));
  const [before, after] = [Object.values(planned), Object.values(used)];
  let differing: string[] | null = null;
  for (let i = 0; i < keys.length; i += 1) {
    if (equal(before[i], after[i])) continue;
    differing ??= [];
    differing.push(keys[i] as string);
  }
  return differing === null ? noKeys : known(differing);
}

function differ(planned: object, used: object, key: string): boolean {
  return !equal((planned as Record<string, unknown>)[key], (used as Record<string, unknown>)[key]);
}

/** Equal as JSON: numbers, words, flags, and the small objects and lists of pacing and diffusion. */
function equal(a: unknown, b: unknown): boolean {
  if (a === b) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (!sameWords(Object.keys(a), Object.keys(b))) return false;
  const [left, right] = [Object.values(a), Object.values(b)];
  for (let i = 0; i < left.length; i += 1) if (!equal(left[i], right[i])) return false;
  return Array.isArray(a) === Array.isArray(b);
}

function sameWords(a: readonly string[], b: readonly string[]): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i += 1) if (a[i] !== b[i]) return false;
  return true;
}

function known(keys: readonly string[]): readonly ParameterKey[] {
  return keys.filter((key) => knownKeys.has(key)) as ParameterKey[];
}
