import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../../src/calc/scanner.js';
import type { GivenParameters } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';
import { cautionOf } from './caution-of.js';

const fluidNull: GivenParameters = {
  repetitionTimeMs: 9000,
  inversionTimeMs: 2500,
  echoTimeMs: 120,
  echoTrainLength: 16,
  echoSpacingMs: 10,
};

describe('null drift: wanted TI = preset TI x new null / preset null', () => {
  const flair = seriesOf('fast-spin-echo/2D', fluidNull);
  const preset = edit(flair);
  const ratio = (set: GivenParameters) => (edit(flair, set).figures.nullTimeMs as number) / (preset.figures.nullTimeMs as number);

  it('says nothing of a preset, whatever its TI', () => {
    expect(preset.codes).not.toContain('null-drift');
    expect(edit(seriesOf('fast-spin-echo/2D', { ...fluidNull, inversionTimeMs: 1500 })).codes).not.toContain('null-drift');
  });

  it.each<[string, GivenParameters, 'caution' | 'error' | undefined]>([
    // 3 % is said, 10 % is lost (common practice, no source)
    ['TI 2.9 % off', { inversionTimeMs: 2500 * 1.029 }, undefined],
    ['TI 3.1 % off', { inversionTimeMs: 2500 * 1.031 }, 'caution'],
    ['TI 9.9 % off', { inversionTimeMs: 2500 * 1.099 }, 'caution'],
    ['TI 10.1 % off', { inversionTimeMs: 2500 * 1.101 }, 'error'],
    ['TI 10.1 % short', { inversionTimeMs: 2500 * 0.899 }, 'error'],
    ['TR 9000 to 8700 with the same TI', { repetitionTimeMs: 8700 }, undefined],
    ['TR 9000 to 6000 with the same TI', { repetitionTimeMs: 6000 }, 'error'],
  ])('%s', (_what, set, level) => {
    expect(cautionOf(edit(flair, set), 'null-drift')?.level).toBe(level);
  });

  it('a TI that follows the null is fine', () => {
    expect(edit(flair, { repetitionTimeMs: 7000, inversionTimeMs: 2500 * ratio({ repetitionTimeMs: 7000 }) }).codes).not.toContain(
      'null-drift',
    );
  });

  it('names the TI that would null as before', () => {
    expect(cautionOf(edit(flair, { repetitionTimeMs: 6000 }), 'null-drift')?.numbers.wantedMs).toBeCloseTo(
      2500 * ratio({ repetitionTimeMs: 6000 }),
      6,
    );
  });

  it('another field moves the null of fat: 200 ms at 1.5 T to about 258 at 3 T', () => {
    const stir = seriesOf('fast-spin-echo/2D', {
      repetitionTimeMs: 4000,
      inversionTimeMs: 200,
      echoTimeMs: 50,
      echoTrainLength: 10,
      fatSuppression: 'inversion',
    });
    const caution = cautionOf(edit(stir, {}, { onto: plainScanner(3) }), 'null-drift');
    expect(caution?.level).toBe('error');
    expect(caution?.numbers.wantedMs as number).toBeGreaterThan(250);
    expect(caution?.numbers.wantedMs as number).toBeLessThan(265);
  });

  it('an inversion-prepared gradient echo aims at contrast, unless it names a tissue', () => {
    const prepared = seriesOf('inversion-prepared-gradient-echo/3D', {
      repetitionTimeMs: 2300,
      inversionTimeMs: 900,
      echoTimeMs: 3,
      sliceCount: 60,
      flipAngleDeg: 9,
    });
    expect(edit(prepared, { inversionTimeMs: 1100 }).codes).not.toContain('null-drift');
    expect(edit({ ...prepared, nullTissue: 'CSF' }, { inversionTimeMs: 1100 }).codes).toContain('null-drift');
  });
});

