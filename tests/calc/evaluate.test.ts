import { describe, expect, it } from 'vitest';
import { classKeys, classTable, figureNeeds } from '../../src/calc/classes.js';
import { figureKeys } from '../../src/calc/figures.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { edit, parametersOf, seriesOf } from './series-of.js';

/** Timing each class can play, so that no figure is missing for a reason of its own. */
const playable: Readonly<Record<string, GivenParameters>> = {
  'inversion-prepared-gradient-echo/3D': { repetitionTimeMs: 2300, inversionTimeMs: 900, echoTimeMs: 3, sliceCount: 100 },
  'echo-planar-gradient-echo/2D': { repetitionTimeMs: 3000, echoTimeMs: 40, matrixPhase: 64, echoSpacingMs: 0.5 },
  'echo-planar-spin-echo/2D': { repetitionTimeMs: 3000, echoTimeMs: 70, matrixPhase: 64, echoSpacingMs: 0.5 },
  'single-shot-fast-spin-echo/2D': { repetitionTimeMs: 1500, echoTimeMs: 80, matrixPhase: 128 },
};

describe('which figures a class gives', () => {
  it.each(classKeys)('%s: all of its row, and no other', (key) => {
    const { figures } = edit(seriesOf(key, playable[key] ?? {}));
    const row: readonly string[] = classTable[key].figures;
    for (const figure of figureKeys) {
      if (!row.includes(figure)) expect(figures[figure], figure).toBeNull();
      else if (!(figure in figureNeeds)) expect(figures[figure], figure).not.toBeNull();
    }
  });

  it('those that need more than the class appear with it', () => {
    expect(edit(seriesOf('spin-echo/2D')).figures.nullTimeMs).toBeNull();
    expect(
      edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 3000, inversionTimeMs: 150, fatSuppression: 'inversion' })).figures.nullTimeMs,
    ).toBeGreaterThan(100);
    expect(edit(seriesOf('spin-echo/2D', { pacing: { kind: 'breath-hold' } })).figures.holds).toBe(1);
    expect(edit(seriesOf('spin-echo/2D')).figures.holds).toBeNull();
  });

  it('a gated cine has its temporal resolution and phases: floor(0.9 x 900 / (12 x 3)) = 22, and takes one slice at a time', () => {
    const cine = {
      repetitionTimeMs: 3,
      echoTimeMs: 1.5,
      linesPerBeat: 12,
      matrixPhase: 150,
      sliceCount: 10,
      pacing: { kind: 'cardiac-gate', periodMs: 900 },
    } as const;
    expect(edit(seriesOf('balanced-steady-state/2D', cine)).figures).toMatchObject({ temporalResolutionMs: 36, cardiacPhases: 22 });
    expect(edit(seriesOf('spoiled-gradient-echo/2D', cine)).figures).toMatchObject({
      temporalResolutionMs: 36,
      cardiacPhases: 22,
      slicesPerRepetition: null,
      roundsNeeded: null,
    });
  });
});

describe('readings of the scanner', () => {
  const series = seriesOf('fast-spin-echo/2D', {
    repetitionTimeMs: 3000,
    echoTimeMs: 80,
    echoTrainLength: 16,
    pacing: { kind: 'breath-hold' },
  });

  it('later times and B1+rms scale from what the scanner showed for the baseline, and say so', () => {
    const before = edit(series).figures;
    const { figures, fromReading } = edit(series, { averages: 2 }, { readings: { timeS: 60, b1rmsUt: 2.5 } });
    expect(figures.scanTimeS).toBeCloseTo(120, 9);
    expect(figures.holdTimeS).toBeCloseTo((120 * 96) / 96, 9);
    expect(figures.b1PlusRmsUt).toBeCloseTo(2.5, 9);
    expect(fromReading).toEqual(['scanTimeS', 'holdTimeS', 'b1PlusRmsUt']);
    expect(before.scanTimeS).toBe(48);
  });

  it('a SAR reading scales no figure: SAR is a trend', () => {
    const { figures, fromReading } = edit(series, {}, { readings: { sarWkg: 2 } });
    expect(fromReading).toEqual([]);
    expect(figures.sarTrendHigh).toBe(1);
  });

  it('a series without holds lists no hold', () => {
    expect(edit(seriesOf('spin-echo/2D'), {}, { readings: { timeS: 100 } }).fromReading).toEqual(['scanTimeS']);
  });
});

