import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { type Edited, edit, seriesOf } from './series-of.js';

const keysOf = (result: Edited) => result.carried.map((value) => value.key);
const gradientEcho = (given: GivenParameters = {}) =>
  seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 20, echoTimeMs: 8, sliceCount: 60, ...given });
const train = (given: GivenParameters = {}) =>
  seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 3000, echoTimeMs: 80, echoTrainLength: 16, echoSpacingMs: 12, ...given });
const planar = (given: GivenParameters = {}) =>
  seriesOf('echo-planar-spin-echo/2D', {
    repetitionTimeMs: 4800,
    echoTimeMs: 90,
    echoSpacingMs: 0.6,
    fieldOfViewMm: 380,
    matrixRead: 128,
    matrixPhase: 128,
    pixelBandwidthHz: 2000,
    ...given,
  });

describe('nothing set, nothing carried', () => {
  it.each([gradientEcho(), train(), planar(), seriesOf('spin-echo/2D')])('leaves the preset as it is: $family', (series) => {
    const result = edit(series);
    expect(result.carried).toEqual([]);
    expect(result.parameters).toBe(series.parameters);
  });

  it('values set as they are leave it too', () => {
    expect(edit(gradientEcho(), { pixelBandwidthHz: 200, echoTimeMs: 8 }).parameters).toEqual(gradientEcho().parameters);
  });

  it('an undefined value sets nothing', () => {
    expect(edit(gradientEcho(), { averages: undefined } as never).parameters.averages).toBe(1);
  });
});

describe('gradient echoes: TR and TE follow the readout by difference', () => {
  it('new = old + (minimum new - minimum old): the slack of the preset is kept', () => {
    const before = edit(gradientEcho()).figures;
    const after = edit(gradientEcho(), { pixelBandwidthHz: 400 });
    expect(after.parameters.echoTimeMs - (after.figures.minimumEchoTimeMs as number)).toBeCloseTo(
      8 - (before.minimumEchoTimeMs as number),
      5,
    );
    expect(after.parameters.repetitionTimeMs - (after.figures.minimumRepetitionTimeMs as number)).toBeCloseTo(
      20 - (before.minimumRepetitionTimeMs as number),
      5,
    );
    expect(after.parameters.echoTimeMs).toBeLessThan(7);
    expect(keysOf(after)).toEqual(['echoTimeMs', 'repetitionTimeMs']);
  });

  it('a read matrix, flow compensation, longer pulses move them as well; field of view and slices do not', () => {
    expect(keysOf(edit(gradientEcho(), { matrixRead: 320 }))).toContain('echoTimeMs');
    expect(edit(gradientEcho(), { flowCompensation: true }).parameters.echoTimeMs).toBeGreaterThan(8);
    expect(edit(gradientEcho(), { rfPulseStretch: 2 }).parameters.repetitionTimeMs).toBeCloseTo(21, 1);
    for (const set of [{ fieldOfViewMm: 200 }, { sliceThicknessMm: 3 }, { matrixPhase: 192 }, { averages: 2 }, { sliceCount: 40 }])
      expect(edit(gradientEcho(), set).carried).toEqual([]);
  });

  it('field, matrix and slices of the same edit do not count as edits of the readout', () => {
    const alone = edit(gradientEcho(), { pixelBandwidthHz: 400 });
    const together = edit(gradientEcho(), {
      pixelBandwidthHz: 400,
      fieldOfViewMm: 200,
      matrixPhase: 320,
      sliceThicknessMm: 2,
      sliceCount: 90,
    });
    expect(together.parameters.echoTimeMs).toBe(alone.parameters.echoTimeMs);
    expect(together.parameters.repetitionTimeMs).toBe(alone.parameters.repetitionTimeMs);
  });

  it('what is set wins', () => {
    const result = edit(gradientEcho(), { pixelBandwidthHz: 400, echoTimeMs: 8 });
    expect(result.parameters.echoTimeMs).toBe(8);
    expect(keysOf(result)).toEqual(['repetitionTimeMs']);
  });

  it('TE of a dual echo stays: it sets contrast', () => {
    const dual = seriesOf('spoiled-gradient-echo/2D', {
      repetitionTimeMs: 170,
      echoTimeMs: 2.3,
      secondEchoTimeMs: 4.6,
      pixelBandwidthHz: 1000,
    });
    expect(edit(dual, { pixelBandwidthHz: 1200 }).parameters.echoTimeMs).toBe(2.3);
    expect(edit(dual, { pixelBandwidthHz: 300 }).parameters.echoTimeMs).toBeGreaterThan(2.3);
  });

  it('TR of an inversion-prepared cycle stays, its spacing and TE follow', () => {
    const prepared = (given: GivenParameters = {}) =>
      seriesOf('inversion-prepared-gradient-echo/3D', {
        repetitionTimeMs: 2300,
        inversionTimeMs: 900,
        echoTimeMs: 4,
        echoSpacingMs: 10,
        sliceCount: 100,
        ...given,
      });
    const least = (given: GivenParameters) => edit(prepared(given)).baseline.model.minimum.echoSpacingMs as number;
    const result = edit(prepared(), { pixelBandwidthHz: 300 });
    expect(result.parameters.repetitionTimeMs).toBe(2300);
    expect(keysOf(result)).toEqual(['echoSpacingMs', 'echoTimeMs']);
    expect(result.parameters.echoSpacingMs).toBeCloseTo(10 + least({ pixelBandwidthHz: 300 }) - least({}), 5);
    // one readout is 1.667 ms shorter, its prephasing and ramps a little
    expect(result.parameters.echoSpacingMs).toBeLessThan(10 - 1.6);
  });
});

