import { type LimitKind, type Verdict, type VerdictWord, verdictOf } from '../calc/verdict.js';
import { scannerNow } from './equipment.js';
import { readingsOf, resultNow, sessionSeries } from './results.js';
import { sayNumber } from './say-number.js';
import { sayTime } from './say-time.js';
import { sayVerdict } from './say-verdict.js';
import type { SeriesResult } from './series-result.js';
import type { SessionSeries } from './session.js';
import type { State } from './state.js';
import { timeline } from './timeline.js';

/** A verdict and what it compares, in words. */
export interface Judged {
  readonly verdict: Verdict;
  /** Of which figure; `session` for the clock. */
  readonly of: 'holdTimeS' | 'scanTimeS' | 'b1PlusRmsUt' | 'sar' | 'session' | 'holds';
  /** `breath-hold 17.0 s, this patient 11 s`. */
  readonly against: string;
}

const weight: Readonly<Record<VerdictWord, number>> = { OVER: 0, 'TOO CLOSE': 1, FITS: 2 };

/** The worst first: OVER, then what is closest to its limit. */
function worstFirst(judged: readonly Judged[]): Judged[] {
  const share = ({ verdict }: Judged) => verdict.spare / Math.max(verdict.limit, 1e-9);
  return [...judged].sort((a, b) => weight[a.verdict.word] - weight[b.verdict.word] || share(a) - share(b));
}

/** The verdicts of one series under this patient's limits, worst first; without those of the clock. */
export function seriesVerdicts(state: State, id: string, result: SeriesResult = resultNow(state, id)): readonly Judged[] {
  const limits = state.session?.limits;
  if (limits === undefined) return [];
  const { figures } = result.evaluation;
  const series = sessionSeries(state, id);
  const readings = readingsOf(state, series);
  const margins = { modelErrorPercent: scannerNow(state)?.modelErrorPercent ?? 5, hasTimeReading: readings.timeS !== undefined };
  const judged: Judged[] = [];
  const add = (
    kind: LimitKind,
    of: Judged['of'],
    value: number | null,
    limit: number | null,
    words: (value: number, limit: number) => string,
  ) => {
    if (value !== null && limit !== null)
      judged.push({ verdict: verdictOf(kind, value, limit, margins), of, against: words(value, limit) });
  };
  add(
    'hold',
    'holdTimeS',
    figures.holdTimeS,
    limits.holdS,
    (value, limit) => `breath-hold ${sayTime(value)}, this patient ${sayNumber(limit)} s`,
  );
  add(
    'series',
    'scanTimeS',
    figures.scanTimeS,
    limits.longestSeriesS,
    (value, limit) => `series ${sayTime(value)}, none longer than ${sayTime(limit)}`,
  );
  if (readings.b1rmsUt !== undefined)
    add(
      'rf',
      'b1PlusRmsUt',
      figures.b1PlusRmsUt,
      limits.b1rmsCapUt,
      (value, limit) => `B1+rms ${value.toFixed(2)} uT, cap ${sayNumber(limit)} uT`,
    );
  if (readings.sarWkg !== undefined && figures.sarTrendHigh !== null) {
    add(
      'rf',
      'sar',
      readings.sarWkg * figures.sarTrendHigh,
      limits.sarCapWkg,
      (value, limit) => `SAR ${value.toFixed(2)} W/kg, cap ${sayNumber(limit)} W/kg`,
    );
  }
  return worstFirst(judged);
}

/** Caps that cannot be judged for want of the scanner's own number: SAR and B1+rms are only ever scaled from it. */
export function missingReadings(state: State, series: SessionSeries): readonly string[] {
  const { b1rmsCapUt = null, sarCapWkg = null } = state.session?.limits ?? {};
  const readings = readingsOf(state, series);
  return [
    ...(b1rmsCapUt !== null && readings.b1rmsUt === undefined ? [`B1+rms cap ${sayNumber(b1rmsCapUt)} uT`] : []),
    ...(sarCapWkg !== null && readings.sarWkg === undefined ? [`SAR cap ${sayNumber(sarCapWkg)} W/kg`] : []),
  ];
}

/** The verdict of the clock: everything that is still to do against the patient's minutes. */
function sessionVerdict(state: State): Judged | null {
  const { totalS, leftS } = timeline(state);
  if (leftS === null) return null;
  const verdict = verdictOf('session', totalS, Math.max(0, leftS), { modelErrorPercent: 5, hasTimeReading: false });
  return { verdict, of: 'session', against: `still to do ${sayTime(totalS)}, time left ${sayTime(Math.max(0, leftS))}` };
}

