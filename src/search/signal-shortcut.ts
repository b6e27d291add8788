import { classRow } from '../calc/classes.js';
import { echoAmplitude } from '../calc/echo-train.js';
import { ignoredIn, withoutIgnored } from '../calc/ignored.js';
import { acquiredLines, type Lines } from '../calc/lines.js';
import { type TissueSignal, tissueSignal, weightedSignal } from '../calc/model.js';
import { effectiveRepetitionTimeMs, isCine } from '../calc/pacing.js';
import type { ParameterKey } from '../calc/parameters.js';
import { type SlotPulses, slotPulses } from '../calc/pulses.js';
import { resolveParameters } from '../calc/resolve.js';
import { b1PlusRmsUt, repetitionEnergyUt2Ms } from '../calc/rf.js';
import { guardedCeil } from '../calc/rounding.js';
import type { Parameters } from '../calc/series.js';
import { classSignal, classTimingOf, type SignalSetting } from '../calc/signal/class-signal.js';
import { contrastEcho, type TrainEnd, trainEnd, trainLongitudinal } from '../calc/signal/echo-train-signal.js';
import { capacity, slotMs } from '../calc/slots.js';
import { type Tissue, tissueOf } from '../calc/tissues.js';
import { type LatticeVariable, pointParameters } from './lattice.js';
import type { SearchSetting } from './setting.js';
import type { StateModel } from './signal-model.js';

type Draft = { -readonly [K in keyof Parameters]: Parameters[K] };

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

export function isFree(key: ParameterKey): boolean {
  return freeKeys.includes(key);
}

/** Signals of both tissues: they follow TR and what is not free. */
export interface SignalPair {
  readonly target: number | null;
  readonly comparison: number | null;
}

/** One tissue under one train: its end and its echo, computed when first asked for. */
interface TissuePart {
  readonly signal: TissueSignal;
  readonly tissue: Tissue;
  train: { readonly end: TrainEnd; readonly amplitude: number } | null;
}

/** What follows the saturation bands besides a base. */
interface BandPart {
  readonly pulses: SlotPulses;
  readonly slotMs: number;
  /** RF energy of one TR by the slices in it. */
  readonly energies: Map<number, number>;
}

/** What all states share that differ in free parameters alone. */
export interface SignalBase<Known> {
  readonly parameters: Parameters;
  readonly lines: Lines;
  readonly pulses: SlotPulses;
  readonly targetT2Ms: number | null;
  readonly target: TissuePart | null;
  readonly comparison: TissuePart | null;
  /** Parameters with the free values of the state asked last. */
  readonly scratch: Draft;
  readonly written: Int32Array;
  readonly bands: Map<number, BandPart>;
  /** What whoever asks works out once for a base. */
  known: Known | null;
}

/** The state a shortcut was asked for last. */
export interface ShortState<Known> {
  base: SignalBase<Known>;
  pulses: SlotPulses;
  rounds: number;
  b1PlusRmsUt: number;
  /** Number of the free values, unique within a base. */
  free: number;
}

interface FreeVariable {
  readonly at: number;
  readonly variable: LatticeVariable;
}

/**
 * Models of states that differ in TR, bands and counts without resolving and modelling each anew: the same functions as `modelOf`, on less,
 * and what several states share computed once. Only for classes whose signal follows neither lines nor a null.
 */
export class SignalShortcut<Known> {
  readonly #setting: SearchSetting;
  readonly #bases = new Map<number, SignalBase<Known>>();
  readonly #bound: readonly number[];
  readonly #free: readonly FreeVariable[];
  readonly #roundsFree: FreeVariable | undefined;
  readonly #volume: boolean;
  readonly #train: boolean;
  /** The state asked for last: its base, split and RF. */
  readonly last = {} as ShortState<Known>;
  #lastId = -1;
  #lastBase: SignalBase<Known> | null = null;

  constructor(setting: SearchSetting, moving: readonly number[]) {
    this.#setting = setting;
    const { variables } = setting;
    const isFreeAt = (at: number) => isFree((variables[at] as LatticeVariable).key);
    this.#bound = moving.filter((at) => !isFreeAt(at));
    const row = classRow(setting.baseline.model.key);
    this.#volume = row.acquisition === '3D';
    this.#train = row.train;
    this.#free = moving.filter(isFreeAt).map((at) => ({ at, variable: variables[at] as LatticeVariable }));
    this.#roundsFree = this.#free.find(({ variable }) => variable.key === 'rounds');
  }

