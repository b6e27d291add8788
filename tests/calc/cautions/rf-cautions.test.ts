import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../../src/calc/scanner.js';
import type { GivenParameters } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';
import { cautionOf } from './caution-of.js';

const train = (given: GivenParameters = {}) =>
  seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 3000, echoTimeMs: 80, echoTrainLength: 16, ...given });

describe('a pulse above the maximum B1', () => {
  it('is lengthened, and said so', () => {
    expect(edit(train()).codes).not.toContain('pulse-lengthened');
    const weak = edit(train(), {}, { scanner: { ...plainScanner(1.5), maximumB1Ut: 8 } });
    expect(cautionOf(weak, 'pulse-lengthened')?.level).toBe('caution');
    expect(cautionOf(weak, 'pulse-lengthened')?.numbers.maximumB1Ut).toBe(8);
  });

  it.each<[string, GivenParameters]>([
    ['excitation', { refocusingAngleDeg: 1, flipAngleDeg: 180 }],
    ['refocusing', { flipAngleDeg: 1 }],
    ['band', { flipAngleDeg: 1, refocusingAngleDeg: 1, saturationBands: 1 }],
    ['fat saturation', { flipAngleDeg: 1, refocusingAngleDeg: 1, fatSuppression: 'spectral' }],
  ])('whichever it is: %s', (_what, given) => {
    const scanner = { ...plainScanner(1.5), maximumB1Ut: 0.5 };
    expect(edit(train(given), {}, { scanner }).codes).toContain('pulse-lengthened');
    expect(edit(train({ flipAngleDeg: 1, refocusingAngleDeg: 1 }), {}, { scanner }).codes).not.toContain('pulse-lengthened');
  });
});

describe('the 10 s window', () => {
  it.each([
    [10000, false],
    [10001, true],
  ])('TR %d: %s', (repetitionTimeMs, noted) => {
    const result = edit(train({ repetitionTimeMs }));
    expect(result.codes.includes('rf-window-bound')).toBe(noted);
    if (noted) expect(cautionOf(result, 'rf-window-bound')?.level).toBe('note');
  });

  it('counts the TR that a trigger makes', () => {
    expect(edit(train({ repetitionTimeMs: 9000, pacing: { kind: 'respiratory-trigger', periodMs: 6000 } })).codes).toContain(
      'rf-window-bound',
    );
  });
});

describe('acceleration does not lower B1+rms', () => {
  it('is said once when it rises, along either direction, not when it falls', () => {
    expect(edit(train(), { parallelFactorPhase: 2 }).codes.filter((code) => code === 'rf-per-exposure')).toHaveLength(1);
    expect(edit(train({ parallelFactorPhase: 2 })).codes).not.toContain('rf-per-exposure');
    expect(edit(train({ parallelFactorPhase: 2 }), { parallelFactorPhase: 1 }).codes).not.toContain('rf-per-exposure');
    expect(
      edit(seriesOf('fast-spin-echo/3D', { repetitionTimeMs: 1500, echoTrainLength: 60, sliceCount: 32 }), { parallelFactorSlice: 2 })
        .codes,
    ).toContain('rf-per-exposure');
  });

  it('holds: B1+rms is the same with R 2', () => {
    expect(edit(train(), { parallelFactorPhase: 2 }).figures.b1PlusRmsUt).toBe(edit(train()).figures.b1PlusRmsUt);
  });
});

describe('scanner readings', () => {
  it('are named when used', () => {
    const result = edit(train(), {}, { readings: { timeS: 61.5, b1rmsUt: 2.8, sarWkg: 1.1 } });
    expect(cautionOf(result, 'reading-used')).toMatchObject({ level: 'note', numbers: { timeS: 61.5, b1rmsUt: 2.8, sarWkg: 1.1 } });
    for (const part of ['time 61.5 s', 'B1+rms 2.8 uT', 'SAR 1.1 W/kg']) expect(cautionOf(result, 'reading-used')?.text).toContain(part);
    expect(edit(train()).codes).not.toContain('reading-used');
  });

  it('of RF ask to be read again before starting; of time do not', () => {
    expect(cautionOf(edit(train(), {}, { readings: { b1rmsUt: 2.8 } }), 'read-scanner-again')?.level).toBe('caution');
    expect(edit(train(), {}, { readings: { sarWkg: 2 } }).codes).toContain('read-scanner-again');
    expect(edit(train(), {}, { readings: { timeS: 60 } }).codes).not.toContain('read-scanner-again');
    expect(edit(train(), {}, { readings: { timeS: 60 } }).codes).toContain('reading-used');
  });

  it('say that they no longer hold at another field, and hold on a magnet a few percent off its name', () => {
    const at = (fieldT: number) => edit(train(), {}, { onto: plainScanner(fieldT), readings: { timeS: 60 } });
    expect(at(1.5).codes).not.toContain('reading-no-longer-holds');
    expect(at(1.494).codes).not.toContain('reading-no-longer-holds');
    expect(cautionOf(at(3), 'reading-no-longer-holds')).toMatchObject({ level: 'caution', numbers: { fromT: 1.5, toT: 3 } });
    expect(cautionOf(at(3), 'reading-no-longer-holds')?.text).toContain('at 1.5 T no longer holds at 3 T');
    expect(edit(train(), {}, { onto: plainScanner(3) }).codes).not.toContain('reading-no-longer-holds');
  });
});
