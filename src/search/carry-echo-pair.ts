import { phaseTimesMs } from '../calc/chemical-shift.js';
import { fatShiftHz } from '../calc/constants.js';
import { rampMs } from '../calc/gradients.js';
import type { CarrySetting, Settled } from './carry-setting.js';

/** An in-phase and an opposed-phase echo at the exact field, ms. */
export interface EchoPair {
  readonly firstMs: number;
  readonly secondMs: number;
  readonly opposedMs: number;
  readonly inMs: number;
  /** True when the opposed echo comes later than the in-phase one: T2* decay then reads as fat. */
  readonly opposedLater: boolean;
  /** The pair that was wished for, where another had to be taken. */
  readonly insteadOf: readonly [number, number] | null;
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

/** Shortest distance of two echoes, ms: a readout and its ramps there and back (geometry of trapezoids). */
function spacingMs(settled: Settled, { to }: CarrySetting): number {
  return 1000 / settled.parameters.pixelBandwidthHz + 2 * rampMs(Math.min(settled.model.minimum.readoutMtPerM, to.gradientMtPerM), to);
}

/**
 * In-phase and opposed echoes at the exact field, `TE = n / (3.4 ppm gamma-bar B0)` with n whole or a half (Dixon, Radiology 1984;153:189):
 * the preset's own cycles where the shortest TE and the readout allow them, else the earliest pair that they allow. An estimate that the preset
 * itself undercuts may be undercut by as much. Null where nothing under six cycles is possible.
 */
export function carriedEchoPair(setting: CarrySetting, settled: Settled): EchoPair | null {
  const wanted = cyclesOfPreset(setting);
  if (wanted === null) return null;
  const { inPhaseMs } = phaseTimesMs(setting.to.fieldT);
  const before = setting.series.parameters;
  const own = setting.baseline.model;
  const shortFirst = Math.max(0, own.minimum.echoTimeMs - Math.min(before.echoTimeMs, before.secondEchoTimeMs as number));
  const ownSpacing = Math.abs((before.secondEchoTimeMs as number) - before.echoTimeMs);
  const ownShortest =
    1000 / before.pixelBandwidthHz + 2 * rampMs(Math.min(own.minimum.readoutMtPerM, own.scanner.gradientMtPerM), own.scanner);
  const shortSpacing = Math.max(0, ownShortest - ownSpacing);
  const possible = (opposed: number, inPhase: number) => {
    const first = Math.min(opposed, inPhase) * inPhaseMs;
    const gap = Math.abs(opposed - inPhase) * inPhaseMs;
    return first >= settled.model.minimum.echoTimeMs - shortFirst - 1e-9 && gap >= spacingMs(settled, setting) - shortSpacing - 1e-9;
  };
  const pairOf = (opposed: number, inPhase: number, insteadOf: EchoPair['insteadOf']): EchoPair => {
    const [opposedMs, inMs] = [hundredth(opposed * inPhaseMs), hundredth(inPhase * inPhaseMs)];
    const [firstMs, secondMs] = [Math.min(opposedMs, inMs), Math.max(opposedMs, inMs)];
    return { firstMs, secondMs, opposedMs, inMs, opposedLater: opposed > inPhase, insteadOf };
  };
  if (possible(wanted.opposed, wanted.inPhase)) return pairOf(wanted.opposed, wanted.inPhase, null);
  const wish = pairOf(wanted.opposed, wanted.inPhase, null);
  const candidates: { opposed: number; inPhase: number }[] = [];
  for (let opposed = 0.5; opposed < 6; opposed += 1) {
    for (let inPhase = 1; inPhase <= 6; inPhase += 1) candidates.push({ opposed, inPhase });
  }
  // The earliest pair, by its later echo; at equal times the opposed echo first.
  candidates.sort(
    (a, b) => Math.max(a.opposed, a.inPhase) - Math.max(b.opposed, b.inPhase) || a.opposed - b.opposed || b.inPhase - a.inPhase,
  );
  const found = candidates.find(({ opposed, inPhase }) => possible(opposed, inPhase));
  return found === undefined ? null : pairOf(found.opposed, found.inPhase, [wish.firstMs, wish.secondMs]);
}

function hundredth(ms: number): number {
  return Math.round(ms * 100) / 100;
}
