import { contrastRatioOf } from '../calc/baseline.js';
import { blurFwhmPx } from '../calc/blur.js';
import { classRow } from '../calc/classes.js';
import { evaluate } from '../calc/evaluate.js';
import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
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
import { type SignalBase, type SignalPair, SignalShortcut } from './signal-shortcut.js';
import type { SignalState } from './signal-state.js';
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
type RfFigures = Pick<Figures, 'scanTimeS' | 'holdTimeS' | 'b1PlusRmsUt' | 'rfPowerTrend' | 'sarTrendLow' | 'sarTrendHigh'>;

/** RF of a state: its figures, and the verdict of the RF limits on them. */
interface RfState {
  readonly figures: RfFigures;
  readonly rank: 0 | 1 | 2;
  readonly excess: number;
}

/** What states share that have their base and their TR in common. */
interface PairState extends SignalPair {
  /** False where signals or blur break a band of their own. */
  readonly kept: boolean;
  readonly quietFrom: number;
}

/** What states share that differ in free parameters alone. */
interface BaseState {
  readonly blurPx: number | null;
  readonly minimumId: number;
  readonly pairs: Map<number, PairState>;
  readonly shotIds: Map<number, number>;
}

/** A state of the shortcut: its parameters are put together when asked for. */
class ShortcutState implements SignalState {
  constructor(
    readonly rounds: number,
    readonly lines: SignalState['lines'],
    readonly pulses: SignalState['pulses'],
    readonly target: number | null,
    readonly comparison: number | null,
    readonly blurPx: number | null,
    readonly power: number | null,
    readonly trainLoss: number,
    readonly rfRank: 0 | 1 | 2,
    readonly rfExcess: number,
    readonly timeId: number,
    readonly shotId: number,
    readonly dummyShots: number,
    readonly minimumId: number,
    readonly echoTimeMs: number,
    readonly comparedRepetitionMs: number,
    readonly echoSpacingMs: number,
    readonly quietFrom: number,
    private readonly base: SignalBase,
    private readonly free: number,
    private readonly shortcut: SignalShortcut,
  ) {}

