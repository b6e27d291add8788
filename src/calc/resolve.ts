import type { Baseline } from './baseline.js';
import { type ClassKey, classRow } from './classes.js';
import { geometryOf } from './geometry.js';
import { acquiredLines } from './lines.js';
import { type MinimumTiming, minimumTiming } from './minimum-timing.js';
import { slotPulses } from './pulses.js';
import { guardedCeil, same } from './rounding.js';
import type { Scanner } from './scanner.js';
import { type GivenParameters, linesInOneTrain, type Parameters } from './series.js';
import { contrastEcho } from './signal/echo-train-signal.js';
import { capacity, slotMs } from './slots.js';

/** One value that followed an edit by itself. */
export interface Carried {
  readonly key: 'echoTrainLength' | 'echoSpacingMs' | 'repetitionTimeMs' | 'echoTimeMs' | 'rounds';
  readonly from: number;
  readonly to: number;
  /** Why, in words. */
  readonly because: string;
}

type Draft = { -readonly [K in keyof Parameters]: Parameters[K] };

/**
 * The parameters of an edited series: set values win; train length, echo spacing, TR, TE and split that are not set follow.
 *
 * Timing is carried, not invented: new = old + (minimum new - minimum old), so that the preset's slack is kept and the error
 * of the estimate cancels. In gradient echoes TR and TE follow the readout, in echo-planar classes TE. A TE that sets contrast
 * (spin echo, trains, dual echo) stays, is centred on the nearest whole echo, and is raised only where the minimum passes it.
 */
export function resolveParameters(
  baseline: Baseline,
  set: GivenParameters,
  scanner: Scanner,
): { readonly parameters: Parameters; readonly carried: readonly Carried[] } {
  const before = baseline.model.series.parameters;
  const key = baseline.model.key;
  const draft: Draft = { ...before, ...withoutUndefined(set) };
  const carried: Carried[] = [];
  const carry = (name: Carried['key'], to: number, because: string) => {
    const clean = tidy(to);
    if (set[name] !== undefined || same(draft[name], clean)) return;
    carried.push({ key: name, from: draft[name], to: clean, because });
    draft[name] = clean;
  };
  carryTrainLength(key, before, draft, carry);
  if (readoutMoved(key, before, draft) || !same(scanner.fieldT, baseline.model.scanner.fieldT) || scanner !== baseline.model.scanner) {
    carrySpacing(key, baseline, draft, scanner, carry);
    carryTimes(key, baseline, draft, scanner, carry);
  }
  centreEcho(key, baseline, draft, carry);
  carryRounds(key, baseline, draft, scanner, carry);
  return { parameters: carried.length === 0 && Object.keys(set).length === 0 ? before : draft, carried };
}

/** Clears the binary dust of sums of decimal fractions: a millionth of a millisecond. */
function tidy(value: number): number {
  return Math.round(value * 1e6) / 1e6;
}

function withoutUndefined(set: GivenParameters): GivenParameters {
  return Object.fromEntries(Object.entries(set).filter(([, value]) => value !== undefined)) as GivenParameters;
}

type Carry = (name: Carried['key'], to: number, because: string) => void;

/** A train that reads all its lines in one go follows their number by difference. */
function carryTrainLength(key: ClassKey, before: Parameters, draft: Draft, carry: Carry): void {
  if (classRow(key).otherwise.echoTrainLength !== 'lines') return;
  const moved = linesInOneTrain(key, acquiredLines(key, draft)) - linesInOneTrain(key, acquiredLines(key, before));
  carry('echoTrainLength', Math.max(1, before.echoTrainLength + moved), 'the train reads all its lines');
}

/** True when an edit moves the fastest possible timing: bandwidth, read matrix, pulses, or a train of echo-planar lines. */
function readoutMoved(key: ClassKey, before: Parameters, now: Parameters): boolean {
  const keys = [
    'pixelBandwidthHz',
    'matrixRead',
    'rfPulseStretch',
    'flowCompensation',
    'partialFourierSlice',
    'flipAngleDeg',
    'refocusingAngleDeg',
    'slabSelective',
    'simultaneousSlices',
  ] as const;
  if (keys.some((name) => now[name] !== before[name])) return true;
  if (!classRow(key).echoPlanar) return false;
  return (
    now.echoTrainLength !== before.echoTrainLength ||
    now.echoSpacingMs !== before.echoSpacingMs ||
    now.partialFourierPhase !== before.partialFourierPhase ||
    now.diffusion !== before.diffusion
  );
}

