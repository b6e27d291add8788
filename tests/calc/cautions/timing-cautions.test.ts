import { describe, expect, it } from 'vitest';
import { type Caution, worstFirst } from '../../../src/calc/caution.js';
import { plainScanner } from '../../../src/calc/scanner.js';
import type { GivenParameters } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';
import { cautionOf } from './caution-of.js';

const gradientEcho = (given: GivenParameters = {}) =>
  seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 20, echoTimeMs: 8, sliceCount: 60, ...given });
const train = (given: GivenParameters = {}) =>
  seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 3000, echoTimeMs: 80, echoTrainLength: 16, echoSpacingMs: 10, ...given });

describe('under the estimated minimum', () => {
  it('TE: a caution from the minimum down, none at it', () => {
    const least = edit(gradientEcho()).figures.minimumEchoTimeMs as number;
    expect(edit(gradientEcho(), { echoTimeMs: least }).codes).not.toContain('below-minimum-te');
    expect(cautionOf(edit(gradientEcho(), { echoTimeMs: least - 0.01 }), 'below-minimum-te')?.level).toBe('caution');
  });

  it('TR: a caution from the minimum down, none at it', () => {
    const least = edit(gradientEcho({ echoTimeMs: 5 })).figures.minimumRepetitionTimeMs as number;
    expect(edit(gradientEcho({ echoTimeMs: 5 }), { repetitionTimeMs: least }).codes).not.toContain('below-minimum-tr');
    expect(cautionOf(edit(gradientEcho({ echoTimeMs: 5 }), { repetitionTimeMs: least - 0.01 }), 'below-minimum-tr')?.level).toBe('caution');
  });

  it('spacing: a caution from the minimum down, none at it', () => {
    const least = 9.120498212599244;
    expect(edit(train(), { echoSpacingMs: least + 1e-6 }).codes).not.toContain('below-minimum-spacing');
    expect(cautionOf(edit(train(), { echoSpacingMs: least - 0.01 }), 'below-minimum-spacing')?.level).toBe('caution');
    expect(edit(seriesOf('spin-echo/2D')).codes).not.toContain('below-minimum-spacing');
  });

  it('is a note where the preset already undercuts the estimate by as much, a caution where an edit goes further', () => {
    const preset = gradientEcho({ echoTimeMs: 2 });
    expect(cautionOf(edit(preset), 'below-minimum-te')?.level).toBe('note');
    expect(cautionOf(edit(preset, { echoTimeMs: 2.1 }), 'below-minimum-te')?.level).toBe('note');
    expect(cautionOf(edit(preset, { echoTimeMs: 1.9 }), 'below-minimum-te')?.level).toBe('caution');
    const fast = gradientEcho({ repetitionTimeMs: 6, echoTimeMs: 2 });
    expect(cautionOf(edit(fast), 'below-minimum-tr')?.level).toBe('note');
    expect(cautionOf(edit(fast, { repetitionTimeMs: 5.9 }), 'below-minimum-tr')?.level).toBe('caution');
    const dense = train({ echoSpacingMs: 8 });
    expect(cautionOf(edit(dense), 'below-minimum-spacing')?.level).toBe('note');
    expect(cautionOf(edit(dense, { echoSpacingMs: 7.9 }), 'below-minimum-spacing')?.level).toBe('caution');
  });

  it('a cine is judged by its own TR, not by the beat', () => {
    const cine = seriesOf('balanced-steady-state/2D', {
      repetitionTimeMs: 2,
      echoTimeMs: 1,
      linesPerBeat: 12,
      pacing: { kind: 'cardiac-gate', periodMs: 900 },
    });
    expect(edit(cine).codes).toContain('below-minimum-tr');
  });
});

describe('the readout gradient', () => {
  it('asks for no more than the scanner gives', () => {
    // 256 samples over 256 mm: 40 mT/m at 1703.1 Hz/px
    expect(edit(gradientEcho({ pixelBandwidthHz: 1700 })).codes).not.toContain('readout-gradient');
    expect(cautionOf(edit(gradientEcho({ pixelBandwidthHz: 1710 })), 'readout-gradient')?.level).toBe('caution');
    expect(edit(gradientEcho({ pixelBandwidthHz: 1000 }), {}, { scanner: { ...plainScanner(1.5), gradientMtPerM: 20 } }).codes).toContain(
      'readout-gradient',
    );
  });
});

