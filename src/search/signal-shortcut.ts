import { classRow } from '../calc/classes.js';
import { echoAmplitude } from '../calc/echo-train.js';
import type { Lines } from '../calc/lines.js';
import { modelOf, type SeriesModel, type TissueSignal, weightedSignal } from '../calc/model.js';
import { effectiveRepetitionTimeMs, isCine } from '../calc/pacing.js';
import type { ParameterKey } from '../calc/parameters.js';
import { type SlotPulses, slotPulses } from '../calc/pulses.js';
import { resolveParameters } from '../calc/resolve.js';
import { seriesB1PlusRmsUt } from '../calc/rf.js';
import { guardedCeil } from '../calc/rounding.js';
import type { Parameters } from '../calc/series.js';
import { classSignal, type SignalSetting, trainTimingOf } from '../calc/signal/class-signal.js';
import { contrastEcho, type TrainEnd, trainEnd, trainLongitudinal } from '../calc/signal/echo-train-signal.js';
import { capacity, slotMs } from '../calc/slots.js';
import { type Tissue, tissueOf } from '../calc/tissues.js';
import { pointParameters } from './lattice.js';
import type { SearchSetting } from './setting.js';

/** What a signal state takes from a model. */
export interface StateModel {
  readonly parameters: Parameters;
  readonly key: SeriesModel['key'];
  readonly rounds: number;
  readonly lines: Lines;
  readonly pulses: SlotPulses;
  readonly target: number | null;
  readonly comparison: number | null;
  readonly targetT2Ms: number | null;
  readonly b1PlusRmsUt: number;
  /** Small numbers for timing and shortest timing where they are known already. */
  readonly ids: { readonly timeId: number; readonly minimumId: number } | null;
}

/** Gives small numbers to what time and shortest timing follow. */
export interface StateWords {
  readonly timeId: (p: Parameters, rounds: number) => number;
  readonly minimumId: (p: Parameters, pulses: SlotPulses) => number;
}

/** Parameters that move no other timing: TR, and what only slots, splits and counts of shots follow. */
const freeKeys: readonly ParameterKey[] = [
  'repetitionTimeMs',
  'saturationBands',
  'dummyShots',
  'volumes',
  'slabs',
  'referenceScanS',
  'rounds',
  'sliceCount',
  'sliceThicknessMm',
  'sliceGapMm',
  'roundsPerHold',
  'averages',
];

/** What all states share that differ in free parameters alone. */
interface Base {
  readonly model: SeriesModel;
  /** Excitation and train of each tissue, null outside trains. */
  readonly target: TissuePart | null;
  readonly comparison: TissuePart | null;
  readonly pulses: Map<number, SlotPulses>;
  /** What time and shortest timing follow of the parameters that are not free. */
  readonly timeBase: number;
  readonly minimumId: number;
}

interface TissuePart {
  readonly signal: TissueSignal;
  readonly tissue: Tissue;
  readonly train: { readonly end: TrainEnd; readonly amplitude: number } | null;
}

/**
 * Models of states that differ in TR, bands and counts without resolving and modelling each anew: the same functions as `modelOf`, on less.
 * Only for classes whose signal follows neither lines nor a null; the others take the whole model.
 */
export class SignalShortcut {
  readonly #setting: SearchSetting;
  readonly #bases = new Map<string, Base>();
  readonly #bound: readonly number[];
  readonly #words: StateWords;
  readonly #timeIds = new Map<number, number>();
  /** Where a state over an RF cap is of no use, its signal is not computed. */
  readonly #isOver: (b1PlusRmsUt: number) => boolean;

  constructor(setting: SearchSetting, words: StateWords, isOver: (b1PlusRmsUt: number) => boolean) {
    this.#setting = setting;
    this.#words = words;
    this.#isOver = isOver;
    this.#bound = setting.variables.flatMap(({ key }, at) => (freeKeys.includes(key) ? [] : [at]));
  }

  /** True where this way of modelling is complete. */
  static serves({ problem }: SearchSetting): boolean {
    const { series, set } = problem;
    const p = { ...series.parameters, ...set };
    const families = ['spin-echo', 'fast-spin-echo', 'rotating-strip-fast-spin-echo', 'spoiled-gradient-echo', 'balanced-steady-state'];
    const plain =
      p.inversionTimeMs === undefined && p.secondEchoTimeMs === undefined && p.diffusion === undefined && p.linesPerBeat === undefined;
    return families.includes(series.family) && plain && !isCine(p);
  }

