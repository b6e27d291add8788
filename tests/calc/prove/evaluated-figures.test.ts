import { describe, expect, it } from 'vitest';
import { plainScanner, type Scanner } from '../../../src/calc/scanner.js';
import { edit, seriesOf } from '../series-of.js';

/** Rectangular pulses of 1 ms, whose B1 needs no waveform: angle / (2 pi gamma-bar tau). */
const hard: Scanner = {
  ...plainScanner(1.5),
  pulses: { excitation: { durationMs: 1, timeBandwidth: 0 }, refocusing: { durationMs: 1, timeBandwidth: 0 } },
};

describe('B1+rms of an evaluated series without a reading', () => {
  it.each([
    // sqrt(sum B1^2 tau / TR) (McRobbie, Essentials of MRI Safety, eq. 1.9; computed for 90 and 180 degrees, hard pulses of 1 ms)
    [1, 0.5872],
    [10, 1.8568],
  ])('spin echo, TR 500, %s slices: %s uT', (sliceCount, expected) => {
    const series = seriesOf('spin-echo/2D', { repetitionTimeMs: 500, echoTimeMs: 15, sliceCount });
    expect(edit(series, {}, { scanner: hard }).figures.b1PlusRmsUt).toBeCloseTo(expected, 4);
  });
});
