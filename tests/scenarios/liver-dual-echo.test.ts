import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../src/calc/scanner.js';
import { edit, seriesOf } from '../calc/series-of.js';
import { expectTime, wordFor } from './judge.js';

/** Invented 2D dual-echo liver series: 30 slices, 180 lines with R 2. */
const dual = {
  repetitionTimeMs: 170,
  echoTimeMs: 2.3,
  secondEchoTimeMs: 4.6,
  flipAngleDeg: 70,
  sliceCount: 30,
  sliceThicknessMm: 5,
  sliceGapMm: 1,
  fieldOfViewMm: 380,
  phaseFieldOfViewPercent: 80,
  matrixRead: 256,
  matrixPhase: 225,
  parallelFactorPhase: 2,
  pixelBandwidthHz: 1000,
  rounds: 2,
  pacing: { kind: 'breath-hold' },
} as const;

describe('in- and opposed-phase pair copied from 1.5 to 3 T unchanged', () => {
  const at15 = seriesOf('spoiled-gradient-echo/2D', dual);

  it('is right at 1.5 T and flagged at 3.0 T: both echoes in phase, 1.00 and 2.00 cycles', () => {
    expect(edit(at15).codes).not.toContain('echo-pair-phase');
    const caution = edit(at15, {}, { onto: plainScanner(3) }).cautions.find(({ code }) => code === 'echo-pair-phase');
    expect(caution?.level).toBe('error');
    expect(caution?.numbers.firstCycles).toBeCloseTo(1, 2);
    expect(caution?.numbers.secondCycles).toBeCloseTo(2, 2);
    expect(caution?.text).toContain('1.15/2.30');
  });

  it('suggests 1.20/2.39 at 2.89 T', () => {
    expect(edit(at15, {}, { onto: plainScanner(2.89) }).cautions.find(({ code }) => code === 'echo-pair-phase')?.text).toContain(
      '1.20/2.39',
    );
  });

  it.each([
    [3, 1.15, 2.3],
    [2.89, 1.2, 2.39],
  ])('at %d T %d/%d is right', (fieldT, first, second) => {
    expect(edit(at15, { echoTimeMs: first, secondEchoTimeMs: second }, { onto: plainScanner(fieldT) }).codes).not.toContain(
      'echo-pair-phase',
    );
  });

  it('3.45/2.30 with the opposed echo later is a T2* confound, and says so', () => {
    const caution = edit(at15, { echoTimeMs: 3.45, secondEchoTimeMs: 2.3 }, { onto: plainScanner(3) }).cautions.find(
      ({ code }) => code === 'echo-pair-phase',
    );
    expect(caution?.level).toBe('note');
    expect(caution?.text).toContain('T2*');
  });
});

describe('30 slices, 22 fit at TR 170, holds of 16 s', () => {
  const at3 = seriesOf('spoiled-gradient-echo/2D', { ...dual, echoTimeMs: 3.45, secondEchoTimeMs: 2.3, pixelBandwidthHz: 450 });
  const tried = (set = {}, target = 'liver') => edit({ ...at3, target }, set, { fieldT: 3 });

  it('22 fit: two rounds of 15.3 s, each a hold, slices may shift between them', () => {
    const { figures, codes } = tried();
    expect(figures.slicesPerRepetition).toBe(22);
    expect(figures).toMatchObject({ holds: 2, roundsNeeded: 2 });
    expectTime(figures.holdTimeS, 15.3);
    expect(wordFor('hold', figures.holdTimeS, 16)).toBe('TOO CLOSE');
    expect(codes).toContain('shift-between-holds');
  });

  it('in one hold at TR 170 they do not fit, and time counts both rounds', () => {
    const { figures, codes } = tried({ rounds: 1 });
    expect(codes).toContain('slices-need-rounds');
    expect(figures.holds).toBe(2);
  });

  it('TR 230 takes one hold of 20.7 s: too long', () => {
    const { figures, codes } = tried({ repetitionTimeMs: 230, rounds: 1 });
    expect(figures.holds).toBe(1);
    expectTime(figures.holdTimeS, 20.7);
    expect(wordFor('hold', figures.holdTimeS, 16)).toBe('OVER');
    expect(codes).not.toContain('shift-between-holds');
  });

  it.each(['liver', 'spleen'])('at TR 230 %s gains 27 to 30 %%', (target) => {
    const ratio = tried({ repetitionTimeMs: 230, rounds: 1 }, target).figures.relativeSnr as number;
    expect(ratio).toBeGreaterThan(1.26);
    expect(ratio).toBeLessThan(1.31);
  });

  it('a 3D dual echo takes about 16 s in one hold', () => {
    const volume = seriesOf('spoiled-gradient-echo/3D', {
      ...dual,
      rounds: 1,
      sliceGapMm: 0,
      repetitionTimeMs: 5.4,
      echoTimeMs: 1.15,
      secondEchoTimeMs: 2.3,
      flipAngleDeg: 10,
      sliceCount: 44,
      partialFourierSlice: 0.75,
    });
    const { figures } = edit(volume, {}, { fieldT: 3 });
    expectTime(figures.holdTimeS, 16);
    expect(figures.holds).toBe(1);
  });
});
