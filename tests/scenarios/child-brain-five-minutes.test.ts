import { describe, expect, it } from 'vitest';
import { edit, seriesOf } from '../calc/series-of.js';
import { expectTime, wordFor } from './judge.js';

/** Invented brain series at 3 T for an awake child; the parent says five minutes. Ten seconds of preparation each. */
const head = { fieldOfViewMm: 220, matrixRead: 256, sliceThicknessMm: 4, sliceGapMm: 0.4 };
const series = {
  localiser: seriesOf('single-shot-fast-spin-echo/2D', {
    ...head,
    repetitionTimeMs: 1000,
    echoTimeMs: 60,
    matrixPhase: 128,
    echoSpacingMs: 4,
    sliceCount: 15,
  }),
  diffusion: seriesOf('echo-planar-spin-echo/2D', {
    ...head,
    repetitionTimeMs: 4000,
    echoTimeMs: 80,
    matrixRead: 128,
    matrixPhase: 128,
    pixelBandwidthHz: 1600,
    parallelFactorPhase: 2,
    sliceCount: 24,
    diffusion: { bValuesSPerMm2: [0, 1000], directions: 3, averages: [1, 3] },
  }),
  t2: seriesOf('fast-spin-echo/2D', {
    ...head,
    repetitionTimeMs: 4000,
    echoTimeMs: 100,
    matrixPhase: 256,
    parallelFactorPhase: 2,
    echoTrainLength: 16,
    dummyShots: 1,
    sliceCount: 22,
  }),
  flair: seriesOf('fast-spin-echo/2D', {
    ...head,
    repetitionTimeMs: 9000,
    inversionTimeMs: 2500,
    echoTimeMs: 120,
    matrixPhase: 192,
    parallelFactorPhase: 2,
    echoTrainLength: 16,
    rounds: 2,
    sliceCount: 22,
  }),
  t1: seriesOf('spoiled-gradient-echo/2D', {
    ...head,
    repetitionTimeMs: 220,
    echoTimeMs: 2.5,
    flipAngleDeg: 70,
    pixelBandwidthHz: 300,
    matrixPhase: 192,
    parallelFactorPhase: 2,
    rounds: 2,
    sliceCount: 22,
  }),
};
const seconds = (name: keyof typeof series) => edit(series[name], {}, { fieldT: 3 }).figures.scanTimeS as number;

describe('brain of a five-year-old at 3 T, awake, five minutes', () => {
  it.each<[keyof typeof series, number]>([
    ['localiser', 15],
    ['diffusion', 40],
    ['t2', 36],
    ['t1', 42],
    ['flair', 108],
  ])('%s takes %d s', (name, expected) => {
    expectTime(seconds(name), expected);
    expect(edit(series[name], {}, { fieldT: 3 }).codes).not.toContain('slot-scaled');
  });

  it('all with ten seconds each come to 4:51: too close, twenty seconds should be to spare', () => {
    const total = Object.keys(series).reduce((sum, name) => sum + seconds(name as keyof typeof series) + 10, 0);
    expectTime(total, 291);
    expect(wordFor('session', total, 300)).toBe('TOO CLOSE');
  });

  it('diffusion and T2 are done within two minutes of starting: the minimum answer', () => {
    expect(seconds('localiser') + seconds('diffusion') + seconds('t2') + 30).toBeLessThan(125);
  });

  it('without FLAIR it fits', () => {
    const total = (['localiser', 'diffusion', 't2', 't1'] as const).reduce((sum, name) => sum + seconds(name) + 10, 0);
    expect(wordFor('session', total, 300)).toBe('FITS');
  });
});
