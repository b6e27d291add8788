import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { acquiredLines } from '../../src/calc/lines.js';
import { inversionEnergyUt2Ms, slotPulses } from '../../src/calc/pulses.js';
import { b1PlusRmsUt, repetitionEnergyUt2Ms, sarTrend, seriesB1PlusRmsUt } from '../../src/calc/rf.js';
import { plainScanner, pulseNames, type Scanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, parametersOf, seriesOf } from './series-of.js';

/** A scanner whose every pulse is a hard one of 1 ms. */
const hard: Scanner = {
  ...plainScanner(1.5),
  maximumB1Ut: 100,
  pulses: Object.fromEntries(pulseNames.map((name) => [name, { durationMs: 1 }])),
};

const rms = (key: ClassKey, given: GivenParameters, slices = 1, scanner = hard) => {
  const p = parametersOf(key, given);
  return seriesB1PlusRmsUt(key, p, acquiredLines(key, p), slotPulses(key, p, scanner), slices);
};
const energy = (key: ClassKey, given: GivenParameters, slices = 1, scanner = hard) => {
  const p = parametersOf(key, given);
  return repetitionEnergyUt2Ms(key, p, acquiredLines(key, p), slotPulses(key, p, scanner), slices);
};

describe('B1+rms with hard pulses of 1 ms (McRobbie, Essentials of MRI Safety, eq. 1.9, read in a secondary page; values computed)', () => {
  it.each<[string, ClassKey, GivenParameters, number, number]>([
    ['spin echo 90 + 180, TR 500, one slice', 'spin-echo/2D', { repetitionTimeMs: 500 }, 1, 0.5872],
    ['ten slices', 'spin-echo/2D', { repetitionTimeMs: 500 }, 10, 1.8568],
    ['fast spin echo 90 + 16 x 180, TR 4000, 20 slices', 'fast-spin-echo/2D', { repetitionTimeMs: 4000, echoTrainLength: 16 }, 20, 3.3474],
    ['at 120 degrees', 'fast-spin-echo/2D', { repetitionTimeMs: 4000, echoTrainLength: 16, refocusingAngleDeg: 120 }, 20, 2.2529],
    ['spoiled 10 degrees, TR 8', 'spoiled-gradient-echo/3D', { repetitionTimeMs: 8, flipAngleDeg: 10 }, 1, 0.2307],
    ['balanced 60 degrees, TR 4', 'balanced-steady-state/2D', { repetitionTimeMs: 4, flipAngleDeg: 60 }, 1, 1.9572],
  ])('%s', (_what, key, given, slices, ut) => {
    expect(rms(key, given, slices)).toBeCloseTo(ut, 4);
  });

  it('one 90 and 16 refocusing pulses: energy at 180 over 120 degrees is 2.2075', () => {
    const train = (refocusingAngleDeg: number) => energy('fast-spin-echo/2D', { echoTrainLength: 16, refocusingAngleDeg });
    expect(train(180) / train(120)).toBeCloseTo(2.2075, 4);
  });
});

