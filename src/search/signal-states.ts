import { contrastRatioOf } from '../calc/baseline.js';
import { blurFwhmPx } from '../calc/blur.js';
import { classRow } from '../calc/classes.js';
import { evaluate } from '../calc/evaluate.js';
import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import type { ParameterKey } from '../calc/parameters.js';
import { sarTrend } from '../calc/rf.js';
import type { Parameters } from '../calc/series.js';
import { contrastEcho } from '../calc/signal/echo-train-signal.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from '../study/study.js';
import { trainLoss } from './balanced-loss.js';
import { type BandLimit, withinBand } from './bands.js';
import { type Groups, levelOf, noiseFigures } from './groups.js';
import type { LatticeVariable } from './lattice.js';
import { limitedValue, limitVerdict, verdictRank } from './limits.js';
import { isCrossed, isTimeCap, namesOfMustKeep } from './must-keep-test.js';
import { comparedRepetitionMs, type SearchSetting } from './setting.js';
import { type StateModel, wholeModel } from './signal-model.js';
import { isFree, type SignalBase, type SignalPair, SignalShortcut } from './signal-shortcut.js';
import type { SignalState, SignalTiming, Timely } from './signal-state.js';
import { SignalWords } from './signal-words.js';

const rfLimitKeys = ['b1rmsUt', 'sarWkg', 'rfRatio'] as const;

function finite(value: number | null): number | null {
  return value !== null && Number.isFinite(value) ? value : null;
}

/** Figures that follow the signal alone. */
type QuickFigures = Pick<
  Figures,
  'contrastRatio' | 'contrastRatioChange' | 'b1PlusRmsUt' | 'rfPowerTrend' | 'sarTrendLow' | 'sarTrendHigh' | 'blurFwhmPx'
>;
type RfFigures = { -readonly [K in 'b1PlusRmsUt' | 'rfPowerTrend' | 'sarTrendLow' | 'sarTrendHigh']: Figures[K] };

/** RF of a state: its figures, and the verdict of the RF limits on them. */
interface RfState extends RfFigures {
  readonly scanTimeS: null;
  readonly holdTimeS: null;
  rank: 0 | 1 | 2;
  excess: number;
}

/** What states share that have their base and their TR in common. */
interface PairState extends SignalPair {
  /** False where signals or blur break a band of their own. */
  readonly kept: boolean;
  readonly quietFrom: number;
  readonly comparedRepetitionMs: number;
}

/** A free variable that the time of the lines follows. */
interface TimedVariable {
  readonly at: number;
  readonly key: ParameterKey;
  readonly count: number;
}

/** More splits and TRs than any search has. */
const mostRounds = 1024;
const mostRepetitions = 65536;

/** What states share that differ in free parameters alone. */
interface BaseState {
  readonly blurPx: number | null;
  readonly minimumId: number;
  /** What the time of the lines follows besides free variables. */
  readonly shotId: number;
  readonly pairs: Map<number, PairState>;
}

type Shortcut = SignalShortcut<BaseState>;
type Base = SignalBase<BaseState>;

/** Timing of a state of the shortcut before the state is formed. */
class ShortTiming implements SignalTiming {
  constructor(
    readonly timeId: number,
    readonly rounds: number,
    private readonly shortcut: Shortcut,
    private readonly base: Base,
    private readonly free: number,
  ) {}

  get parameters(): Parameters {
    return this.shortcut.parametersOf(this.base, this.free, this.rounds);
  }
}

/** A state of the shortcut: most of it is what its base and its TR say, and its parameters are put together when asked for. */
class ShortcutState implements SignalState {
  constructor(
    private readonly shortcut: Shortcut,
    private readonly base: Base,
    private readonly known: BaseState,
    private readonly pair: PairState,
    private readonly free: number,
    readonly rounds: number,
    readonly pulses: SignalState['pulses'],
    readonly power: number | null,
    readonly trainLoss: number,
    readonly rfRank: 0 | 1 | 2,
    readonly rfExcess: number,
    readonly timeId: number,
    readonly shotId: number,
    readonly dummyShots: number,
  ) {}

