import { describe, expect, it } from 'vitest';
import { unknownBody } from '../../src/calc/body.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { usualBands } from '../../src/search/bands.js';
import { type BudgetProblem, planBudget } from '../../src/search/budget.js';
import { judgePoint } from '../../src/search/judge.js';
import { settingOf } from '../../src/search/setting.js';
import type { StudySeries } from '../../src/study/study.js';
import { inventedSeries, liverProblem, problemOf } from '../scenarios-search/problems.js';

/** A plan of some invented series, with no overhead unless it is given. */
function budgetOf(series: readonly StudySeries[], minutes: number, more: Partial<BudgetProblem> = {}): BudgetProblem {
  return {
    study: {
      format: 'holdfast preset',
      version: 1,
      id: 'invented',
      title: 'Invented',
      region: 'liver',
      fieldT: 3,
      status: 'draft',
      revision: 1,
      notes: '',
      minimumSet: [],
      series,
    },
    scanner: plainScanner(3),
    body: unknownBody,
    rules: new Map(),
    minutes,
    longestS: null,
    overheadS: 0,
    done: [],
    bands: usualBands,
    readings: {},
    ...more,
  };
}

const diffusion: GivenParameters = {
  repetitionTimeMs: 6000,
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
};
const dwi = inventedSeries('echo-planar-spin-echo/2D', diffusion, {});

/** 30 slices in breath-holds, two echoes: a split is one more hold, and its rest counts. Few values, so that every way can be gone through. */
const held = inventedSeries(
  'spoiled-gradient-echo/2D',
  {
    repetitionTimeMs: 170,
    echoTimeMs: 2.3,
    flipAngleDeg: 70,
    sliceCount: 20,
    sliceThicknessMm: 6,
    sliceGapMm: 1,
    fieldOfViewMm: 380,
    matrixRead: 256,
    matrixPhase: 180,
    pixelBandwidthHz: 500,
    parallelFactorPhase: 2,
    pacing: { kind: 'breath-hold' },
  },
  {
    ranges: { matrixPhase: [144, 160, 180], sliceThicknessMm: [6, 8], rounds: [1, 2, 3], repetitionTimeMs: [155, 170] },
    locked: ['phaseOversamplingPercent', 'phaseFieldOfViewPercent'],
  },
);

/** Every way of a series, by going through the whole lattice: seconds with rests, longest hold, quality, changes. */
function everyWay(series: StudySeries): { timeS: number; holdS: number; value: number; changes: number }[] {
  const setting = settingOf(problemOf(series, 3, {}));
  let points: number[][] = [[]];
  for (const { values } of setting.variables) points = points.flatMap((point) => values.map((_, i) => [...point, i]));
  return points.flatMap((point) => {
    const { isWay, figures, candidate } = judgePoint(setting, point);
    if (!isWay) return [];
    return [
      {
        timeS: (figures.tableTimeS as number) - 20,
        holdS: figures.holdTimeS as number,
        value: candidate.changes === 0 ? 1 : Math.exp(-Math.sqrt(candidate.loss)),
        changes: candidate.changes,
      },
    ];
  });
}

