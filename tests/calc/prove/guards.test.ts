import { describe, expect, it } from 'vitest';
import { parallelNoiseFactor } from '../../../src/calc/parallel-noise.js';
import { playPulse } from '../../../src/calc/pulses.js';
import { type Coil, plainScanner } from '../../../src/calc/scanner.js';
import { inversionCapacity } from '../../../src/calc/slots.js';
import { type Tissue, tableTissue } from '../../../src/calc/tissues.js';
import { edit, seriesOf } from '../series-of.js';

/** A limit forgives the last binary digits of a sum, and nothing that a person could type. */
describe('a hair beyond a limit is beyond it', () => {
  it('an acceleration of 4.005 or 2.005 x 2 is not in the default table', () => {
    expect(parallelNoiseFactor(null, 4, 1)).toBeCloseTo(1.7, 12);
    expect(parallelNoiseFactor(null, 4.005, 1)).toBeNull();
    expect(parallelNoiseFactor(null, 2, 2)).toBeCloseTo(1.15, 12);
    expect(parallelNoiseFactor(null, 2.005, 2)).toBeNull();
    expect(parallelNoiseFactor(null, 2, 2.005)).toBeNull();
  });

  it("an acceleration of 2.005 lies between a coil's rows, and 1.005 along partitions in none of them", () => {
    const rows = [
      { phase: 2, slice: 1, g: 1.1 },
      { phase: 3, slice: 1, g: 1.3 },
      { phase: 2, slice: 2, g: 1.4 },
    ];
    const coil: Coil = { name: 'invented', elements: { AP: 4, RL: 4, HF: 4 }, g: rows };
    expect(parallelNoiseFactor(coil, 2.005, 1)).toBeCloseTo(1.101, 9);
    expect(parallelNoiseFactor(coil, 2, 1.005)).toBeNull();
    expect(parallelNoiseFactor(coil, 1.5, 1)).toBeCloseTo(1.05, 12);
  });

  it('a field of 3.005 or 0.545 T lies beyond measured 3 and 0.55 T', () => {
    const beyond = (fieldT: number) => (tableTissue('liver', fieldT) as Tissue).extrapolated;
    expect([3, 3.005, 0.55, 0.545].map(beyond)).toEqual([false, true, false, true]);
  });

  it('a pulse whose peak is half a percent too high is lengthened', () => {
    const { peakB1Ut } = playPulse('refocusing', 180, 1, { ...plainScanner(1.5), maximumB1Ut: 1000 });
    expect(playPulse('refocusing', 180, 1, { ...plainScanner(1.5), maximumB1Ut: peakB1Ut }).lengthened).toBe(false);
    expect(playPulse('refocusing', 180, 1, { ...plainScanner(1.5), maximumB1Ut: peakB1Ut / 1.005 }).lengthened).toBe(true);
  });

  it('a slot of 600.005 ms does not fit into 600 after TI', () => {
    expect(inversionCapacity(1000, 400, 600)).toBe(1);
    expect(inversionCapacity(1000, 400, 600.005)).toBe(0);
  });

  it.each([
    // 50 readouts of 7 ms before the centre; as many after it; 125 echoes of 4 ms; TI 500 and TE 10
    [
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, echoTimeMs: 3, sliceCount: 100 },
      { inversionTimeMs: 350 },
      { inversionTimeMs: 349.995 },
    ],
    [
      'inversion-prepared-gradient-echo/3D',
      { inversionTimeMs: 900, echoTimeMs: 3, sliceCount: 100 },
      { repetitionTimeMs: 1250 },
      { repetitionTimeMs: 1249.995 },
    ],
    [
      'fast-spin-echo/3D',
      { echoTimeMs: 100, echoTrainLength: 125, echoSpacingMs: 4 },
      { repetitionTimeMs: 500 },
      { repetitionTimeMs: 499.995 },
    ],
    ['spin-echo/3D', { echoTimeMs: 10, inversionTimeMs: 500 }, { repetitionTimeMs: 510 }, { repetitionTimeMs: 509.995 }],
  ] as const)('%s: what is 5 us too long cannot be played', (key, given, fits, over) => {
    expect(edit(seriesOf(key, { ...given, ...fits })).codes).not.toContain('timing-impossible');
    expect(edit(seriesOf(key, { ...given, ...over })).codes).toContain('timing-impossible');
  });
});