describe('repetitionEnergyUt2Ms', () => {
  const ninety = energy('spoiled-gradient-echo/2D', { flipAngleDeg: 90 });

  it('a second echo plays a second refocusing pulse', () => {
    expect(energy('spin-echo/2D', {})).toBeCloseTo(5 * ninety, 9);
    expect(energy('spin-echo/2D', { secondEchoTimeMs: 80 })).toBeCloseTo(9 * ninety, 9);
    expect(energy('spoiled-gradient-echo/2D', { flipAngleDeg: 90, secondEchoTimeMs: 12 })).toBeCloseTo(ninety, 9);
  });

  it('simultaneous slices: the same slices in fewer slots, each with that many times the energy', () => {
    expect(energy('spin-echo/2D', { simultaneousSlices: 2 }, 10)).toBeCloseTo(energy('spin-echo/2D', {}, 10), 9);
    expect(energy('spin-echo/2D', { simultaneousSlices: 2 }, 9)).toBeCloseTo(energy('spin-echo/2D', {}, 10), 9);
  });

  it('bands of a 3D gradient echo count before every line, an upper bound, unless it is stated how often they are played', () => {
    const series = (given: GivenParameters) =>
      edit(seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 5, echoTimeMs: 2, sliceCount: 60 }), given).figures
        .b1PlusRmsUt as number;
    const plain = series({}) ** 2;
    const everyLine = series({ saturationBands: 1 }) ** 2 - plain;
    const every40 = series({ saturationBands: 1, fatSuppressionEveryLines: 40 }) ** 2 - plain;
    expect(everyLine / every40).toBeCloseTo(40, 6);
  });

  it('an inversion pulse stretched with the series loses energy alike', () => {
    const series = (given: GivenParameters) =>
      edit(
        seriesOf('fast-spin-echo/2D', {
          repetitionTimeMs: 4000,
          inversionTimeMs: 200,
          sliceCount: 1,
          echoTrainLength: 8,
          echoSpacingMs: 14,
          echoTimeMs: 56,
        }),
        {
          echoSpacingMs: 14,
          echoTimeMs: 56,
          ...given,
        },
      ).figures.b1PlusRmsUt as number;
    expect(series({ rfPulseStretch: 2 }) / series({})).toBeCloseTo(Math.SQRT1_2, 9);
  });

  it('bands and fat saturation once a slot: half as many with two simultaneous slices', () => {
    const extra = (given: GivenParameters, slices: number) =>
      energy('spin-echo/2D', { saturationBands: 2, fatSuppression: 'spectral', ...given }, slices) - energy('spin-echo/2D', given, slices);
    expect(extra({}, 10)).toBeCloseTo(10 * ninety * (2 + (100 / 90) ** 2), 8);
    expect(extra({ simultaneousSlices: 2 }, 10)).toBeCloseTo(extra({}, 5), 8);
  });

  it('an inversion for every slice in 2D, one a repetition in 3D', () => {
    expect(energy('spin-echo/2D', { inversionTimeMs: 150 }, 7) - energy('spin-echo/2D', {}, 7)).toBeCloseTo(7 * inversionEnergyUt2Ms, 8);
    expect(energy('fast-spin-echo/3D', { inversionTimeMs: 150 }) - energy('fast-spin-echo/3D', {})).toBeCloseTo(inversionEnergyUt2Ms, 8);
  });

  it('an inversion-prepared cycle plays one excitation a readout', () => {
    const given: GivenParameters = { flipAngleDeg: 9, sliceCount: 176, partialFourierSlice: 0.75 };
    expect(energy('inversion-prepared-gradient-echo/3D', given)).toBeCloseTo(132 * ninety * 0.01 + inversionEnergyUt2Ms, 6);
  });

  it('fat saturation of a 3D gradient echo counts only where its distance is stated', () => {
    const fat = (given: GivenParameters, key: ClassKey = 'spoiled-gradient-echo/3D') =>
      energy(key, { ...given, fatSuppression: 'spectral' }) - energy(key, given);
    expect(fat({})).toBe(0);
    expect(fat({ fatSuppressionEveryLines: 40 })).toBeCloseTo((ninety * (100 / 90) ** 2) / 40, 9);
    expect(fat({}, 'balanced-steady-state/2D')).toBe(0);
    for (const key of [
      'spoiled-gradient-echo/2D',
      'inversion-prepared-gradient-echo/3D',
      'fast-spin-echo/3D',
      'single-shot-fast-spin-echo/2D',
    ] as const) {
      expect(fat({}, key)).toBeCloseTo(ninety * (100 / 90) ** 2, 6);
    }
  });
});

describe('B1+rms over its window', () => {
  it('beyond 10 s all of one TR counts within 10 s (IEC 60601-2-33: any 10 s; read in a secondary page)', () => {
    expect(b1PlusRmsUt(1000, 10000)).toBeCloseTo(Math.sqrt(0.1), 12);
    expect(b1PlusRmsUt(1000, 12000)).toBeCloseTo(Math.sqrt(0.1), 12);
    expect(b1PlusRmsUt(1000, 2500)).toBeCloseTo(Math.sqrt(0.4), 12);
  });

  it('a respiratory trigger stretches TR for RF too', () => {
    const triggered = { repetitionTimeMs: 2000, pacing: { kind: 'respiratory-trigger', periodMs: 4000 } } as const;
    expect(rms('fast-spin-echo/2D', { repetitionTimeMs: 2000 }, 5) / rms('fast-spin-echo/2D', triggered, 5)).toBeCloseTo(Math.SQRT2, 9);
  });

  it('does not depend on the field', () => {
    const at = (fieldT: number) => rms('fast-spin-echo/2D', { echoTrainLength: 8 }, 10, plainScanner(fieldT));
    expect(at(3)).toBe(at(1.5));
  });
});

describe('SAR trend', () => {
  it('equals the power trend within one field', () => {
    expect(sarTrend(0.7, 1)).toEqual({ low: 0.7, high: 0.7 });
  });

  it('spans B0 to 0.85 and to 2 across fields, sorted (IEEE Rev Biomed Eng 2017;10:95, table VI: 1.7 to 1.9 from 1.5 to 3 T; read in the source)', () => {
    const up = sarTrend(1, 2);
    expect(up.high).toBeCloseTo(4, 12);
    expect(up.low).toBeGreaterThan(1.7);
    expect(up.low).toBeLessThan(1.9);
    expect(up.low).toBeCloseTo(2 ** 0.85, 12);
    const down = sarTrend(1, 0.5);
    expect(down.low).toBeCloseTo(0.25, 12);
    expect(down.high).toBeCloseTo(0.5 ** 0.85, 12);
  });

  it('two real 3D spoiled series, 15 deg / TR 15 against 9 deg / TR 35: reported SAR differs 6.38-fold in 159 subjects (Cohen-Adad et al., Sci Data 2021; computed from its sidecars), the model gives 6.48', () => {
    const series = seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 35, echoTimeMs: 3.13, flipAngleDeg: 9, sliceCount: 22 });
    const { figures } = edit(series, { repetitionTimeMs: 15, flipAngleDeg: 15 }, { fieldT: 3 });
    expect(figures.rfPowerTrend).toBeCloseTo(6.4815, 3);
    expect((figures.rfPowerTrend as number) / 6.38).toBeLessThan(1.02);
  });
});
