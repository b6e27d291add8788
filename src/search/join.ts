import type { Figures } from '../calc/figures.js';
import type { Lines } from '../calc/lines.js';
import type { Parameters } from '../calc/series.js';
import { seriesTime } from '../calc/time.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from '../study/study.js';
import { addLosses, noiseLoss } from './balanced-loss.js';
import { type BandLimit, withinBand } from './bands.js';
import { noiseFigures } from './groups.js';
import { comparedTimeS } from './judge.js';
import { limitedValue, limitVerdict, verdictRank } from './limits.js';
import type { LineBucket } from './line-buckets.js';
import { isCrossed, isTimeCap } from './must-keep-test.js';
import type { SearchSetting } from './setting.js';
import type { SignalState } from './signal-states.js';

/** Time of one count of lines under one timing. */
export interface JoinedTime {
  /** The time that ways are compared by, s. */
  readonly timeS: number;
  /** Verdict of the time limits: 0 fits, 1 too close, 2 over. */
  readonly rank: 0 | 1 | 2;
  /** Largest time over its limit, 0 without one. */
  readonly excess: number;
  /** False where a must-keep caps time below this. */
  readonly kept: boolean;
}

/** SNR and contrast of a line state and a signal state together. */
export interface JoinedNoise {
  readonly snr: number | null;
  readonly contrast: number | null;
}

/** What plays its lines in the same time: parameters that time asks, and times by lines. */
interface TimeFamily {
  readonly parameters: Parameters;
  readonly times: Map<number, JoinedTime>;
}

const equalShare = 0.01;

/** Puts line states and signal states together: the same numbers, by the same functions and in the same order as `evaluate`. */
export class Join {
  readonly #setting: SearchSetting;
  readonly #timeCaps: readonly MustKeep[];
  readonly #noiseBands: readonly BandLimit[];
  /** |target - comparison| of the preset, null where it is too small to compare with. */
  readonly #contrastBefore: number | null;
  readonly #byBucket = new Map<LineBucket, (TimeFamily | undefined)[]>();
  #lastBucket: LineBucket | null = null;
  #lastRow: (TimeFamily | undefined)[] = [];
  readonly #families = new Map<string, TimeFamily>();

  constructor(setting: SearchSetting) {
    this.#setting = setting;
    const { mustKeep } = setting.problem.series;
    this.#timeCaps = mustKeep.filter((one) => isTimeCap(one, setting.problem.rules));
    this.#noiseBands = setting.bands.filter(({ figure }) => noiseFigures.includes(figure));
    const { targetSignal, comparisonSignal } = setting.baseline;
    const before = targetSignal === null || comparisonSignal === null ? 0 : Math.abs(targetSignal - comparisonSignal);
    this.#contrastBefore =
      before > 0 && before >= equalShare * Math.max(targetSignal as number, comparisonSignal as number) ? before : null;
  }

  /** Forgets times of buckets that are no longer needed. */
  forget(): void {
    this.#byBucket.clear();
    this.#lastBucket = null;
    this.#families.clear();
  }

  /** Time of a count of lines; it never falls when lines are added. */
  time(state: SignalState, bucket: LineBucket, lineCount: number): JoinedTime {
    const family = this.#familyOf(state, bucket);
    let time = family.times.get(lineCount);
    if (time === undefined) {
      time = this.#computeTime(state, family.parameters, lineCount);
      family.times.set(lineCount, time);
    }
    return time;
  }