describe('tissues listed', () => {
  it('target and comparison; on request then every tissue with a value at this field, each once', () => {
    const series = seriesOf('spin-echo/2D');
    expect(edit(series).signals.map((s) => s.tissue)).toEqual(['liver', 'spleen']);
    const all = edit(series, {}, { tissues: 'all' }).signals.map((s) => s.tissue);
    expect(all.slice(0, 2)).toEqual(['liver', 'spleen']);
    expect(new Set(all).size).toBe(all.length);
    expect(all.length).toBeGreaterThan(15);
    expect(edit(series, {}, { tissues: 'all', fieldT: 3 }).signals.map((s) => s.tissue)).not.toContain('intervertebral disc (nucleus)');
  });
});

describe('impossible timing: an error, and what it makes impossible is null', () => {
  it.each<[string, Parameters<typeof seriesOf>[0], GivenParameters, boolean]>([
    ['TE just under TR', 'spoiled-gradient-echo/3D', { repetitionTimeMs: 10, echoTimeMs: 9.99 }, false],
    ['TE at TR', 'spoiled-gradient-echo/3D', { repetitionTimeMs: 10, echoTimeMs: 10 }, true],
    ['the second TE counts', 'spoiled-gradient-echo/3D', { repetitionTimeMs: 10, echoTimeMs: 2, secondEchoTimeMs: 10 }, true],
    [
      'a train that just ends',
      'fast-spin-echo/3D',
      { repetitionTimeMs: 500, echoTimeMs: 100, echoTrainLength: 125, echoSpacingMs: 4 },
      false,
    ],
    [
      'a train that does not',
      'fast-spin-echo/3D',
      { repetitionTimeMs: 499, echoTimeMs: 100, echoTrainLength: 125, echoSpacingMs: 4 },
      true,
    ],
    ['TI and TE that just end', 'spin-echo/3D', { repetitionTimeMs: 510, echoTimeMs: 10, inversionTimeMs: 500 }, false],
    ['TI and TE that do not', 'spin-echo/3D', { repetitionTimeMs: 509, echoTimeMs: 10, inversionTimeMs: 500 }, true],
    [
      'readouts before the centre just fit TI',
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, inversionTimeMs: 350, echoTimeMs: 3, sliceCount: 100 },
      false,
    ],
    [
      'they do not',
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, inversionTimeMs: 349, echoTimeMs: 3, sliceCount: 100 },
      true,
    ],
    [
      'readouts after the centre just fit the cycle',
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 1250, inversionTimeMs: 900, echoTimeMs: 3, sliceCount: 100 },
      false,
    ],
    [
      'they do not fit',
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 1249, inversionTimeMs: 900, echoTimeMs: 3, sliceCount: 100 },
      true,
    ],
    [
      'TE beyond the spacing of readouts',
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, inversionTimeMs: 900, echoTimeMs: 7, sliceCount: 100 },
      true,
    ],
  ])('%s', (_what, key, given, impossible) => {
    const { figures, codes, cautions, signals } = edit(seriesOf(key, given));
    expect(codes.includes('timing-impossible')).toBe(impossible);
    expect(signals[0]?.signal === null).toBe(impossible);
    expect(figures.relativeSnr === null).toBe(impossible);
    if (impossible) expect(cautions.find((c) => c.code === 'timing-impossible')?.level).toBe('error');
  });

  it('not one slice fits: its figures are null, TR is not', () => {
    // a slot of 1.25 + 15 + 2.5 + 2 = 20.75 ms; the baseline fits and keeps the slot as modelled
    const { figures, codes } = edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 500, echoTimeMs: 15 }), { repetitionTimeMs: 20 });
    expect(codes).toContain('timing-impossible');
    expect(figures).toMatchObject({ slicesPerRepetition: 0, roundsNeeded: null, relativeSnr: null, contrastRatio: null });
    expect(figures.scanTimeS).toBeGreaterThan(0);
  });
});