  /** The model of a point; null where its timing is impossible, or a timed phase would be split. */
  modelAt(point: ArrayLike<number>, signalKeys: readonly number[]): StateModel | null {
    const { problem, baseline, variables } = this.#setting;
    const base = this.#baseAt(point, signalKeys);
    const { key, lines } = base.model;
    let free = 0;
    const p = { ...base.model.series.parameters } as { -readonly [K in keyof Parameters]: Parameters[K] };
    for (const at of signalKeys) {
      const { key: name, values, sliceCounts } = variables[at] as (typeof variables)[number];
      const i = point[at] as number;
      if (!freeKeys.includes(name)) continue;
      free = free * values.length + i;
      if (i === 0) continue;
      (p as unknown as Record<string, unknown>)[name] = values[i];
      if (sliceCounts !== null) p.sliceCount = sliceCounts[i] as number;
    }
    const pulses = this.#pulses(base, p);
    const slices = capacity(key, p, slotMs(key, p, pulses, lines.fullPhase) * baseline.model.slotFactor);
    const roundsNeeded = slices === null || slices === 0 ? null : guardedCeil(p.sliceCount / slices);
    const rounds = classRow(key).acquisition === '3D' ? 1 : Math.max(p.rounds, roundsNeeded ?? 1);
    if (problem.series.purpose === 'dynamic' && rounds > 1) return null;
    const tr = effectiveRepetitionTimeMs(p);
    const lastMs = classRow(key).train ? p.echoTrainLength * p.echoSpacingMs : p.echoTimeMs;
    if (p.echoTimeMs >= tr || lastMs > tr + 1e-9 || slices === 0) return null;
    p.rounds = rounds;
    const slicesOfRound = guardedCeil(p.sliceCount / rounds);
    const slicesInRepetition = slices === null ? p.simultaneousSlices : Math.max(1, Math.min(slices, slicesOfRound));
    const b1PlusRmsUt = seriesB1PlusRmsUt(key, p, lines, pulses, slicesInRepetition);
    if (this.#isOver(b1PlusRmsUt)) return null;
    const setting: SignalSetting = { key, parameters: p, lines, slicesOfRound };
    return {
      parameters: p,
      key,
      rounds,
      lines,
      pulses,
      ids: { timeId: this.#timeId(base, free, rounds, p), minimumId: base.minimumId },
      target: signalOf(base.target, setting),
      comparison: signalOf(base.comparison, setting),
      targetT2Ms: base.model.target?.t2Ms ?? null,
      b1PlusRmsUt,
    };
  }

  #timeId(base: Base, free: number, rounds: number, p: Parameters): number {
    const key = (base.timeBase * 512 + rounds) * 2 ** 22 + free;
    const known = this.#timeIds.get(key);
    if (known !== undefined) return known;
    const id = this.#words.timeId(p, rounds);
    this.#timeIds.set(key, id);
    return id;
  }

  #pulses(base: Base, p: Parameters): SlotPulses {
    let pulses = base.pulses.get(p.saturationBands);
    if (pulses === undefined) {
      pulses = slotPulses(base.model.key, p, this.#setting.problem.scanner);
      base.pulses.set(p.saturationBands, pulses);
    }
    return pulses;
  }

  #baseAt(point: ArrayLike<number>, signalKeys: readonly number[]): Base {
    const bound = this.#bound.filter((at) => signalKeys.includes(at));
    let id = '';
    for (const at of bound) id += `${point[at]},`;
    const known = this.#bases.get(id);
    if (known !== undefined) return known;
    const { problem, baseline, variables } = this.#setting;
    const { series, scanner } = problem;
    const alone = variables.map((_, at) => (bound.includes(at) ? (point[at] as number) : 0));
    // The split that its own slots need is worked out for each state: here it stays the preset's.
    const rounds = problem.set.rounds ?? series.parameters.rounds;
    const resolved = resolveParameters(baseline, pointParameters(variables, alone, problem.set), scanner).parameters;
    const model = modelOf({ ...series, parameters: { ...resolved, rounds } }, scanner, baseline.model.slotFactor);
    const setting: SignalSetting = { key: model.key, parameters: model.series.parameters, lines: model.lines, slicesOfRound: 1 };
    const part = (signal: TissueSignal | null): TissuePart | null => {
      const tissue = signal === null ? null : tissueOf(signal.tissue, scanner.fieldT, series);
      return signal === null || tissue === null
        ? null
        : { signal, tissue, train: classRow(model.key).train ? trainOf(setting, tissue) : null };
    };
    const base = {
      model,
      target: part(model.target),
      comparison: part(model.comparison),
      pulses: new Map<number, SlotPulses>(),
      timeBase: this.#words.timeId(model.series.parameters, 0),
      minimumId: this.#words.minimumId(model.series.parameters, model.pulses),
    };
    this.#bases.set(id, base);
    return base;
  }
}

function trainOf(setting: SignalSetting, { t1Ms, t2Ms }: Tissue): { end: TrainEnd; amplitude: number } {
  const timing = trainTimingOf(setting);
  const { refocusingAngleDeg, echoSpacingMs, echoTimeMs, echoTrainLength } = timing;
  const echo = contrastEcho(echoTimeMs, echoSpacingMs, echoTrainLength);
  return { end: trainEnd(timing, t1Ms, t2Ms), amplitude: echoAmplitude({ refocusingAngleDeg, echoSpacingMs, t1Ms, t2Ms }, echo) };
}

/** Weighted signal of a tissue: the product in the order of `trainSignal`, or the class's own equation. */
function signalOf(part: TissuePart | null, setting: SignalSetting): number | null {
  if (part === null) return null;
  const { tissue, train } = part;
  if (train === null) return weightedSignal({ ...part.signal, signal: classSignal(setting, setting.parameters.echoTimeMs, tissue) });
  const timing = trainTimingOf(setting);
  const signal = Math.abs(
    trainLongitudinal(timing, tissue.t1Ms, train.end) * Math.sin((timing.flipAngleDeg * Math.PI) / 180) * train.amplitude,
  );
  return weightedSignal({ ...part.signal, signal });
}
