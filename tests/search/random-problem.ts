import { baselineOf } from '../../src/calc/baseline.js';
import { type ClassKey, classRow } from '../../src/calc/classes.js';
import type { ParameterKey } from '../../src/calc/parameters.js';
import { plainScanner, type Scanner } from '../../src/calc/scanner.js';
import { fillDefaults, type GivenParameters, type Pacing } from '../../src/calc/series.js';
import { tissuesWithValueAt } from '../../src/calc/tissues.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { type Bands, usualBands } from '../../src/search/bands.js';
import { latticeOf, latticeSize } from '../../src/search/lattice.js';
import type { Limits } from '../../src/search/limits.js';
import type { SearchProblem } from '../../src/search/problem-to-solve.js';
import { readRules } from '../../src/study/read-rules.js';
import type { MustKeep, Range, StudySeries } from '../../src/study/study.js';
import type { Random } from './random.js';

const parse = await loadParser();

const invented = 'invented for a test';

/** Repetition, echo and train of each class, in plausible stretches. */
function timing(key: ClassKey, random: Random): GivenParameters {
  const row = classRow(key);
  const volume = row.acquisition === '3D';
  switch (row.family) {
    case 'spin-echo':
      return { repetitionTimeMs: volume ? random.whole(40, 80) : random.whole(30, 70) * 10, echoTimeMs: random.whole(12, 20) };
    case 'fast-spin-echo': {
      const echoTrainLength = volume ? random.whole(20, 60) : random.whole(4, 16);
      const echoSpacingMs = volume ? random.between(4, 6) : random.between(9, 13);
      return {
        repetitionTimeMs: random.whole(14, 40) * 100,
        echoTrainLength,
        echoSpacingMs: Math.round(echoSpacingMs * 10) / 10,
        echoTimeMs: Math.round(echoSpacingMs * random.whole(1, echoTrainLength)),
        refocusingAngleDeg: random.pick([120, 140, 150, 180]),
        dummyShots: random.whole(0, 2),
      };
    }
    case 'single-shot-fast-spin-echo':
      return {
        repetitionTimeMs: random.whole(9, 15) * 100,
        echoTimeMs: random.whole(60, 110),
        echoSpacingMs: random.pick([4.4, 5, 5.6]),
        refocusingAngleDeg: random.pick([120, 150, 180]),
      };
    case 'rotating-strip-fast-spin-echo':
      return {
        repetitionTimeMs: random.whole(30, 50) * 100,
        echoTimeMs: random.whole(60, 110),
        echoTrainLength: random.whole(12, 26),
        echoSpacingMs: random.pick([5, 6]),
      };
    case 'spoiled-gradient-echo':
      return volume
        ? { repetitionTimeMs: random.between(3.8, 9), echoTimeMs: random.between(1.3, 2.5), flipAngleDeg: random.whole(8, 20) }
        : { repetitionTimeMs: random.whole(12, 25) * 10, echoTimeMs: random.between(2.5, 5), flipAngleDeg: random.whole(40, 80) };
    case 'balanced-steady-state':
      return { repetitionTimeMs: random.between(3.6, 5), echoTimeMs: random.between(1.6, 2.2), flipAngleDeg: random.whole(40, 60) };
    case 'inversion-prepared-gradient-echo':
      return {
        repetitionTimeMs: random.whole(19, 25) * 100,
        inversionTimeMs: random.whole(85, 105) * 10,
        echoTimeMs: random.between(2.5, 3.5),
        flipAngleDeg: random.whole(7, 12),
        echoSpacingMs: random.between(6, 7.5),
      };
    default:
      return {
        repetitionTimeMs: random.whole(30, 60) * 100,
        echoTimeMs: random.whole(60, 95),
        echoSpacingMs: random.pick([0.5, 0.6, 0.7]),
      };
  }
}

function pacing(key: ClassKey, random: Random): Pacing {
  const row = classRow(key);
  if (random.chance(0.4)) return { kind: 'breath-hold' };
  if (row.train && random.chance(0.2)) return { kind: 'respiratory-trigger', periodMs: random.whole(35, 45) * 100 };
  return { kind: 'none' };
}

