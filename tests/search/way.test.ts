import { describe, expect, it } from 'vitest';
import { same } from '../../src/calc/rounding.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import type { SearchProblem } from '../../src/search/problem-to-solve.js';
import { settingOf } from '../../src/search/setting.js';
import { type Way, wayOf } from '../../src/search/way.js';
import { changesInWords } from '../../src/session/say-way.js';
import { lumbarTrain } from '../scenarios/invented-parameters.js';
import { inventedSeries, liverProblem, problemOf } from '../scenarios-search/problems.js';

/** The way that sets these values, each a step of the lattice. */
function wayWith(problem: SearchProblem, given: GivenParameters): Way {
  const setting = settingOf(problem);
  const point = setting.variables.map(({ key, values }) =>
    given[key] === undefined ? 0 : values.findIndex((value) => same(value as number, given[key] as number)),
  );
  expect(point, JSON.stringify(given)).not.toContain(-1);
  return wayOf(setting, 'closest', point);
}

const lumbar = inventedSeries('fast-spin-echo/2D', lumbarTrain, { plane: 'sagittal', target: 'intervertebral disc (nucleus)' });

describe('a way whose slices no longer fit in one TR', () => {
  it('names the split among its changes and in its sentence, but does not count it as a change of its own', () => {
    const way = wayWith(problemOf(lumbar, 1.5, { timeS: 200 }), { echoTrainLength: 25 });
    expect(way.changes).toEqual({ rounds: { from: 1, to: 2 }, echoTrainLength: { from: 20, to: 25 } });
    expect(way.changed).toBe(1);
    expect(way.given.rounds).toBeUndefined();
    expect(changesInWords(way)).toBe('split into 2 acquisitions; echo train 20 to 25');
  });

  it('names no split where none is needed', () => {
    expect(wayWith(problemOf(lumbar, 1.5, { timeS: 200 }), { echoTrainLength: 18 }).changes.rounds).toBeUndefined();
  });
});

describe('a must-keep that a way meets exactly at its bound', () => {
  const exact = (given: GivenParameters) =>
    wayWith(liverProblem({ holdS: 11 }), given).cautions.filter(({ code }) => code === 'must-keep-exact');

  it('is said in plain words with its source', () => {
    expect(exact({ sliceThicknessMm: 5 })).toEqual([
      {
        code: 'must-keep-exact',
        level: 'note',
        text: 'voxel, slice 5 mm: exactly what must be kept, at most 5 mm (LI-RADS v2018 technical table as given by Santillan, Hepatoma Res 2020;6:63, table 3)',
      },
    ]);
  });

  it('is not said of a value within the bound, nor of one that the way does not move', () => {
    expect(exact({ sliceThicknessMm: 4 })).toEqual([]);
    const problem = liverProblem({ holdS: 11 });
    const atBound = { ...problem.series, mustKeep: [{ figure: 'voxelSliceMm' as const, atMost: 3, source: 'invented' }] };
    expect(wayWith({ ...problem, series: atBound }, { partialFourierPhase: 0.75 }).cautions.map(({ code }) => code)).not.toContain(
      'must-keep-exact',
    );
  });
});

describe('distortion and chemical shift, which the balanced loss does not weigh', () => {
  const dwi = inventedSeries(
    'echo-planar-spin-echo/2D',
    {
      repetitionTimeMs: 4800,
      echoTimeMs: 90,
      echoSpacingMs: 0.6,
      sliceCount: 20,
      sliceThicknessMm: 6,
      fieldOfViewMm: 380,
      matrixRead: 128,
      matrixPhase: 128,
      pixelBandwidthHz: 2000,
      parallelFactorPhase: 2,
      diffusion: { bValuesSPerMm2: [50, 800], directions: 3, averages: [1, 4] },
    },
    {},
  );

  it('a way that gives up acceleration names what grows, in what it gives up and as a caution', () => {
    const way = wayWith(problemOf(dwi, 3, {}), { parallelFactorPhase: 1 });
    expect(way.gives.find(({ figure }) => figure === 'distortionPxPer100Hz')?.ratio).toBeCloseTo(2, 6);
    expect(way.gives.find(({ figure }) => figure === 'chemicalShiftPx')?.ratio).toBeCloseTo(2, 6);
    const caution = way.cautions.find(({ code }) => code === 'side-effect-grows');
    expect(caution?.level).toBe('caution');
    // 100 Hz x 0.6 ms / R x 128 lines: 3.84 px at R 2, 7.68 px at R 1.
    expect(caution?.text).toContain('distortion grows from 3.84 to 7.68 px');
  });

  it('one within a quarter more, or less, does not', () => {
    for (const given of [{ matrixPhase: 112 }, { parallelFactorPhase: 3 }])
      expect(wayWith(problemOf(dwi, 3, {}), given).cautions.map(({ code }) => code)).not.toContain('side-effect-grows');
  });
});

describe('the preset that a way is compared with', () => {
  it('has the pauses of this site, so that its table time moves by the series alone', () => {
    const scanner = { ...plainScanner(3), pauses: { preparationS: 60, restS: 5 } };
    expect(wayWith(liverProblem({ holdS: 20 }, { scanner }), {}).gives).toEqual([]);
  });
});
