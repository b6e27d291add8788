import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../../src/calc/scanner.js';
import type { GivenParameters } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';
import { cautionOf } from './caution-of.js';

const volume = (given: GivenParameters) =>
  edit(seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 8, echoTimeMs: 3, sliceCount: 64, ...given }));
const plane = (given: GivenParameters) => edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 2000, sliceGapMm: 5, ...given }));

describe('partial Fourier in two directions', () => {
  it.each<[GivenParameters, boolean]>([
    [{ partialFourierPhase: 0.75, partialFourierSlice: 0.75 }, true],
    [{ partialFourierPhase: 0.99, partialFourierSlice: 0.99 }, true],
    [{ partialFourierPhase: 0.75 }, false],
    [{ partialFourierSlice: 0.75 }, false],
  ])('%j: %s', (given, warns) => {
    expect(volume(given).codes.includes('partial-fourier-two-directions')).toBe(warns);
  });

  it('is a caution, and 2D has but one direction', () => {
    expect(cautionOf(volume({ partialFourierPhase: 0.75, partialFourierSlice: 0.75 }), 'partial-fourier-two-directions')?.level).toBe(
      'caution',
    );
    expect(plane({ partialFourierPhase: 0.75, partialFourierSlice: 0.75 }).codes).not.toContain('partial-fourier-two-directions');
  });
});

describe('partial Fourier over R below a quarter', () => {
  it.each<[GivenParameters, boolean]>([
    [{ partialFourierPhase: 0.75, parallelFactorPhase: 3 }, false],
    [{ partialFourierPhase: 0.74, parallelFactorPhase: 3 }, true],
    [{ parallelFactorPhase: 4 }, false],
    [{ parallelFactorPhase: 4.1 }, true],
    [{ partialFourierSlice: 0.75, parallelFactorSlice: 3 }, false],
    [{ partialFourierSlice: 0.6, parallelFactorSlice: 3 }, true],
  ])('%j: %s', (given, warns) => {
    const result = volume(given);
    expect(result.codes.includes('partial-fourier-low')).toBe(warns);
    if (warns) expect(cautionOf(result, 'partial-fourier-low')?.level).toBe('caution');
  });

  it('2D has no partitions to leave out', () => {
    expect(plane({ partialFourierSlice: 0.6, parallelFactorSlice: 4 }).codes).not.toContain('partial-fourier-low');
  });
});

describe('g that is not known', () => {
  it('beyond the table there is no SNR, a caution', () => {
    expect(cautionOf(volume({ parallelFactorPhase: 4.5 }), 'g-unknown')?.level).toBe('caution');
    expect(volume({ parallelFactorPhase: 4 }).codes).not.toContain('g-unknown');
    expect(volume({ parallelFactorPhase: 2, parallelFactorSlice: 2 }).codes).not.toContain('g-unknown');
    expect(volume({ parallelFactorPhase: 3, parallelFactorSlice: 2 }).codes).toContain('g-unknown');
  });

  it('of simultaneous slices: a note, unless the scanner file has it', () => {
    const series = seriesOf('echo-planar-gradient-echo/2D', {
      repetitionTimeMs: 2000,
      echoTimeMs: 30,
      matrixPhase: 64,
      sliceCount: 20,
      sliceGapMm: 1,
      simultaneousSlices: 2,
      volumes: 5,
    });
    expect(cautionOf(edit(series), 'g-unknown')?.level).toBe('note');
    expect(edit(series, {}, { scanner: { ...plainScanner(3), simultaneousSliceG: { 2: 1.1 } } }).codes).not.toContain('g-unknown');
    expect(edit(series, {}, { scanner: { ...plainScanner(3), simultaneousSliceG: { 3: 1.1 } } }).codes).toContain('g-unknown');
  });
});

describe('cross-talk: a 2D gap under 10 % while neighbours share a round (common practice, no source)', () => {
  it.each<[string, GivenParameters, boolean]>([
    ['0.4 mm on 5 mm', { sliceCount: 10, sliceGapMm: 0.4 }, true],
    ['0.5 mm on 5 mm', { sliceCount: 10, sliceGapMm: 0.5 }, false],
    ['no gap', { sliceCount: 10, sliceGapMm: 0 }, true],
    ['one slice has no neighbour', { sliceCount: 1, sliceGapMm: 0 }, false],
    ['two rounds part the neighbours', { sliceCount: 10, sliceGapMm: 0, rounds: 2 }, false],
  ])('%s', (_what, given, warns) => {
    expect(plane(given).codes.includes('cross-talk')).toBe(warns);
  });

  it('is a note, and nothing in 3D', () => {
    expect(cautionOf(plane({ sliceCount: 10, sliceGapMm: 0 }), 'cross-talk')?.level).toBe('note');
    expect(volume({}).codes).not.toContain('cross-talk');
  });
});

describe('extrapolated tissues', () => {
  it('target and comparison beyond their measured fields are noted, each', () => {
    const at = (fieldT: number) => edit(seriesOf('spin-echo/2D'), {}, { fieldT }).cautions.filter((c) => c.code === 'extrapolated-tissue');
    expect(at(1.5)).toEqual([]);
    expect(at(3)).toEqual([]);
    expect(at(7).map((c) => c.level)).toEqual(['note', 'note']);
    expect(at(7)[0]?.text).toContain('liver');
    expect(at(7)[1]?.text).toContain('spleen');
  });
});
