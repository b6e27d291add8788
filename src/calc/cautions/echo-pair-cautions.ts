import type { AddCaution } from '../caution.js';
import { phaseTimesMs } from '../chemical-shift.js';
import { fatShiftHz } from '../constants.js';
import type { SeriesModel } from '../model.js';
import { inWords } from './number-words.js';

/** Distance from the wanted phase, in cycles, beyond which an in/opposed pair is off (common practice, no source). */
const tolerance = 0.15;

/** Distance of x from the nearest whole number. */
function fromWhole(x: number): number {
  return Math.abs(x - Math.round(x));
}

/**
 * An in/opposed-phase pair judged at the real frequency (Dixon, Radiology 1984;153:189): one echo near a whole number of
 * fat-water cycles, the other near a half. A pair copied from another field is caught here.
 */
export function echoPairCautions(model: SeriesModel, add: AddCaution): void {
  const p = model.series.parameters;
  if (p.secondEchoTimeMs === undefined || model.series.family !== 'spoiled-gradient-echo') return;
  const cyclesPerMs = fatShiftHz(model.scanner.fieldT) / 1000;
  const first = p.echoTimeMs * cyclesPerMs;
  const second = p.secondEchoTimeMs * cyclesPerMs;
  // Either may be the opposed one: take the assignment that errs least.
  const firstOpposed = Math.max(fromWhole(first - 0.5), fromWhole(second));
  const secondOpposed = Math.max(fromWhole(first), fromWhole(second - 0.5));
  const off = Math.min(firstOpposed, secondOpposed);
  const { inPhaseMs, opposedPhaseMs } = phaseTimesMs(model.scanner.fieldT);
  const numbers = { firstCycles: first, secondCycles: second, offCycles: off, inPhaseMs, opposedPhaseMs };
  const later = secondOpposed < firstOpposed === p.secondEchoTimeMs > p.echoTimeMs;
  if (off > tolerance) {
    add('echo-pair-phase', 'error', numbers, sayPairOff);
  } else if (later) {
    add('echo-pair-phase', 'note', numbers, () => 'the opposed echo comes later than the in-phase one: T2* decay reads as fat');
  }
}

function sayPairOff(
  {
    firstCycles: first,
    secondCycles: second,
    inPhaseMs,
    opposedPhaseMs,
  }: Record<'firstCycles' | 'secondCycles' | 'inPhaseMs' | 'opposedPhaseMs', number>,
  { scanner }: SeriesModel,
): string {
  const bothIn = fromWhole(first) <= tolerance && fromWhole(second) <= tolerance;
  const bothOpposed = fromWhole(first - 0.5) <= tolerance && fromWhole(second - 0.5) <= tolerance;
  const what = bothIn ? 'both echoes are in phase' : bothOpposed ? 'both echoes are opposed' : 'the pair is neither in nor opposed phase';
  return `${what} at ${inWords(scanner.fieldT, 2)} T (${first.toFixed(2)} and ${second.toFixed(2)} cycles), opposed-phase information lost: ${opposedPhaseMs.toFixed(2)}/${inPhaseMs.toFixed(2)} ms would be opposed and in phase; where the shortest echo forbids it, ${(3 * opposedPhaseMs).toFixed(2)}/${inPhaseMs.toFixed(2)} ms, opposed later and T2* in the way`;
}
