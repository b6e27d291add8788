import type { RecordedSeries, SessionRecord } from './record.js';
import { ChangeCounts, type ParameterChanges } from './record-report-changes.js';
import { CrossedCounts, type CrossedReport } from './record-report-crossed.js';
import { PredictionCounts, type PredictionReport } from './record-report-prediction.js';
import { type Rewrite, RewriteCounts } from './record-report-rewrites.js';
import { shareOf } from './record-report-share.js';
import { type CountedWord, Tally } from './record-report-tally.js';
import type { Quality } from './record-words.js';

/** Quality as seen at the console, by count. */
export type QualityCounts = Readonly<Record<Quality | 'notSaid', number>>;

/** What the records say of one series of one preset. */
export interface SeriesReport {
  readonly series: string;
  /** Records that name it. */
  readonly recorded: number;
  /** Done or repeated. */
  readonly run: number;
  readonly done: number;
  readonly repeated: number;
  readonly givenUp: number;
  /** At least one parameter used was not the one planned. */
  readonly rewritten: number;
  /** Of those recorded; null where fewer than five were. */
  readonly rates: { readonly rewritten: number | null; readonly repeated: number | null; readonly givenUp: number | null };
  readonly parameters: readonly ParameterChanges[];
  /** Of rewritten, repeated and given-up ones; blank: NO REASON GIVEN. */
  readonly reasons: readonly CountedWord[];
  readonly quality: { readonly rewritten: QualityCounts; readonly asPlanned: QualityCounts };
  readonly crossed: CrossedReport;
  readonly rewrites: readonly Rewrite[];
  readonly prediction: PredictionReport;
}

/** The reasons of one series: its own, else those of the whole session; one blank where there is none. */
function reasonsOf(record: SessionRecord, series: RecordedSeries): readonly string[] {
  if (series.reason.trim() !== '') return [series.reason];
  const given = record.reasons.filter((reason) => reason.trim() !== '');
  return given.length > 0 ? given : [''];
}

/** One series of one preset, counted record by record. */
export class SeriesCounts {
  private readonly outcomes = { done: 0, repeated: 0, 'given-up': 0 };
  private rewritten = 0;
  private readonly changes = new ChangeCounts();
  private readonly reasons = new Tally();
  private readonly quality = { rewritten: noQuality(), asPlanned: noQuality() };
  private readonly crossed = new CrossedCounts();
  private readonly rewrites = new RewriteCounts();
  private readonly prediction = new PredictionCounts();

  constructor(private readonly series: string) {}

  add(record: SessionRecord, series: RecordedSeries): void {
    this.outcomes[series.outcome] += 1;
    const changed = this.changes.add(series);
    const isRewritten = changed.length > 0;
    this.quality[isRewritten ? 'rewritten' : 'asPlanned'][series.quality ?? 'notSaid'] += 1;
    this.prediction.add(series, record.day);
    if (!isRewritten && series.outcome === 'done' && series.crossed.length === 0) return;
    const reasons = reasonsOf(record, series);
    if (isRewritten) {
      this.rewritten += 1;
      this.rewrites.add(series, changed, reasons);
    }
    if (isRewritten || series.outcome !== 'done') for (const reason of reasons) this.reasons.add(reason);
    if (series.crossed.length > 0) this.crossed.add(record, series, reasons[0] ?? '');
  }

  report(): SeriesReport {
    const { done, repeated, 'given-up': givenUp } = this.outcomes;
    const recorded = done + repeated + givenUp;
    return {
      series: this.series,
      recorded,
      run: done + repeated,
      done,
      repeated,
      givenUp,
      rewritten: this.rewritten,
      rates: { rewritten: shareOf(this.rewritten, recorded), repeated: shareOf(repeated, recorded), givenUp: shareOf(givenUp, recorded) },
      parameters: this.changes.report(),
      reasons: this.reasons.sorted(),
      quality: this.quality,
      crossed: this.crossed.report(),
      rewrites: this.rewrites.report(),
      prediction: this.prediction.report(),
    };
  }
}

function noQuality(): Record<Quality | 'notSaid', number> {
  return { diagnostic: 0, limited: 0, not: 0, notSaid: 0 };
}
