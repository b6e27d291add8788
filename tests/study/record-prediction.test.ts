import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { changedConditions, endedBy } from '../../src/study/reading-conditions.js';
import type { RecordedReading, RecordedSeries } from '../../src/study/record.js';
import { comparedReadings, modelTimeError, predictionError } from '../../src/study/record-prediction.js';
import { inventedSeries } from './records.js';

const conditions = { coil: 'body', fieldT: 3, frontBackMm: 240, leftRightMm: null };
const figures = { scanTimeS: 10, b1PlusRmsUt: 2, sarTrendLow: 0.5, sarTrendHigh: 0.8 };
const read = (before: RecordedReading | null, after: RecordedReading | null): RecordedSeries => ({
  ...inventedSeries,
  used: { parameters: {}, figures },
  readings: { before, after },
});

describe('a reading against its prediction', () => {
  it('is counted by hand: time and B1+rms against the figures, SAR against the range of the trend', () => {
    expect(predictionError(read({ sarWkg: 2 }, { timeS: 10.5, b1rmsUt: 1.9, sarWkg: 1.2 }))).toEqual({
      time: expect.closeTo(0.05, 12),
      b1rms: expect.closeTo(-0.05, 12),
      sar: 0,
    });
    // The range is 1.0 to 1.6 W/kg.
    expect(predictionError(read({ sarWkg: 2 }, { sarWkg: 2 })).sar).toBeCloseTo(0.25, 12);
    expect(predictionError(read({ sarWkg: 2 }, { sarWkg: 0.9 })).sar).toBeCloseTo(-0.1, 12);
    expect(predictionError(read(null, { sarWkg: 0.9 })).sar).toBeNull();
  });

  it('the ratio is always what was read over what was predicted, within the range no error at all', () => {
    const number = fc.double({ min: 0.01, max: 1000, noNaN: true });
    fc.assert(
      fc.property(number, number, number, number, (before, after, low, more) => {
        const used = { sarTrendLow: low, sarTrendHigh: low + more };
        const one = comparedReadings({}, used, { before: { sarWkg: before }, after: { sarWkg: after } })?.after.sarWkg;
        if (one === undefined) return false;
        const inside = after >= low * before && after <= (low + more) * before;
        return one.read === after && one.ratio === after / one.predicted && (one.ratio === 1) === (inside || after === one.predicted);
      }),
    );
  });

  it('is none across coils and fields, and of SAR across bodies', () => {
    const now = { timeS: 10.5, b1rmsUt: 2, sarWkg: 1.2 };
    const with_ = (other: object) =>
      predictionError(read({ timeS: 11, b1rmsUt: 2, sarWkg: 2, conditions }, { ...now, conditions: { ...conditions, ...other } }));
    expect(with_({ coil: 'head' })).toEqual({ time: null, b1rms: null, sar: null });
    expect(with_({ fieldT: 1.5 })).toEqual({ time: null, b1rms: null, sar: null });
    expect(with_({ frontBackMm: 300 })).toMatchObject({ b1rms: 0, sar: null });
    expect(with_({ leftRightMm: 400, fieldT: 2.89 })).toMatchObject({ b1rms: 0, sar: 0 });
  });

  it('what changed is named; what was not read is not ended', () => {
    expect(changedConditions(conditions, { coil: null, fieldT: 7, frontBackMm: 250, leftRightMm: 400 })).toEqual(['coil', 'field', 'body']);
    expect(endedBy({ timeS: 1, conditions }, 'sarWkg', { ...conditions, coil: 'x' })).toBeNull();
    expect(endedBy({ timeS: 1 }, 'timeS', { ...conditions, coil: 'x' })).toBeNull();
  });
});

describe('the error of the model alone', () => {
  it('is that of the run without a reading before, else that of the preset as it was read', () => {
    expect(modelTimeError(read(null, { timeS: 10.4 }))).toBeCloseTo(0.04, 12);
    const scaled = read({ timeS: 21 }, { timeS: 10.1 });
    expect(modelTimeError(scaled)).toBeNull();
    const compared = comparedReadings({ scanTimeS: 20 }, figures, scaled.readings);
    expect(modelTimeError({ ...scaled, readings: { ...scaled.readings, ...(compared === null ? {} : { compared }) } })).toBeCloseTo(
      0.05,
      12,
    );
  });
});
