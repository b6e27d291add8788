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
import { isCrossed, isTimeCap, namesOfMustKeep } from './must-keep-test.js';
import { noFurtherBelow, type SearchSetting, shortfallOf } from './setting.js';
import { SignalShortcut, type StateModel } from './signal-shortcut.js';

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
  readonly timeKey: string;
  /** States with one of these have the same estimates of the shortest timing. */
  readonly minimumKey: string;
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

/** Values of some parameters as one word. */
function idOf(keys: readonly ParameterKey[], p: Parameters): string {
  let id = '';
  for (const key of keys) id += `${p[key]}|`;
  return id;
}

const rfLimitKeys = ['b1rmsUt', 'sarWkg', 'rfRatio'] as const;

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
  /** Null where each state needs its whole model. */
  readonly #shortcut: SignalShortcut | null;
  /** Variables that move a signal state. */
  readonly #moving: readonly number[];
  /** Of the parameters that time and shortest timing follow, those that a variable or carried timing can move. */
  readonly #timed: readonly ParameterKey[];
  readonly #minimal: readonly ParameterKey[];
  readonly #blurs = { linear: new Map<number, number | null>(), centric: new Map<number, number | null>() };
  /** Estimates of the shortest timing, by `minimumKey`, train and voxel. */
  readonly #minima = new Map<string, MinimumTiming>();

  constructor(setting: SearchSetting, groups: Groups) {
    const { problem, bands } = setting;
    const { series, rules } = problem;
    this.#setting = setting;
    this.#shortcut = SignalShortcut.serves(setting) ? new SignalShortcut(setting) : null;
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
    const { excitation, refocusing } = model.pulses;
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
      timeKey: `${idOf(this.#timed, parameters)}${model.rounds}`,
      minimumKey: `${idOf(this.#minimal, parameters)}${excitation.durationMs}|${refocusing?.durationMs}`,
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
    const { problem, baseline } = this.#setting;
    const b1Ratio = problem.readings.b1rmsUt === undefined ? 1 : problem.readings.b1rmsUt / baseline.model.b1PlusRmsUt;
    const finite = (value: number | null) => (value !== null && Number.isFinite(value) ? value : null);
    const contrastRatio = contrastRatioOf(target, comparison);
    const before = baseline.contrastRatio;
    const power = (b1PlusRmsUt / baseline.model.b1PlusRmsUt) ** 2;
    const sar = sarTrend(power, problem.scanner.fieldT / baseline.model.scanner.fieldT);
    return {
      scanTimeS: null,
      holdTimeS: null,
      contrastRatio: finite(contrastRatio),
      contrastRatioChange: finite(contrastRatio === null || before === null || before === 0 ? null : contrastRatio / before - 1),
      b1PlusRmsUt: finite(b1PlusRmsUt * b1Ratio),
      rfPowerTrend: finite(power),
      sarTrendLow: finite(sar.low),
      sarTrendHigh: finite(sar.high),
      blurFwhmPx: blurPx,
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

  /** True when a state, with the voxel of these parameters, is no further under the estimates of the shortest timing than the preset. */
  playable(state: SignalState, train: string, line: Parameters): boolean {
    const { scanner } = this.#setting.problem;
    const key = `${state.minimumKey}|${train}|${line.fieldOfViewMm}|${line.matrixPhase}|${line.sliceThicknessMm}|${line.sliceCount}`;
    let minimum = this.#minima.get(key);
    if (minimum === undefined) {
      const p = {
        ...state.parameters,
        fieldOfViewMm: line.fieldOfViewMm,
        matrixPhase: line.matrixPhase,
        sliceThicknessMm: line.sliceThicknessMm,
        sliceCount: line.sliceCount,
      };
      const acquisition = classRow(state.model.key).acquisition;
      minimum = minimumTiming(state.model.key, p, state.model.lines, geometryOf(acquisition, p), state.model.pulses, scanner);
      this.#minima.set(key, minimum);
    }
    return noFurtherBelow(shortfallOf(state.parameters, minimum), this.#setting.shortfall);
  }
}