  #familyOf(state: SignalState, bucket: LineBucket): TimeFamily {
    if (this.#lastBucket !== bucket) {
      this.#lastBucket = bucket;
      this.#lastRow = this.#byBucket.get(bucket) ?? [];
      this.#byBucket.set(bucket, this.#lastRow);
    }
    const known = this.#lastRow[state.timeId];
    if (known !== undefined) return known;
    const { averages, ellipticalSampling, matrixPhase, parallelFactorPhase, sliceCount } = bucket.parameters;
    // Blades follow matrix and acceleration besides their lines; elsewhere lines say all.
    const blades = this.#setting.problem.series.family === 'rotating-strip-fast-spin-echo';
    const key = `${state.timeId}|${averages}|${ellipticalSampling}${blades ? `|${matrixPhase}|${parallelFactorPhase}` : ''}`;
    let family = this.#families.get(key);
    if (family === undefined) {
      family = {
        parameters: { ...state.parameters, averages, ellipticalSampling, matrixPhase, parallelFactorPhase, sliceCount },
        times: new Map(),
      };
      this.#families.set(key, family);
    }
    this.#lastRow[state.timeId] = family;
    return family;
  }

  #computeTime(state: SignalState, p: Parameters, lineCount: number): JoinedTime {
    const { problem, baseline, margins } = this.#setting;
    const lines = { phase: lineCount, total: lineCount } as Lines;
    const time = seriesTime(state.model.key, p, lines, state.model.rounds, problem.scanner);
    const timeRatio = problem.readings.timeS === undefined ? 1 : problem.readings.timeS / baseline.model.time.scanTimeS;
    const figures = {
      scanTimeS: time.scanTimeS * timeRatio,
      holdTimeS: time.holdTimeS === null ? null : time.holdTimeS * timeRatio,
      b1PlusRmsUt: null,
      sarTrendHigh: null,
    };
    let rank: 0 | 1 | 2 = 0;
    let excess = 0;
    for (const key of ['holdS', 'timeS'] as const) {
      const limit = problem.limits[key];
      if (limit === undefined) continue;
      const value = limitedValue(key, figures, problem.readings);
      const own = verdictRank[limitVerdict(key, value, limit, margins).word];
      if (own > rank) rank = own;
      excess = Math.max(excess, (value ?? Number.POSITIVE_INFINITY) / limit);
    }
    let kept = true;
    if (this.#timeCaps.length > 0) {
      const valueNamed = namedValues(p, { ...figures, tableTimeS: time.tableTimeS } as unknown as Figures);
      kept = !this.#timeCaps.some((cap) => isCrossed(cap, valueNamed, problem.rules));
    }
    return { timeS: comparedTimeS(this.#setting, figures), rank, excess, kept };
  }

  /** SNR and contrast together. */
  noise(state: SignalState, signalFreeSnr: number | null): JoinedNoise {
    const { baseline } = this.#setting;
    const before = baseline.model.signalFreeSnr;
    if (signalFreeSnr === null || before === null) return { snr: null, contrast: null };
    const ratio = signalFreeSnr / before;
    const { target, comparison } = state;
    const { targetSignal, comparisonSignal } = baseline;
    const snr = target === null || targetSignal === null || targetSignal === 0 ? null : (ratio * target) / targetSignal;
    const contrast =
      this.#contrastBefore === null || target === null || comparison === null || targetSignal === null || comparisonSignal === null
        ? null
        : (ratio * Math.abs(target - comparison)) / this.#contrastBefore;
    return {
      snr: snr !== null && Number.isFinite(snr) ? snr : null,
      contrast: contrast !== null && Number.isFinite(contrast) ? contrast : null,
    };
  }

  /** `audible` of `noise`, without forming it. */
  audibleAt(state: SignalState, signalFreeSnr: number | null): boolean {
    if (this.#noiseBands.length === 0) return true;
    const { baseline } = this.#setting;
    const before = baseline.model.signalFreeSnr;
    const { targetSignal } = baseline;
    const { target, comparison } = state;
    if (signalFreeSnr === null || before === null || target === null || targetSignal === null) return false;
    const ratio = signalFreeSnr / before;
    for (const band of this.#noiseBands) {
      if (band.figure === 'relativeSnr') {
        if (!withinBand(band, (ratio * target) / targetSignal)) return false;
      } else if (
        comparison === null ||
        this.#contrastBefore === null ||
        !withinBand(band, (ratio * Math.abs(target - comparison)) / this.#contrastBefore)
      )
        return false;
    }
    return true;
  }

  /** True when SNR and contrast keep within their bands; more signal without noise never breaks one. */
  audible({ snr, contrast }: JoinedNoise): boolean {
    return this.#noiseBands.every((band) => withinBand(band, band.figure === 'relativeSnr' ? snr : contrast));
  }

  /** Balanced loss of a bucket, a signal state and their noise. */
  loss(bucket: LineBucket, state: SignalState, { snr, contrast }: JoinedNoise): number {
    return addLosses(bucket.geometryLoss, state.trainLoss, noiseLoss(snr, contrast));
  }
}
