import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { acquiredLines } from '../../src/calc/lines.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { diffusionShots, seriesTime } from '../../src/calc/time.js';
import { parametersOf } from './series-of.js';

function timeOf(key: ClassKey, given: GivenParameters) {
  const p = parametersOf(key, given);
  return seriesTime(key, p, acquiredLines(key, p), p.rounds, plainScanner(1.5));
}

describe('scan time by class', () => {
  it.each<[string, ClassKey, GivenParameters, number]>([
    // Haacke et al., Magnetic Resonance Imaging, 1999 and all textbooks: TR x lines x averages / train; values computed
    ['spin echo 600, 192 lines, 2 averages', 'spin-echo/2D', { repetitionTimeMs: 600, matrixPhase: 192, averages: 2 }, 230.4],
    [
      'fast spin echo 4000, 320 lines, train 16, 2 averages',
      'fast-spin-echo/2D',
      { repetitionTimeMs: 4000, matrixPhase: 320, echoTrainLength: 16, averages: 2 },
      160,
    ],
    [
      'the same with R 2',
      'fast-spin-echo/2D',
      { repetitionTimeMs: 4000, matrixPhase: 320, echoTrainLength: 16, averages: 2, parallelFactorPhase: 2 },
      80,
    ],
    [
      'a train that does not divide the lines plays one more shot',
      'fast-spin-echo/2D',
      { repetitionTimeMs: 1000, matrixPhase: 321, echoTrainLength: 16 },
      21,
    ],
    [
      'half averages of shots are rounded up',
      'fast-spin-echo/2D',
      { repetitionTimeMs: 1000, matrixPhase: 240, echoTrainLength: 16, averages: 1.5 },
      23,
    ],
    [
      'one dummy shot a round',
      'fast-spin-echo/2D',
      { repetitionTimeMs: 3500, matrixPhase: 320, echoTrainLength: 20, averages: 2, dummyShots: 1, rounds: 2 },
      231,
    ],
    ['volumes repeat it all', 'spoiled-gradient-echo/2D', { repetitionTimeMs: 100, matrixPhase: 100, volumes: 3, rounds: 2 }, 60],
    ['spoiled 3D TR 8, 224 x 160', 'spoiled-gradient-echo/3D', { repetitionTimeMs: 8, matrixPhase: 224, sliceCount: 160 }, 286.72],
    [
      'the same with R 2 and 6/8 along phase',
      'spoiled-gradient-echo/3D',
      { repetitionTimeMs: 8, matrixPhase: 224, sliceCount: 160, parallelFactorPhase: 2, partialFourierPhase: 0.75 },
      107.52,
    ],
    [
      'two slabs one after the other',
      'spoiled-gradient-echo/3D',
      { repetitionTimeMs: 8, matrixPhase: 224, sliceCount: 160, slabs: 2 },
      573.44,
    ],
    [
      'elliptical sampling leaves out the corners',
      'spoiled-gradient-echo/3D',
      { repetitionTimeMs: 10, matrixPhase: 100, sliceCount: 100, ellipticalSampling: true },
      78.54,
    ],
    [
      '3D lines are averaged before the ceiling',
      'spoiled-gradient-echo/3D',
      { repetitionTimeMs: 10, matrixPhase: 11, sliceCount: 1, averages: 1.5 },
      0.17,
    ],
    [
      '3D train: shots first, then averages',
      'fast-spin-echo/3D',
      { repetitionTimeMs: 1500, matrixPhase: 100, sliceCount: 30, echoTrainLength: 100, averages: 1.4, dummyShots: 1 },
      64.5,
    ],
    [
      '3D train elliptical',
      'fast-spin-echo/3D',
      { repetitionTimeMs: 1000, matrixPhase: 100, sliceCount: 40, echoTrainLength: 50, ellipticalSampling: true },
      63,
    ],
    [
      'inversion-prepared TR 2300, 224 shots',
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, matrixPhase: 224, sliceCount: 176 },
      515.2,
    ],
    [
      'partitions run inside the cycle: slice oversampling costs no time',
      'inversion-prepared-gradient-echo/3D',
      { repetitionTimeMs: 2300, matrixPhase: 224, sliceCount: 176, sliceOversamplingPercent: 50 },
      515.2,
    ],
    [
      'balanced slices follow one another',
      'balanced-steady-state/2D',
      { repetitionTimeMs: 4, matrixPhase: 200, sliceCount: 25, dummyShots: 10 },
      21,
    ],
    ['balanced 3D', 'balanced-steady-state/3D', { repetitionTimeMs: 5, matrixPhase: 100, sliceCount: 40 }, 20],
    ['single shots, TR from shot to shot', 'single-shot-fast-spin-echo/2D', { repetitionTimeMs: 1200, sliceCount: 25, averages: 2 }, 60],
    [
      'single shots of simultaneous slices',
      'single-shot-fast-spin-echo/2D',
      { repetitionTimeMs: 1000, sliceCount: 25, simultaneousSlices: 2 },
      13,
    ],
    [
      'echo-planar series: volumes and dummies',
      'echo-planar-gradient-echo/2D',
      { repetitionTimeMs: 2000, volumes: 100, dummyShots: 4 },
      208,
    ],
    ['echo-planar averages', 'echo-planar-spin-echo/2D', { repetitionTimeMs: 3000, averages: 2.5, volumes: 3, rounds: 2 }, 48],
    [
      'rotating strips: blades',
      'rotating-strip-fast-spin-echo/2D',
      { repetitionTimeMs: 4000, matrixPhase: 320, echoTrainLength: 20, averages: 1.5, dummyShots: 1, rounds: 2 },
      320,
    ],
    [
      'a separate reference scan is a fixed cost',
      'spin-echo/2D',
      { repetitionTimeMs: 600, matrixPhase: 192, averages: 2, referenceScanS: 16 },
      246.4,
    ],
    ['3D spin echo', 'spin-echo/3D', { repetitionTimeMs: 100, matrixPhase: 64, sliceCount: 16, dummyShots: 2 }, 102.6],
  ])('%s', (_what, key, given, seconds) => {
    expect(timeOf(key, given).scanTimeS).toBeCloseTo(seconds, 9);
  });

  it('counts diffusion by b-value: directions count one at b 0', () => {
    const diffusion = { bValuesSPerMm2: [0, 50, 800], directions: 3, averages: [2, 1, 4] };
    expect(diffusionShots(diffusion)).toBe(17);
    expect(timeOf('echo-planar-spin-echo/2D', { repetitionTimeMs: 4000, diffusion, dummyShots: 1, rounds: 2 }).scanTimeS).toBe(144);
  });

  it('takes one average where a list of averages is shorter than its b-values', () => {
    expect(diffusionShots({ bValuesSPerMm2: [0, 1000], directions: 6, averages: [] })).toBe(7);
  });

  it('adds fat blocks to a 3D gradient echo only where their distance is stated: 40 blocks of 24/1.5 ms (computed)', () => {
    const given: GivenParameters = { repetitionTimeMs: 5, matrixPhase: 40, sliceCount: 40, fatSuppression: 'spectral' };
    expect(timeOf('spoiled-gradient-echo/3D', given).scanTimeS).toBe(8);
    expect(timeOf('spoiled-gradient-echo/3D', { ...given, fatSuppressionEveryLines: 40 }).scanTimeS).toBeCloseTo(8.64, 9);
    expect(timeOf('spoiled-gradient-echo/3D', { ...given, fatSuppressionEveryLines: 39 }).scanTimeS).toBeCloseTo(8 + 42 * 0.016, 9);
    expect(timeOf('spoiled-gradient-echo/3D', { ...given, fatSuppressionEveryLines: 40, rfPulseStretch: 2 }).scanTimeS).toBeCloseTo(
      9.28,
      9,
    );
    expect(
      timeOf('spoiled-gradient-echo/3D', { ...given, fatSuppression: 'water-excitation', fatSuppressionEveryLines: 40 }).scanTimeS,
    ).toBe(8);
  });

  it('counts dummies of single shots once, before the first slice', () => {
    expect(timeOf('single-shot-fast-spin-echo/2D', { repetitionTimeMs: 1000, sliceCount: 20, dummyShots: 2 }).scanTimeS).toBe(22);
  });

  it('gives the excitations of one pass', () => {
    expect(timeOf('fast-spin-echo/2D', { matrixPhase: 320, echoTrainLength: 20, averages: 2, dummyShots: 1, rounds: 3 }).shots).toBe(33);
  });

  it('counts in whole microseconds: 3.55 ms x 4800 lines are 17.04 s to the last digit', () => {
    expect(timeOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 3.55, matrixPhase: 80, sliceCount: 60 }).scanTimeS).toBe(17.04);
  });
});

