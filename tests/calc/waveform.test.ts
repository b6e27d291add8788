import { describe, expect, it } from 'vitest';
import { gaussianWaveform, hardWaveform, sincWaveform, timeBandwidthOfPower } from '../../src/calc/waveform.js';

/** Power and peak factor by the trapezoid rule on 100,000 steps, written apart from the model. */
function byTrapezoids(shape: (t: number) => number): { powerFactor: number; peakFactor: number } {
  const steps = 100_000;
  const values = Array.from({ length: steps + 1 }, (_, i) => shape(i / steps));
  const integral = (f: (v: number) => number) => values.reduce((sum, v, i) => sum + f(v) * (i === 0 || i === steps ? 0.5 : 1), 0) / steps;
  const area = integral((v) => v);
  return { powerFactor: integral((v) => v * v) / area ** 2, peakFactor: Math.max(...values.slice(steps / 2 - 1, steps / 2 + 2)) / area };
}

const hannSinc = (lobes: number) => (t: number) => {
  const x = Math.PI * lobes * (t - 0.5);
  return (Math.abs(x) < 1e-12 ? 1 : Math.sin(x) / x) * Math.cos(Math.PI * (t - 0.5)) ** 2;
};

describe('waveforms', () => {
  it.each([
    // common practice; recomputed by integrating the shape
    [2, 1.8],
    [3, 2.28],
    [4, 3.11],
    [6, 5.22],
  ])('a Hann-windowed sinc of time-bandwidth %d takes %d times the power of a hard pulse', (tb, power) => {
    expect(sincWaveform(tb).powerFactor).toBeCloseTo(power, 2);
  });

  it('a Gaussian cut at two standard deviations takes 1.23 times (recomputed)', () => {
    expect(gaussianWaveform().powerFactor).toBeCloseTo(1.23, 2);
  });

  it.each([2, 3, 4, 6, 2.8])('agrees with trapezoids for a sinc of %d', (tb) => {
    const own = byTrapezoids(hannSinc(tb));
    expect(sincWaveform(tb).powerFactor).toBeCloseTo(own.powerFactor, 7);
    expect(sincWaveform(tb).peakFactor).toBeCloseTo(own.peakFactor, 7);
  });

  it('agrees with trapezoids for the Gaussian', () => {
    const own = byTrapezoids((t) => Math.exp(-0.5 * ((t - 0.5) / 0.25) ** 2));
    expect(gaussianWaveform().powerFactor).toBeCloseTo(own.powerFactor, 7);
    expect(gaussianWaveform().peakFactor).toBeCloseTo(own.peakFactor, 7);
  });

  it('a hard pulse is the measure', () => {
    expect(hardWaveform).toEqual({ powerFactor: 1, peakFactor: 1 });
  });

  it('finds the sinc of a known power factor again', () => {
    expect(sincWaveform(timeBandwidthOfPower(2.11)).powerFactor).toBeCloseTo(2.11, 6);
    expect(timeBandwidthOfPower(sincWaveform(4).powerFactor)).toBeCloseTo(4, 6);
  });
});
