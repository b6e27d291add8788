import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { classRow } from '../../src/calc/classes.js';
import type { Figures } from '../../src/calc/figures.js';
import type { GivenParameters, Series } from '../../src/calc/series.js';
import { anySeries, pace, seed } from './playable-series.js';
import { edit, seriesOf } from './series-of.js';

const runs = { seed, numRuns: 60 };
const time = (figures: Figures) => figures.scanTimeS as number;

describe(`what grows with what (fast-check seed ${seed})`, () => {
  it('time never falls when lines, averages, TR, dummies or oversampling rise', () => {
    const rises = fc.constantFrom<(p: Series['parameters']) => GivenParameters>(
      (p) => ({ averages: p.averages + 0.5 }),
      (p) => ({ matrixPhase: p.matrixPhase + 16 }),
      (p) => ({ repetitionTimeMs: p.repetitionTimeMs * 1.1 }),
      (p) => ({ dummyShots: p.dummyShots + 1 }),
      (p) => ({ phaseOversamplingPercent: p.phaseOversamplingPercent + 25 }),
      (p) => ({ phaseFieldOfViewPercent: p.phaseFieldOfViewPercent * 1.1 }),
    );
    fc.assert(
      fc.property(anySeries, rises, ({ series }, rise) => {
        const before = edit(series).figures;
        const after = edit({ ...series, parameters: { ...series.parameters, ...rise(series.parameters) } }).figures;
        expect(time(after)).toBeGreaterThanOrEqual(time(before) - 1e-9);
      }),
      { seed, numRuns: 200 },
    );
  });

  it('time never rises with acceleration or less of k-space', () => {
    const falls = fc.constantFrom<GivenParameters>(
      { parallelFactorPhase: 3 },
      { partialFourierPhase: 0.65 },
      { phaseFieldOfViewPercent: 70 },
    );
    fc.assert(
      fc.property(anySeries, falls, ({ series }, fall) => {
        const after = edit({ ...series, parameters: { ...series.parameters, ...fall } }).figures;
        expect(time(after)).toBeLessThanOrEqual(time(edit(series).figures) + 1e-9);
      }),
      { seed, numRuns: 150 },
    );
  });

  it('time is TR times a count: twice TR, twice the time', () => {
    fc.assert(
      fc.property(anySeries, ({ series }) => {
        const p = series.parameters;
        const doubled = { ...series, parameters: { ...p, repetitionTimeMs: 2 * p.repetitionTimeMs } };
        expect(time(edit(doubled).figures)).toBeCloseTo(2 * time(edit(series).figures), 6);
      }),
      runs,
    );
  });

  it('SNR rises with averages, slice thickness and field of view, and falls with bandwidth, acceleration and matrix', () => {
    const edits = fc.constantFrom<readonly [(p: Series['parameters']) => GivenParameters, 1 | -1]>(
      [(p) => ({ averages: p.averages + 1 }), 1],
      [(p) => ({ sliceThicknessMm: p.sliceThicknessMm * 1.2 }), 1],
      [(p) => ({ fieldOfViewMm: p.fieldOfViewMm * 1.2 }), 1],
      [
        (p) => ({
          pixelBandwidthHz: p.pixelBandwidthHz * 1.3,
          echoTimeMs: p.echoTimeMs,
          echoSpacingMs: p.echoSpacingMs,
          repetitionTimeMs: p.repetitionTimeMs,
        }),
        -1,
      ],
      [
        (p) => ({
          matrixRead: p.matrixRead + 64,
          echoTimeMs: p.echoTimeMs,
          echoSpacingMs: p.echoSpacingMs,
          repetitionTimeMs: p.repetitionTimeMs,
        }),
        -1,
      ],
      [(p) => ({ parallelFactorPhase: p.parallelFactorPhase + 1, echoTimeMs: p.echoTimeMs, echoTrainLength: p.echoTrainLength }), -1],
    );
    fc.assert(
      fc.property(anySeries, edits, ({ key, series }, [set, direction]) => {
        const result = edit(series, set(series.parameters));
        fc.pre(
          Object.keys(set(series.parameters)).every(
            (name) =>
              (classRow(key).parameters as readonly string[]).includes(name) || name === 'echoSpacingMs' || name === 'echoTrainLength',
          ),
        );
        const snr = result.figures.relativeSnr as number;
        if (direction === 1) expect(snr).toBeGreaterThan(1);
        else expect(snr).toBeLessThan(1);
      }),
      { seed, numRuns: 200 },
    );
  });

  it('RF rises with angle and slices per TR and falls with TR and pulse length', () => {
    fc.assert(
      fc.property(anySeries, ({ series }) => {
        const p = series.parameters;
        const power = (set: GivenParameters) => edit({ ...series, parameters: { ...p, ...set } }).figures.b1PlusRmsUt as number;
        const now = power({});
        expect(power({ flipAngleDeg: Math.min(180, p.flipAngleDeg * 1.2) })).toBeGreaterThan(now);
        expect(power({ repetitionTimeMs: p.repetitionTimeMs * 1.2 })).toBeLessThan(now);
        expect(power({ rfPulseStretch: 1.5 })).toBeLessThanOrEqual(now + 1e-12);
        if (series.acquisition === '2D') expect(power({ sliceCount: p.sliceCount - 1 })).toBeLessThanOrEqual(now);
      }),
      runs,
    );
  });

  it('blur widens with the train and with lower T2', () => {
    fc.assert(
      fc.property(fc.integer({ min: 4, max: 60 }), fc.double({ min: 20, max: 300, noNaN: true }), (echoTrainLength, t2Ms) => {
        const blur = (length: number, t2: number) =>
          edit(
            seriesOf(
              'fast-spin-echo/2D',
              { ...pace, repetitionTimeMs: 6000, echoTimeMs: 40, echoTrainLength: length },
              { tissueOverrides: { liver: { t2Ms: t2 } } },
            ),
          ).figures.blurFwhmPx as number;
        expect(blur(echoTrainLength + 4, t2Ms)).toBeGreaterThan(blur(echoTrainLength, t2Ms));
        expect(blur(echoTrainLength, t2Ms * 0.8)).toBeGreaterThan(blur(echoTrainLength, t2Ms));
      }),
      runs,
    );
  });
});
