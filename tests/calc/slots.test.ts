import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { acquiredLines } from '../../src/calc/lines.js';
import { slotPulses } from '../../src/calc/pulses.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { capacity, inversionCapacity, slotFactor, slotMs } from '../../src/calc/slots.js';
import { parametersOf } from './series-of.js';

function slotOf(key: ClassKey, given: GivenParameters, fieldT = 1.5): number {
  const p = parametersOf(key, given);
  return slotMs(key, p, slotPulses(key, p, plainScanner(fieldT)), acquiredLines(key, p).fullPhase);
}

describe('slotMs', () => {
  it.each<[string, ClassKey, GivenParameters, number]>([
    // computed: half of the default pulse + last echo + half the readout + 2
    ['spin echo: 1.25 + 15 + 2.5 + 2', 'spin-echo/2D', { echoTimeMs: 15 }, 20.75],
    ['dual echo: the later TE, 1.25 + 80 + 2.5 + 2', 'spin-echo/2D', { echoTimeMs: 20, secondEchoTimeMs: 80 }, 85.75],
    ['an earlier second echo counts for nothing', 'spoiled-gradient-echo/2D', { echoTimeMs: 4.6, secondEchoTimeMs: 2.3 }, 10.1],
    ['train: 1.25 + 16 x 10 + 5 + 2', 'fast-spin-echo/2D', { echoTimeMs: 80, echoTrainLength: 16, echoSpacingMs: 10 }, 168.25],
    ['gradient echo: 1 + 5 + 2.5 + 2', 'spoiled-gradient-echo/2D', { echoTimeMs: 5 }, 10.5],
    ['an echo under 1 ms: 1 + 0.4 + 2.5 + 2', 'spoiled-gradient-echo/2D', { echoTimeMs: 0.4 }, 5.9],
    ['bandwidth: 500/1000', 'spoiled-gradient-echo/2D', { echoTimeMs: 5, pixelBandwidthHz: 1000 }, 8.5],
    [
      'echo-planar: 1.5 + 30 + half of 64 lines of 0.5 ms + 2',
      'echo-planar-gradient-echo/2D',
      { echoTimeMs: 30, matrixPhase: 64, echoSpacingMs: 0.5 },
      49.5,
    ],
    [
      'echo-planar with R 2',
      'echo-planar-gradient-echo/2D',
      { echoTimeMs: 30, matrixPhase: 64, echoSpacingMs: 0.5, parallelFactorPhase: 2 },
      41.5,
    ],
    ['fat saturation 24/1.5 ms', 'spin-echo/2D', { echoTimeMs: 15, fatSuppression: 'spectral' }, 36.75],
    ['water excitation takes none', 'spin-echo/2D', { echoTimeMs: 15, fatSuppression: 'water-excitation' }, 20.75],
    ['10 for each saturation band', 'spin-echo/2D', { echoTimeMs: 15, saturationBands: 2 }, 40.75],
    ['10 for the inversion', 'spin-echo/2D', { echoTimeMs: 15, inversionTimeMs: 150 }, 30.75],
  ])('%s', (_what, key, given, ms) => {
    expect(slotOf(key, given)).toBeCloseTo(ms, 9);
  });

  it('fat saturation takes 24 over the field: 8 ms at 3 T', () => {
    expect(slotOf('spin-echo/2D', { echoTimeMs: 15, fatSuppression: 'spectral' }, 3)).toBeCloseTo(28.75, 9);
  });
});

describe('inversionCapacity', () => {
  it.each([
    // worked in the definition of the interleaving: largest p x min(max(1, floor(TI/slot)), floor((TR/p - TI)/slot))
    [9000, 2500, 180, 22],
    [4000, 160, 120, 14],
    // computed by hand
    [500, 400, 100, 1],
    [500, 401, 100, 0],
    [4000, 50, 120, 23],
  ])('TR %d, TI %d, slot %d holds %d', (tr, ti, slot, slices) => {
    expect(inversionCapacity(tr, ti, slot)).toBe(slices);
  });
});

describe('capacity', () => {
  const capacityOf = (key: ClassKey, given: GivenParameters, slot: number) => capacity(key, parametersOf(key, given), slot);

  it.each<[string, ClassKey, GivenParameters, number, number | null]>([
    ['floor(TR / slot)', 'spin-echo/2D', { repetitionTimeMs: 600 }, 25, 24],
    ['an exact fit counts', 'spin-echo/2D', { repetitionTimeMs: 602 }, 60.2, 10],
    ['none when not even one fits', 'spin-echo/2D', { repetitionTimeMs: 20 }, 25, 0],
    ['simultaneous slices multiply', 'spin-echo/2D', { repetitionTimeMs: 600, simultaneousSlices: 3 }, 25, 72],
    [
      'within the window of a trigger',
      'fast-spin-echo/2D',
      { repetitionTimeMs: 4000, pacing: { kind: 'respiratory-trigger', periodMs: 4000, windowMs: 1000 } },
      150,
      6,
    ],
    [
      '40 % of the breath without a window',
      'fast-spin-echo/2D',
      { repetitionTimeMs: 4000, pacing: { kind: 'respiratory-trigger', periodMs: 4000 } },
      150,
      10,
    ],
    ['inversions interleave', 'fast-spin-echo/2D', { repetitionTimeMs: 9000, inversionTimeMs: 2500 }, 180, 22],
    ['nothing where slices follow one another', 'balanced-steady-state/2D', {}, 10, null],
    ['nothing in 3D', 'spoiled-gradient-echo/3D', {}, 10, null],
    ['nothing in a cine', 'spoiled-gradient-echo/2D', { linesPerBeat: 8, pacing: { kind: 'cardiac-gate' } }, 10, null],
  ])('%s', (_what, key, given, slot, slices) => {
    expect(capacityOf(key, given, slot)).toBe(slices);
  });
});

describe('slotFactor', () => {
  const factorOf = (given: GivenParameters, slot: number) => slotFactor('spin-echo/2D', parametersOf('spin-echo/2D', given), slot);

  it('is 1 where the slices fit as modelled', () => {
    expect(factorOf({ repetitionTimeMs: 600, sliceCount: 24 }, 25)).toBe(1);
    expect(factorOf({ repetitionTimeMs: 600, sliceCount: 48, rounds: 2 }, 25)).toBe(1);
  });

  it('shrinks the slot just until they do: 25 slices of 25 ms in 600 ms take 0.96 (computed)', () => {
    const factor = factorOf({ repetitionTimeMs: 600, sliceCount: 25 }, 25);
    expect(factor).toBeCloseTo(0.96, 6);
    expect(capacity('spin-echo/2D', parametersOf('spin-echo/2D', { repetitionTimeMs: 600 }), 25 * factor)).toBe(25);
  });

  it('is 1 where no slot would do: an inversion time beyond TR leaves no room however short a slice is', () => {
    expect(factorOf({ repetitionTimeMs: 1000, inversionTimeMs: 1200, sliceCount: 3 }, 25)).toBe(1);
  });

  it('is 1 where slices do not share TR', () => {
    expect(
      slotFactor('spoiled-gradient-echo/3D', parametersOf('spoiled-gradient-echo/3D', { sliceCount: 100, repetitionTimeMs: 5 }), 10),
    ).toBe(1);
  });
});
