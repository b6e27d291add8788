import { seriesNullMs } from '../calc/baseline.js';
import { blurFwhmPx } from '../calc/blur.js';
import type { AddCaution } from '../calc/caution.js';
import { driftCautions } from '../calc/cautions/drift-cautions.js';
import { echoPairCautions } from '../calc/cautions/echo-pair-cautions.js';
import { classRow } from '../calc/classes.js';
import { type Comparison, compareWith } from '../calc/compare.js';
import { evaluate } from '../calc/evaluate.js';
import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import { geometryOf } from '../calc/geometry.js';
import { type MinimumTiming, minimumTiming } from '../calc/minimum-timing.js';
import { modelOf, type SeriesModel, weightedSignal } from '../calc/model.js';
import type { ParameterKey } from '../calc/parameters.js';
import { resolveParameters } from '../calc/resolve.js';
import type { Parameters } from '../calc/series.js';
import { contrastEcho } from '../calc/signal/echo-train-signal.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from '../study/study.js';
import { trainLoss } from './balanced-loss.js';
import { type BandLimit, withinBand } from './bands.js';
import { type Groups, levelOf, noiseFigures } from './groups.js';
import { pointParameters } from './lattice.js';
import { limitedValue, limitKeys, limitVerdict, verdictRank } from './limits.js';
import { isCrossed, isTimeCap, namesOfMustKeep } from './must-keep-test.js';
import { noFurtherBelow, type SearchSetting, shortfallOf } from './setting.js';

/** Timing, signal and RF of one choice of the signal variables, for one train and one choice of the shared ones. */
export interface SignalState {
  readonly parameters: Parameters;
  readonly model: SeriesModel;
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

/** Computes signal states of a setting: resolve and model once for each, then only what a way asks. */
export class SignalTable {
  readonly #setting: SearchSetting;
  readonly #bands: readonly BandLimit[];
  readonly #mustKeeps: readonly MustKeep[];
  /** Estimates of the shortest timing, by `minimumKey`, train and voxel. */
  readonly #minima = new Map<string, MinimumTiming>();

  constructor(setting: SearchSetting, groups: Groups) {
    const { problem, bands } = setting;
    const { series, rules } = problem;
    this.#setting = setting;
    const here = (level: string) => level === 'signal' || (groups.tied && level === 'both');
    this.#bands = bands.filter(({ figure }) => here(levelOf([figure], groups, setting)) && !noiseFigures.includes(figure));
    this.#mustKeeps = series.mustKeep.filter(
      (mustKeep) => !isTimeCap(mustKeep, rules) && here(levelOf(namesOfMustKeep(mustKeep, rules), groups, setting)),
    );
  }

  /** The state of a point, whose line variables stand for its train; null where it is an error or breaks a band or a must-keep of the signal. */
  stateAt(point: ArrayLike<number>): SignalState | null {
    const setting = this.#setting;
    const { problem, baseline, presetFigures } = setting;
    const { series, scanner, readings, limits } = problem;
    const { parameters } = resolveParameters(baseline, pointParameters(setting.variables, point, problem.set), scanner);
    const model = modelOf({ ...series, parameters }, scanner, baseline.model.slotFactor);
    if (model.impossible !== null || (series.purpose === 'dynamic' && model.rounds > 1)) return null;
    const comparison = compareWith(model, baseline);
    if (this.#hasError(model, comparison)) return null;
    const blurPx = this.#blurPx(model);
    const figures = this.#quickFigures(model, comparison, blurPx);
    if (!this.#keeps(model, figures)) return null;
    let rfRank: 0 | 1 | 2 = 0;
    let rfExcess = 0;
    for (const key of limitKeys) {
      const limit = limits[key];
      if (limit === undefined || key === 'holdS' || key === 'timeS') continue;
      const value = limitedValue(key, { ...presetFigures, ...figures }, readings);
      const rank = verdictRank[limitVerdict(key, value, limit, setting.margins).word];
      if (rank > rfRank) rfRank = rank;
      rfExcess = Math.max(rfExcess, (value ?? Number.POSITIVE_INFINITY) / limit);
    }
    const power = figures.rfPowerTrend as number | null;
    return {
      parameters,
      model,
      target: weightedSignal(model.target),
      comparison: weightedSignal(model.comparison),
      blurPx,
      power,
      trainLoss: trainLoss(blurPx, presetFigures.blurFwhmPx, power, setting.rfCapped),
      rfRank,
      rfExcess,
      timeKey: `${timedKeys.map((key) => parameters[key]).join('|')}|${model.rounds}`,
      minimumKey: `${minimumKeys.map((key) => parameters[key]).join('|')}|${model.pulses.excitation.durationMs}|${model.pulses.refocusing?.durationMs}`,
    };
  }

  #hasError(model: SeriesModel, comparison: Comparison): boolean {
    const { baseline } = this.#setting;
    const p = model.series.parameters;
    let error = false;
    const add: AddCaution = (_code, level) => {
      if (level === 'error') error = true;
    };
    if (p.inversionTimeMs !== undefined || p.diffusion !== undefined) driftCautions(model, seriesNullMs(model), comparison, baseline, add);
    if (p.secondEchoTimeMs !== undefined) echoPairCautions(model, add);
    return error;
  }

  #blurPx(model: SeriesModel): number | null {
    const p = model.series.parameters;
    if (!classRow(model.key).train || model.target === null) return null;
    const echo = contrastEcho(p.echoTimeMs, p.echoSpacingMs, p.echoTrainLength);
    const blur = blurFwhmPx((p.echoTrainLength * p.echoSpacingMs) / model.target.t2Ms, echo <= 2 ? 'centric' : 'linear');
    return Number.isFinite(blur) ? blur : null;
  }

  #quickFigures(model: SeriesModel, comparison: Comparison, blurPx: number | null): Partial<Record<FigureKey, number | null>> {
    const { readings } = this.#setting.problem;
    const b1Ratio = readings.b1rmsUt === undefined ? 1 : readings.b1rmsUt / this.#setting.baseline.model.b1PlusRmsUt;
    const finite = (value: number | null) => (value !== null && Number.isFinite(value) ? value : null);
    return {
      contrastRatio: finite(comparison.contrastRatio),
      contrastRatioChange: finite(comparison.contrastRatioChange),
      b1PlusRmsUt: finite(model.b1PlusRmsUt * b1Ratio),
      rfPowerTrend: finite(comparison.rfPowerTrend),
      sarTrendLow: finite(comparison.sarTrendLow),
      sarTrendHigh: finite(comparison.sarTrendHigh),
      blurFwhmPx: blurPx,
    };
  }

  #keeps(model: SeriesModel, quick: Partial<Record<FigureKey, number | null>>): boolean {
    if (this.#bands.length === 0 && this.#mustKeeps.length === 0) return true;
    const { problem, baseline } = this.#setting;
    let all: Figures | null = null;
    const figure = (name: FigureKey): number | null => {
      const known = quick[name];
      if (known !== undefined) return known;
      all ??= evaluate(model.series, problem.scanner, problem.body, baseline, { readings: problem.readings }).figures;
      return all[name];
    };
    const parameterNamed = namedValues(model.series.parameters, {} as Figures);
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