  get parameters(): Parameters {
    return this.shortcut.parametersOf(this.base, this.free, this.rounds);
  }
  get lines(): SignalState['lines'] {
    return this.base.lines;
  }
  get target(): number | null {
    return this.pair.target;
  }
  get comparison(): number | null {
    return this.pair.comparison;
  }
  get quietFrom(): number {
    return this.pair.quietFrom;
  }
  get blurPx(): number | null {
    return this.known.blurPx;
  }
  get minimumId(): number {
    return this.known.minimumId;
  }
  get echoTimeMs(): number {
    return this.base.parameters.echoTimeMs;
  }
  get echoSpacingMs(): number {
    return this.base.parameters.echoSpacingMs;
  }
  get comparedRepetitionMs(): number {
    return this.pair.comparedRepetitionMs;
  }
}

/** Computes signal states of a setting: only what a way asks, and what states share once. */
export class SignalTable {
  readonly #setting: SearchSetting;
  /** Bands of figures that follow signals and blur alone, and the others. */
  readonly #pairBands: readonly BandLimit[];
  readonly #otherBands: readonly BandLimit[];
  readonly #mustKeeps: readonly MustKeep[];
  /** States over an RF cap are formed too: only where the nearest way is asked for. */
  keepsOver = false;
  readonly #words: SignalWords;
  /** Null where each state needs its whole model. */
  readonly #shortcut: Shortcut | null;
  /** RF of the state asked for last. */
  readonly #rf: RfState = {
    scanTimeS: null,
    holdTimeS: null,
    b1PlusRmsUt: null,
    rfPowerTrend: null,
    sarTrendLow: null,
    sarTrendHigh: null,
    rank: 0,
    excess: 0,
  };
  /** True where bands or must-keeps ask for more than signals and blur. */
  readonly #asksMore: boolean;
  readonly #blurs = { linear: new Map<number, number | null>(), centric: new Map<number, number | null>() };
  /** Free variables that time follows, TR and dummies apart; and their keys with TR. */
  readonly #timed: readonly TimedVariable[];
  readonly #timedKeys: readonly ParameterKey[];
  readonly #repetitions = new Map<number, number>();

  constructor(setting: SearchSetting, groups: Groups) {
    const { problem, bands, variables } = setting;
    const { series, rules } = problem;
    this.#setting = setting;
    this.#words = new SignalWords(setting);
    const moving = [...groups.shared, ...groups.signal];
    this.#shortcut = SignalShortcut.serves(setting) ? new SignalShortcut(setting, moving) : null;
    this.#timed = moving
      .map((at) => ({ at, key: (variables[at] as LatticeVariable).key, count: (variables[at] as LatticeVariable).values.length }))
      .filter(({ key }) => this.#words.times(key) && isFree(key) && key !== 'repetitionTimeMs');
    this.#timedKeys = ['repetitionTimeMs', ...this.#timed.map(({ key }) => key)];
    const here = (level: string) => level === 'signal' || (groups.tied && level === 'both');
    const own = bands.filter(({ figure }) => here(levelOf([figure], groups, setting)) && !noiseFigures.includes(figure));
    const ofPair = ({ figure }: BandLimit) => figure === 'contrastRatio' || figure === 'contrastRatioChange' || figure === 'blurFwhmPx';
    this.#pairBands = own.filter(ofPair);
    this.#otherBands = own.filter((band) => !ofPair(band));
    this.#mustKeeps = series.mustKeep.filter(
      (mustKeep) => !isTimeCap(mustKeep, rules) && here(levelOf(namesOfMustKeep(mustKeep, rules), groups, setting)),
    );
    this.#asksMore = this.#otherBands.length > 0 || this.#mustKeeps.length > 0;
  }

  /** The state of a point, whose line variables stand for its train; null where it is an error or breaks a band or a must-keep of the signal. */
  stateAt(point: ArrayLike<number>, changes: number, timely: Timely): SignalState | null {
    if (this.#shortcut === null) return this.#wholeState(point);
    return this.#shortcut.stateAt(point) ? this.#shortState(this.#shortcut, point, changes, timely) : null;
  }

  /** Signal variables in the order in which their states are formed quickest. */
  inOrder(which: readonly number[]): readonly number[] {
    return this.#shortcut?.inOrder(which) ?? which;
  }

  /** Signal variables that time follows, where no other signal variable moves it but by more splits. */
  timedAlone(which: readonly number[]): readonly number[] {
    const { variables, baseline } = this.#setting;
    // In gradient echoes TR follows pulses and angle.
    if (this.#shortcut === null || classRow(baseline.model.key).gradientEcho) return [];
    return which.filter((at) => {
      const { key } = variables[at] as LatticeVariable;
      return key === 'dummyShots' || this.#words.times(key);
    });
  }

  /** False where a point leaves no time for any lines, whatever the variables that time does not follow are. */
  mayBeTimely(point: ArrayLike<number>, changes: number, timely: Timely): boolean {
    if (this.#shortcut === null) return true;
    const { base, rounds, free } = this.#shortcut.leastSplitAt(point);
    base.known ??= this.#formBaseState(base);
    const timeId = this.#words.timeId(this.#shotIdOf(base.known, base.scratch, rounds, point), base.scratch.dummyShots);
    return timely(new ShortTiming(timeId, rounds, this.#shortcut, base, free), changes);
  }

  /** True where the split of a state can be asked for before the state is formed. */
  get splitsApart(): boolean {
    return this.#shortcut !== null;
  }

  /** The split of the state of a point; null where its timing is impossible. */
  splitAt(point: ArrayLike<number>): number | null {
    return this.#shortcut?.stateAt(point) === true ? this.#shortcut.last.rounds : null;
  }

  /** The state whose split was asked for last. */
  stateAsked(point: ArrayLike<number>): SignalState | null {
    return this.#shortcut === null ? null : this.#shortState(this.#shortcut, point, 0, null);
  }

  #shortState(shortcut: Shortcut, point: ArrayLike<number>, changes: number, timely: Timely | null): SignalState | null {
    const { base, pulses, rounds, free, b1PlusRmsUt } = shortcut.last;
    base.known ??= this.#formBaseState(base);
    const { known } = base;
    const p = base.scratch;
    let pair = known.pairs.get(p.repetitionTimeMs);
    if (pair?.kept === false) return null;
    const shotId = this.#shotIdOf(known, p, rounds, point);
    const timeId = this.#words.timeId(shotId, p.dummyShots);
    // Signals without lines that leave time for them are not computed.
    if (timely !== null && !timely(new ShortTiming(timeId, rounds, shortcut, base, free), changes)) return null;
    const rf = this.#rfState(b1PlusRmsUt);
    // Nor where a state over an RF cap is of no use.
    if (rf.rank === 2 && !this.keepsOver) return null;
    if (pair === undefined) {
      pair = this.#pairState(shortcut.signals(), known.blurPx, p);
      known.pairs.set(p.repetitionTimeMs, pair);
    }
    if (!pair.kept || (this.#asksMore && !this.#keeps(shortcut.modelOf(pair), known.blurPx))) return null;
    const power = rf.rfPowerTrend;
    return new ShortcutState(
      shortcut,
      base,
      known,
      pair,
      free,
      rounds,
      pulses,
      power,
      trainLoss(known.blurPx, this.#setting.presetFigures.blurFwhmPx, power, this.#setting.rfCapped),
      rf.rank,
      rf.excess,
      timeId,
      shotId,
      p.dummyShots,
    );
  }

  /** What of the time of lines follows the base, TR, the split and each free variable, as one number. */
  #shotIdOf({ shotId }: BaseState, p: Parameters, rounds: number, point: ArrayLike<number>): number {
    let timed = (shotId * mostRounds + rounds) * mostRepetitions + this.#repetitionId(p.repetitionTimeMs);
    for (let k = 0; k < this.#timed.length; k += 1) {
      const { at, count } = this.#timed[k] as TimedVariable;
      timed = timed * count + (point[at] as number);
    }
    return this.#words.numberId(timed);
  }

  #repetitionId(repetitionTimeMs: number): number {
    let id = this.#repetitions.get(repetitionTimeMs);
    if (id === undefined) {
      id = this.#repetitions.size;
      this.#repetitions.set(repetitionTimeMs, id);
    }
    return id;
  }

  #wholeState(point: ArrayLike<number>): SignalState | null {
    const model = wholeModel(this.#setting, point);
    if (model === null) return null;
    const { parameters: p, rounds, lines, pulses, target, comparison, targetT2Ms } = model;
    const blurPx = this.#blurPx(p, targetT2Ms);
    const pair = this.#pairState(model, blurPx, p);
    if (!pair.kept) return null;
    const rf = this.#rfState(model.b1PlusRmsUt);
    if (this.#asksMore && !this.#keeps(model, blurPx)) return null;
    const power = rf.rfPowerTrend;
    const shotId = this.#words.shotId(p, rounds);
    return {
      parameters: p,
      rounds,
      lines,
      pulses,
      target,
      comparison,
      blurPx,
      power,
      trainLoss: trainLoss(blurPx, this.#setting.presetFigures.blurFwhmPx, power, this.#setting.rfCapped),
      rfRank: rf.rank,
      rfExcess: rf.excess,
      timeId: this.#words.timeId(shotId, p.dummyShots),
      shotId,
      dummyShots: p.dummyShots,
      minimumId: this.#words.minimumId(p, pulses),
      echoTimeMs: p.echoTimeMs,
      comparedRepetitionMs: pair.comparedRepetitionMs,
      echoSpacingMs: p.echoSpacingMs,
      quietFrom: pair.quietFrom,
    };
  }

  #formBaseState(base: Base): BaseState {
    return {
      blurPx: this.#blurPx(base.parameters, base.targetT2Ms),
      minimumId: this.#words.minimumId(base.parameters, base.pulses),
      shotId: this.#words.shotIdWithout(this.#timedKeys, base.parameters),
      pairs: new Map(),
    };
  }

  #blurPx(p: Parameters, targetT2Ms: number | null): number | null {
    if (targetT2Ms === null || !classRow(this.#setting.baseline.model.key).train) return null;
    const id = (p.echoTrainLength * p.echoSpacingMs) / targetT2Ms;
    const echo = contrastEcho(p.echoTimeMs, p.echoSpacingMs, p.echoTrainLength);
    const order = echo <= 2 ? 'centric' : 'linear';
    const known = this.#blurs[order].get(id);
    if (known !== undefined) return known;
    const blur = blurFwhmPx(id, order);
    const value = Number.isFinite(blur) ? blur : null;
    this.#blurs[order].set(id, value);
    return value;
  }

  #pairState({ target, comparison }: SignalPair, blurPx: number | null, p: Parameters): PairState {
    let kept = true;
    if (this.#pairBands.length > 0) {
      const { contrastRatio, contrastRatioChange } = this.#contrastFigures(target, comparison);
      for (const band of this.#pairBands) {
        const { figure } = band;
        const value = figure === 'blurFwhmPx' ? blurPx : figure === 'contrastRatio' ? contrastRatio : contrastRatioChange;
        kept &&= withinBand(band, value);
      }
    }
    return { target, comparison, kept, quietFrom: this.#quietFrom(target, comparison), comparedRepetitionMs: comparedRepetitionMs(p) };
  }

  /** As `compareWith` and `evaluate` give them. */
  #contrastFigures(target: number | null, comparison: number | null): Pick<Figures, 'contrastRatio' | 'contrastRatioChange'> {
    const contrastRatio = contrastRatioOf(target, comparison);
    const before = this.#setting.baseline.contrastRatio;
    return {
      contrastRatio: finite(contrastRatio),
      contrastRatioChange: finite(contrastRatio === null || before === null || before === 0 ? null : contrastRatio / before - 1),
    };
  }

  /** RF figures of B1+rms and the verdict on them: they stand until the next are asked for. */
  #rfState(b1PlusRmsUt: number): RfState {
    const { problem, baseline, margins } = this.#setting;
    const rf = this.#rf;
    const b1Ratio = problem.readings.b1rmsUt === undefined ? 1 : problem.readings.b1rmsUt / baseline.model.b1PlusRmsUt;
    const power = (b1PlusRmsUt / baseline.model.b1PlusRmsUt) ** 2;
    const sar = sarTrend(power, problem.scanner.fieldT / baseline.model.scanner.fieldT);
    rf.b1PlusRmsUt = finite(b1PlusRmsUt * b1Ratio);
    rf.rfPowerTrend = finite(power);
    rf.sarTrendLow = finite(sar.low);
    rf.sarTrendHigh = finite(sar.high);
    rf.rank = 0;
    rf.excess = 0;
    for (const key of rfLimitKeys) {
      const limit = problem.limits[key];
      if (limit === undefined) continue;
      const value = limitedValue(key, rf, problem.readings);
      const own = verdictRank[limitVerdict(key, value, limit, margins).word];
      if (own > rf.rank) rf.rank = own;
      rf.excess = Math.max(rf.excess, (value ?? Number.POSITIVE_INFINITY) / limit);
    }
    return rf;
  }

  #keeps({ parameters, target, comparison }: StateModel, blurPx: number | null): boolean {
    const { problem, baseline } = this.#setting;
    const { b1PlusRmsUt, rfPowerTrend, sarTrendLow, sarTrendHigh } = this.#rf;
    const quick: QuickFigures = {
      ...this.#contrastFigures(target, comparison),
      b1PlusRmsUt,
      rfPowerTrend,
      sarTrendLow,
      sarTrendHigh,
      blurFwhmPx: blurPx,
    };
    let all: Figures | null = null;
    const figure = (name: FigureKey): number | null => {
      if (Object.hasOwn(quick, name)) return quick[name as keyof QuickFigures];
      all ??= evaluate({ ...problem.series, parameters }, problem.scanner, problem.body, baseline, { readings: problem.readings }).figures;
      return all[name];
    };
    const parameterNamed = namedValues(parameters, {} as Figures);
    const valueNamed = (name: string) => (Object.hasOwn(figureTable, name) ? figure(name as FigureKey) : parameterNamed(name));
    return (
      this.#otherBands.every((band) => withinBand(band, figure(band.figure))) &&
      !this.#mustKeeps.some((mustKeep) => isCrossed(mustKeep, valueNamed, problem.rules))
    );
  }

  /** The ratio of SNR without signal that the bands of SNR and contrast ask of this signal. */
  #quietFrom(target: number | null, comparison: number | null): number {
    const { bands, baseline } = this.#setting;
    const { targetSignal, comparisonSignal } = baseline;
    let ratio = 0;
    for (const { figure, atLeast } of bands) {
      if (atLeast === null || !noiseFigures.includes(figure)) continue;
      if (target === null || targetSignal === null) return Number.POSITIVE_INFINITY;
      if (figure === 'relativeSnr') ratio = Math.max(ratio, (atLeast * targetSignal) / target);
      else if (comparison === null || comparisonSignal === null) return Number.POSITIVE_INFINITY;
      else ratio = Math.max(ratio, (atLeast * Math.abs(targetSignal - comparisonSignal)) / Math.abs(target - comparison));
    }
    return Number.isNaN(ratio) ? 0 : ratio;
  }
}
