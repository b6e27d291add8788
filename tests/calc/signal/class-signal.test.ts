import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../../src/calc/classes.js';
import type { TissueSignal } from '../../../src/calc/evaluate.js';
import type { GivenParameters, Series } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';

const targetOf = (key: ClassKey, given: GivenParameters, besides: Partial<Series> = {}, fieldT = 1.5) =>
  edit(seriesOf(key, given, { target: 'CSF', ...besides }), {}, { fieldT }).signals[0] as TissueSignal & { signal: number };

describe('what magnetisation a slice starts with', () => {
  const shot: GivenParameters = { repetitionTimeMs: 1000, echoTimeMs: 80, matrixPhase: 128, echoSpacingMs: 5 };

  it('single shots start at equilibrium: CSF reads nearly 1 at 180 degrees, not the 0.19 of the shot-to-shot TR (computed)', () => {
    expect(targetOf('single-shot-fast-spin-echo/2D', shot).signal).toBeCloseTo(Math.exp(-80 / 2200), 9);
    const repeated = targetOf('single-shot-fast-spin-echo/2D', { ...shot, averages: 2 });
    expect(repeated.signal).toBeLessThan(0.19);
  });

  it('dummies or averages bring the steady state, TR times the slices of the round', () => {
    const one = targetOf('single-shot-fast-spin-echo/2D', { ...shot, repetitionTimeMs: 10000, averages: 2 }).signal;
    const ten = targetOf('single-shot-fast-spin-echo/2D', { ...shot, averages: 2, sliceCount: 10 }).signal;
    const dummy = targetOf('single-shot-fast-spin-echo/2D', { ...shot, dummyShots: 1, sliceCount: 10 }).signal;
    const split = targetOf('single-shot-fast-spin-echo/2D', { ...shot, averages: 2, sliceCount: 20, rounds: 2 }).signal;
    const together = targetOf('single-shot-fast-spin-echo/2D', { ...shot, averages: 2, sliceCount: 20, simultaneousSlices: 2 }).signal;
    for (const same of [ten, dummy, split, together]) expect(same).toBeCloseTo(one, 12);
  });

  it('an echo-planar series or diffusion is in its steady state, a single volume is not', () => {
    const planar: GivenParameters = { repetitionTimeMs: 2000, echoTimeMs: 80, matrixPhase: 64, echoSpacingMs: 0.5 };
    const single = targetOf('echo-planar-spin-echo/2D', planar).signal;
    expect(single).toBeCloseTo(Math.exp(-80 / 2200), 9);
    for (const repeats of [
      { volumes: 2 },
      { averages: 2 },
      { dummyShots: 1 },
      { diffusion: { bValuesSPerMm2: [0], directions: 1, averages: [1] } },
    ] as const) {
      expect(targetOf('echo-planar-spin-echo/2D', { ...planar, ...repeats }).signal).toBeLessThan(0.5);
    }
  });
});

describe('what stands beside a signal', () => {
  it.each<[Series['parameters']['fatSuppression'], number]>([
    ['none', 1],
    ['spectral', 0.05],
    ['water-excitation', 0.05],
    ['two-point', 0],
    ['inversion', 1],
  ])('fat under %s keeps %d; water and marrow keep all', (fatSuppression, kept) => {
    const pair = edit(
      seriesOf('spin-echo/2D', { fatSuppression }, { target: 'subcutaneous fat', comparison: 'bone marrow (vertebral)' }),
    ).signals;
    expect(pair.map((tissue) => tissue.suppression)).toEqual([kept, 1]);
  });

  it('the diffusion factor is that of the highest b-value, apart from the signal', () => {
    const given: GivenParameters = { repetitionTimeMs: 5000, echoTimeMs: 80, matrixPhase: 64, echoSpacingMs: 0.5, dummyShots: 1 };
    const weighted = targetOf('echo-planar-spin-echo/2D', {
      ...given,
      diffusion: { bValuesSPerMm2: [0, 800], directions: 3, averages: [1, 2] },
    });
    const plain = targetOf('echo-planar-spin-echo/2D', given);
    expect(weighted.diffusionFactor).toBeCloseTo(Math.exp(-2.4), 12);
    expect(plain.diffusionFactor).toBe(1);
    expect(weighted.signal).toBeCloseTo(plain.signal, 12);
  });

  it('the T1 is the one used, contrast agent included', () => {
    const spleen = targetOf(
      'spoiled-gradient-echo/3D',
      { repetitionTimeMs: 4, echoTimeMs: 1.2 },
      { target: 'spleen', contrastAgent: true },
      3,
    );
    expect(spleen.t1Ms).toBeCloseTo(1 / (1 / 1328 + 0.004), 9);
  });

  it('a dual echo gives both signals, and time, SNR and contrast at the first', () => {
    const dual = edit(
      seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 170, echoTimeMs: 2.3, secondEchoTimeMs: 4.6, flipAngleDeg: 70 }),
    );
    const single = edit(seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 170, echoTimeMs: 2.3, flipAngleDeg: 70 }));
    const [dualLiver, singleLiver] = [dual.signals[0] as TissueSignal, single.signals[0] as TissueSignal];
    expect(dualLiver.signal).toBe(singleLiver.signal);
    expect((dualLiver.secondSignal as number) / (dualLiver.signal as number)).toBeCloseTo(Math.exp(-2.3 / dualLiver.t2StarMs), 9);
    expect(singleLiver.secondSignal).toBeNull();
    expect(dual.figures.contrastRatio).toBe(single.figures.contrastRatio);
  });

  it('a cine keeps its own TR, a trigger stretches it', () => {
    const free = targetOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 4000 }).signal;
    const triggered = targetOf('spoiled-gradient-echo/2D', {
      repetitionTimeMs: 100,
      pacing: { kind: 'respiratory-trigger', periodMs: 4000 },
    }).signal;
    expect(triggered).toBeCloseTo(free, 12);
  });
});
