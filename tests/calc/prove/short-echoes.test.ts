import { describe, expect, it } from 'vitest';
import { spinEchoLongitudinal } from '../../../src/calc/signal/spin-echo.js';
import { edit, seriesOf } from '../series-of.js';

// Times under 1 ms, where a missing second echo must count for nothing at all.
describe('an echo under 1 ms and no second one', () => {
  const series = seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 0.9, echoTimeMs: 0.4, pixelBandwidthHz: 2000 });

  it('is played within a TR under 1 ms', () => {
    expect(edit(series).codes).not.toContain('timing-impossible');
  });

  it('ends when it ends: the shortest TR of the estimate goes with TE', () => {
    const { minimumEchoTimeMs, minimumRepetitionTimeMs } = edit(series).figures;
    const twice = edit(series, { secondEchoTimeMs: minimumEchoTimeMs as number }).figures;
    expect(twice.minimumRepetitionTimeMs).toBeCloseTo(minimumRepetitionTimeMs as number, 12);
  });

  it('leaves a spin echo all of TR but the echo to recover: 1 - 2 e^(-(TR - TE/2)/T1) + e^(-TR/T1) (Hahn, Phys Rev 1950;80:580)', () => {
    const timing = {
      repetitionTimeMs: 100,
      echoTimeMs: 0.4,
      secondEchoTimeMs: undefined,
      inversionTimeMs: undefined,
      flipAngleDeg: 90,
      refocusingAngleDeg: 180,
      fromEquilibrium: false,
    };
    const t1Ms = 500;
    const expected = 1 - 2 * Math.exp(-(100 - 0.2) / t1Ms) + Math.exp(-100 / t1Ms);
    expect(spinEchoLongitudinal(timing, t1Ms)).toBeCloseTo(expected, 12);
  });
});
