import { addLosses, noiseLoss } from './balanced-loss.js';
import { type BandLimit, withinBand } from './bands.js';
import { noiseFigures } from './groups.js';
import type { LineBucket } from './line-buckets.js';
import type { SearchSetting } from './setting.js';
import type { SignalState, SignalTiming } from './signal-state.js';
import { TimeFamily, type TimeRules, timeRulesOf } from './time-family.js';

/** SNR and contrast of a line state and a signal state together. */
export interface JoinedNoise {
  readonly snr: number | null;
  readonly contrast: number | null;
}

/** What noise asks of a signal: of one state, or the best that any of several gives. */
export type Signals = Pick<SignalState, 'target' | 'comparison'>;

const equalShare = 0.01;

/** Puts line states and signal states together: the same numbers, by the same functions and in the same order as `evaluate`. */
export class Join {
  readonly #timeRules: TimeRules;
  readonly noiseBands: readonly BandLimit[];
  /** Preset: SNR without signal, signal of the target, and |target - comparison|; null where there is none to compare with. */
  readonly signalFreeBefore: number | null;
  readonly targetBefore: number | null;
  readonly contrastBefore: number | null;
  readonly #families: TimeFamily[][] = [];

  constructor(setting: SearchSetting) {
    this.#timeRules = timeRulesOf(setting);
    this.noiseBands = setting.bands.filter(({ figure }) => noiseFigures.includes(figure));
    const { targetSignal, comparisonSignal, model } = setting.baseline;
    const before = targetSignal === null || comparisonSignal === null ? 0 : Math.abs(targetSignal - comparisonSignal);
    this.signalFreeBefore = model.signalFreeSnr;
    this.targetBefore = targetSignal;
    this.contrastBefore = before > 0 && before >= equalShare * Math.max(targetSignal as number, comparisonSignal as number) ? before : null;
  }

  /** Forgets times of what is no longer needed. */
  forget(): void {
    this.#families.length = 0;
  }

  /** Times of the lines of a bucket under a timing. */
  times(state: SignalTiming, bucket: Pick<LineBucket, 'timeId' | 'parameters'>): TimeFamily {
    let row = this.#families[bucket.timeId];
    if (row === undefined) {
      row = [];
      this.#families[bucket.timeId] = row;
    }
    let family = row[state.timeId];
    if (family === undefined) {
      const { averages, ellipticalSampling, matrixPhase, parallelFactorPhase, sliceCount } = bucket.parameters;
      const p = { ...state.parameters, averages, ellipticalSampling, matrixPhase, parallelFactorPhase, sliceCount };
      family = new TimeFamily(this.#timeRules, p, state.rounds);
      row[state.timeId] = family;
    }
    return family;
  }

  /** SNR and contrast together. */
  noise({ target, comparison }: Signals, signalFreeSnr: number | null): JoinedNoise {
    const { signalFreeBefore, targetBefore, contrastBefore } = this;
    if (signalFreeSnr === null || signalFreeBefore === null) return { snr: null, contrast: null };
    const ratio = signalFreeSnr / signalFreeBefore;
    const snr = target === null || targetBefore === null || targetBefore === 0 ? null : (ratio * target) / targetBefore;
    const contrast =
      contrastBefore === null || target === null || comparison === null ? null : (ratio * Math.abs(target - comparison)) / contrastBefore;
    return {
      snr: snr !== null && Number.isFinite(snr) ? snr : null,
      contrast: contrast !== null && Number.isFinite(contrast) ? contrast : null,
    };
  }

  /** `audible` of `noise`, without forming it. */
  audibleAt(signals: Signals, signalFreeSnr: number | null): boolean {
    return this.noiseBands.length === 0 || this.audible(this.noise(signals, signalFreeSnr));
  }

  /** True when SNR and contrast keep within their bands; more signal without noise never breaks one. */
  audible({ snr, contrast }: JoinedNoise): boolean {
    for (const band of this.noiseBands) if (!withinBand(band, band.figure === 'relativeSnr' ? snr : contrast)) return false;
    return true;
  }

  /** Balanced loss of a bucket, a signal state and their noise. */
  loss(bucket: Pick<LineBucket, 'geometryLoss'>, state: Pick<SignalState, 'trainLoss'>, { snr, contrast }: JoinedNoise): number {
    return addLosses(bucket.geometryLoss, state.trainLoss, noiseLoss(snr, contrast));
  }
}
