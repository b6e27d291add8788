import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../../src/calc/parameters.js';
import type { Attributes } from '../../src/headers/attribute-table.js';
import { CollectedSeries } from '../../src/headers/collected-series.js';
import { valuesOfHeaders } from '../../src/headers/read-series.js';
import { takeValue } from '../../src/headers/take-value.js';
import { valueRules } from '../../src/headers/value-rules.js';

function found(attributes: Attributes | readonly Attributes[], parameter: ParameterKey, key: ClassKey = 'fast-spin-echo/2D') {
  const images = Array.isArray(attributes) ? (attributes as readonly Attributes[]) : [attributes as Attributes];
  const headers = images.map((one) => ({ source: 'dicom' as const, seriesKey: 'a', attributes: one }));
  const series = new CollectedSeries(headers[0]!);
  for (const header of headers) series.add(header);
  const { value, origin, words } = valuesOfHeaders(series, key).find((one) => one.key === parameter)!;
  return { value, origin, words };
}

const options = (...words: string[]): Attributes => {
  const taken: Attributes = {};
  takeValue(taken, 'ScanOptions', words);
  return taken;
};

describe('the mapping table', () => {
  it('names every keyword of the table of parameters', () => {
    for (const key of parameterKeys) {
      const { dicom } = parameterRow(key);
      if (dicom !== null) expect([key, ...valueRules[key].from]).toContain(dicom);
    }
  });
});

