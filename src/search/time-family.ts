import type { ClassKey } from '../calc/classes.js';
import type { Figures } from '../calc/figures.js';
import type { Lines } from '../calc/lines.js';
import type { Parameters } from '../calc/series.js';
import { seriesTime } from '../calc/time.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from '../study/study.js';
import { comparedTimeS } from './judge.js';
import { limitedValue, limitVerdict, verdictRank } from './limits.js';
import { isCrossed, isTimeCap } from './must-keep-test.js';
import type { SearchSetting } from './setting.js';

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

/** What all times of a setting share. */
export interface TimeRules {
  readonly setting: SearchSetting;
  readonly key: ClassKey;
  /** Must-keeps that cap time. */
  readonly caps: readonly MustKeep[];
  /** Times are scaled so that the preset's is the one that was read. */
  readonly ratio: number;
}

export function timeRulesOf(setting: SearchSetting): TimeRules {
  const { problem, baseline } = setting;
  const { timeS } = problem.readings;
  return {
    setting,
    key: baseline.model.key,
    caps: problem.series.mustKeep.filter((one) => isTimeCap(one, problem.rules)),
    ratio: timeS === undefined ? 1 : timeS / baseline.model.time.scanTimeS,
  };
}

/** More lines than any series acquires. */
const anyLines = 2 ** 30;

/** What plays its lines in the same time. Time never falls when lines are added. */
export class TimeFamily {
  readonly #rules: TimeRules;
  readonly #parameters: Parameters;
  readonly #rounds: number;
  readonly #times = new Map<number, JoinedTime>();
  readonly #compared = new Map<number, number>();
  #mostLines: number | null = null;

  constructor(rules: TimeRules, parameters: Parameters, rounds: number) {
    this.#rules = rules;
    this.#parameters = parameters;
    this.#rounds = rounds;
  }

  /** The time that ways are compared by, s; infinite where a must-keep caps time below it. */
  comparedS(lineCount: number): number {
    let timeS = this.#compared.get(lineCount);
    if (timeS === undefined) {
      const { caps, setting } = this.#rules;
      if (caps.length > 0) {
        const time = this.at(lineCount);
        timeS = time.kept ? time.timeS : Number.POSITIVE_INFINITY;
      } else timeS = comparedTimeS(setting, this.#figuresAt(lineCount));
      this.#compared.set(lineCount, timeS);
    }
    return timeS;
  }

  /** True where no time limit and no cap forbids so many lines. */
  allows(lineCount: number): boolean {
    const { rank, kept } = this.at(lineCount);
    return rank < 2 && kept;
  }

  /** The most lines that no time limit and no cap forbids; 0 where there are none, infinite where nothing limits them. */
  get mostLines(): number {
    this.#mostLines ??= this.#findMostLines();
    return this.#mostLines;
  }

  #findMostLines(): number {
    const within = (lines: number) => {
      const { rank, kept } = this.#compute(lines);
      return rank < 2 && kept;
    };
    if (within(anyLines)) return Number.POSITIVE_INFINITY;
    let low = 0;
    let high = 64;
    while (within(high)) {
      low = high;
      high *= 4;
    }
    while (high - low > 1) {
      const middle = Math.floor((low + high) / 2);
      if (within(middle)) low = middle;
      else high = middle;
    }
    return low;
  }

  at(lineCount: number): JoinedTime {
    let time = this.#times.get(lineCount);
    if (time === undefined) {
      time = this.#compute(lineCount);
      this.#times.set(lineCount, time);
    }
    return time;
  }

  #figuresAt(lineCount: number): Pick<Figures, 'scanTimeS' | 'holdTimeS' | 'tableTimeS' | 'b1PlusRmsUt' | 'sarTrendHigh'> {
    const { setting, key, ratio } = this.#rules;
    const lines = { phase: lineCount, total: lineCount } as Lines;
    const time = seriesTime(key, this.#parameters, lines, this.#rounds, setting.problem.scanner);
    return {
      scanTimeS: time.scanTimeS * ratio,
      holdTimeS: time.holdTimeS === null ? null : time.holdTimeS * ratio,
      tableTimeS: time.tableTimeS,
      b1PlusRmsUt: null,
      sarTrendHigh: null,
    };
  }

  #compute(lineCount: number): JoinedTime {
    const { setting, caps } = this.#rules;
    const { problem, margins } = setting;
    const figures = this.#figuresAt(lineCount);
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
    if (caps.length > 0) {
      const valueNamed = namedValues(this.#parameters, figures as unknown as Figures);
      kept = !caps.some((cap) => isCrossed(cap, valueNamed, problem.rules));
    }
    return { timeS: comparedTimeS(setting, figures), rank, excess, kept };
  }
}
