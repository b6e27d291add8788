import { describe, expect, it } from 'vitest';
import { type SpinEchoTiming, shortSpinEchoSignal, spinEchoLongitudinal, spinEchoSignal } from '../../../src/calc/signal/spin-echo.js';
import { edit, seriesOf } from '../series-of.js';

const ninety = (repetitionTimeMs: number, echoTimeMs: number): SpinEchoTiming => ({
  repetitionTimeMs,
  echoTimeMs,
  secondEchoTimeMs: undefined,
  inversionTimeMs: undefined,
  flipAngleDeg: 90,
  refocusingAngleDeg: 180,
  fromEquilibrium: false,
});

describe('shortSpinEchoSignal', () => {
  it.each([
    // published worked examples (UCLA M267 problem set; read in the source)
    [400, 10, 600, 80, 0.4294],
    [400, 10, 500, 70, 0.4774],
    [3000, 90, 600, 80, 0.3225],
    [3000, 90, 500, 70, 0.2758],
  ])('%d/%d with T1 %d and T2 %d gives %d', (tr, te, t1, t2, signal) => {
    expect(shortSpinEchoSignal(tr, te, t1, t2)).toBeCloseTo(signal, 4);
  });
});

describe('spinEchoSignal', () => {
  it.each([
    // exact form, computed (Hahn 1950; Haacke et al. 1999)
    [400, 10, 600, 80, 0.4218],
    [400, 10, 500, 70, 0.4695],
    [500, 15, 1084, 69, 0.290267],
    [500, 15, 1820, 99, 0.201053],
  ])('%d/%d with T1 %d and T2 %d gives %d', (tr, te, t1, t2, signal) => {
    expect(spinEchoSignal(ninety(tr, te), te, t1, t2)).toBeCloseTo(signal, signal === 0.4218 || signal === 0.4695 ? 4 : 6);
  });

  it('is what evaluate gives for a spin echo', () => {
    const series = seriesOf(
      'spin-echo/2D',
      { repetitionTimeMs: 400, echoTimeMs: 10 },
      { tissueOverrides: { liver: { t1Ms: 600, t2Ms: 80 }, spleen: { t1Ms: 500, t2Ms: 70 } } },
    );
    const [target, comparison] = edit(series).signals;
    expect(target?.signal).toBeCloseTo(0.4218, 4);
    expect(comparison?.signal).toBeCloseTo(0.4695, 4);
  });

  it.each([
    [400, 10, 600],
    [500, 15, 1084],
    [500, 15, 1820],
    [3000, 90, 600],
    [3000, 90, 838],
  ])('the short form reads 0.05 to 3.3 % high: TR %d, TE %d, T1 %d (computed)', (tr, te, t1) => {
    const excess = shortSpinEchoSignal(tr, te, t1, 80) / spinEchoSignal(ninety(tr, te), te, t1, 80) - 1;
    expect(excess).toBeGreaterThan(0.0005);
    expect(excess).toBeLessThan(0.033);
  });

  it.each([
    [2000, 30, 900],
    [600, 12, 400],
    [5000, 80, 3000],
  ])('at 90 and 180 degrees longitudinal magnetisation follows the textbook: TR %d, TE %d, T1 %d', (tr, te, t1) => {
    const textbook = 1 - 2 * Math.exp(-(tr - te / 2) / t1) + Math.exp(-tr / t1);
    expect(spinEchoLongitudinal(ninety(tr, te), t1)).toBeCloseTo(textbook, 12);
  });

  it.each([
    [2500, 15, 160, 288],
    [9000, 90, 2400, 4300],
  ])('with an inversion too: TR %d, TE %d, TI %d, T1 %d (Bydder & Young 1985; Hajnal 1992)', (tr, te, ti, t1) => {
    const textbook = 1 - 2 * Math.exp(-ti / t1) + 2 * Math.exp(-(tr - te / 2) / t1) - Math.exp(-tr / t1);
    expect(spinEchoLongitudinal({ ...ninety(tr, te), inversionTimeMs: ti }, t1)).toBeCloseTo(textbook, 12);
  });

  it('from equilibrium nothing was excited before', () => {
    expect(spinEchoLongitudinal({ ...ninety(2000, 30), fromEquilibrium: true }, 900)).toBe(1);
    expect(spinEchoLongitudinal({ ...ninety(2000, 30), inversionTimeMs: 500, fromEquilibrium: true }, 900)).toBeCloseTo(
      1 - 2 * Math.exp(-500 / 900),
      12,
    );
  });

  it('each echo loses sin^2 of half the refocusing angle', () => {
    const dual = { ...ninety(3000, 20), secondEchoTimeMs: 80, refocusingAngleDeg: 120, fromEquilibrium: true };
    expect(spinEchoSignal(dual, 20, 1000, 80)).toBeCloseTo(0.75 * Math.exp(-20 / 80), 12);
    expect(spinEchoSignal(dual, 80, 1000, 80)).toBeCloseTo(0.5625 * Math.exp(-1), 12);
  });
});