describe('a parameter that the class has not got', () => {
  const strays: GivenParameters = {
    inversionTimeMs: 150,
    secondEchoTimeMs: 80,
    linesPerBeat: 8,
    simultaneousSlices: 2,
    rounds: 2,
    sliceGapMm: 1,
    slabs: 2,
    sliceOversamplingPercent: 50,
    parallelFactorSlice: 2,
    partialFourierSlice: 0.75,
    ellipticalSampling: true,
    fatSuppressionEveryLines: 20,
    phaseOversamplingPercent: 50,
    partialFourierPhase: 0.75,
    phaseFieldOfViewPercent: 80,
    referenceLines: 24,
    diffusion: { bValuesSPerMm2: [0, 800], directions: 3, averages: [1, 2] },
  };

  it.each(classKeys)('%s: has no effect on any figure, and says so', (key) => {
    const gated: GivenParameters = {
      ...playable[key],
      pacing: { kind: 'cardiac-gate', periodMs: 5000 },
      fatSuppression: 'spectral',
      parallelFactorPhase: 2,
    };
    const without = edit(seriesOf(key, gated));
    for (const [name, value] of Object.entries(strays)) {
      if ((classTable[key].parameters as readonly string[]).includes(name)) continue;
      const given = edit(seriesOf(key, { ...gated, [name]: value }));
      expect(given.figures, name).toEqual(without.figures);
      expect(
        given.cautions.filter(({ text }) => text.startsWith(`${name} has no effect`)),
        name,
      ).toHaveLength(1);
      const edited = edit(seriesOf(key, { ...gated, [name]: value }), { averages: 2 });
      expect(edited.figures, name).toEqual(edit(seriesOf(key, gated), { averages: 2 }).figures);
      expect(edited.codes, name).toContain('not-modelled');
    }
  });
});

describe('lines and shots as figures', () => {
  it('shows lines, partitions, shots and what fits', () => {
    const held = edit(
      seriesOf('spoiled-gradient-echo/3D', {
        repetitionTimeMs: 4,
        echoTimeMs: 1.5,
        matrixPhase: 200,
        sliceCount: 80,
        partialFourierSlice: 0.75,
      }),
    ).figures;
    expect(held).toMatchObject({ linesPhase: 200, linesSlice: 60, shots: 12000, slicesPerRepetition: null });
    const planar = edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 600, echoTimeMs: 15, sliceCount: 30, rounds: 2 })).figures;
    expect(planar).toMatchObject({ linesPhase: 256, linesSlice: null, shots: 256, slicesPerRepetition: 28, roundsNeeded: 2 });
  });

  it('defaults fill a series, and trains that read all their lines take their length from them', () => {
    expect(
      parametersOf('single-shot-fast-spin-echo/2D', { matrixPhase: 256, partialFourierPhase: 0.6, parallelFactorPhase: 2 }).echoTrainLength,
    ).toBe(77);
    expect(parametersOf('inversion-prepared-gradient-echo/3D', { sliceCount: 160, partialFourierSlice: 0.75 }).echoTrainLength).toBe(120);
    expect(parametersOf('echo-planar-gradient-echo/2D', { matrixPhase: 64, parallelFactorPhase: 2 }).echoTrainLength).toBe(32);
    expect(parametersOf('fast-spin-echo/2D').echoTrainLength).toBe(1);
  });
});
