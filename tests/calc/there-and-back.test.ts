import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { GivenParameters } from '../../src/calc/series.js';
import { anySeries, pace, seed, timing } from './playable-series.js';
import { edit, seriesOf } from './series-of.js';

const runs = { seed, numRuns: 60 };

describe(`there and back (fast-check seed ${seed})`, () => {
  it('a value set and set back gives the figures of the preset, whatever was carried', () => {
    const edits = fc.constantFrom<GivenParameters>(
      { pixelBandwidthHz: 500 },
      { matrixRead: 192 },
      { rfPulseStretch: 2 },
      { averages: 5 },
      { sliceCount: 8 },
      { flowCompensation: true },
    );
    fc.assert(
      fc.property(anySeries, edits, ({ series }, set) => {
        const there = edit(series, set);
        const back = Object.fromEntries(Object.keys(set).map((name) => [name, series.parameters[name as keyof typeof series.parameters]]));
        const returned = edit(series, back);
        expect(returned.figures).toEqual(edit(series).figures);
        expect(there.parameters).not.toEqual(series.parameters);
      }),
      runs,
    );
  });

  it('the same series has the same figures on every path: set at once or as its own preset, time to the last digit', () => {
    fc.assert(
      fc.property(anySeries, fc.integer({ min: 1, max: 4 }), fc.integer({ min: 96, max: 256 }), ({ series }, averages, matrixRead) => {
        const edited = edit(series, { averages, matrixRead });
        const own = edit({ ...series, parameters: edited.parameters });
        for (const figure of [
          'scanTimeS',
          'b1PlusRmsUt',
          'voxelVolumeMm3',
          'chemicalShiftPx',
          'minimumEchoTimeMs',
          'contrastRatio',
        ] as const)
          expect(own.figures[figure]).toBe(edited.figures[figure]);
      }),
      runs,
    );
  });

  it('SNR against A times A against B is SNR against B', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 6 }), fc.double({ min: 2, max: 8, noNaN: true }), (averages, sliceThicknessMm) => {
        const series = seriesOf('spin-echo/2D', { ...pace, ...timing['spin-echo/2D'] });
        const first = edit(series, { averages }).figures.relativeSnr as number;
        const middle = { ...series, parameters: { ...series.parameters, averages } };
        const second = edit(middle, { sliceThicknessMm }).figures.relativeSnr as number;
        expect(first * second).toBeCloseTo(edit(series, { averages, sliceThicknessMm }).figures.relativeSnr as number, 9);
      }),
      runs,
    );
  });
});