describe('contrast drift: ratio off by more than 10 %', () => {
  it('is said beyond 10 % either way and not below', () => {
    const series = seriesOf('spin-echo/2D', { repetitionTimeMs: 600, echoTimeMs: 15 });
    for (const repetitionTimeMs of [650, 900, 1500, 400, 3000]) {
      const result = edit(series, { repetitionTimeMs });
      expect(result.codes.includes('contrast-drift')).toBe(Math.abs(result.figures.contrastRatioChange as number) > 0.1);
    }
    expect(edit(series, { repetitionTimeMs: 650 }).codes).not.toContain('contrast-drift');
    expect(cautionOf(edit(series, { repetitionTimeMs: 3000 }), 'contrast-drift')?.level).toBe('caution');
    const drifted = edit(series, { repetitionTimeMs: 3000 });
    expect(cautionOf(drifted, 'contrast-drift')?.numbers).toEqual({
      change: drifted.figures.contrastRatioChange,
      contrastRatio: drifted.figures.contrastRatio,
    });
  });

  it('sits at 10 % exactly', () => {
    const series = seriesOf('spin-echo/2D', { repetitionTimeMs: 600, echoTimeMs: 15 });
    let [low, high] = [600, 3000];
    for (let i = 0; i < 40; i += 1) {
      const middle = (low + high) / 2;
      if (Math.abs(edit(series, { repetitionTimeMs: middle }).figures.contrastRatioChange as number) > 0.1) high = middle;
      else low = middle;
    }
    expect(edit(series, { repetitionTimeMs: low - 1 }).codes).not.toContain('contrast-drift');
    expect(edit(series, { repetitionTimeMs: high + 1 }).codes).toContain('contrast-drift');
  });
});

describe('phases of a dynamic series must match', () => {
  const dynamic = seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 4, echoTimeMs: 1.5, sliceCount: 60 }, { purpose: 'dynamic' });

  it('is said of an edit that shows in the picture, with what may restore the preset', () => {
    const caution = cautionOf(edit(dynamic, { sliceThicknessMm: 4 }), 'phases-must-match');
    expect(caution?.level).toBe('caution');
    expect(caution?.text).toContain('Oxygen');
  });

  it('not of the preset, not of its pacing or volumes, not of other series', () => {
    expect(edit(dynamic).codes).not.toContain('phases-must-match');
    expect(edit(dynamic, { volumes: 4 }).codes).not.toContain('phases-must-match');
    expect(edit(dynamic, { pacing: { kind: 'breath-hold' } }).codes).not.toContain('phases-must-match');
    expect(edit({ ...dynamic, purpose: null }, { sliceThicknessMm: 4 }).codes).not.toContain('phases-must-match');
  });
});

describe('what is not modelled', () => {
  it('a learned reconstruction is noted', () => {
    expect(cautionOf(edit(seriesOf('spin-echo/2D', { reconstruction: 'learned' })), 'not-modelled')?.level).toBe('note');
    expect(edit(seriesOf('spin-echo/2D')).codes).not.toContain('not-modelled');
  });

  it('averages of a diffusion series other than 1 are an error', () => {
    const diffusion = { bValuesSPerMm2: [0, 800], directions: 3, averages: [1, 2] };
    const planar: GivenParameters = { repetitionTimeMs: 4000, echoTimeMs: 90, matrixPhase: 96, diffusion };
    expect(cautionOf(edit(seriesOf('echo-planar-spin-echo/2D', { ...planar, averages: 2 })), 'not-modelled')?.level).toBe('error');
    expect(edit(seriesOf('echo-planar-spin-echo/2D', planar)).codes).not.toContain('not-modelled');
  });

  it('fat blocks switched on in a 3D spoiled gradient echo without their distance are noted', () => {
    const series = seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 4, echoTimeMs: 1.5, sliceCount: 60 });
    expect(cautionOf(edit(series, { fatSuppression: 'spectral' }), 'not-modelled')?.level).toBe('note');
    expect(edit(series, { fatSuppression: 'spectral', fatSuppressionEveryLines: 40 }).codes).not.toContain('not-modelled');
    expect(edit(series, { fatSuppression: 'water-excitation' }).codes).not.toContain('not-modelled');
  });

  it.each<[string, GivenParameters]>([
    ['inversionTimeMs', { inversionTimeMs: 150 }],
    ['linesPerBeat', { linesPerBeat: 8 }],
    ['diffusion', { diffusion: { bValuesSPerMm2: [0], directions: 1, averages: [1] } }],
    ['parallelFactorSlice', { parallelFactorSlice: 2 }],
    ['ellipticalSampling', { ellipticalSampling: true }],
    ['slabs', { slabs: 2 }],
  ])('%s set in a class that has none is named', (key, given) => {
    const series = seriesOf('rotating-strip-fast-spin-echo/2D', { repetitionTimeMs: 3000, echoTrainLength: 20 });
    const result = edit(series, given);
    const has = key === 'inversionTimeMs';
    expect(cautionOf(result, 'not-modelled')?.text.startsWith(key) ?? false).toBe(!has);
  });
});