describe('values of headers', () => {
  it('a gap is the spacing of centres less the thickness; overlapping slices have none', () => {
    expect(found({ SliceThickness: [5], SpacingBetweenSlices: [6] }, 'sliceGapMm')).toMatchObject({ value: 1, origin: 'derived' });
    expect(found({ SliceThickness: [5], SpacingBetweenSlices: [2.5] }, 'sliceGapMm')).toMatchObject({ origin: 'missing' });
    expect(found({ SliceThickness: [5], SpacingBetweenSlices: [2.5] }, 'sliceGapMm').words).toContain('overlap');
  });

  it('spacing comes from the places of slices where it is not stated', () => {
    const place = (z: number): Attributes => ({
      SliceThickness: [4],
      ImageOrientationPatient: [1, 0, 0, 0, 1, 0],
      ImagePositionPatient: [0, 0, z],
    });
    expect(found([place(0), place(4.4), place(8.8)], 'sliceGapMm')).toMatchObject({ value: 0.4, origin: 'derived' });
    expect(found([place(0), place(4.4), place(8.8)], 'sliceCount')).toMatchObject({ value: 3, origin: 'derived' });
    expect(found([place(0), place(4.4), place(20)], 'sliceGapMm')).toMatchObject({ origin: 'missing' });
  });

  it('an option that is not listed was not used, unless a maker lists words of its own', () => {
    expect(found(options('FC', 'PFP'), 'fatSuppression')).toMatchObject({ value: 'none', origin: 'derived' });
    expect(found(options('FC', 'PFP', 'ODD_WORD'), 'fatSuppression')).toMatchObject({ value: undefined, origin: 'missing' });
    expect(found(options('ODD_WORD'), 'saturationBands')).toMatchObject({ value: undefined, origin: 'missing' });
    expect(found(options(''), 'flowCompensation')).toMatchObject({ value: undefined, origin: 'missing' });
    expect(found(options('FS', 'ODD_WORD'), 'fatSuppression')).toMatchObject({ value: 'spectral', origin: 'read' });
  });

  it('lines of a rectangular field become lines over a square one; PercentSampling tells where they already are', () => {
    // 384 samples, 70 % of them as lines over a square field, 75 % field: 202 of 269 lines (the printed header of a real series).
    const field: Attributes = { AcquisitionMatrix: [0, 384, 202, 0], PercentPhaseFieldOfView: [75] };
    expect(found({ ...field, PercentSampling: [70] }, 'matrixPhase')).toMatchObject({ value: 269, origin: 'derived' });
    expect(found({ ...field, PercentSampling: [52.6] }, 'matrixPhase')).toMatchObject({ value: 202, origin: 'read' });
    expect(found(field, 'matrixPhase').words).toContain('as the standard means it');
    expect(found({ AcquisitionMatrix: [256, 0, 0, 205], PercentPhaseFieldOfView: [80] }, 'matrixPhase')).toMatchObject({ value: 256 });
  });

  it('an angle over 100 in a refocused class is a guess of the refocusing angle', () => {
    expect(found({ FlipAngle: [150] }, 'flipAngleDeg')).toMatchObject({ origin: 'missing' });
    expect(found({ FlipAngle: [150] }, 'refocusingAngleDeg')).toMatchObject({ value: 150, origin: 'guess' });
    expect(found({ FlipAngle: [90] }, 'refocusingAngleDeg')).toMatchObject({ origin: 'missing' });
  });

  it('a short inversion time of a refocused class suppresses fat, a long one does not', () => {
    expect(found({ InversionTime: [170], SpectrallySelectedSuppression: ['NONE'] }, 'fatSuppression')).toMatchObject({
      value: 'inversion',
    });
    expect(found({ InversionTime: [2500], SpectrallySelectedSuppression: ['NONE'] }, 'fatSuppression')).toMatchObject({ value: 'none' });
  });

  it('partial Fourier and oversampling that are only said to be there stay missing', () => {
    for (const key of ['partialFourierPhase', 'phaseOversamplingPercent'] as const) {
      const { origin, words } = found({ PartialFourier: ['YES'], PartialFourierDirection: ['PHASE'], OversamplingPhase: ['2D'] }, key);
      expect(origin).toBe('missing');
      expect(words).toMatch(/how much is not stated; AcquisitionDuration is not stated/);
    }
    expect(found({ PartialFourier: ['YES'], PartialFourierDirection: ['FREQUENCY'] }, 'partialFourierPhase')).toMatchObject({
      value: 1,
      origin: 'derived',
    });
  });

  it('values that no series may have are named and missing', () => {
    expect(found({ RepetitionTime: [0] }, 'repetitionTimeMs')).toMatchObject({ origin: 'missing' });
    expect(found({ RepetitionTime: [0] }, 'repetitionTimeMs').words).toContain('gives 0');
  });

  it('a phase direction is the nearest body axis, with how far it is off', () => {
    const tilted: Attributes = { InPlanePhaseEncodingDirection: ['COL'], ImageOrientationPatient: [1, 0, 0, 0, 0.9063, -0.4226] };
    expect(found(tilted, 'phaseDirection')).toMatchObject({ value: 'AP', origin: 'derived' });
    expect(found(tilted, 'phaseDirection').words).toContain('25 degrees off');
    expect(found({ ...tilted, InPlanePhaseEncodingDirection: ['ROW'] }, 'phaseDirection')).toMatchObject({ value: 'RL' });
    expect(found({ InPlanePhaseEncodingDirection: ['ROW'] }, 'phaseDirection')).toMatchObject({ origin: 'missing' });
  });

  it('images of one place are volumes, unless the series is gated and they differ in the time after the trigger', () => {
    const image = (z: number, time: number): Attributes => ({
      ImageOrientationPatient: [1, 0, 0, 0, 1, 0],
      ImagePositionPatient: [0, 0, z],
      TriggerTime: [time],
    });
    const images = [0, 8, 16].flatMap((z) => [0, 40].map((time) => image(z, time)));
    expect(found(images, 'volumes', 'spoiled-gradient-echo/2D')).toMatchObject({ value: 2, origin: 'derived' });
    const gated = images.map((one) => ({ ...one, ScanOptions: ['CG'] }));
    expect(found(gated, 'volumes', 'spoiled-gradient-echo/2D')).toMatchObject({ value: 1, origin: 'derived' });
    expect(found(gated, 'pacing', 'spoiled-gradient-echo/2D')).toMatchObject({ value: { kind: 'cardiac-gate' }, origin: 'read' });
  });

  it('where the phase direction is not stated, the zeros of AcquisitionMatrix tell it', () => {
    // As real headers have both: COL beside 128\\0\\0\\128, ROW beside 0\\384\\202\\0 (test files of Debian's python3-nibabel).
    const axial: Attributes = { ImageOrientationPatient: [1, 0, 0, 0, 1, 0] };
    expect(found({ ...axial, AcquisitionMatrix: [128, 0, 0, 128] }, 'phaseDirection')).toMatchObject({ value: 'AP', origin: 'derived' });
    expect(found({ ...axial, AcquisitionMatrix: [0, 384, 202, 0] }, 'phaseDirection')).toMatchObject({ value: 'RL', origin: 'derived' });
    expect(found({ ...axial, AcquisitionMatrix: [128, 128, 128, 128] }, 'phaseDirection')).toMatchObject({ origin: 'missing' });
  });

  it('two echoes are two echo times, in their order; more are named', () => {
    const echo = (time: number): Attributes => ({ EchoTime: [time] });
    expect(found([echo(4.6), echo(2.3)], 'echoTimeMs', 'spoiled-gradient-echo/2D')).toMatchObject({ value: 2.3 });
    expect(found([echo(4.6), echo(2.3)], 'secondEchoTimeMs', 'spoiled-gradient-echo/2D')).toMatchObject({ value: 4.6 });
    expect(found([echo(4.6), echo(2.3), echo(6.9)], 'echoTimeMs', 'spoiled-gradient-echo/2D').words).toContain('3 different ones');
  });
});