/** Fastest timing with the readout and pulses of the draft, the geometry of the preset: only the readout, pulses and train count as edits. */
function minimumOf(key: ClassKey, draft: Parameters, baseline: Baseline, scanner: Scanner): MinimumTiming {
  const before = baseline.model.series.parameters;
  const { acquisition, echoPlanar } = classRow(key);
  const p: Parameters = {
    ...draft,
    fieldOfViewMm: before.fieldOfViewMm,
    matrixPhase: echoPlanar ? draft.matrixPhase : before.matrixPhase,
    sliceThicknessMm: before.sliceThicknessMm,
    sliceCount: before.sliceCount,
  };
  return minimumTiming(key, p, acquiredLines(key, p), geometryOf(acquisition, p), slotPulses(key, p, scanner), scanner);
}

function carrySpacing(key: ClassKey, baseline: Baseline, draft: Draft, scanner: Scanner, carry: Carry): void {
  const old = baseline.model.minimum.echoSpacingMs;
  const now = minimumOf(key, draft, baseline, scanner).echoSpacingMs;
  if (old === null || now === null) return;
  carry(
    'echoSpacingMs',
    Math.max(0.05, baseline.model.series.parameters.echoSpacingMs + now - old),
    'the spacing follows readout and pulses',
  );
}

function carryTimes(key: ClassKey, baseline: Baseline, draft: Draft, scanner: Scanner, carry: Carry): void {
  const before = baseline.model.series.parameters;
  const old = baseline.model.minimum;
  const now = minimumOf(key, draft, baseline, scanner);
  const row = classRow(key);
  const follows = (row.gradientEcho || row.echoPlanar) && before.secondEchoTimeMs === undefined;
  if (follows) {
    carry('echoTimeMs', Math.max(0.01, before.echoTimeMs + now.echoTimeMs - old.echoTimeMs), 'TE follows readout, pulses and train');
  } else if (!row.train) {
    const raised = before.echoTimeMs + now.echoTimeMs - old.echoTimeMs;
    // A contrast-setting TE stays while its slack allows: it is raised only when the minimum itself passes it.
    if (now.echoTimeMs > Math.max(draft.echoTimeMs, old.echoTimeMs) && raised > draft.echoTimeMs)
      carry('echoTimeMs', raised, 'the shortest TE passes it');
  }
  const lineByLine = row.gradientEcho && !row.echoPlanar && key !== 'inversion-prepared-gradient-echo/3D';
  if (lineByLine)
    carry(
      'repetitionTimeMs',
      Math.max(0.5, before.repetitionTimeMs + now.repetitionTimeMs - old.repetitionTimeMs),
      'TR follows readout and pulses',
    );
}

/** Trains: TE is centred on the nearest whole echo once spacing or train differ from the preset's. */
function centreEcho(key: ClassKey, baseline: Baseline, draft: Draft, carry: Carry): void {
  const before = baseline.model.series.parameters;
  if (!classRow(key).train) return;
  if (same(draft.echoSpacingMs, before.echoSpacingMs) && draft.echoTrainLength === before.echoTrainLength) return;
  const echo = contrastEcho(draft.echoTimeMs, draft.echoSpacingMs, draft.echoTrainLength);
  const centred = echo * draft.echoSpacingMs;
  const sameEcho =
    same(draft.echoSpacingMs, before.echoSpacingMs) &&
    echo === contrastEcho(before.echoTimeMs, before.echoSpacingMs, before.echoTrainLength);
  if (!sameEcho) carry('echoTimeMs', centred, 'TE falls on a whole echo of the train');
}

/** Slices that no longer fit raise the split; the preset's own is the least. */
function carryRounds(key: ClassKey, baseline: Baseline, draft: Draft, scanner: Scanner, carry: Carry): void {
  if (classRow(key).interleaving !== 'interleaved') return;
  const p: Parameters = draft;
  const slot = slotMs(key, p, slotPulses(key, p, scanner), acquiredLines(key, p).fullPhase) * baseline.model.slotFactor;
  const fits = capacity(key, p, slot);
  if (fits === null || fits === 0) return;
  const needed = guardedCeil(p.sliceCount / fits);
  if (needed > draft.rounds) carry('rounds', needed, 'the slices no longer fit in one TR');
}