/** The first line of every screen. */
export interface Headline {
  /** Null while there is no limit to judge by. */
  readonly word: VerdictWord | null;
  readonly text: string;
}

/** `FITS, 0.17 uT to spare`: the verdict alone, with the unit of what is judged. */
export function sayJudgedAlone({ verdict, of }: Pick<Judged, 'verdict' | 'of'>): string {
  const unit = of === 'b1PlusRmsUt' ? ' uT' : of === 'sar' ? ' W/kg' : '';
  const said = sayVerdict(verdict);
  if (unit === '') return said;
  return verdict.word === 'OVER' ? `${said}${unit}` : said.replace(' to spare', `${unit} to spare`);
}

/** `OVER by 6.0 s: breath-hold 17.0 s, this patient 11 s`. */
export function sayJudged(judged: Judged): string {
  return `${sayJudgedAlone(judged)}: ${judged.against}`;
}

/** The same of one series among others: `OVER by 1.8 s: t1-3d, breath-hold 12.8 s, this patient 11 s`. */
function sayJudgedOf(id: string, judged: Judged): string {
  return sayJudged({ ...judged, against: `${id}, ${judged.against}` });
}

/** The headline of one series. */
export function seriesHeadline(state: State, id: string): Headline {
  const judged = seriesVerdicts(state, id);
  const missing = missingReadings(state, sessionSeries(state, id));
  const worst = judged[0];
  const bad = judged.filter(({ verdict }) => verdict.word !== 'FITS').length;
  const crossed = resultNow(state, id).mustKeeps.filter(({ status }) => status === 'crossed').length;
  const broken = crossed === 0 ? '' : `; ${crossed} must-keep${crossed > 1 ? 's' : ''} crossed`;
  const more = `${bad > 1 ? ` (and ${bad - 1} more)` : ''}${broken}`;
  const unjudged = missing.length === 0 ? '' : `${missing[0]} not judged: type the scanner's number (d)`;
  if (worst !== undefined && (worst.verdict.word === 'OVER' || unjudged === ''))
    return { word: worst.verdict.word, text: `${sayJudged(worst)}${more}` };
  if (unjudged !== '') return { word: null, text: `NOT JUDGED: ${unjudged}` };
  const { figures } = resultNow(state, id).evaluation;
  const takes = figures.holdTimeS === null ? `scan time ${sayTime(figures.scanTimeS ?? 0)}` : `breath-hold ${sayTime(figures.holdTimeS)}`;
  return { word: null, text: `NO LIMIT SET: ${takes}${broken === '' ? '; p says what this patient can do' : broken}` };
}

/** The headline of the whole session: the worst of the clock and of every series still to do. */
export function sessionHeadline(state: State): Headline {
  const { session } = state;
  if (session === null) return { word: null, text: 'Choose a field strength and a region' };
  const clock = sessionVerdict(state);
  const open = session.series.filter((series) => series.state === 'to-do' || series.state === 'running');
  const worstOf = open.flatMap(({ id }) =>
    seriesVerdicts(state, id)
      .slice(0, 1)
      .map((judged) => ({ id, judged })),
  );
  const over = worstOf.filter(({ judged }) => judged.verdict.word === 'OVER');
  if (clock !== null && clock.verdict.word === 'OVER')
    return { word: 'OVER', text: `${sayJudged(clock)}${over.length > 0 ? ` (and ${over.length} series)` : ''}` };
  const first = over[0];
  if (first !== undefined)
    return { word: 'OVER', text: `${sayJudgedOf(first.id, first.judged)}${over.length > 1 ? ` (and ${over.length - 1} more)` : ''}` };
  const close = worstOf.find(({ judged }) => judged.verdict.word === 'TOO CLOSE');
  if (clock !== null && clock.verdict.word === 'TOO CLOSE') return { word: 'TOO CLOSE', text: sayJudged(clock) };
  if (close !== undefined) return { word: 'TOO CLOSE', text: sayJudgedOf(close.id, close.judged) };
  const unread = open.find((series) => missingReadings(state, series).length > 0);
  if (unread !== undefined)
    return { word: null, text: `NOT JUDGED: ${unread.id}, ${missingReadings(state, unread)[0]}: type the scanner's number` };
  if (clock !== null) return { word: 'FITS', text: sayJudged(clock) };
  if (worstOf.length > 0) return { word: 'FITS', text: `FITS: ${worstOf.length} series within this patient's limits` };
  return { word: null, text: `NO LIMIT SET: planned ${sayTime(timeline(state).totalS)}; p says what this patient can do` };
}