/** Values near the preset's own for every parameter that a random search may open. */
function candidates(key: ClassKey, p: GivenParameters, random: Random): [ParameterKey, readonly (number | boolean)[]][] {
  const row = classRow(key);
  const volume = row.acquisition === '3D';
  const around = (own: number, step: number, whole = false) =>
    [-3, -2, -1, 1, 2, 3].map((i) => own + i * step).map((value) => (whole ? Math.round(value) : Math.round(value * 1e4) / 1e4));
  const matrix = p.matrixPhase as number;
  const thickness = p.sliceThicknessMm as number;
  const all: [ParameterKey, readonly (number | boolean)[]][] = [
    ['matrixPhase', around(matrix, volume ? 8 : 16, true)],
    ['phaseFieldOfViewPercent', [70, 75, 80, 85, 90, 95, 100]],
    ['phaseOversamplingPercent', [0, 10, 20, 30, 40, 50]],
    ['sliceThicknessMm', around(thickness, thickness < 2 ? 0.1 : 0.5).filter((mm) => mm > 0.3)],
    ['averages', [1, 1.5, 2, 3]],
    ['parallelFactorPhase', [1, 1.5, 2, 3, 4]],
    ['partialFourierPhase', [0.625, 0.75, 0.875, 1]],
    ['fieldOfViewMm', around(p.fieldOfViewMm as number, 10, true)],
    ['repetitionTimeMs', around(p.repetitionTimeMs as number, (p.repetitionTimeMs as number) * 0.05)],
    ['saturationBands', [0, 1, 2]],
    ['rfPulseStretch', [1, 1.25, 1.5, 2]],
    ['pixelBandwidthHz', around(p.pixelBandwidthHz as number, Math.round((p.pixelBandwidthHz as number) * 0.1), true)],
    ['matrixRead', around(p.matrixRead as number, 16, true)],
    ['flipAngleDeg', around((p.flipAngleDeg as number | undefined) ?? 90, 2).filter((angle) => angle > 1 && angle <= 180)],
    ['sliceCount', around(p.sliceCount as number, volume ? 2 : 1, true)],
    ['referenceLines', [0, 8, 16, 24]],
    ['dummyShots', [0, 1, 2]],
    ['echoTimeMs', around(p.echoTimeMs as number, (p.echoTimeMs as number) * 0.06)],
  ];
  if (row.train || row.family === 'spin-echo') all.push(['refocusingAngleDeg', [90, 110, 120, 130, 140, 150, 160, 180]]);
  if (row.train && row.otherwise.echoTrainLength !== 'lines')
    all.push(['echoTrainLength', around(p.echoTrainLength as number, 1, true).filter((n) => n > 0)]);
  if (volume)
    all.push(
      ['parallelFactorSlice', [1, 2]],
      ['partialFourierSlice', [0.625, 0.75, 0.875, 1]],
      ['sliceOversamplingPercent', [0, 10, 20]],
      ['ellipticalSampling', [false, true]],
    );
  else all.push(['rounds', [1, 2, 3]], ['sliceGapMm', [0, 0.5, 1]]);
  const own = p as Readonly<Record<string, unknown>>;
  return random.shuffled(
    all
      .filter(([name]) => (row.parameters as readonly string[]).includes(name))
      .map(([name, values]): [ParameterKey, readonly (number | boolean)[]] => [
        name,
        values.filter((value) => value !== own[name] && (typeof value === 'boolean' || value >= 0)),
      ]),
  );
}

function mustKeeps(random: Random, series: StudySeries): MustKeep[] {
  const p = series.parameters;
  const some: MustKeep[] = [
    { figure: 'voxelSliceMm', atMost: p.sliceThicknessMm * random.between(1.1, 1.6), source: invented },
    {
      rule: `voxelReadMm * voxelPhaseMm <= ${((p.fieldOfViewMm ** 2 / (p.matrixRead * p.matrixPhase)) * random.between(1.05, 1.3)).toFixed(4)}`,
      source: invented,
    },
    { parameter: 'echoTimeMs', atMost: p.echoTimeMs * random.between(0.98, 1.2), source: invented },
    { rule: 'scanTimeS / volumes <= 300', source: invented },
    { figure: 'relativeSnr', atLeast: random.between(0.6, 0.9), when: 'averages < 2', source: invented },
    { figure: 'b1PlusRmsUt', atMost: 8, source: invented },
    { rule: 'linesPhase >= 40 or averages >= 2', source: invented },
  ];
  return random.shuffled(some).slice(0, random.pick([0, 0, 1, 1, 2]));
}

function limitsFor(series: StudySeries, fieldT: number, scanner: Scanner, random: Random): Limits {
  const { time } = baselineOf(series, scanner).model;
  const limits: { -readonly [K in keyof Limits]: Limits[K] } = {};
  if (time.holdTimeS !== null && random.chance(0.7)) limits.holdS = time.holdTimeS * random.between(0.4, 1.1);
  if (random.chance(time.holdTimeS === null ? 0.7 : 0.3)) limits.timeS = time.scanTimeS * random.between(0.4, 1.1);
  if (random.chance(0.4)) limits.rfRatio = random.between(0.5, 1.1);
  void fieldT;
  return limits;
}

