import { describe, expect, it } from 'vitest';
import { balancedSignal } from '../../../src/calc/signal/balanced-steady-state.js';
import { inversionPreparedDelaysMs, inversionPreparedSignal } from '../../../src/calc/signal/inversion-prepared.js';
import { ernstAngleDeg, spoiledGradientEchoSignal } from '../../../src/calc/signal/spoiled-gradient-echo.js';
import { edit, seriesOf } from '../series-of.js';

describe('spoiledGradientEchoSignal (Ernst & Anderson 1966; Haase 1986; values computed)', () => {
  it('TR 8, TE 3, 10 degrees, T1 1084, T2* 69', () => {
    expect(spoiledGradientEchoSignal(8, 3, 10, 1084, 69)).toBeCloseTo(0.054494, 6);
  });
  it('TR 100, TE 2.3, 70 degrees, T1 809, T2* 34', () => {
    expect(spoiledGradientEchoSignal(100, 2.3, 70, 809, 34)).toBeCloseTo(0.146351, 6);
  });
});

describe('ernstAngleDeg: arccos e^(-TR/T1) (Ernst & Anderson 1966; values computed)', () => {
  it.each([
    [10, 1000, 8.089],
    [30, 1084, 13.418],
    [100, 586, 32.529],
  ])('TR %d, T1 %d: %d degrees', (tr, t1, angle) => {
    expect(ernstAngleDeg(tr, t1)).toBeCloseTo(angle, 3);
  });

  it('gives the most signal of all angles', () => {
    const best = ernstAngleDeg(30, 1084);
    const signal = (angle: number) => spoiledGradientEchoSignal(30, 3, angle, 1084, 60);
    expect(signal(best)).toBeGreaterThan(signal(best + 0.5));
    expect(signal(best)).toBeGreaterThan(signal(best - 0.5));
  });

  it('is a figure at the TR that magnetisation sees: a trigger stretches it', () => {
    const series = seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 100, pacing: { kind: 'cardiac-gate', periodMs: 800 } });
    expect(edit(series).figures.ernstAngleDeg).toBeCloseTo(ernstAngleDeg(800, 586), 9);
    expect(edit(seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 100 })).figures.ernstAngleDeg).toBeCloseTo(32.529, 3);
  });
});

describe('balancedSignal (Freeman & Hill 1971; Scheffler & Lehnhardt 2003; values computed)', () => {
  it('TR 4, TE 2, 40 degrees, 1932/275', () => {
    expect(balancedSignal(4, 2, 40, 1932, 275)).toBeCloseTo(0.188515, 6);
  });
  it('TR 4, TE 2, 60 degrees, 4300/2000', () => {
    expect(balancedSignal(4, 2, 60, 4300, 2000)).toBeCloseTo(0.33632, 6);
  });
  it('is greatest where cos a = (T1/T2 - 1)/(T1/T2 + 1): 48.19 degrees at a ratio of 5', () => {
    const best = (Math.acos(4 / 6) * 180) / Math.PI;
    expect(best).toBeCloseTo(48.19, 2);
    const signal = (angle: number) => balancedSignal(0.01, 0.005, angle, 1000, 200);
    expect(signal(best)).toBeGreaterThan(signal(best + 0.2));
    expect(signal(best)).toBeGreaterThan(signal(best - 0.2));
  });
});

describe('inversionPreparedSignal (Mugler & Brookeman 1990; Deichmann 2000; values computed, equal to step-by-step propagation)', () => {
  const cycle = { repetitionTimeMs: 2300, inversionTimeMs: 900, flipAngleDeg: 9, readouts: 176, centre: 88, echoSpacingMs: 7 };
  it.each([
    [838, 0.046769],
    [1607, 0.021475],
    [4300, 0.005454],
  ])('T1 %d: %d', (t1, signal) => {
    expect(Math.abs(inversionPreparedSignal(cycle, t1))).toBeCloseTo(signal, 6);
  });

  it('leaves TI less the readouts before the centre, and what is left of the cycle', () => {
    expect(inversionPreparedDelaysMs(cycle)).toEqual({ beforeMs: 284, afterMs: 784 });
  });

  it('is what evaluate gives, with the decay of TE beside it', () => {
    const series = seriesOf(
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, inversionTimeMs: 900, flipAngleDeg: 9, sliceCount: 176, echoTimeMs: 3 },
      { tissueOverrides: { liver: { t1Ms: 838, t2StarMs: 50 } } },
    );
    expect(edit(series).signals[0]?.signal).toBeCloseTo(0.046769 * Math.exp(-3 / 50), 6);
  });
});
