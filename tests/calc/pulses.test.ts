import { describe, expect, it } from 'vitest';
import { type ClassKey, classKeys } from '../../src/calc/classes.js';
import {
  excitationPulse,
  fatSaturationAngleDeg,
  hardPulseB1Ut,
  inversionEnergyUt2Ms,
  inversionPulseMs,
  playPulse,
  pulseShape,
  refocusingPulse,
  saturationBandAngleDeg,
  slotPulses,
} from '../../src/calc/pulses.js';
import { type PulseName, plainScanner } from '../../src/calc/scanner.js';
import { parametersOf } from './series-of.js';

const scanner = plainScanner(1.5);
const strong = { ...scanner, maximumB1Ut: 1000 };

describe('hardPulseB1Ut', () => {
  it.each([
    // B1 = a / (2 pi gamma-bar tau); textbooks print 5.87 (computed from the cited constant)
    [90, 1, 5.8716],
    [180, 1, 11.743],
    [180, 2, 5.8716],
  ])('%d degrees in %d ms take %d uT', (angle, ms, ut) => {
    expect(hardPulseB1Ut(angle, ms)).toBeCloseTo(ut, 3);
  });
});

describe('default pulses (common practice, no source)', () => {
  it.each<[PulseName, number, number]>([
    ['excitation', 2.5, 3.11],
    ['refocusing', 3, 2.11],
    ['gradientEcho2D', 2, 2.28],
    ['gradientEcho3D', 1, 5.22],
    ['nonSelective', 0.5, 1],
    ['balanced', 1, 1.8],
    ['echoPlanarExcitation', 3, 3.11],
    ['echoPlanarRefocusing', 4, 2.28],
    ['fatSaturation', 16, 1.23],
    ['saturationBand', 4, 5.22],
  ])('%s lasts %d ms with a power factor of %d', (name, ms, power) => {
    const pulse = playPulse(name, 30, 1, strong);
    expect(pulse.durationMs).toBe(ms);
    expect(pulse.energyUt2Ms / (hardPulseB1Ut(30, ms) ** 2 * ms)).toBeCloseTo(power, 2);
  });

  it('fat saturation lasts 24 ms over the field: 100 degrees in 8 ms at 3 T', () => {
    expect(pulseShape('fatSaturation', plainScanner(3)).durationMs).toBe(8);
    expect([fatSaturationAngleDeg, saturationBandAngleDeg]).toEqual([100, 90]);
  });

  it('an adiabatic inversion takes 272 uT2 ms and 10 ms whatever its angle', () => {
    expect([inversionEnergyUt2Ms, inversionPulseMs]).toEqual([272, 10]);
  });

  it('a scanner file wins', () => {
    const own = {
      ...strong,
      pulses: {
        refocusing: { durationMs: 2 },
        excitation: { durationMs: 1, powerFactor: 1.5 },
        gradientEcho2D: { durationMs: 1, timeBandwidth: 3, powerFactor: 9 },
      },
    };
    expect(playPulse('refocusing', 180, 1, own).energyUt2Ms).toBeCloseTo(hardPulseB1Ut(180, 2) ** 2 * 2, 9);
    expect(playPulse('excitation', 90, 1, own).energyUt2Ms).toBeCloseTo(hardPulseB1Ut(90, 1) ** 2 * 1.5, 9);
    expect(playPulse('gradientEcho2D', 90, 1, own).energyUt2Ms).toBeCloseTo(hardPulseB1Ut(90, 1) ** 2 * 9, 9);
  });
});

