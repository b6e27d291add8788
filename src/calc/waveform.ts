/** Shape of an RF pulse, independent of its angle and duration. */
export interface Waveform {
  /** tau x integral of B1 squared over the square of the integral of B1: energy against a hard pulse of the same angle and duration. */
  readonly powerFactor: number;
  /** Peak B1 against a hard pulse of the same angle and duration. */
  readonly peakFactor: number;
}

/** A rectangular pulse. */
export const hardWaveform: Waveform = { powerFactor: 1, peakFactor: 1 };

/** Integrates a shape on -1/2 .. 1/2 (composite Simpson; 2,000 steps keep ten digits for these smooth shapes). */
function waveformOf(shape: (x: number) => number): Waveform {
  const steps = 2000;
  let area = 0;
  let energy = 0;
  let peak = 0;
  for (let i = 0; i <= steps; i += 1) {
    const weight = i === 0 || i === steps ? 1 : i % 2 === 1 ? 4 : 2;
    const value = shape(i / steps - 0.5);
    area += weight * value;
    energy += weight * value * value;
    peak = Math.max(peak, Math.abs(value));
  }
  area /= 3 * steps;
  energy /= 3 * steps;
  return { powerFactor: energy / (area * area), peakFactor: peak / Math.abs(area) };
}

const sincs = new Map<number, Waveform>();

/**
 * Hann-windowed sinc of a time-bandwidth product: `sinc(tb x) (1 + cos 2 pi x) / 2` over the pulse (standard windowed sinc, common practice).
 *
 * @example sincWaveform(4).powerFactor //=> 3.11
 */
export function sincWaveform(timeBandwidth: number): Waveform {
  const known = sincs.get(timeBandwidth);
  if (known !== undefined) return known;
  const made = waveformOf((x) => sincAt(timeBandwidth, x));
  sincs.set(timeBandwidth, made);
  return made;
}

const gaussian: Waveform = waveformOf((x) => Math.exp(-8 * x * x));

/** Gaussian cut at two standard deviations (common practice, no source). Power factor 1.23. */
export function gaussianWaveform(): Waveform {
  return gaussian;
}

/** The time-bandwidth product whose windowed sinc has this power factor: gives a peak to a pulse of which only the power is known. */
export function timeBandwidthOfPower(powerFactor: number): number {
  const off = (timeBandwidth: number) => waveformOf((x) => sincAt(timeBandwidth, x)).powerFactor - powerFactor;
  // The power factor grows nearly in proportion: the secant through two neighbours lands within a few steps.
  let before = powerFactor;
  let here = 1.3 * powerFactor;
  let offBefore = off(before);
  for (let i = 0; i < 20; i += 1) {
    const offHere = off(here);
    if (offHere === offBefore) break;
    const next = here - (offHere * (here - before)) / (offHere - offBefore);
    [before, offBefore, here] = [here, offHere, next];
    if (Math.abs(here - before) < 1e-13 * here) break;
  }
  return here;
}

function sincAt(timeBandwidth: number, x: number): number {
  const angle = Math.PI * timeBandwidth * x;
  return (angle === 0 ? 1 : Math.sin(angle) / angle) * 0.5 * (1 + Math.cos(2 * Math.PI * x));
}
