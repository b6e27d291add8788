import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { type NumberParameterKey, parameterKeys, parameterRow } from '../../../src/calc/parameters.js';

interface NumberRow {
  readonly min: number;
  readonly max: number;
  readonly aboveMin?: true;
  readonly whole?: true;
  readonly otherwise: unknown;
  readonly step: number;
  readonly bigStep: number;
  readonly digits: number;
}

const numbers = parameterKeys.flatMap((key) => {
  const row = parameterRow(key);
  return row.kind === 'number' ? [[key as NumberParameterKey, row as NumberRow] as const] : [];
});
const rowOf = (key: string) => numbers.find(([one]) => one === key)?.[1] as NumberRow;

/** Every number that a shipped preset gives for a parameter. */
const presetFolder = new URL('../../../presets/', import.meta.url);
const given = new Map<string, number[]>();
for (const file of readdirSync(presetFolder)) {
  const study = JSON.parse(readFileSync(new URL(file, presetFolder), 'utf8')) as { series: { parameters: Record<string, unknown> }[] };
  for (const { parameters } of study.series) {
    for (const [key, value] of Object.entries(parameters))
      if (typeof value === 'number') given.set(key, [...(given.get(key) ?? []), value]);
  }
}

const digitsOf = (value: number) => (String(value).split('.')[1] ?? '').length;

/**
 * Smallest and largest value a preset file may give. They bound what a file may say, not what is sensible, and are a promise to
 * files that exist: what was read once is read tomorrow. Angles end at 180 degrees, an acceleration begins at 1 and a partial
 * Fourier fraction lies above a half by definition; the rest is common practice, no source.
 */
const bounds: Readonly<Record<NumberParameterKey, readonly [number, number]>> = {
  fieldOfViewMm: [10, 1000],
  phaseFieldOfViewPercent: [5, 400],
  phaseOversamplingPercent: [0, 400],
  matrixRead: [8, 4096],
  matrixPhase: [8, 4096],
  displayMatrix: [8, 8192],
  sliceCount: [1, 2048],
  sliceThicknessMm: [0.05, 500],
  sliceGapMm: [0, 500],
  sliceOversamplingPercent: [0, 400],
  slabs: [1, 64],
  rounds: [1, 256],
  averages: [0.1, 256],
  volumes: [1, 10000],
  dummyShots: [0, 1000],
  parallelFactorPhase: [1, 16],
  parallelFactorSlice: [1, 16],
  referenceLines: [0, 1024],
  referenceScanS: [0, 600],
  partialFourierPhase: [0.5, 1],
  partialFourierSlice: [0.5, 1],
  simultaneousSlices: [1, 16],
  repetitionTimeMs: [0.5, 60000],
  echoTimeMs: [0.01, 5000],
  secondEchoTimeMs: [0.01, 5000],
  inversionTimeMs: [1, 20000],
  echoTrainLength: [1, 2048],
  echoSpacingMs: [0.05, 500],
  pixelBandwidthHz: [5, 50000],
  linesPerBeat: [1, 512],
  flipAngleDeg: [0.1, 180],
  refocusingAngleDeg: [1, 180],
  fatSuppressionEveryLines: [1, 1024],
  saturationBands: [0, 8],
  rfPulseStretch: [0.25, 8],
  roundsPerHold: [1, 256],
};

/**
 * One small and one large step of the keyboard: steps are values a scanner accepts, matrices by 16, slices by 1, mm by 0.5 (gaps,
 * thin ones, by 0.1), oversampling by 10 %, angles by 5 degrees (excitation by 1 as well, for gradient echoes), extent by 10 mm,
 * acceleration by one, partial Fourier by eighths (common practice, no source).
 */