describe('which pulse a class plays', () => {
  it.each<[ClassKey, PulseName, PulseName | null]>([
    ['spin-echo/2D', 'excitation', 'refocusing'],
    ['fast-spin-echo/3D', 'excitation', 'refocusing'],
    ['single-shot-fast-spin-echo/2D', 'excitation', 'refocusing'],
    ['rotating-strip-fast-spin-echo/2D', 'excitation', 'refocusing'],
    ['spoiled-gradient-echo/2D', 'gradientEcho2D', null],
    ['spoiled-gradient-echo/3D', 'gradientEcho3D', null],
    ['balanced-steady-state/2D', 'balanced', null],
    ['balanced-steady-state/3D', 'balanced', null],
    ['inversion-prepared-gradient-echo/3D', 'gradientEcho3D', null],
    ['echo-planar-gradient-echo/2D', 'echoPlanarExcitation', null],
    ['echo-planar-spin-echo/2D', 'echoPlanarExcitation', 'echoPlanarRefocusing'],
  ])('%s', (key, excitation, refocusing) => {
    expect(excitationPulse(key, true)).toBe(excitation);
    expect(refocusingPulse(key)).toBe(refocusing);
  });

  it('3D without a slab plays a hard pulse', () => {
    expect(excitationPulse('inversion-prepared-gradient-echo/3D', false)).toBe('nonSelective');
    expect(excitationPulse('spoiled-gradient-echo/3D', false)).toBe('nonSelective');
    expect(excitationPulse('spoiled-gradient-echo/2D', false)).toBe('gradientEcho2D');
  });
});

describe('playPulse', () => {
  it('stretched pulses: B1 and energy fall by the stretch', () => {
    const [one, two] = [playPulse('refocusing', 120, 1, strong), playPulse('refocusing', 120, 2, strong)];
    expect(two.durationMs).toBe(6);
    expect(two.energyUt2Ms / one.energyUt2Ms).toBeCloseTo(0.5, 12);
    expect(two.peakB1Ut / one.peakB1Ut).toBeCloseTo(0.5, 12);
  });

  it('a pulse above the maximum B1 is lengthened until its peak is that', () => {
    const wanted = playPulse('excitation', 180, 1, strong);
    expect(wanted.lengthened).toBe(false);
    const capped = playPulse('excitation', 180, 1, { ...scanner, maximumB1Ut: wanted.peakB1Ut / 2 });
    expect(capped.lengthened).toBe(true);
    expect(capped.durationMs).toBeCloseTo(2 * wanted.durationMs, 9);
    expect(capped.peakB1Ut).toBeCloseTo(wanted.peakB1Ut / 2, 9);
    expect(capped.energyUt2Ms).toBeCloseTo(wanted.energyUt2Ms / 2, 9);
    expect(playPulse('excitation', 180, 1, { ...scanner, maximumB1Ut: wanted.peakB1Ut }).lengthened).toBe(false);
    expect(playPulse('excitation', 180, 1, { ...scanner, maximumB1Ut: wanted.peakB1Ut * 0.999 }).lengthened).toBe(true);
  });

  it('simultaneous slices add up in amplitude: peak power grows with the square (Barth, Magn Reson Med 2016;75:63; law from memory)', () => {
    expect(playPulse('excitation', 20, 1, strong, 3).peakB1Ut).toBeCloseTo(3 * playPulse('excitation', 20, 1, strong).peakB1Ut, 9);
    expect(playPulse('excitation', 20, 1, strong, 3).energyUt2Ms).toBe(playPulse('excitation', 20, 1, strong).energyUt2Ms);
  });
});

describe('slotPulses', () => {
  it('plays fat saturation and bands only where the series has them', () => {
    const plain = slotPulses('spin-echo/2D', parametersOf('spin-echo/2D'), scanner);
    expect([plain.fatSaturation, plain.band]).toEqual([null, null]);
    for (const fatSuppression of ['inversion', 'water-excitation', 'two-point'] as const) {
      expect(slotPulses('spin-echo/2D', parametersOf('spin-echo/2D', { fatSuppression }), scanner).fatSaturation).toBeNull();
    }
    const full = slotPulses(
      'spin-echo/2D',
      parametersOf('spin-echo/2D', { fatSuppression: 'spectral', saturationBands: 1, rfPulseStretch: 2 }),
      scanner,
    );
    expect(full.fatSaturation?.durationMs).toBe(32);
    expect(full.band?.durationMs).toBe(8);
    expect(full.excitation.durationMs).toBe(5);
  });

  it('every class has an excitation', () => {
    for (const key of classKeys) expect(slotPulses(key, parametersOf(key), scanner).excitation.energyUt2Ms).toBeGreaterThan(0);
  });
});
