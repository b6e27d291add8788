import { contrastRatioOf, seriesNullMs } from '../calc/baseline.js';
import { blurFwhmPx } from '../calc/blur.js';
import type { AddCaution } from '../calc/caution.js';
import { driftCautions } from '../calc/cautions/drift-cautions.js';
import { echoPairCautions } from '../calc/cautions/echo-pair-cautions.js';
import { classRow } from '../calc/classes.js';
import { compareWith } from '../calc/compare.js';
import { evaluate } from '../calc/evaluate.js';
import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import { geometryOf } from '../calc/geometry.js';
import { type MinimumTiming, minimumTiming } from '../calc/minimum-timing.js';
import { modelOf, type SeriesModel, weightedSignal } from '../calc/model.js';
import type { ParameterKey } from '../calc/parameters.js';
import { resolveParameters } from '../calc/resolve.js';
import { sarTrend } from '../calc/rf.js';
import type { Parameters } from '../calc/series.js';
import { contrastEcho } from '../calc/signal/echo-train-signal.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from '../study/study.js';
import { trainLoss } from './balanced-loss.js';
import { type BandLimit, withinBand } from './bands.js';
import { type Groups, levelOf, noiseFigures } from './groups.js';
import { pointParameters } from './lattice.js';
import { limitedValue, limitVerdict, verdictRank } from './limits.js';
import type { LineBucket } from './line-buckets.js';
import { isCrossed, isTimeCap, namesOfMustKeep } from './must-keep-test.js';
import { keepsShortfall, type SearchSetting } from './setting.js';
import { SignalShortcut, type StateModel, type StateWords } from './signal-shortcut.js';

/** Timing, signal and RF of one choice of the signal variables, for one train and one choice of the shared ones. */
export interface SignalState {
  readonly parameters: Parameters;
  readonly model: StateModel;
  readonly target: number | null;
  readonly comparison: number | null;
  readonly blurPx: number | null;
  readonly power: number | null;
  readonly trainLoss: number;
  /** Verdict of the RF limits: 0 fits, 1 too close, 2 over. */
  readonly rfRank: 0 | 1 | 2;
  /** Largest RF value over its limit, 0 without one. */
  readonly rfExcess: number;
  /** States with one of these play their lines in the same time. */
  readonly timeId: number;
  /** States with one of these have the same estimates of the shortest timing. */
  readonly minimumId: number;
  /** SNR without signal, over the preset's, from which on the noise bands may be kept: within a billionth. */
  readonly quietFrom: number;
}

const timedKeys: readonly ParameterKey[] = [
  'repetitionTimeMs',
  'echoTrainLength',
  'dummyShots',
  'volumes',
  'slabs',
  'referenceScanS',
  'roundsPerHold',
  'linesPerBeat',
  'fatSuppression',
  'fatSuppressionEveryLines',
  'rfPulseStretch',
];
/** Pulses take time of their own only where the distance of fat-suppression blocks is stated. */
const blockKeys: readonly ParameterKey[] = ['fatSuppression', 'fatSuppressionEveryLines', 'rfPulseStretch'];
/** What the estimates of the shortest timing follow besides the pulses. */
const minimumKeys: readonly ParameterKey[] = [
  'echoTimeMs',
  'secondEchoTimeMs',
  'inversionTimeMs',
  'echoTrainLength',
  'echoSpacingMs',
  'flowCompensation',
  'slabSelective',
  'pixelBandwidthHz',
  'matrixRead',
];

/** A value as part of a name: objects by what they hold. */
function nameOf(value: unknown): string {
  return typeof value === 'object' ? JSON.stringify(value) : String(value as number | string | boolean | undefined);
}

/** Values of some parameters as one word. */
function idOf(keys: readonly ParameterKey[], p: Parameters): string {
  let id = '';
  for (const key of keys) id += `${nameOf(p[key])}|`;
  return id;
}

const rfLimitKeys = ['b1rmsUt', 'sarWkg', 'rfRatio'] as const;