describe('slices, slots and rounds', () => {
  it('slices that no longer fit raise the split and say so before time doubles', () => {
    // slot 1.25 + 160 + 5 + 2 = 168.25 ms: 17 in 3000
    const preset = train({ sliceCount: 17, sliceGapMm: 1 });
    expect(edit(preset).codes).not.toContain('slices-need-rounds');
    const more = edit(preset, { sliceCount: 18 });
    expect(cautionOf(more, 'slices-need-rounds')?.level).toBe('caution');
    expect(more.parameters.rounds).toBe(2);
    expect(more.figures.scanTimeS).toBe(2 * (edit(preset).figures.scanTimeS as number));
  });

  it('rounds that the preset already has are no news', () => {
    expect(edit(train({ sliceCount: 30, rounds: 2 })).codes).not.toContain('slices-need-rounds');
    expect(edit(train({ sliceCount: 30, rounds: 2 }), { rounds: 1 }).codes).toContain('slices-need-rounds');
  });

  it("a preset's own split is a fact: the slot is scaled, noted, and kept for edits", () => {
    const tight = edit(train({ sliceCount: 20 }));
    expect(cautionOf(tight, 'slot-scaled')?.level).toBe('note');
    expect(cautionOf(tight, 'slot-scaled')?.numbers.factor).toBeCloseTo(150 / 168.25, 6);
    expect(tight.codes).not.toContain('slices-need-rounds');
    expect(edit(train({ sliceCount: 20 }), { sliceCount: 21 }).parameters.rounds).toBe(2);
    expect(edit(train({ sliceCount: 17 })).codes).not.toContain('slot-scaled');
  });

  it('a timed contrast phase is never split', () => {
    const dynamic = seriesOf(
      'spoiled-gradient-echo/2D',
      { repetitionTimeMs: 170, echoTimeMs: 2.3, pixelBandwidthHz: 1000, sliceCount: 14 },
      { purpose: 'dynamic' },
    );
    expect(edit(dynamic).codes).not.toContain('timed-phase-not-split');
    expect(cautionOf(edit(dynamic, { rounds: 2 }), 'timed-phase-not-split')?.level).toBe('error');
    expect(edit({ ...dynamic, purpose: null }, { rounds: 2 }).codes).not.toContain('timed-phase-not-split');
  });

  it('a split asked of a timed volume is refused with the same reason, though a volume has none', () => {
    const volume = { ...gradientEcho(), purpose: 'dynamic' };
    expect(edit(volume).codes).not.toContain('timed-phase-not-split');
    expect(cautionOf(edit(volume, { rounds: 2 }), 'timed-phase-not-split')?.level).toBe('error');
    expect(edit(gradientEcho(), { rounds: 2 }).codes).not.toContain('timed-phase-not-split');
  });

  it('several holds of one volume may shift; one hold for each volume does not', () => {
    const held = (given: GivenParameters) =>
      edit(
        seriesOf('spoiled-gradient-echo/2D', {
          repetitionTimeMs: 170,
          echoTimeMs: 2.3,
          sliceCount: 8,
          pacing: { kind: 'breath-hold' },
          ...given,
        }),
      );
    expect(held({}).codes).not.toContain('shift-between-holds');
    expect(cautionOf(held({ rounds: 2 }), 'shift-between-holds')?.level).toBe('caution');
    expect(held({ volumes: 3 }).codes).not.toContain('shift-between-holds');
    expect(held({ rounds: 2, roundsPerHold: 2 }).codes).not.toContain('shift-between-holds');
    expect(held({ rounds: 2, pacing: { kind: 'none' } }).codes).not.toContain('shift-between-holds');
  });
});

describe('trains', () => {
  it.each<[number, boolean]>([
    // the echo is clamped to the train: over half a spacing away is said
    [165, false],
    [165.1, true],
    [5, false],
    [4.9, true],
    [84.9, false],
  ])('TE %d in a train of 16 x 10: %s', (echoTimeMs, off) => {
    const result = edit(train({ echoTimeMs }));
    expect(result.codes.includes('echo-off-time')).toBe(off);
    if (off) expect(cautionOf(result, 'echo-off-time')?.level).toBe('caution');
  });

  it('single-shot: partial Fourier and TE must put the same number of echoes before the centre, within one and a half', () => {
    // (0.6 - 0.5) x 200 = 20 echoes before: echo 21, TE 105
    const shot = (echoTimeMs: number, given: GivenParameters = {}) =>
      edit(
        seriesOf('single-shot-fast-spin-echo/2D', { echoTimeMs, matrixPhase: 200, partialFourierPhase: 0.6, echoSpacingMs: 5, ...given }),
      ).codes;
    for (const te of [100, 105, 110]) expect(shot(te)).not.toContain('echo-centre-differs');
    for (const te of [95, 115]) expect(shot(te)).toContain('echo-centre-differs');
    expect(shot(55, { parallelFactorPhase: 2 })).not.toContain('echo-centre-differs');
    expect(edit(train({ echoTimeMs: 20 })).codes).not.toContain('echo-centre-differs');
  });

  it('3D trains vary their angles: approximate below 180 degrees', () => {
    const volume = (refocusingAngleDeg: number) =>
      edit(
        seriesOf('fast-spin-echo/3D', {
          repetitionTimeMs: 2000,
          echoTimeMs: 100,
          echoTrainLength: 100,
          sliceCount: 32,
          refocusingAngleDeg,
        }),
      );
    expect(cautionOf(volume(179), 'approximate-train')?.level).toBe('note');
    expect(volume(180).codes).not.toContain('approximate-train');
    expect(edit(train({ refocusingAngleDeg: 120 })).codes).not.toContain('approximate-train');
  });

  it('a train that should read all its lines and does not is noted', () => {
    const shot = (echoTrainLength: number) => edit(seriesOf('single-shot-fast-spin-echo/2D', { matrixPhase: 200, echoTrainLength })).codes;
    expect(shot(200)).not.toContain('train-length-differs');
    expect(shot(199)).toContain('train-length-differs');
    expect(
      edit(
        seriesOf('inversion-prepared-gradient-echo/3D', {
          repetitionTimeMs: 2300,
          inversionTimeMs: 900,
          echoTimeMs: 3,
          sliceCount: 100,
          echoTrainLength: 90,
        }),
      ).codes,
    ).toContain('train-length-differs');
    expect(edit(train({ echoTrainLength: 13 })).codes).not.toContain('train-length-differs');
  });
});

describe('worstFirst', () => {
  it('puts errors before cautions before notes, and keeps the order of equals', () => {
    const of = (level: Caution['level'], text: string): Caution => ({ code: 'wrap', level, text, numbers: {} });
    const sorted = worstFirst([of('note', 'a'), of('caution', 'b'), of('error', 'c'), of('caution', 'd'), of('error', 'e')]);
    expect(sorted.map((c) => c.text)).toEqual(['c', 'e', 'b', 'd', 'a']);
  });
});
