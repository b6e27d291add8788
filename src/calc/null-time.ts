import { classRow } from './classes.js';
import type { FatSuppression, Series } from './series.js';
import { type ClassTiming, classTimingOf, type SignalSetting } from './signal/class-signal.js';
import { trainEnd, trainLongitudinal } from './signal/echo-train-signal.js';
import { readoutsOf, signalAfterInversion } from './signal/inversion-prepared.js';
import { spinEchoLongitudinal } from './signal/spin-echo.js';
import { fatTissue, fluidTissue, type Tissue } from './tissues.js';

/** The tissue whose null a series is about: its own choice, else fat with inversion fat suppression, else fluid with an inversion time, else none. */
export function nullTissueOf(
  series: Pick<Series, 'nullTissue'>,
  fatSuppression: FatSuppression,
  inversionTimeMs: number | undefined,
): string | null {
  if (inversionTimeMs === undefined) return null;
  return series.nullTissue ?? (fatSuppression === 'inversion' ? fatTissue : fluidTissue);
}

/**
 * The textbook null of a fully spoiled inversion recovery, `T1 ln(2 / (1 + e^(-TR/T1)))`, ms (Haacke et al., Magnetic Resonance Imaging, 1999).
 *
 * @example simpleNullMs(4300, 9000) //=> 2480.5
 */
export function simpleNullMs(t1Ms: number, repetitionTimeMs: number): number {
  return t1Ms * Math.log(2 / (1 + Math.exp(-repetitionTimeMs / t1Ms)));
}

/**
 * Inversion time between two bounds at which a signal is zero, or null where it does not change sign there.
 * TR being fixed, every class's signed signal is a straight line in e^(-TI/T1): TI enters as the inversion's own recovery, and the
 * recovery after the readout has what TI leaves of TR, so that their product is constant. Two values give the root.
 */
function rootMs(signalAt: (inversionTimeMs: number) => number, lowMs: number, highMs: number, t1Ms: number): number | null {
  if (!(highMs > lowMs)) return null;
  const low = signalAt(lowMs);
  const high = signalAt(highMs);
  if (low > 0 || high < 0 || low === high) return null;
  const xLow = Math.exp(-lowMs / t1Ms);
  const xHigh = Math.exp(-highMs / t1Ms);
  return -t1Ms * Math.log(xLow - (low * (xHigh - xLow)) / (high - low));
}

/** Inversion time in ms at which the class's own signal equation gives zero for this tissue, or null where it never does. */
export function nullTimeMs(setting: SignalSetting, { t1Ms, t2Ms }: Tissue, timing: ClassTiming = classTimingOf(setting)): number | null {
  const { prepared } = timing;
  if (prepared !== null) {
    const lead = prepared.centre * prepared.echoSpacingMs;
    const longest = prepared.repetitionTimeMs - (prepared.readouts - prepared.centre) * prepared.echoSpacingMs;
    const readouts = readoutsOf(prepared, t1Ms);
    return rootMs((ti) => signalAfterInversion(prepared, t1Ms, readouts, ti), lead, longest, t1Ms);
  }
  if (classRow(setting.key).train) {
    const end = timing.fromEquilibrium ? { z0: 0, gain: 0 } : trainEnd(timing, t1Ms, t2Ms);
    const longest = timing.fromEquilibrium ? 20 * t1Ms : timing.repetitionTimeMs - timing.echoTrainLength * timing.echoSpacingMs;
    return rootMs((ti) => trainLongitudinal(timing, t1Ms, end, ti), 0, longest, t1Ms);
  }
  const lastEchoMs = Math.max(timing.echoTimeMs, timing.secondEchoTimeMs ?? 0);
  const longest = timing.fromEquilibrium ? 20 * t1Ms : timing.repetitionTimeMs - lastEchoMs;
  return rootMs((ti) => spinEchoLongitudinal(timing, t1Ms, ti), 0, longest, t1Ms);
}