type RfFigures = Pick<Figures, 'scanTimeS' | 'holdTimeS' | 'b1PlusRmsUt' | 'rfPowerTrend' | 'sarTrendLow' | 'sarTrendHigh'>;

function finite(value: number | null): number | null {
  return value !== null && Number.isFinite(value) ? value : null;
}

type QuickFigures = Pick<
  Figures,
  | 'scanTimeS'
  | 'holdTimeS'
  | 'contrastRatio'
  | 'contrastRatioChange'
  | 'b1PlusRmsUt'
  | 'rfPowerTrend'
  | 'sarTrendLow'
  | 'sarTrendHigh'
  | 'blurFwhmPx'
>;

/** Computes signal states of a setting: resolve and model once for each, then only what a way asks. */
export class SignalTable {
  readonly #setting: SearchSetting;
  readonly #bands: readonly BandLimit[];
  readonly #mustKeeps: readonly MustKeep[];
  /** States over an RF cap are formed too: only where the nearest way is asked for. */
  keepsOver = false;
  readonly #words: StateWords = {
    timeId: (p, rounds) => this.#idFor(`time ${idOf(this.#timed, p)}${rounds}`),
    minimumId: (p, { excitation, refocusing }) =>
      this.#idFor(`minimum ${idOf(this.#minimal, p)}${excitation.durationMs}|${refocusing?.durationMs}`),
  };
  /** Null where each state needs its whole model. */
  readonly #shortcut: SignalShortcut | null;
  /** Variables that move a signal state. */
  readonly #moving: readonly number[];
  /** Of the parameters that time and shortest timing follow, those that a variable or carried timing can move. */
  readonly #timed: readonly ParameterKey[];
  readonly #minimal: readonly ParameterKey[];
  readonly #blurs = { linear: new Map<number, number | null>(), centric: new Map<number, number | null>() };
  /** Estimates of the shortest timing: by train and voxel, then by `minimumId`. */
  readonly #minima = new Map<string, (MinimumTiming | undefined)[]>();
  readonly #minimaByBucket = new WeakMap<LineBucket, (MinimumTiming | undefined)[]>();
  /** Small numbers for what is told apart. */
  readonly #ids = new Map<string, number>();

  constructor(setting: SearchSetting, groups: Groups) {
    const { problem, bands } = setting;
    const { series, rules } = problem;
    this.#setting = setting;
    this.#shortcut = SignalShortcut.serves(setting)
      ? new SignalShortcut(setting, this.#words, (b1) => !this.keepsOver && this.#isOver(b1))
      : null;
    this.#moving = [...groups.shared, ...groups.signal];
    const moved: readonly ParameterKey[] = [
      ...setting.variables.map(({ key }) => key),
      'repetitionTimeMs',
      'echoTimeMs',
      'echoSpacingMs',
      'echoTrainLength',
    ];
    const blocks =
      problem.series.parameters.fatSuppressionEveryLines !== undefined ||
      setting.variables.some(({ key }) => key === 'fatSuppressionEveryLines');
    this.#timed = timedKeys.filter((key) => moved.includes(key) && (blocks || !blockKeys.includes(key)));
    this.#minimal = minimumKeys.filter((key) => moved.includes(key));
    const here = (level: string) => level === 'signal' || (groups.tied && level === 'both');
    this.#bands = bands.filter(({ figure }) => here(levelOf([figure], groups, setting)) && !noiseFigures.includes(figure));
    this.#mustKeeps = series.mustKeep.filter(
      (mustKeep) => !isTimeCap(mustKeep, rules) && here(levelOf(namesOfMustKeep(mustKeep, rules), groups, setting)),
    );
  }

  /** True when B1+rms alone puts a state over an RF limit. */
  #isOver(b1PlusRmsUt: number): boolean {
    const { problem, margins } = this.#setting;
    const figures = this.#rfFigures(b1PlusRmsUt);
    return rfLimitKeys.some((key) => {
      const limit = problem.limits[key];
      return limit !== undefined && limitVerdict(key, limitedValue(key, figures, problem.readings), limit, margins).word === 'OVER';
    });
  }

  /** The state of a point, whose line variables stand for its train; null where it is an error or breaks a band or a must-keep of the signal. */
  stateAt(point: ArrayLike<number>): SignalState | null {
    const setting = this.#setting;
    const { problem, presetFigures } = setting;
    const { readings, limits } = problem;
    const model = this.#shortcut === null ? this.#wholeModel(point) : this.#shortcut.modelAt(point, this.#moving);
    if (model === null) return null;
    const { parameters } = model;
    const blurPx = this.#blurPx(model);
    const figures = this.#quickFigures(model, blurPx);
    if (!this.#keeps(model, figures)) return null;
    let rfRank: 0 | 1 | 2 = 0;
    let rfExcess = 0;
    for (const key of rfLimitKeys) {
      const limit = limits[key];
      if (limit === undefined) continue;
      const value = limitedValue(key, figures, readings);
      const rank = verdictRank[limitVerdict(key, value, limit, setting.margins).word];
      if (rank > rfRank) rfRank = rank;
      rfExcess = Math.max(rfExcess, (value ?? Number.POSITIVE_INFINITY) / limit);
    }
    const power = figures.rfPowerTrend;
    return {
      parameters,
      model,
      target: model.target,
      comparison: model.comparison,
      blurPx,
      power,
      trainLoss: trainLoss(blurPx, presetFigures.blurFwhmPx, power, setting.rfCapped),
      rfRank,
      rfExcess,
      quietFrom: this.#quietFrom(model),
      timeId: model.ids?.timeId ?? this.#words.timeId(parameters, model.rounds),
      minimumId: model.ids?.minimumId ?? this.#words.minimumId(parameters, model.pulses),
    };
  }

  /** The model of a point by resolving and modelling it whole; null where it is an error. */
  #wholeModel(point: ArrayLike<number>): StateModel | null {
    const { problem, baseline, variables } = this.#setting;
    const { series, scanner } = problem;
    const { parameters } = resolveParameters(baseline, pointParameters(variables, point, problem.set), scanner);
    const model = modelOf({ ...series, parameters }, scanner, baseline.model.slotFactor);
    if (model.impossible !== null || (series.purpose === 'dynamic' && model.rounds > 1) || this.#hasError(model)) return null;
    const { key, rounds, lines, pulses, b1PlusRmsUt } = model;
    return {
      parameters: model.series.parameters,
      key,
      rounds,
      lines,
      pulses,
      ids: null,
      target: weightedSignal(model.target),
      comparison: weightedSignal(model.comparison),
      targetT2Ms: model.target?.t2Ms ?? null,
      b1PlusRmsUt,
    };
  }

  #hasError(model: SeriesModel): boolean {
    const { baseline } = this.#setting;
    const p = model.series.parameters;
    let error = false;
    const add: AddCaution = (_code, level) => {
      if (level === 'error') error = true;
    };
    if (p.inversionTimeMs !== undefined || p.diffusion !== undefined)
      driftCautions(model, seriesNullMs(model), compareWith(model, baseline), baseline, add);
    if (p.secondEchoTimeMs !== undefined) echoPairCautions(model, add);
    return error;
  }

  #blurPx({ key, parameters: p, targetT2Ms }: StateModel): number | null {
    if (targetT2Ms === null || !classRow(key).train) return null;
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

  /** Figures that follow the signal alone, as `compareWith` and `evaluate` give them. */
  #quickFigures({ target, comparison, b1PlusRmsUt }: StateModel, blurPx: number | null): QuickFigures {
    const { baseline } = this.#setting;
    const rf = this.#rfFigures(b1PlusRmsUt);
    const contrastRatio = contrastRatioOf(target, comparison);
    const before = baseline.contrastRatio;
    return {
      scanTimeS: null,
      holdTimeS: null,
      contrastRatio: finite(contrastRatio),
      contrastRatioChange: finite(contrastRatio === null || before === null || before === 0 ? null : contrastRatio / before - 1),
      b1PlusRmsUt: rf.b1PlusRmsUt,
      rfPowerTrend: rf.rfPowerTrend,
      sarTrendLow: rf.sarTrendLow,
      sarTrendHigh: rf.sarTrendHigh,
      blurFwhmPx: blurPx,
    };
  }

  #rfFigures(b1PlusRmsUt: number): RfFigures {
    const { problem, baseline } = this.#setting;
    const b1Ratio = problem.readings.b1rmsUt === undefined ? 1 : problem.readings.b1rmsUt / baseline.model.b1PlusRmsUt;
    const power = (b1PlusRmsUt / baseline.model.b1PlusRmsUt) ** 2;
    const sar = sarTrend(power, problem.scanner.fieldT / baseline.model.scanner.fieldT);
    return {
      scanTimeS: null,
      holdTimeS: null,
      b1PlusRmsUt: finite(b1PlusRmsUt * b1Ratio),
      rfPowerTrend: finite(power),
      sarTrendLow: finite(sar.low),
      sarTrendHigh: finite(sar.high),
    };
  }

  #keeps({ parameters }: StateModel, quick: QuickFigures): boolean {
    if (this.#bands.length === 0 && this.#mustKeeps.length === 0) return true;
    const { problem, baseline } = this.#setting;
    let all: Figures | null = null;
    const figure = (name: FigureKey): number | null => {
      if (name !== 'scanTimeS' && name !== 'holdTimeS' && Object.hasOwn(quick, name)) return quick[name as keyof QuickFigures];
      all ??= evaluate({ ...problem.series, parameters }, problem.scanner, problem.body, baseline, { readings: problem.readings }).figures;
      return all[name];
    };
    const parameterNamed = namedValues(parameters, {} as Figures);
    const valueNamed = (name: string) => (Object.hasOwn(figureTable, name) ? figure(name as FigureKey) : parameterNamed(name));
    return (
      this.#bands.every((band) => withinBand(band, figure(band.figure))) &&
      !this.#mustKeeps.some((mustKeep) => isCrossed(mustKeep, valueNamed, problem.rules))
    );
  }

  /** True when a state, with the voxel of a bucket, is no further under the estimates of the shortest timing than the preset. */
  playable(state: SignalState, bucket: LineBucket): boolean {
    const row = this.#minimaOf(bucket);
    let minimum = row[state.minimumId];
    if (minimum === undefined) {
      const { fieldOfViewMm, matrixPhase, sliceThicknessMm, sliceCount } = bucket.parameters;
      const p = { ...state.parameters, fieldOfViewMm, matrixPhase, sliceThicknessMm, sliceCount };
      const { key, lines, pulses } = state.model;
      minimum = minimumTiming(key, p, lines, geometryOf(classRow(key).acquisition, p), pulses, this.#setting.problem.scanner);
      row[state.minimumId] = minimum;
    }
    return keepsShortfall(state.parameters, minimum, this.#setting.shortfall);
  }

  #minimaOf(bucket: LineBucket): (MinimumTiming | undefined)[] {
    const known = this.#minimaByBucket.get(bucket);
    if (known !== undefined) return known;
    const { fieldOfViewMm, matrixPhase, sliceThicknessMm, sliceCount } = bucket.parameters;
    const key = `${bucket.train}|${fieldOfViewMm}|${matrixPhase}|${sliceThicknessMm}|${sliceCount}`;
    const row = this.#minima.get(key) ?? [];
    this.#minima.set(key, row);
    this.#minimaByBucket.set(bucket, row);
    return row;
  }

  /** The ratio of SNR without signal that the bands of SNR and contrast ask of this signal. */
  #quietFrom({ target, comparison }: StateModel): number {
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

  #idFor(word: string): number {
    let id = this.#ids.get(word);
    if (id === undefined) {
      id = this.#ids.size;
      this.#ids.set(word, id);
    }
    return id;
  }
}