describe('spin echoes: a TE that sets contrast stays and is raised only where the minimum passes it', () => {
  it('stays while it can', () => {
    expect(edit(seriesOf('spin-echo/2D', { echoTimeMs: 15 }), { pixelBandwidthHz: 150 }).parameters.echoTimeMs).toBe(15);
    expect(edit(seriesOf('spin-echo/2D', { echoTimeMs: 15 }), { pixelBandwidthHz: 400 }).parameters.echoTimeMs).toBe(15);
  });

  it('is raised by the difference of the minimum, and TR stays', () => {
    const before = edit(seriesOf('spin-echo/2D', { echoTimeMs: 12 }));
    const after = edit(seriesOf('spin-echo/2D', { echoTimeMs: 12 }), { pixelBandwidthHz: 80 });
    expect(after.figures.minimumEchoTimeMs as number).toBeGreaterThan(12);
    expect(after.parameters.echoTimeMs - 12).toBeCloseTo(
      (after.figures.minimumEchoTimeMs as number) - (before.figures.minimumEchoTimeMs as number),
      5,
    );
    expect(after.parameters.repetitionTimeMs).toBe(1000);
  });
});

describe('trains: the spacing follows, TE falls on the nearest whole echo', () => {
  it('bandwidth up shortens the spacing by what one readout shortens', () => {
    const result = edit(train(), { pixelBandwidthHz: 400 });
    expect(result.parameters.echoSpacingMs).toBeCloseTo(9.5, 2);
    expect(result.parameters.echoTimeMs).toBeCloseTo(8 * result.parameters.echoSpacingMs, 5);
    expect(keysOf(result)).toEqual(['echoSpacingMs', 'echoTimeMs']);
  });

  it('twice the pulse length lengthens it by one refocusing pulse, less what thinner selection ramps save', () => {
    const result = edit(train(), { rfPulseStretch: 2 });
    expect(result.parameters.echoSpacingMs).toBeGreaterThan(14.9);
    expect(result.parameters.echoSpacingMs).toBeLessThanOrEqual(15);
  });

  it('a spacing that is set re-centres TE; a TE that is set stays', () => {
    expect(edit(train(), { echoSpacingMs: 9 }).parameters.echoTimeMs).toBe(81);
    expect(edit(train(), { echoSpacingMs: 9, echoTimeMs: 80 }).parameters.echoTimeMs).toBe(80);
  });

  it('a shorter train pulls TE to its last echo, a longer one leaves it', () => {
    expect(edit(train(), { echoTrainLength: 5 }).parameters.echoTimeMs).toBe(60);
    expect(edit(train(), { echoTrainLength: 24 }).parameters.echoTimeMs).toBe(80);
  });

  it('a single-shot train follows its lines by difference', () => {
    const shot = seriesOf('single-shot-fast-spin-echo/2D', {
      repetitionTimeMs: 1500,
      echoTimeMs: 80,
      matrixPhase: 200,
      echoTrainLength: 110,
      partialFourierPhase: 0.6,
    });
    expect(edit(shot).parameters.echoTrainLength).toBe(110);
    expect(edit(shot, { matrixPhase: 160 }).parameters.echoTrainLength).toBe(86);
    expect(edit(shot, { matrixPhase: 160, echoTrainLength: 100 }).parameters.echoTrainLength).toBe(100);
    expect(edit(shot, { partialFourierPhase: 0.51, matrixPhase: 8 }).parameters.echoTrainLength).toBe(1);
  });

  it('an inversion-prepared train follows its partitions', () => {
    const prepared = seriesOf('inversion-prepared-gradient-echo/3D', {
      repetitionTimeMs: 2300,
      inversionTimeMs: 900,
      echoTimeMs: 3,
      sliceCount: 100,
    });
    expect(edit(prepared, { sliceCount: 120 }).parameters.echoTrainLength).toBe(120);
  });
});

