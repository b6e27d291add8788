import { describe, expect, it } from 'vitest';
import { fatShiftHz, fatShiftPpm, gammaBarMhzPerT, larmorMhz } from '../../src/calc/constants.js';

describe('constants', () => {
  it('gamma-bar is 42.577478461 MHz/T (CODATA 2022, free proton; read in a secondary page)', () => {
    expect(gammaBarMhzPerT).toBe(42.577478461);
  });

  it.each([
    // computed from the cited constant
    [0.5, 21.288739],
    [0.55, 23.417613],
    [1.0, 42.577478],
    [1.5, 63.866218],
    [3.0, 127.732435],
    [7.0, 298.042349],
  ])('protons precess at %d T with %d MHz', (fieldT, mhz) => {
    expect(larmorMhz(fieldT)).toBeCloseTo(mhz, 6);
  });

  it('agrees with the teaching value 63.87 MHz at 1.5 T (Hornak, The Basics of MRI, ch. 4; read in the source)', () => {
    expect(larmorMhz(1.5)).toBeCloseTo(63.87, 2);
  });

  it('takes fat 3.4 ppm from water (main line at body temperature; value from memory)', () => {
    expect(fatShiftPpm).toBe(3.4);
  });

  it.each([
    // computed from 3.4 ppm
    [0.55, 79.6, 1],
    [1.5, 217.15, 2],
    [3, 434.29, 2],
  ])('fat lies from water at %d T by %d Hz', (fieldT, hz, digits) => {
    expect(fatShiftHz(fieldT)).toBeCloseTo(hz, digits);
  });

  it('lies within 2 % of the 220 Hz taught at 1.5 T, which are 3.444 ppm (Hornak; read in the source)', () => {
    expect(220 / larmorMhz(1.5)).toBeCloseTo(3.4447, 3);
    expect(fatShiftHz(1.5) / 220).toBeGreaterThan(0.98);
  });
});
