import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { classKeys, classRow } from '../../src/calc/classes.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters, Series } from '../../src/calc/series.js';
import { anySeries, pace, seed, timing } from './playable-series.js';
import { edit, seriesOf } from './series-of.js';

const runs = { seed, numRuns: 60 };

describe(`scaling identities of signal to noise, each to 1e-9 (Macovski, Magn Reson Med 1996;36:494; fast-check seed ${seed})`, () => {
  const kept = (p: Series['parameters']): GivenParameters => ({
    echoTimeMs: p.echoTimeMs,
    echoSpacingMs: p.echoSpacingMs,
    repetitionTimeMs: p.repetitionTimeMs,
    echoTrainLength: p.echoTrainLength,
  });
  const identities: readonly (readonly [string, (p: Series['parameters']) => GivenParameters, number])[] = [
    ['half both in-plane extents: 1/4', (p) => ({ fieldOfViewMm: p.fieldOfViewMm / 2 }), 0.25],
    [
      'both matrices doubled at the same Hz/px: 1/(2 sqrt 2)',
      (p) => ({ matrixRead: 2 * p.matrixRead, matrixPhase: 2 * p.matrixPhase }),
      Math.sqrt(2) / 4,
    ],
    [
      'both matrices doubled at the same total bandwidth: 1/2',
      (p) => ({ matrixRead: 2 * p.matrixRead, matrixPhase: 2 * p.matrixPhase, pixelBandwidthHz: p.pixelBandwidthHz / 2 }),
      0.5,
    ],
    ['averages four times: 2', (p) => ({ averages: 4 * p.averages }), 2],
    ['bandwidth twice: 1/sqrt 2', (p) => ({ pixelBandwidthHz: 2 * p.pixelBandwidthHz }), Math.SQRT1_2],
    ['5 to 3 mm: 0.6', () => ({ sliceThicknessMm: 3 }), 0.6],
    ['display matrix: 1', () => ({ displayMatrix: 1024 }), 1],
  ];

  it.each(identities)('%s', (_what, set, ratio) => {
    fc.assert(
      fc.property(anySeries, ({ series }) => {
        const p = series.parameters;
        // Line counts must be whole for the identity to be exact: no partial Fourier, a square field; strips round their blades.
        fc.pre(series.family !== 'rotating-strip-fast-spin-echo' || set(p).matrixPhase === undefined);
        const whole = { ...series, parameters: { ...p, partialFourierPhase: 1 } };
        // A diffusion-free series: its own averages count.
        const { figures } = edit(whole, { ...kept(p), ...set(p) });
        expect(Math.abs((figures.relativeSnr as number) / ratio - 1)).toBeLessThan(1e-9);
      }),
      { seed, numRuns: 40 },
    );
  });

  it('6/8 partial Fourier of whole counts: sqrt(3/4)', () => {
    for (const key of classKeys.filter((name) => (classRow(name).parameters as readonly string[]).includes('partialFourierPhase'))) {
      const series = seriesOf(key, { ...pace, ...timing[key] });
      const { figures } = edit(series, { ...kept(series.parameters), partialFourierPhase: 0.75 });
      expect(Math.abs((figures.relativeSnr as number) / Math.sqrt(0.75) - 1)).toBeLessThan(1e-9);
    }
  });

  it('R 2 at g 1.1: 1/(1.1 sqrt 2)', () => {
    const scanner = {
      ...plainScanner(1.5),
      coil: { name: 'invented', elements: { AP: 4, RL: 4, HF: 4 }, g: [{ phase: 2, slice: 1, g: 1.1 }] },
    };
    for (const key of classKeys.filter((name) => name !== 'rotating-strip-fast-spin-echo/2D')) {
      const series = seriesOf(key, { ...pace, ...timing[key] });
      const { figures } = edit(series, { ...kept(series.parameters), parallelFactorPhase: 2 }, { scanner });
      expect(Math.abs((figures.relativeSnr as number) * 1.1 * Math.SQRT2 - 1)).toBeLessThan(1e-9);
    }
  });

  it('3D partitions twice at the same slab: 1/sqrt 2', () => {
    for (const key of classKeys.filter((name) => classRow(name).acquisition === '3D')) {
      const series = seriesOf(key, { ...pace, ...timing[key] });
      const set = { ...kept(series.parameters), sliceCount: 24, sliceThicknessMm: 2.5 };
      // The longer train of an inversion-prepared cycle moves its signal: only k is compared there.
      const target = edit(series, set);
      const signal = (target.signals[0]?.signal as number) / (edit(series).signals[0]?.signal as number);
      expect(Math.abs((target.figures.relativeSnr as number) / signal / Math.SQRT1_2 - 1)).toBeLessThan(1e-9);
    }
  });

  it('100 % phase oversampling costs and gains what doubling averages does', () => {
    for (const key of [
      'spin-echo/2D',
      'fast-spin-echo/2D',
      'spoiled-gradient-echo/2D',
      'spoiled-gradient-echo/3D',
      'balanced-steady-state/3D',
      'inversion-prepared-gradient-echo/3D',
    ] as const) {
      const series = seriesOf(key, { ...pace, ...timing[key] });
      const [padded, averaged] = [edit(series, { phaseOversamplingPercent: 100 }).figures, edit(series, { averages: 2 }).figures];
      expect(padded.scanTimeS).toBe(averaged.scanTimeS);
      expect(Math.abs((padded.relativeSnr as number) / (averaged.relativeSnr as number) - 1)).toBeLessThan(1e-9);
    }
  });

  it('signal to noise does not know TR but through the signal: SNR over signal stays', () => {
    fc.assert(
      fc.property(anySeries, fc.double({ min: 1.05, max: 2, noNaN: true }), ({ series }, factor) => {
        const result = edit(series, { repetitionTimeMs: series.parameters.repetitionTimeMs * factor });
        const signal = (result.signals[0]?.signal as number) / (edit(series).signals[0]?.signal as number);
        expect(Math.abs((result.figures.relativeSnr as number) / signal - 1)).toBeLessThan(1e-9);
      }),
      runs,
    );
  });
});
