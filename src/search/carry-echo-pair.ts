import { phaseTimesMs } from '../calc/chemical-shift.js';
import { fatShiftHz } from '../calc/constants.js';
import type { CarrySetting, Settled } from './carry-setting.js';

/** An in-phase and an opposed-phase echo at the exact field, ms. */
export interface EchoPair {
  readonly firstMs: number;
  readonly secondMs: number;
  readonly opposedMs: number;
  readonly inMs: number;
  /** True when the opposed echo comes later than the in-phase one: T2* decay then reads as fat. */
  readonly opposedLater: boolean;
  /** What to take where the scanner refuses this pair, since the estimated shortest TE lies above its first echo. */
  readonly otherwise: {
    readonly firstMs: number;
    readonly secondMs: number;
    readonly opposedLater: boolean;
    readonly shortestMs: number;
  } | null;
}

/** Distance from a whole number of cycles within which an echo counts as in phase, and as opposed (common practice, no source). */
const near = 0.25;

/** Cycles of fat against water at the two echoes of the preset, as halves and wholes; null where it is no in/opposed pair. */
function cyclesOfPreset({ series, baseline }: CarrySetting): { opposed: number; inPhase: number } | null {
  const { echoTimeMs, secondEchoTimeMs } = series.parameters;
  if (secondEchoTimeMs === undefined || series.family !== 'spoiled-gradient-echo') return null;
  const perMs = fatShiftHz(baseline.model.scanner.fieldT) / 1000;
  const [first, second] = [echoTimeMs * perMs, secondEchoTimeMs * perMs];
  const off = (cycles: number, offset: number) => Math.abs(cycles - offset - Math.round(cycles - offset));
  const pairs = [
    { opposed: first, inPhase: second },
    { opposed: second, inPhase: first },
  ];
  const best = pairs.find(({ opposed, inPhase }) => off(opposed, 0.5) <= near && off(inPhase, 0) <= near && inPhase > 0.5);
  return best === undefined ? null : { opposed: Math.round(best.opposed - 0.5) + 0.5, inPhase: Math.round(best.inPhase) };
}

/** True where the preset's two echoes are an in-phase and an opposed one. */
export function isEchoPair(setting: CarrySetting): boolean {
  return cyclesOfPreset(setting) !== null;
}

interface Cycles {
  readonly opposed: number;
  readonly inPhase: number;
}

/** Every pair under six cycles, the earliest first by its later echo; at equal times the opposed echo first. */
const candidates: readonly Cycles[] = [0.5, 1.5, 2.5, 3.5, 4.5, 5.5]
  .flatMap((opposed) => [1, 2, 3, 4, 5, 6].map((inPhase) => ({ opposed, inPhase })))
  .sort((a, b) => Math.max(a.opposed, a.inPhase) - Math.max(b.opposed, b.inPhase) || a.opposed - b.opposed || b.inPhase - a.inPhase);

/**
 * In-phase and opposed echoes at the exact field, `TE = n / (3.4 ppm gamma-bar B0)` with n whole or a half (Dixon, Radiology 1984;153:189):
 * the preset's own cycles, unless the readout is longer than the two echoes lie apart; then the earliest pair that leaves it room.
 * The shortest TE is an estimate and refuses nothing: where it lies above the first echo, the pair to fall back on is named.
 * Null where nothing under six cycles is possible.
 */
export function carriedEchoPair(setting: CarrySetting, settled: Settled): EchoPair | null {
  const wanted = cyclesOfPreset(setting);
  if (wanted === null) return null;
  const { inPhaseMs } = phaseTimesMs(setting.to.fieldT);
  const before = setting.series.parameters;
  const own = setting.baseline.model.minimum.echoTimeMs - Math.min(before.echoTimeMs, before.secondEchoTimeMs as number);
  // An estimate that the preset itself undercuts may be undercut by as much.
  const shortestMs = settled.model.minimum.echoTimeMs - Math.max(0, own);
  const firstMs = ({ opposed, inPhase }: Cycles) => Math.min(opposed, inPhase) * inPhaseMs;
  const hasRoom = ({ opposed, inPhase }: Cycles) => {
    return Math.abs(opposed - inPhase) * inPhaseMs >= 1000 / settled.parameters.pixelBandwidthHz - 1e-9;
  };
  const taken = hasRoom(wanted) ? wanted : candidates.find(hasRoom);
  if (taken === undefined) return null;
  const times = ({ opposed, inPhase }: Cycles) => {
    const [opposedMs, inMs] = [hundredth(opposed * inPhaseMs), hundredth(inPhase * inPhaseMs)];
    return { firstMs: Math.min(opposedMs, inMs), secondMs: Math.max(opposedMs, inMs), opposedMs, inMs, opposedLater: opposed > inPhase };
  };
  const later =
    firstMs(taken) >= shortestMs - 1e-9 ? undefined : candidates.find((pair) => hasRoom(pair) && firstMs(pair) >= shortestMs - 1e-9);
  return { ...times(taken), otherwise: later === undefined ? null : { ...times(later), shortestMs } };
}

function hundredth(ms: number): number {
  return Math.round(ms * 100) / 100;
}