describe('triggers and gates', () => {
  it('a respiratory trigger waits for the next breath: TR 2500 takes 4000 of a 4 s breath', () => {
    const given: GivenParameters = {
      repetitionTimeMs: 2500,
      matrixPhase: 160,
      echoTrainLength: 16,
      pacing: { kind: 'respiratory-trigger', periodMs: 4000 },
    };
    expect(timeOf('fast-spin-echo/2D', given).scanTimeS).toBe(40);
    expect(timeOf('fast-spin-echo/2D', { ...given, repetitionTimeMs: 4001 }).scanTimeS).toBe(80);
  });

  it('a gated cine takes ceil(L / lines per beat) + 1 beats a slice', () => {
    const given: GivenParameters = {
      repetitionTimeMs: 3,
      matrixPhase: 150,
      sliceCount: 10,
      linesPerBeat: 12,
      pacing: { kind: 'cardiac-gate', periodMs: 900 },
    };
    const time = timeOf('balanced-steady-state/2D', given);
    expect(time.scanTimeS).toBe(126);
    expect(time.shots).toBe(14);
    expect(time.holds).toBeNull();
  });

  it('a gated cine in breath-holds gives the longest hold', () => {
    const given: GivenParameters = {
      repetitionTimeMs: 3,
      matrixPhase: 150,
      sliceCount: 11,
      linesPerBeat: 12,
      roundsPerHold: 2,
      pacing: { kind: 'cardiac-gate', periodMs: 900, breathHold: true },
    };
    const time = timeOf('balanced-steady-state/2D', given);
    expect(time.holds).toBe(6);
    expect(time.holdTimeS).toBeCloseTo(25.2, 9);
  });
});

