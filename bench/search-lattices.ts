import { unknownBody } from '../src/calc/body.js';
import { type ClassKey, classRow } from '../src/calc/classes.js';
import type { ParameterKey } from '../src/calc/parameters.js';
import { plainScanner } from '../src/calc/scanner.js';
import { fillDefaults, type GivenParameters } from '../src/calc/series.js';
import { usualBands } from '../src/search/bands.js';
import { latticeOf, latticeSize } from '../src/search/lattice.js';
import type { Limits } from '../src/search/limits.js';
import type { SearchProblem } from '../src/search/problem-to-solve.js';
import type { Range, StudySeries } from '../src/study/study.js';
import { liverArterialPhase, lumbarTrain } from '../tests/scenarios/invented-parameters.js';

/** An invented series with everything opened that a physicist might open, and the steps each parameter takes, finest first. */
interface Case {
  readonly name: string;
  readonly key: ClassKey;
  readonly fieldT: number;
  readonly target: string;
  readonly comparison: string;
  readonly given: GivenParameters;
  readonly limits: Limits;
  readonly steps: Readonly<Partial<Record<ParameterKey, readonly [number, number, number]>>>;
}

const cases: readonly Case[] = [
  {
    name: 'liver 3D',
    key: 'spoiled-gradient-echo/3D',
    fieldT: 3,
    target: 'liver',
    comparison: 'spleen',
    given: liverArterialPhase,
    limits: { holdS: 11 },
    steps: {
      phaseFieldOfViewPercent: [70, 100, 5],
      phaseOversamplingPercent: [0, 50, 10],
      matrixPhase: [152, 216, 8],
      sliceThicknessMm: [2.5, 5, 0.5],
      sliceOversamplingPercent: [0, 30, 10],
      averages: [1, 2, 1],
      parallelFactorPhase: [1, 3, 1],
      parallelFactorSlice: [1, 2, 1],
      partialFourierPhase: [0.625, 1, 0.125],
      partialFourierSlice: [0.625, 1, 0.125],
      sliceCount: [56, 76, 2],
      flipAngleDeg: [6, 18, 1],
      fieldOfViewMm: [360, 390, 10],
      repetitionTimeMs: [3.3, 4.1, 0.1],
    },
  },
  {
    name: 'lumbar 2D train',
    key: 'fast-spin-echo/2D',
    fieldT: 1.5,
    target: 'CSF',
    comparison: 'intervertebral disc (nucleus)',
    given: { ...lumbarTrain, saturationBands: 1 },
    limits: { timeS: 110, rfRatio: 0.6 },
    steps: {
      phaseOversamplingPercent: [0, 50, 10],
      phaseFieldOfViewPercent: [70, 100, 5],
      matrixPhase: [224, 352, 16],
      sliceThicknessMm: [3.5, 6.5, 0.5],
      averages: [1, 3, 1],
      parallelFactorPhase: [1, 3, 1],
      partialFourierPhase: [0.625, 1, 0.125],
      repetitionTimeMs: [3200, 5200, 100],
      echoTrainLength: [15, 25, 1],
      refocusingAngleDeg: [100, 180, 5],
      dummyShots: [0, 1, 1],
      fieldOfViewMm: [270, 290, 10],
      saturationBands: [0, 1, 1],
      rfPulseStretch: [1, 2, 0.5],
    },
  },
  {
    name: '3D train',
    key: 'fast-spin-echo/3D',
    fieldT: 3,
    target: 'white matter',
    comparison: 'grey matter (cortical)',
    given: {
      repetitionTimeMs: 2500,
      echoTimeMs: 100,
      echoTrainLength: 50,
      echoSpacingMs: 4,
      refocusingAngleDeg: 110,
      pixelBandwidthHz: 500,
      fieldOfViewMm: 240,
      matrixRead: 256,
      matrixPhase: 240,
      sliceCount: 160,
      sliceThicknessMm: 1,
      parallelFactorPhase: 2,
      parallelFactorSlice: 1,
    },
    limits: { timeS: 240, rfRatio: 0.9 },
    steps: {
      phaseFieldOfViewPercent: [75, 100, 5],
      phaseOversamplingPercent: [0, 30, 10],
      matrixPhase: [184, 256, 8],
      sliceThicknessMm: [0.8, 1.6, 0.1],
      sliceOversamplingPercent: [0, 20, 10],
      averages: [1, 2, 1],
      parallelFactorPhase: [1, 3, 1],
      parallelFactorSlice: [1, 2, 1],
      partialFourierPhase: [0.625, 1, 0.125],
      partialFourierSlice: [0.625, 1, 0.125],
      repetitionTimeMs: [2300, 3500, 100],
      echoTrainLength: [38, 62, 4],
      refocusingAngleDeg: [70, 110, 5],
      fieldOfViewMm: [230, 250, 10],
    },
  },
];

export type LatticeName = 'liver 3D' | 'lumbar 2D train' | '3D train';
export const latticeNames = cases.map(({ name }) => name) as readonly LatticeName[];

/** The search of a case whose lattice holds about so many ways: its largest lists of values are thinned until it does. */
export function latticeOfSize(name: LatticeName, wanted: number): { readonly problem: SearchProblem; readonly size: number } {
  const one = cases.find((each) => each.name === name) as Case;
  const row = classRow(one.key);
  const ranges: Record<string, Range> = {};
  for (const [key, [min, max, step]] of Object.entries(one.steps)) {
    ranges[key] = Array.from({ length: Math.floor((max - min) / step + 1e-9) + 1 }, (_, i) => Math.round((min + i * step) * 1e6) / 1e6);
  }
  const opened = Object.keys(ranges) as ParameterKey[];
  const problemOf = (): SearchProblem => {
    const series: StudySeries = {
      id: 'invented',
      title: name,
      priority: 1,
      mustKeep: [],
      ranges: { ...ranges },
      pairedWith: [],
      locked: [],
      opened,
      family: row.family as StudySeries['family'],
      acquisition: row.acquisition,
      plane: 'axial',
      purpose: null,
      target: one.target,
      comparison: one.comparison,
      contrastAgent: false,
      nullTissue: null,
      tissueOverrides: {},
      parameters: fillDefaults(one.key, one.given),
    };
    return {
      series,
      presetFieldT: one.fieldT,
      scanner: plainScanner(one.fieldT),
      body: unknownBody,
      rules: new Map(),
      limits: one.limits,
      readings: {},
      bands: usualBands,
      set: {},
      opened: [],
      frozen: false,
    };
  };
  for (;;) {
    const problem = problemOf();
    const size = latticeSize(latticeOf(problem));
    if (size <= wanted) return { problem, size };
    const longest = opened.reduce((a, b) => ((ranges[b] as number[]).length > (ranges[a] as number[]).length ? b : a));
    (ranges[longest] as number[]).pop();
  }
}
