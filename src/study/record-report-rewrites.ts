import type { ParameterKey } from '../calc/parameters.js';
import { parameterRow } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';
import type { RecordedSeries } from './record.js';
import { type CountedWord, Tally } from './record-report-tally.js';

/** One set of values that a series was rewritten to, and how it went. */
export interface Rewrite {
  readonly set: GivenParameters;
  readonly times: number;
  /** Done, with quality seen as diagnostic and no must-keep crossed. */
  readonly good: number;
  readonly reasons: readonly CountedWord[];
}

interface Counted {
  readonly set: GivenParameters;
  times: number;
  good: number;
  readonly reasons: Tally;
}

/** Sets of values that are followed; beyond, those seen once are given up. */
const mostFollowed = 200;
/** Sets that a report names. */
const mostNamed = 5;

/** Which values a series was rewritten to together, counted. */
export class RewriteCounts {
  private readonly rewrites = new Map<string, Counted>();

  add(series: RecordedSeries, changed: readonly ParameterKey[], reasons: readonly string[]): void {
    const used = series.used.parameters;
    let name = '';
    for (const key of changed) {
      const value = tidy(key, used[key]);
      name += `${key} ${typeof value === 'number' ? value : JSON.stringify(value)};`;
    }
    let counted = this.rewrites.get(name);
    if (counted === undefined) {
      if (this.rewrites.size >= mostFollowed) this.giveUpRare();
      if (this.rewrites.size >= mostFollowed) return;
      const set = Object.fromEntries(changed.map((key) => [key, tidy(key, used[key])])) as GivenParameters;
      counted = { set, times: 0, good: 0, reasons: new Tally() };
      this.rewrites.set(name, counted);
    }
    counted.times += 1;
    if (series.outcome === 'done' && series.quality === 'diagnostic' && series.crossed.length === 0) counted.good += 1;
    for (const reason of reasons) counted.reasons.add(reason);
  }

  /** Those with the most good ones first. */
  report(): Rewrite[] {
    const sorted = [...this.rewrites.values()].sort((a, b) => b.good - a.good || b.times - a.times);
    return sorted.slice(0, mostNamed).map(({ set, times, good, reasons }) => ({ set, times, good, reasons: reasons.sorted() }));
  }

  private giveUpRare(): void {
    for (const [name, { times }] of this.rewrites) if (times === 1) this.rewrites.delete(name);
  }
}

/** Carried timing has endless digits: values that nobody can tell apart are one. What was taken away stays absent. */
function tidy(key: ParameterKey, value: unknown): unknown {
  const row = parameterRow(key);
  if (typeof value !== 'number' || row.kind !== 'number') return value;
  const perUnit = row.digits > 2 ? 1000 : 100;
  return Math.round(value * perUnit) / perUnit;
}