describe('breath-holds', () => {
  const held: GivenParameters = { pacing: { kind: 'breath-hold' } };

  it('has none unless the series is held', () => {
    expect(timeOf('spin-echo/2D', {})).toMatchObject({ holds: null, holdTimeS: null });
  });

  it('one hold a round: 2 rounds of 15.3 s', () => {
    const time = timeOf('spoiled-gradient-echo/2D', { ...held, repetitionTimeMs: 170, matrixPhase: 90, rounds: 2, sliceCount: 30 });
    expect([time.holds, time.holdTimeS, time.scanTimeS]).toEqual([2, 15.3, 30.6]);
  });

  it('volumes are holds of their own', () => {
    const time = timeOf('spoiled-gradient-echo/3D', { ...held, repetitionTimeMs: 4, matrixPhase: 100, sliceCount: 40, volumes: 4 });
    expect([time.holds, time.holdTimeS, time.scanTimeS]).toEqual([4, 16, 64]);
  });

  it('all slabs of a volume go into its hold', () => {
    const time = timeOf('spoiled-gradient-echo/3D', { ...held, repetitionTimeMs: 4, matrixPhase: 100, sliceCount: 20, slabs: 2 });
    expect([time.holds, time.holdTimeS]).toEqual([1, 16]);
  });

  it('several rounds in one hold: 5 rounds, 2 a hold, make 3 holds of two rounds at most', () => {
    const time = timeOf('spoiled-gradient-echo/2D', {
      ...held,
      repetitionTimeMs: 100,
      matrixPhase: 50,
      rounds: 5,
      roundsPerHold: 2,
      sliceCount: 30,
    });
    expect([time.holds, time.holdTimeS]).toEqual([3, 10]);
  });

  it('slices one by one: 25 single shots, 10 a hold, make 3 holds of 10 s', () => {
    const time = timeOf('single-shot-fast-spin-echo/2D', { ...held, repetitionTimeMs: 1000, sliceCount: 25, roundsPerHold: 10 });
    expect([time.holds, time.holdTimeS]).toEqual([3, 10]);
  });

  it('slices one by one without a stated number: as many as a round has', () => {
    const time = timeOf('balanced-steady-state/2D', { ...held, repetitionTimeMs: 4, matrixPhase: 200, sliceCount: 25, rounds: 2 });
    expect(time.holds).toBe(2);
    expect(time.holdTimeS).toBeCloseTo(13 * 0.8, 9);
  });

  it('never fills a hold with more rounds than there are', () => {
    const time = timeOf('spoiled-gradient-echo/2D', { ...held, repetitionTimeMs: 100, matrixPhase: 50, rounds: 2, roundsPerHold: 8 });
    expect([time.holds, time.holdTimeS]).toEqual([1, 10]);
  });

  it('on the table: 20 s of preparation, and per hold 10 s of instruction and 20 s of rest (common practice, no source)', () => {
    expect(timeOf('spin-echo/2D', { repetitionTimeMs: 100, matrixPhase: 100 }).tableTimeS).toBe(30);
    expect(timeOf('spoiled-gradient-echo/2D', { ...held, repetitionTimeMs: 100, matrixPhase: 100, rounds: 3 }).tableTimeS).toBe(
      20 + 30 + 3 * 30,
    );
  });
});