describe('planBudget of one held series', () => {
  const ways = everyWay(held);

  it.each([36, 38.5, 40, 42, 44, 60, 80, 90, 120])('into %d s it keeps what going through every way keeps', (limitS) => {
    for (const holdS of [null, 14, 12, 9]) {
      const within = ways.filter(({ timeS, holdS: own }) => timeS <= limitS && (holdS === null || own <= holdS));
      const best = Math.max(0, ...within.map(({ value }) => value));
      const [planned] = planBudget(budgetOf([held], limitS / 60, { holdS })).plan;
      const kept = planned?.choice === 'skipped' ? 0 : Math.exp(-Math.sqrt(planned?.loss ?? 0));
      expect(kept, `hold ${holdS}`).toBeCloseTo(best, 9);
      if (planned === undefined || planned.choice === 'skipped') continue;
      expect(planned.timeS).toBeLessThanOrEqual(limitS + 1e-9);
      // Among equals none with fewer changes is left aside: slices that follow thickness are no change of their own.
      const equals = within.filter(({ value, timeS }) => Math.abs(value - best) < 1e-9 && timeS <= planned.timeS + 1e-9);
      const changes = Object.keys(planned.changes).filter((key) => key !== 'sliceCount').length;
      expect(changes, `hold ${holdS}`).toBe(Math.min(...equals.map((way) => way.changes)));
    }
  });

  it('is never longer than this patient holds, though the minutes would allow it', () => {
    const { series } = liverProblem({});
    const [asItIs] = planBudget(budgetOf([series], 30)).plan;
    expect(asItIs?.choice).toBe('as it is');
    const [planned] = planBudget(budgetOf([series], 30, { holdS: 11 })).plan;
    expect(planned?.choice).toBe('shortened');
    const setting = settingOf(problemOf(series, 3, {}, { set: planned?.given ?? {} }));
    expect(judgePoint(setting, []).figures.holdTimeS).toBeLessThanOrEqual(11);
    expect(planBudget(budgetOf([series], 30, { holdS: 1 })).plan[0]?.choice).toBe('skipped');
  });

  it('counts the pauses of this site: preparation once, by the overhead, and its rests', () => {
    const scanner = { ...plainScanner(3), pauses: { preparationS: 35, restS: 50 } };
    const [usual] = planBudget(budgetOf([held], 30)).plan;
    const [slow] = planBudget(budgetOf([held], 30, { scanner })).plan;
    // One hold: 10 s of instruction, and 50 s of rest in the place of 20 s.
    expect((slow?.timeS ?? 0) - (usual?.timeS ?? 0)).toBeCloseTo(30, 9);
  });
});

describe('planBudget and what the balanced loss does not weigh', () => {
  /** Shots of 6 s: the repetition time alone shortens it. Without a bound giving up acceleration would pay for the signal, and distort twice as much. */
  const asItIs = planBudget(budgetOf([dwi], 30)).plan[0]?.timeS ?? 0;

  it.each([0.98, 0.95, 0.92, 0.9])('into %d of its time distortion grows by a quarter at most', (share) => {
    const [planned] = planBudget(budgetOf([dwi], (asItIs * share) / 60)).plan;
    expect(planned?.choice).toBe('shortened');
    const grown = planned?.gives.find(({ figure }) => figure === 'distortionPxPer100Hz')?.ratio ?? 1;
    expect(grown).toBeLessThanOrEqual(1.25);
    expect(planned?.changes['parallelFactorPhase']).not.toEqual({ from: 2, to: 1 });
  });

  it('a band that was asked for stands in the place of the bound', () => {
    const bands = { ...usualBands, distortionPxPer100Hz: 1.05 };
    const [planned] = planBudget(budgetOf([dwi], (asItIs * 0.95) / 60, { bands })).plan;
    expect(planned?.gives.find(({ figure }) => figure === 'distortionPxPer100Hz')?.ratio ?? 1).toBeLessThanOrEqual(1.05);
  });
});

describe('planBudget of an order that fits as it is', () => {
  it('changes nothing, too close or not, with a minimum set or without', () => {
    const totalS = planBudget(budgetOf([dwi, held], 30)).totalS;
    for (const spareS of [0, 5, 19, 21]) {
      const { plan, verdict } = planBudget(budgetOf([{ ...dwi, id: 'dwi' }, held], (totalS + spareS) / 60));
      expect(plan.map(({ choice }) => choice)).toEqual(['as it is', 'as it is']);
      expect(verdict.word).toBe(spareS < 20 ? 'TOO CLOSE' : 'FITS');
    }
  });
});

describe('a plan that changes more than three settings of a series', () => {
  it('lists them all: the preset with the listed values is what was planned', () => {
    const { series } = liverProblem({});
    let seen = 0;
    for (const minutes of [0.75, 0.7, 0.65, 0.62]) {
      const [planned] = planBudget(budgetOf([series], minutes)).plan;
      if (planned?.choice !== 'shortened') continue;
      seen = Math.max(seen, Object.keys(planned.changes).filter((key) => key !== 'sliceCount').length);
      const listed = Object.fromEntries(Object.entries(planned.changes).map(([key, { to }]) => [key, to])) as GivenParameters;
      const { figures } = judgePoint(settingOf(problemOf(series, 3, {}, { set: listed })), []);
      expect((figures.tableTimeS as number) - 20).toBeCloseTo(planned.timeS, 9);
    }
    expect(seen).toBeGreaterThan(3);
  });
});
