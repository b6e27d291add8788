import { describe, expect, it } from 'vitest';
import { echoAmplitude, longitudinalAfterTrain } from '../../../src/calc/echo-train.js';
import { contrastEcho } from '../../../src/calc/signal/echo-train-signal.js';

const lossless = (refocusingAngleDeg: number) => ({ refocusingAngleDeg, echoSpacingMs: 10, t1Ms: 1e15, t2Ms: 1e15 });

describe('echoes of a train without relaxation (Hennig, J Magn Reson 1988;78:397; value from memory, computed)', () => {
  it.each([60, 90, 120, 150, 180])('the first echo at %d degrees is sin^2 of half the angle', (angle) => {
    expect(echoAmplitude(lossless(angle), 1)).toBeCloseTo(Math.sin((angle * Math.PI) / 360) ** 2, 12);
  });

  it.each<[number, readonly number[]]>([
    [120, [0.75, 0.9375, 0.84375, 0.85547]],
    [90, [0.5, 0.75, 0.75, 0.6875]],
    [180, [1, 1, 1, 1]],
  ])('at %d degrees the first four are %j', (angle, amplitudes) => {
    amplitudes.forEach((amplitude, i) => {
      expect(echoAmplitude(lossless(angle), i + 1)).toBeCloseTo(amplitude, 5);
    });
  });

  it.each([60, 90, 120, 150])('at %d degrees they settle at sin of half the angle', (angle) => {
    const late = [397, 398, 399, 400].map((echo) => echoAmplitude(lossless(angle), echo));
    expect(late.reduce((sum, a) => sum + a, 0) / 4).toBeCloseTo(Math.sin((angle * Math.PI) / 360), 2);
  });

  it('no echo is larger than what was excited', () => {
    for (let echo = 1; echo <= 60; echo += 1) expect(Math.abs(echoAmplitude(lossless(107), echo))).toBeLessThanOrEqual(1);
  });
});

describe('echoes with relaxation', () => {
  it('at 180 degrees decay with T2 alone', () => {
    expect(echoAmplitude({ refocusingAngleDeg: 180, echoSpacingMs: 10, t1Ms: 500, t2Ms: 80 }, 8)).toBeCloseTo(Math.exp(-1), 12);
  });

  it('does not depend on what was computed before', () => {
    const train = { refocusingAngleDeg: 130, echoSpacingMs: 6, t1Ms: 900, t2Ms: 70 };
    const fresh = echoAmplitude(train, 12);
    echoAmplitude(lossless(60), 300);
    longitudinalAfterTrain(train, 200, 1);
    expect(echoAmplitude(train, 12)).toBe(fresh);
  });
});

describe('longitudinalAfterTrain', () => {
  it('one spacing at 180 degrees turns what recovered over: recovery over half, turned, recovery over half (computed)', () => {
    const e = Math.exp(-5 / 10);
    expect(longitudinalAfterTrain({ refocusingAngleDeg: 180, echoSpacingMs: 10, t1Ms: 10, t2Ms: 5 }, 1, 0)).toBeCloseTo(
      1 - e - e * (1 - e),
      12,
    );
    expect(longitudinalAfterTrain({ refocusingAngleDeg: 180, echoSpacingMs: 10, t1Ms: 10, t2Ms: 5 }, 1, 1)).toBeCloseTo(1 - e - e, 12);
  });

  it('a pulse of nothing leaves free recovery', () => {
    const e = Math.exp(-120 / 800);
    expect(longitudinalAfterTrain({ refocusingAngleDeg: 0, echoSpacingMs: 10, t1Ms: 800, t2Ms: 80 }, 12, 0.3)).toBeCloseTo(
      1 - e + 0.3 * e,
      12,
    );
  });
});

describe('contrastEcho', () => {
  it.each([
    // echoes count from 1: clamp(round(TE / spacing), 1, train)
    [100, 10, 20, 10],
    [104, 10, 20, 10],
    [105, 10, 20, 11],
    [2, 10, 20, 1],
    [500, 10, 20, 20],
    [36, 12, 7, 3],
  ])('TE %d at spacing %d in a train of %d is echo %d', (te, spacing, length, echo) => {
    expect(contrastEcho(te, spacing, length)).toBe(echo);
  });
});
