import { displacement } from './chemical-shift.js';
import { type ClassKey, classRow } from './classes.js';
import { type Geometry, geometryOf } from './geometry.js';
import { ignoredIn, withoutIgnored } from './ignored.js';
import { acquiredLines, type Lines } from './lines.js';
import { type MinimumTiming, minimumTiming } from './minimum-timing.js';
import { highestB, noiseAveragingLines, signalFreeSnr } from './noise.js';
import { effectiveRepetitionTimeMs } from './pacing.js';
import { parallelNoiseFactor } from './parallel-noise.js';
import type { ParameterKey } from './parameters.js';
import { type SlotPulses, slotPulses } from './pulses.js';
import { seriesB1PlusRmsUt } from './rf.js';
import { guardedCeil } from './rounding.js';
import type { Scanner } from './scanner.js';
import { classOf, type Parameters, type Series } from './series.js';
import { type ClassTiming, classSignal, classTimingOf, type SignalSetting } from './signal/class-signal.js';
import { inversionPreparedDelaysMs } from './signal/inversion-prepared.js';
import { capacity, slotFactor, slotMs } from './slots.js';
import { type SeriesTime, seriesTime } from './time.js';
import { type Tissue, TissueRole } from './tissues.js';

/** Everything the model knows of one series on one scanner, before it is compared with a baseline. */
export interface SeriesModel {
  readonly key: ClassKey;
  /** The series, without what its class cannot use. */
  readonly series: Series;
  /** What was given and the class cannot use. */
  readonly ignored: readonly ParameterKey[];
  readonly scanner: Scanner;
  readonly lines: Lines;
  readonly geometry: Geometry;
  readonly pulses: SlotPulses;
  readonly minimum: MinimumTiming;
  /** Slot as it counts, the factor applied. */
  readonly slotMs: number;
  readonly slotFactor: number;
  readonly capacity: number | null;
  readonly roundsNeeded: number | null;
  /** The split in force: the series' own, raised where the slices no longer fit. */
  readonly rounds: number;
  readonly time: SeriesTime;
  readonly setting: SignalSetting;
  readonly timing: ClassTiming;
  /** What makes the timing impossible, in words; null when nothing does. */
  readonly impossible: string | null;
  readonly noiseFactor: number | null;
  /** SNR without signal; null where g is not known. */
  readonly signalFreeSnr: number | null;
  readonly target: TissueSignal | null;
  readonly comparison: TissueSignal | null;
  readonly b1PlusRmsUt: number;
  readonly shift: ReturnType<typeof displacement>;
}

/** One tissue as this series shows it: times in ms, signals for proton density 1 without fat factor and diffusion, which stand beside them. */
export interface TissueSignal {
  readonly tissue: string;
  readonly t1Ms: number;
  readonly t2Ms: number;
  readonly t2StarMs: number;
  readonly protonDensity: number;
  readonly signal: number | null;
  readonly secondSignal: number | null;
  readonly suppression: number;
  readonly diffusionFactor: number | null;
  readonly extrapolated: boolean;
}

/** What is left of fat: 5 % under spectral suppression or water excitation (common practice, no source), nothing in a two-point water image. */
function suppressionOf(isFat: boolean, fatSuppression: Series['parameters']['fatSuppression']): number {
  if (!isFat) return 1;
  if (fatSuppression === 'spectral' || fatSuppression === 'water-excitation') return 0.05;
  return fatSuppression === 'two-point' ? 0 : 1;
}

const targetRole = new TissueRole();
const comparisonRole = new TissueRole();
const otherRole = new TissueRole();

/** Signal of one tissue in this series, null for a name the table does not have. */
export function tissueSignal(
  setting: SignalSetting,
  series: Series,
  fieldT: number,
  name: string,
  impossible: boolean,
  timing = classTimingOf(setting),
  role = otherRole,
): TissueSignal | null {
  const tissue: Tissue | null = role.tissueOf(name, fieldT, series);
  if (tissue === null) return null;
  const p = series.parameters;
  const second = p.secondEchoTimeMs;
  return {
    tissue: name,
    t1Ms: tissue.t1Ms,
    t2Ms: tissue.t2Ms,
    t2StarMs: tissue.t2StarMs,
    protonDensity: tissue.protonDensity,
    signal: impossible ? null : classSignal(setting, p.echoTimeMs, tissue, timing),
    secondSignal: impossible || second === undefined ? null : classSignal(setting, second, tissue, timing),
    suppression: suppressionOf(role.isFat, p.fatSuppression),
    diffusionFactor: role.diffusionFactor(p.diffusion === undefined ? 0 : highestB(p)),
    extrapolated: tissue.extrapolated,
  };
}