/** A random search of a class: invented series, ranges of at least five parameters, limits, bands and must-keeps. */
export function randomProblem(key: ClassKey, random: Random, wantedSize: number): SearchProblem {
  const row = classRow(key);
  const volume = row.acquisition === '3D';
  const fieldT = random.pick([1.5, 3]);
  const planar = row.family.startsWith('echo-planar');
  const given: GivenParameters = {
    ...timing(key, random),
    fieldOfViewMm: random.whole(18, 40) * 10,
    phaseFieldOfViewPercent: row.family.startsWith('rotating') ? 100 : random.pick([75, 80, 100]),
    matrixRead: planar ? 128 : random.whole(12, 24) * 16,
    matrixPhase: planar ? random.pick([96, 112, 128]) : random.whole(10, 20) * 16,
    phaseDirection: random.pick(['AP', 'RL', 'HF']),
    sliceCount: volume ? random.whole(16, 48) * 2 : random.whole(8, 24),
    sliceThicknessMm: volume ? random.pick([1, 1.5, 3]) : random.pick([3, 4, 5]),
    sliceGapMm: volume ? 0 : random.pick([0, 0.4, 1]),
    pixelBandwidthHz: planar ? random.whole(12, 20) * 100 : random.whole(15, 60) * 10,
    averages: planar ? 1 : random.pick([1, 1, 2, 1.5]),
    rounds: !volume && row.interleaving === 'interleaved' ? random.pick([1, 1, 2]) : 1,
    fatSuppression: random.pick(['none', 'spectral']),
    pacing: pacing(key, random),
    ...(row.family.startsWith('rotating') || planar ? {} : { parallelFactorPhase: random.pick([1, 2]) }),
    ...(planar ? { parallelFactorPhase: 2 } : {}),
    ...(key === 'echo-planar-spin-echo/2D' && random.chance(0.6)
      ? { diffusion: { bValuesSPerMm2: [0, 800], directions: 3, averages: [1, 2] } }
      : {}),
    ...(planar ? { flipAngleDeg: 90 } : {}),
    ...(key === 'fast-spin-echo/2D' && random.chance(0.25) ? { inversionTimeMs: 160, fatSuppression: 'inversion' as const } : {}),
  };
  const tissues = tissuesWithValueAt(fieldT);
  const [target, comparison] = random.shuffled(tissues) as [string, string];
  const parameters = fillDefaults(key, given);
  const open = candidates(key, parameters, random);
  const base: StudySeries = {
    id: 'random',
    title: 'Random',
    priority: 1,
    mustKeep: [],
    pairedWith: [],
    locked: [],
    opened: [],
    ranges: {},
    family: row.family as StudySeries['family'],
    acquisition: row.acquisition,
    plane: random.pick(['axial', 'sagittal', 'oblique']),
    purpose: random.chance(0.2) ? 'dynamic' : null,
    target,
    comparison,
    contrastAgent: random.chance(0.2),
    nullTissue: null,
    tissueOverrides: {},
    parameters,
  };
  const scanner = plainScanner(fieldT);
  const body = {
    frontBackMm: random.chance(0.4) ? random.whole(20, 30) * 10 : null,
    leftRightMm: random.chance(0.4) ? random.whole(30, 44) * 10 : null,
  };
  const limits = limitsFor(base, fieldT, scanner, random);
  const bands: Bands = random.chance(0.3)
    ? { ...usualBands, relativeSnr: 0.5, ...(random.chance(0.5) ? { scanTimeS: 1.5 } : { coverageMm: 0.9 }) }
    : usualBands;
  const mustKeep = mustKeeps(random, base);
  const rules = readRules(mustKeep, parse);
  // Ranges grow round by round until the lattice is about as large as wanted: five parameters at least.
  const ranges: Record<string, Range> = {};
  const chosen = open.slice(0, Math.max(5, Math.min(open.length, random.whole(5, 8))));
  const problemWith = (): SearchProblem => {
    const names = Object.keys(ranges) as ParameterKey[];
    // What is not chosen stays: the default steps of the class do not come in.
    const locked = (row.parameters as readonly ParameterKey[]).filter((name) => !names.includes(name));
    const series: StudySeries = {
      ...base,
      mustKeep,
      ranges: { ...ranges },
      locked: names.includes('sliceThicknessMm') ? locked.filter((name) => name !== 'sliceCount') : locked,
      opened: names,
    };
    return { series, presetFieldT: fieldT, scanner, body, rules, limits, bands, readings: {}, set: {}, opened: [], frozen: false };
  };
  for (let values = 1; values <= 8; values += 1) {
    for (const [name, list] of chosen) {
      const before = ranges[name];
      ranges[name] = random.shuffled(list as readonly number[]).slice(0, values);
      if (values > 1 && latticeSize(latticeOf(problemWith())) > wantedSize) {
        if (before === undefined) delete ranges[name];
        else ranges[name] = before;
      }
    }
  }
  const problem = problemWith();
  return {
    ...problem,
    series: {
      ...problem.series,
      opened: problem.series.opened.filter((name) => name !== 'sliceCount' || chosen.some(([key2]) => key2 === 'sliceCount')),
    },
  };
}