  /** Variables with the free ones last: states of one base come one after the other. */
  inOrder(which: readonly number[]): readonly number[] {
    return [...which].sort((a, b) => Number(this.#isFree(a)) - Number(this.#isFree(b)) || a - b);
  }

  #isFree(at: number): boolean {
    return this.#free.some((one) => one.at === at);
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

  /** Works out split and RF of a point into `last`; false where its timing is impossible, or a timed phase would be split. */
  stateAt(point: ArrayLike<number>): boolean {
    const { problem, baseline } = this.#setting;
    const { key } = baseline.model;
    const base = this.#baseAt(point);
    const free = this.#writeFree(base, point);
    const p = base.scratch;
    const band = this.#bandPart(base, p);
    const slices = capacity(key, p, band.slotMs);
    const needed = slices === null || slices === 0 ? 1 : guardedCeil(p.sliceCount / slices);
    const rounds = this.#volume ? 1 : Math.max(this.#roundsSet(point, base), needed);
    if (problem.series.purpose === 'dynamic' && rounds > 1) return false;
    const tr = effectiveRepetitionTimeMs(p);
    const lastMs = this.#train ? p.echoTrainLength * p.echoSpacingMs : p.echoTimeMs;
    if (p.echoTimeMs >= tr || lastMs > tr + 1e-9 || slices === 0) return false;
    p.rounds = rounds;
    const inRepetition = slices === null ? p.simultaneousSlices : Math.max(1, Math.min(slices, guardedCeil(p.sliceCount / rounds)));
    let energy = band.energies.get(inRepetition);
    if (energy === undefined) {
      energy = repetitionEnergyUt2Ms(key, p, base.lines, band.pulses, inRepetition);
      band.energies.set(inRepetition, energy);
    }
    const { last } = this;
    last.base = base;
    last.pulses = band.pulses;
    last.rounds = rounds;
    last.b1PlusRmsUt = b1PlusRmsUt(energy, tr);
    last.free = free;
    return true;
  }

  /** The base of a point, its free values, and a split that no state of it goes below. */
  leastSplitAt(point: ArrayLike<number>): { readonly base: SignalBase<Known>; readonly free: number; readonly rounds: number } {
    const base = this.#baseAt(point);
    const free = this.#writeFree(base, point);
    return { base, free, rounds: this.#volume ? 1 : this.#roundsSet(point, base) };
  }

  /** Signals of the state asked for last. */
  signals(): SignalPair {
    const { base } = this.last;
    const setting: SignalSetting = {
      key: this.#setting.baseline.model.key,
      parameters: base.scratch,
      lines: base.lines,
      slicesOfRound: guardedCeil(base.scratch.sliceCount / this.last.rounds),
    };
    return { target: signalOf(base.target, setting), comparison: signalOf(base.comparison, setting) };
  }

  /** Parameters of a state, by what `last` said of it. */
  parametersOf(base: SignalBase<Known>, free: number, rounds: number): Parameters {
    const p: Draft = { ...base.parameters };
    let rest = free;
    for (let k = this.#free.length - 1; k >= 0; k -= 1) {
      const { variable } = this.#free[k] as FreeVariable;
      writeValue(p, base.parameters, variable, rest % variable.values.length);
      rest = Math.floor(rest / variable.values.length);
    }
    p.rounds = rounds;
    return p;
  }

  /** The model of the state asked for last, as those of other classes are. */
  modelOf({ target, comparison }: SignalPair): StateModel {
    const { base, pulses, rounds, free, b1PlusRmsUt: b1 } = this.last;
    return {
      parameters: this.parametersOf(base, free, rounds),
      rounds,
      lines: base.lines,
      pulses,
      target,
      comparison,
      targetT2Ms: base.targetT2Ms,
      b1PlusRmsUt: b1,
    };
  }

  /** Writes what differs from the state asked before; the number of the free values. */
  #writeFree({ scratch, parameters, written }: SignalBase<Known>, point: ArrayLike<number>): number {
    let free = 0;
    for (let k = 0; k < this.#free.length; k += 1) {
      const { at, variable } = this.#free[k] as FreeVariable;
      const i = point[at] as number;
      free = free * variable.values.length + i;
      if (written[k] === i) continue;
      written[k] = i;
      writeValue(scratch, parameters, variable, i);
    }
    return free;
  }

  /** The split as a point sets it: the one in force overwrites it in the scratch. */
  #roundsSet(point: ArrayLike<number>, base: SignalBase<Known>): number {
    if (this.#roundsFree === undefined) return base.parameters.rounds;
    const { at, variable } = this.#roundsFree;
    return (point[at] === 0 ? base.parameters.rounds : variable.values[point[at] as number]) as number;
  }

  #bandPart(base: SignalBase<Known>, p: Parameters): BandPart {
    let band = base.bands.get(p.saturationBands);
    if (band === undefined) {
      const { baseline, problem } = this.#setting;
      const { key, slotFactor } = baseline.model;
      const pulses = slotPulses(key, p, problem.scanner);
      band = { pulses, slotMs: slotMs(key, p, pulses, base.lines.fullPhase) * slotFactor, energies: new Map() };
      base.bands.set(p.saturationBands, band);
    }
    return band;
  }

  #baseAt(point: ArrayLike<number>): SignalBase<Known> {
    const { variables } = this.#setting;
    let id = 0;
    for (const at of this.#bound) id = id * (variables[at] as LatticeVariable).values.length + (point[at] as number);
    if (id === this.#lastId) return this.#lastBase as SignalBase<Known>;
    let base = this.#bases.get(id);
    if (base === undefined) {
      base = this.#formBase(point);
      this.#bases.set(id, base);
    }
    this.#lastId = id;
    this.#lastBase = base;
    return base;
  }

  #formBase(point: ArrayLike<number>): SignalBase<Known> {
    const { problem, baseline, variables } = this.#setting;
    const { series, scanner } = problem;
    const { key } = baseline.model;
    const alone = variables.map((_, at) => (this.#bound.includes(at) ? (point[at] as number) : 0));
    // The split that its own slots need is worked out for each state: here it stays the preset's.
    const rounds = problem.set.rounds ?? series.parameters.rounds;
    const resolved = { ...resolveParameters(baseline, pointParameters(variables, alone, problem.set), scanner).parameters, rounds };
    const usable = withoutIgnored({ ...series, parameters: resolved }, key, ignoredIn(key, resolved));
    const { parameters } = usable;
    const lines = acquiredLines(key, parameters);
    const part = (name: string): TissuePart | null => {
      // Without a signal: that follows TR.
      const signal = tissueSignal({ key, parameters, lines, slicesOfRound: 1 }, usable, scanner.fieldT, name, true);
      const tissue = tissueOf(name, scanner.fieldT, series);
      return signal === null || tissue === null ? null : { signal, tissue, train: null };
    };
    const target = part(series.target);
    return {
      parameters,
      lines,
      pulses: slotPulses(key, parameters, scanner),
      targetT2Ms: target?.signal.t2Ms ?? null,
      target,
      comparison: part(series.comparison),
      scratch: { ...parameters },
      written: new Int32Array(this.#free.length),
      bands: new Map(),
      known: null,
    };
  }
}

function writeValue(p: Draft, start: Parameters, { key, values, sliceCounts }: LatticeVariable, i: number): void {
  const draft = p as unknown as Record<string, unknown>;
  draft[key] = i === 0 ? start[key] : values[i];
  if (sliceCounts !== null) p.sliceCount = i === 0 ? start.sliceCount : (sliceCounts[i] as number);
}

function trainOf(setting: SignalSetting, { t1Ms, t2Ms }: Tissue): { end: TrainEnd; amplitude: number } {
  const timing = classTimingOf(setting);
  const { refocusingAngleDeg, echoSpacingMs, echoTimeMs, echoTrainLength } = timing;
  const echo = contrastEcho(echoTimeMs, echoSpacingMs, echoTrainLength);
  return { end: trainEnd(timing, t1Ms, t2Ms), amplitude: echoAmplitude({ refocusingAngleDeg, echoSpacingMs, t1Ms, t2Ms }, echo) };
}

/** Weighted signal of a tissue: the product in the order of `trainSignal`, or the class's own equation. */
function signalOf(part: TissuePart | null, setting: SignalSetting): number | null {
  if (part === null) return null;
  const { tissue } = part;
  if (!classRow(setting.key).train)
    return weightedSignal({ ...part.signal, signal: classSignal(setting, setting.parameters.echoTimeMs, tissue) });
  part.train ??= trainOf(setting, tissue);
  const timing = classTimingOf(setting);
  const signal = Math.abs(
    trainLongitudinal(timing, tissue.t1Ms, part.train.end) * Math.sin((timing.flipAngleDeg * Math.PI) / 180) * part.train.amplitude,
  );
  return weightedSignal({ ...part.signal, signal });
}