/** Signal as it stands in contrast and SNR: proton density, fat factor and diffusion included; null where a part is not known. */
export function weightedSignal(tissue: TissueSignal | null): number | null {
  if (tissue === null || tissue.signal === null || tissue.diffusionFactor === null) return null;
  return tissue.protonDensity * tissue.signal * tissue.suppression * tissue.diffusionFactor;
}

/** Why the timing cannot be played, or null. TE under the estimated minimum is a caution, not this. */
function impossibleBecause(key: ClassKey, p: Parameters, { prepared }: ClassTiming, slices: number | null): string | null {
  const row = classRow(key);
  const tr = effectiveRepetitionTimeMs(p);
  const lastEchoMs = Math.max(p.echoTimeMs, p.secondEchoTimeMs ?? 0);
  if (prepared !== null) {
    const { beforeMs, afterMs } = inversionPreparedDelaysMs(prepared);
    if (beforeMs < -1e-9) return 'TI is too short for the readouts before the centre';
    if (afterMs < -1e-9) return 'TR is too short for TI and the readouts';
    return p.echoTimeMs >= p.echoSpacingMs ? 'TE is not shorter than the echo spacing' : null;
  }
  if (lastEchoMs >= tr) return 'TE is not shorter than TR';
  const lastMs = (row.train ? p.echoTrainLength * p.echoSpacingMs : lastEchoMs) + (p.inversionTimeMs ?? 0);
  if (lastMs > tr + 1e-9) return row.train ? 'the train does not end within TR' : 'TI and TE do not end within TR';
  if (slices === 0) return 'not one slice fits in TR';
  return null;
}

/** Computes a series on a scanner. `knownSlotFactor` is the baseline's; without one the series' own split is taken as a fact. */
export function modelOf(given: Series, scanner: Scanner, knownSlotFactor: number | null): SeriesModel {
  const key = classOf(given);
  const ignored = ignoredIn(key, given.parameters);
  const series = withoutIgnored(given, key, ignored);
  const p = series.parameters;
  const lines = acquiredLines(key, p);
  const geometry = geometryOf(series.acquisition, p);
  const pulses = slotPulses(key, p, scanner);
  const minimum = minimumTiming(key, p, lines, geometry, pulses, scanner);
  const plainSlotMs = slotMs(key, p, pulses, lines.fullPhase);
  const factor = knownSlotFactor ?? slotFactor(key, p, plainSlotMs);
  const slices = capacity(key, p, plainSlotMs * factor);
  const roundsNeeded = slices === null || slices === 0 ? null : guardedCeil(p.sliceCount / slices);
  const rounds = classRow(key).acquisition === '3D' ? 1 : Math.max(p.rounds, roundsNeeded ?? 1);
  const slicesOfRound = guardedCeil(p.sliceCount / rounds);
  const setting: SignalSetting = { key, parameters: p, lines, slicesOfRound };
  const timing = classTimingOf(setting);
  const impossible = impossibleBecause(key, p, timing, slices);
  const g = parallelNoiseFactor(scanner.coil, p.parallelFactorPhase, series.acquisition === '3D' ? p.parallelFactorSlice : 1);
  const simultaneousG = p.simultaneousSlices === 1 ? 1 : (scanner.simultaneousSliceG[p.simultaneousSlices] ?? 1);
  const slicesInRepetition = slices === null ? p.simultaneousSlices : Math.max(1, Math.min(slices, slicesOfRound));
  return {
    key,
    series,
    ignored,
    scanner,
    lines,
    geometry,
    pulses,
    minimum,
    slotMs: plainSlotMs * factor,
    slotFactor: factor,
    capacity: slices,
    roundsNeeded,
    rounds,
    time: seriesTime(key, p, lines, rounds, scanner),
    setting,
    timing,
    impossible,
    noiseFactor: g,
    signalFreeSnr:
      g === null ? null : signalFreeSnr(geometry.voxelVolumeMm3, noiseAveragingLines(key, p, lines, g), p, scanner.fieldT, simultaneousG),
    target: tissueSignal(setting, series, scanner.fieldT, series.target, impossible !== null, timing, targetRole),
    comparison: tissueSignal(setting, series, scanner.fieldT, series.comparison, impossible !== null, timing, comparisonRole),
    b1PlusRmsUt: seriesB1PlusRmsUt(key, p, lines, pulses, slicesInRepetition),
    shift: displacement(key, p, lines, geometry, scanner.fieldT),
  };
}