  get parameters(): Parameters {
    return this.shortcut.parametersOf(this.base, this.free, this.rounds);
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
  readonly #shortcut: SignalShortcut | null;
  readonly #bases = new WeakMap<SignalBase, BaseState>();
  readonly #blurs = { linear: new Map<number, number | null>(), centric: new Map<number, number | null>() };
  /** Free variables that time follows, dummies apart. */
  readonly #timed: readonly { readonly at: number; readonly count: number }[];

  constructor(setting: SearchSetting, groups: Groups) {
    const { problem, bands, variables } = setting;
    const { series, rules } = problem;
    this.#setting = setting;
    this.#words = new SignalWords(setting);
    const moving = [...groups.shared, ...groups.signal];
    this.#shortcut = SignalShortcut.serves(setting) ? new SignalShortcut(setting, moving) : null;
    this.#timed = moving
      .map((at) => ({ at, key: (variables[at] as LatticeVariable).key, count: (variables[at] as LatticeVariable).values.length }))
      .filter(({ key }) => this.#words.times(key));
    const here = (level: string) => level === 'signal' || (groups.tied && level === 'both');
    const own = bands.filter(({ figure }) => here(levelOf([figure], groups, setting)) && !noiseFigures.includes(figure));
    const ofPair = ({ figure }: BandLimit) => figure === 'contrastRatio' || figure === 'contrastRatioChange' || figure === 'blurFwhmPx';
    this.#pairBands = own.filter(ofPair);
    this.#otherBands = own.filter((band) => !ofPair(band));
    this.#mustKeeps = series.mustKeep.filter(
      (mustKeep) => !isTimeCap(mustKeep, rules) && here(levelOf(namesOfMustKeep(mustKeep, rules), groups, setting)),
    );
  }

  /** The state of a point, whose line variables stand for its train; null where it is an error or breaks a band or a must-keep of the signal. */
  stateAt(point: ArrayLike<number>): SignalState | null {
    if (this.#shortcut === null) return this.#wholeState(point);
    return this.#shortcut.stateAt(point) ? this.#shortState(this.#shortcut, point) : null;
  }

  /** Signal variables in the order in which their states are formed quickest. */
  inOrder(which: readonly number[]): readonly number[] {
    return this.#shortcut?.inOrder(which) ?? which;
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
    return this.#shortcut === null ? null : this.#shortState(this.#shortcut, point);
  }

  #shortState(shortcut: SignalShortcut, point: ArrayLike<number>): SignalState | null {
    const { base, pulses, rounds, free, b1PlusRmsUt } = shortcut.last;
    const rf = this.#rfState(b1PlusRmsUt);
    // Where a state over an RF cap is of no use, its signal is not computed.
    if (rf.rank === 2 && !this.keepsOver) return null;
    const p = base.scratch;
    const known = this.#baseState(base);
    let pair = known.pairs.get(p.repetitionTimeMs);
    if (pair === undefined) {
      pair = this.#pairState(shortcut.signals(), known.blurPx);
      known.pairs.set(p.repetitionTimeMs, pair);
    }
    if (!pair.kept || (this.#asksMore && !this.#keeps(shortcut.modelOf(pair), known.blurPx, rf))) return null;
    let timed = rounds;
    for (const { at, count } of this.#timed) timed = timed * count + (point[at] as number);
    let shotId = known.shotIds.get(timed);
    if (shotId === undefined) {
      shotId = this.#words.shotId(p, rounds);
      known.shotIds.set(timed, shotId);
    }
    const power = rf.figures.rfPowerTrend;
    const { target, comparison, quietFrom } = pair;
    return new ShortcutState(
      rounds,
      base.lines,
      pulses,
      target,
      comparison,
      known.blurPx,
      power,
      trainLoss(known.blurPx, this.#setting.presetFigures.blurFwhmPx, power, this.#setting.rfCapped),
      rf.rank,
      rf.excess,
      this.#words.timeId(shotId, p.dummyShots),
      shotId,
      p.dummyShots,
      known.minimumId,
      p.echoTimeMs,
      comparedRepetitionMs(p),
      p.echoSpacingMs,
      quietFrom,
      base,
      free,
      shortcut,
    );
  }

  #wholeState(point: ArrayLike<number>): SignalState | null {
    const model = wholeModel(this.#setting, point);
    if (model === null) return null;
    const { parameters: p, rounds, lines, pulses, target, comparison, targetT2Ms } = model;
    const blurPx = this.#blurPx(p, targetT2Ms);
    const pair = this.#pairState(model, blurPx);
    if (!pair.kept) return null;
    const rf = this.#rfState(model.b1PlusRmsUt);
    if (this.#asksMore && !this.#keeps(model, blurPx, rf)) return null;
    const power = rf.figures.rfPowerTrend;
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
      comparedRepetitionMs: comparedRepetitionMs(p),
      echoSpacingMs: p.echoSpacingMs,
      quietFrom: pair.quietFrom,
    };
  }

  #baseState(base: SignalBase): BaseState {
    let known = this.#bases.get(base);
    if (known === undefined) {
      known = {
        blurPx: this.#blurPx(base.parameters, base.targetT2Ms),
        minimumId: this.#words.minimumId(base.parameters, base.pulses),
        pairs: new Map(),
        shotIds: new Map(),
      };
      this.#bases.set(base, known);
    }
    return known;
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

  #pairState({ target, comparison }: SignalPair, blurPx: number | null): PairState {
    const figures = { ...this.#contrastFigures(target, comparison), blurFwhmPx: blurPx };
    const kept = this.#pairBands.every((band) => withinBand(band, figures[band.figure as keyof typeof figures]));
    return { target, comparison, kept, quietFrom: this.#quietFrom(target, comparison) };
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

  /** RF figures of B1+rms and the verdict on them. */
  #rfState(b1PlusRmsUt: number): RfState {
    const { problem, baseline, margins } = this.#setting;
    const b1Ratio = problem.readings.b1rmsUt === undefined ? 1 : problem.readings.b1rmsUt / baseline.model.b1PlusRmsUt;
    const power = (b1PlusRmsUt / baseline.model.b1PlusRmsUt) ** 2;
    const sar = sarTrend(power, problem.scanner.fieldT / baseline.model.scanner.fieldT);
    const figures: RfFigures = {
      scanTimeS: null,
      holdTimeS: null,
      b1PlusRmsUt: finite(b1PlusRmsUt * b1Ratio),
      rfPowerTrend: finite(power),
      sarTrendLow: finite(sar.low),
      sarTrendHigh: finite(sar.high),
    };
    let rank: 0 | 1 | 2 = 0;
    let excess = 0;
    for (const key of rfLimitKeys) {
      const limit = problem.limits[key];
      if (limit === undefined) continue;
      const value = limitedValue(key, figures, problem.readings);
      const own = verdictRank[limitVerdict(key, value, limit, margins).word];
      if (own > rank) rank = own;
      excess = Math.max(excess, (value ?? Number.POSITIVE_INFINITY) / limit);
    }
    return { figures, rank, excess };
  }

  /** True where bands or must-keeps ask for more than signals and blur. */
  get #asksMore(): boolean {
    return this.#otherBands.length > 0 || this.#mustKeeps.length > 0;
  }

  #keeps({ parameters, target, comparison }: StateModel, blurPx: number | null, rf: RfState): boolean {
    const { problem, baseline } = this.#setting;
    const { b1PlusRmsUt, rfPowerTrend, sarTrendLow, sarTrendHigh } = rf.figures;
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