const steps: Readonly<Record<NumberParameterKey, readonly [number, number]>> = {
  fieldOfViewMm: [10, 50],
  phaseFieldOfViewPercent: [5, 20],
  phaseOversamplingPercent: [10, 50],
  matrixRead: [16, 64],
  matrixPhase: [16, 64],
  displayMatrix: [64, 256],
  sliceCount: [1, 4],
  sliceThicknessMm: [0.5, 1],
  sliceGapMm: [0.1, 0.5],
  sliceOversamplingPercent: [10, 50],
  slabs: [1, 2],
  rounds: [1, 2],
  averages: [1, 2],
  volumes: [1, 10],
  dummyShots: [1, 4],
  parallelFactorPhase: [1, 2],
  parallelFactorSlice: [1, 2],
  referenceLines: [4, 16],
  referenceScanS: [1, 10],
  partialFourierPhase: [0.125, 0.25],
  partialFourierSlice: [0.125, 0.25],
  simultaneousSlices: [1, 1],
  repetitionTimeMs: [10, 100],
  echoTimeMs: [1, 10],
  secondEchoTimeMs: [1, 10],
  inversionTimeMs: [10, 100],
  echoTrainLength: [1, 4],
  echoSpacingMs: [0.1, 1],
  pixelBandwidthHz: [10, 100],
  linesPerBeat: [1, 4],
  flipAngleDeg: [1, 5],
  refocusingAngleDeg: [5, 20],
  fatSuppressionEveryLines: [4, 16],
  saturationBands: [1, 1],
  rfPulseStretch: [0.25, 1],
  roundsPerHold: [1, 1],
};

/** What a file leaves out (the preset contract); `absent` stays away, `required` must be there, `by-class` depends on the class. */
const otherwise: Partial<Readonly<Record<NumberParameterKey, unknown>>> = {
  phaseFieldOfViewPercent: 100,
  refocusingAngleDeg: 180,
  ...Object.fromEntries(
    [
      'averages',
      'parallelFactorPhase',
      'parallelFactorSlice',
      'partialFourierPhase',
      'partialFourierSlice',
      'rounds',
      'volumes',
      'slabs',
      'simultaneousSlices',
      'rfPulseStretch',
    ].map((key) => [key, 1]),
  ),
  ...Object.fromEntries(
    [
      'dummyShots',
      'phaseOversamplingPercent',
      'sliceOversamplingPercent',
      'sliceGapMm',
      'saturationBands',
      'referenceLines',
      'referenceScanS',
    ].map((key) => [key, 0]),
  ),
};

describe('the table of parameters', () => {
  it.each(numbers)('%s is bounded as files rely on', (key, row) => {
    expect([row.min, row.max]).toEqual(bounds[key]);
  });

  it('only a partial Fourier fraction may not be its lowest value: half the lines are not enough to reconstruct from', () => {
    expect(numbers.filter(([, row]) => row.aboveMin === true).map(([key]) => key)).toEqual(['partialFourierPhase', 'partialFourierSlice']);
    for (const [, row] of numbers) expect(row.aboveMin ?? true).toBe(true);
  });

  it('counts are whole, quantities are not', () => {
    const whole = numbers.filter(([, row]) => row.whole === true).map(([key]) => key);
    expect(whole.sort()).toEqual(
      [
        'displayMatrix',
        'dummyShots',
        'echoTrainLength',
        'fatSuppressionEveryLines',
        'linesPerBeat',
        'matrixPhase',
        'matrixRead',
        'referenceLines',
        'rounds',
        'roundsPerHold',
        'saturationBands',
        'simultaneousSlices',
        'slabs',
        'sliceCount',
        'volumes',
      ].sort(),
    );
  });

  it.each(numbers)('%s steps by values a scanner accepts', (key, row) => {
    expect([row.step, row.bigStep]).toEqual(steps[key]);
  });

  it('what a file leaves out is one of what counts once, none of what is added, the whole field and full refocusing', () => {
    for (const [key, row] of numbers)
      if (typeof row.otherwise === 'number' || key in otherwise) expect([key, row.otherwise]).toEqual([key, otherwise[key]]);
  });

  it('flags are off when left out', () => {
    for (const key of ['ellipticalSampling', 'flowCompensation'] as const) expect(parameterRow(key).otherwise).toBe(false);
  });

  it('every value of a shipped preset is allowed', () => {
    for (const [key, values] of given) {
      const row = rowOf(key);
      for (const value of values) {
        expect([key, value >= row.min && value <= row.max]).toEqual([key, true]);
        if (row.aboveMin) expect(value).toBeGreaterThan(row.min);
        if (row.whole) expect(Number.isInteger(value)).toBe(true);
      }
    }
  });

  it.each(numbers)('%s is shown with the digits that its steps and the shipped presets need, and no more', (key, row) => {
    // A second echo is an echo, a partition factor is an acceleration.
    const like = key === 'secondEchoTimeMs' ? 'echoTimeMs' : key === 'parallelFactorSlice' ? 'parallelFactorPhase' : key;
    const needed = Math.max(...[row.step, row.bigStep, ...(given.get(like) ?? [])].map(digitsOf));
    expect(row.digits).toBe(needed);
  });
});
