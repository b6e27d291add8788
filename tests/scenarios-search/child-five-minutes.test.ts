import { describe, expect, it } from 'vitest';
import { unknownBody } from '../../src/calc/body.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { usualBands } from '../../src/search/bands.js';
import { type BudgetProblem, planBudget } from '../../src/search/budget.js';
import type { Study, StudySeries } from '../../src/study/study.js';
import { inventedSeries } from './problems.js';

const common: GivenParameters = {
  fieldOfViewMm: 200,
  matrixRead: 256,
  sliceCount: 20,
  sliceThicknessMm: 4,
  sliceGapMm: 0.4,
  pixelBandwidthHz: 250,
  echoTimeMs: 90,
};
const brain = { target: 'white matter', comparison: 'CSF' } as const;
const named = (id: string, priority: number, series: StudySeries): StudySeries => ({ ...series, id, title: id, priority });

/** A five-year-old, awake: localiser 0:15, diffusion 0:40, T2 0:36, FLAIR 1:48, T1 0:42. Invented. */
const series: readonly StudySeries[] = [
  named(
    'localiser',
    1,
    inventedSeries(
      'spoiled-gradient-echo/2D',
      { ...common, echoTimeMs: 3, flipAngleDeg: 30, repetitionTimeMs: 150, matrixPhase: 100, sliceCount: 3 },
      brain,
    ),
  ),
  named(
    'dwi',
    2,
    inventedSeries(
      'echo-planar-spin-echo/2D',
      {
        ...common,
        repetitionTimeMs: 4000,
        echoTimeMs: 80,
        matrixRead: 128,
        matrixPhase: 128,
        pixelBandwidthHz: 1800,
        parallelFactorPhase: 2,
        diffusion: { bValuesSPerMm2: [0, 1000], directions: 3, averages: [1, 3] },
      },
      brain,
    ),
  ),
  named(
    't2',
    3,
    inventedSeries(
      'fast-spin-echo/2D',
      { ...common, repetitionTimeMs: 4000, matrixPhase: 256, parallelFactorPhase: 2, echoTrainLength: 16, dummyShots: 1 },
      brain,
    ),
  ),
  named(
    'flair',
    4,
    inventedSeries(
      'fast-spin-echo/2D',
      {
        ...common,
        repetitionTimeMs: 9000,
        inversionTimeMs: 2500,
        matrixPhase: 192,
        parallelFactorPhase: 2,
        echoTrainLength: 16,
        rounds: 2,
      },
      brain,
    ),
  ),
  named(
    't1',
    5,
    inventedSeries(
      'spoiled-gradient-echo/2D',
      { ...common, echoTimeMs: 4, flipAngleDeg: 70, repetitionTimeMs: 220, matrixPhase: 192, parallelFactorPhase: 2, rounds: 2 },
      brain,
    ),
  ),
];
const study: Study = {
  format: 'holdfast preset',
  version: 1,
  id: 'child',
  title: 'Child',
  region: 'brain',
  fieldT: 3,
  status: 'draft',
  revision: 1,
  notes: '',
  minimumSet: ['dwi', 't2'],
  series,
};
const problem = (minutes: number, more: Partial<BudgetProblem> = {}): BudgetProblem => ({
  study,
  scanner: plainScanner(3),
  body: unknownBody,
  rules: new Map(),
  minutes,
  longestS: null,
  overheadS: 10,
  done: [],
  bands: usualBands,
  readings: {},
  ...more,
});

describe('a child, awake, five minutes', () => {
  it('everything as it is takes 4:51 with 10 s of overhead each, and that is too close', () => {
    const { plan, totalS, verdict } = planBudget(problem(5));
    expect(plan.map(({ series: { id }, choice }) => [id, choice])).toEqual(series.map(({ id }) => [id, 'as it is']));
    expect(Math.abs(totalS - 291)).toBeLessThan(1);
    expect(verdict.word).toBe('TOO CLOSE');
  });

  it('with a minute less one redundant series is dropped and nothing is shortened: the one of least priority that is enough', () => {
    const { plan, totalS, missing } = planBudget(problem(4));
    expect(plan.filter(({ choice }) => choice !== 'as it is').map(({ series: { id }, choice }) => [id, choice])).toEqual([
      ['t1', 'skipped'],
    ]);
    expect(totalS).toBeLessThanOrEqual(240);
    expect(missing).toEqual([]);
  });

  it('in two minutes the minimum answer is kept first: T2 and diffusion', () => {
    const { plan, missing, totalS } = planBudget(problem(1.7));
    expect(missing).toEqual([]);
    expect(totalS).toBeLessThanOrEqual(102);
    for (const id of ['dwi', 't2']) expect(plan.find((one) => one.series.id === id)?.choice).not.toBe('skipped');
  });

  it('what is done takes no more time, and no series is longer than asked', () => {
    const { plan } = planBudget(problem(5, { done: ['localiser', 'dwi'], longestS: 60 }));
    expect(plan.map(({ series: { id } }) => id)).toEqual(['t2', 'flair', 't1']);
    for (const { timeS, choice } of plan) if (choice !== 'skipped') expect(timeS).toBeLessThanOrEqual(60 + 1e-9);
  });

  it('says which part of the minimum set does not fit', () => {
    expect(planBudget(problem(0.5)).missing.length).toBeGreaterThan(0);
  });
});