describe('echo-planar: TE follows the lines before the centre', () => {
  it('R 2 to 3 with 0.6 ms and 128 lines takes 2 x 6.4 = 12.8 ms (computed)', () => {
    expect(edit(planar({ parallelFactorPhase: 2 }), { parallelFactorPhase: 3 }).parameters).toMatchObject({
      echoTimeMs: 77.2,
      echoTrainLength: 43,
      repetitionTimeMs: 4800,
    });
  });

  it('partial Fourier, spacing and b-value move it too', () => {
    expect(edit(planar(), { partialFourierPhase: 0.75 }).parameters.echoTimeMs).toBeCloseTo(90 - 2 * 0.25 * 128 * 0.6, 5);
    expect(edit(planar(), { echoSpacingMs: 0.7 }).parameters.echoTimeMs).toBeCloseTo(90 + 2 * 0.5 * 128 * 0.1, 5);
    const weighted = planar({ diffusion: { bValuesSPerMm2: [0, 800], directions: 3, averages: [1, 1] } });
    expect(
      edit(weighted, { diffusion: { bValuesSPerMm2: [0, 1000], directions: 3, averages: [1, 1] } }).parameters.echoTimeMs,
    ).toBeGreaterThan(90);
  });
});

describe('another field follows the same rule', () => {
  it('the fat pulse lasts 24/B0 and is no part of TE or spacing; timing keeps its slack', () => {
    expect(edit(train(), {}, { onto: plainScanner(3) }).parameters.echoSpacingMs).toBe(12);
  });

  it('weaker gradients lengthen a gradient echo', () => {
    const weak = { ...plainScanner(1.5), gradientMtPerM: 20, slewTPerMPerS: 60 };
    const result = edit(gradientEcho(), {}, { onto: weak });
    expect(result.parameters.echoTimeMs).toBeGreaterThan(8);
    expect(keysOf(result)).toContain('repetitionTimeMs');
  });
});

describe('rounds', () => {
  // slot 1.25 + 192 + 6 + 2 = 201.25 ms: 14 in 3000
  it('rise when slices no longer fit, and only then', () => {
    expect(edit(train({ sliceCount: 14 }), { sliceCount: 15 }).carried).toEqual([
      { key: 'rounds', from: 1, to: 2, because: expect.any(String) },
    ]);
    expect(edit(train({ sliceCount: 14 }), { repetitionTimeMs: 2800 }).parameters.rounds).toBe(2);
    expect(edit(train({ sliceCount: 14 }), { sliceCount: 29 }).parameters.rounds).toBe(3);
  });

  it("never fall below the preset's own", () => {
    expect(edit(train({ sliceCount: 28, rounds: 2 }), { sliceCount: 10 }).parameters.rounds).toBe(2);
  });

  it('that are set stay, even where they do not fit', () => {
    expect(edit(train({ sliceCount: 28, rounds: 2 }), { rounds: 1 }).parameters.rounds).toBe(1);
    expect(edit(train({ sliceCount: 28, rounds: 2 }), { rounds: 1 }).figures.scanTimeS).toBe(
      edit(train({ sliceCount: 28, rounds: 2 })).figures.scanTimeS,
    );
  });

  it('are not touched where not one slice fits', () => {
    expect(edit(train({ sliceCount: 14 }), { repetitionTimeMs: 195 }).parameters.rounds).toBe(1);
  });
});
