import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { nullTissueOf, simpleNullMs } from '../../src/calc/null-time.js';
import type { GivenParameters, Series } from '../../src/calc/series.js';
import { edit, seriesOf } from './series-of.js';

describe('simpleNullMs', () => {
  it.each([
    // TI = T1 ln(2 / (1 + e^(-TR/T1))) (Haacke et al. 1999; values computed)
    [4300, 9000, 2480.5],
    [4300, 8000, 2358.7],
    [4300, 6000, 2028.8],
    [288, 1e9, 199.6],
  ])('T1 %d, TR %d: %d ms', (t1, tr, ti) => {
    expect(simpleNullMs(t1, tr)).toBeCloseTo(ti, 1);
  });

  it('lies within 25 % of practice: fluid null 2200 to 2500 ms (read in a secondary page; published T1 scatters)', () => {
    for (const tr of [8000, 9000, 10000]) {
      expect(simpleNullMs(4300, tr)).toBeGreaterThan(2200 * 0.75);
      expect(simpleNullMs(4300, tr)).toBeLessThan(2500 * 1.25);
    }
    // fat at 1.5 T: practice 140 to 170 ms
    expect(simpleNullMs(288, 4000)).toBeLessThan(170 * 1.25);
  });
});

const signalAtNull = (key: ClassKey, given: GivenParameters, besides: Partial<Series> = {}) => {
  const start = edit(seriesOf(key, given, besides));
  const ti = start.figures.nullTimeMs as number;
  const there = edit(seriesOf(key, { ...given, inversionTimeMs: ti }, besides));
  return { ti, signal: there.signals[0]?.signal as number };
};

describe('nullTimeMs', () => {
  it.each<[ClassKey, GivenParameters]>([
    ['spin-echo/2D', { repetitionTimeMs: 6000, inversionTimeMs: 900 }],
    ['spin-echo/3D', { repetitionTimeMs: 2500, inversionTimeMs: 900, secondEchoTimeMs: 40, refocusingAngleDeg: 150 }],
    [
      'fast-spin-echo/2D',
      { repetitionTimeMs: 9000, inversionTimeMs: 2200, echoTrainLength: 16, flipAngleDeg: 80, refocusingAngleDeg: 140 },
    ],
    [
      'fast-spin-echo/3D',
      { repetitionTimeMs: 5000, inversionTimeMs: 1800, echoTrainLength: 150, echoTimeMs: 200, refocusingAngleDeg: 110 },
    ],
    ['single-shot-fast-spin-echo/2D', { repetitionTimeMs: 9000, inversionTimeMs: 900, averages: 2, sliceCount: 3, matrixPhase: 128 }],
    ['single-shot-fast-spin-echo/2D', { repetitionTimeMs: 9000, inversionTimeMs: 900, matrixPhase: 128 }],
    [
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, inversionTimeMs: 900, flipAngleDeg: 9, sliceCount: 60, echoTimeMs: 3 },
    ],
    ['echo-planar-spin-echo/2D', { repetitionTimeMs: 8000, inversionTimeMs: 900, echoTimeMs: 60, matrixPhase: 64 }],
  ])("is the zero of the class's own signal: %s", (key, given) => {
    const { ti, signal } = signalAtNull(key, given, { target: 'liver', nullTissue: 'liver' });
    expect(ti).toBeGreaterThan(100);
    expect(signal).toBeLessThan(1e-7);
  });

  it('comes to the textbook null for a fully recovered spin echo', () => {
    const { figures } = edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 30000, inversionTimeMs: 200, fatSuppression: 'inversion' }));
    expect(figures.nullTimeMs).toBeCloseTo(simpleNullMs(288, 30000), 3);
  });

  it('for trains counts TR less the train: within 1 % of the textbook null', () => {
    const { figures } = edit(
      seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 9000, inversionTimeMs: 2500, echoTrainLength: 16, echoSpacingMs: 10 }),
    );
    expect((figures.nullTimeMs as number) / simpleNullMs(4300, 9000 - 160)).toBeCloseTo(1, 2);
  });

  it('is null where nothing is inverted, where no tissue stands for the name, and where no TI gives a null', () => {
    expect(edit(seriesOf('spin-echo/2D')).figures.nullTimeMs).toBeNull();
    expect(edit(seriesOf('spin-echo/2D', { inversionTimeMs: 150 }, { nullTissue: 'unobtainium' })).figures.nullTimeMs).toBeNull();
    // fat has recovered past zero before the centre of a long cycle can be reached: 100 readouts of 10 ms
    const long = seriesOf(
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 3000, inversionTimeMs: 1500, sliceCount: 200, echoSpacingMs: 10, flipAngleDeg: 3 },
      { nullTissue: 'subcutaneous fat' },
    );
    expect(edit(long).figures.nullTimeMs).toBeNull();
    expect(edit({ ...long, nullTissue: 'CSF' }).figures.nullTimeMs).toBeGreaterThan(1000);
  });
});

describe('nullTissueOf', () => {
  it('is fat under inversion fat suppression, else fluid, else what the series names', () => {
    expect(nullTissueOf({ nullTissue: null }, 'inversion', 150)).toBe('subcutaneous fat');
    expect(nullTissueOf({ nullTissue: null }, 'none', 2500)).toBe('CSF');
    expect(nullTissueOf({ nullTissue: 'myocardium' }, 'inversion', 300)).toBe('myocardium');
    expect(nullTissueOf({ nullTissue: 'myocardium' }, 'none', undefined)).toBeNull();
  });
});
