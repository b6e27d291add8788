import type { Body } from '../../src/calc/body.js';
import { type Acquisition, type ClassKey, classKeys, classRow, type Family } from '../../src/calc/classes.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../../src/calc/parameters.js';
import { plainScanner, type Scanner } from '../../src/calc/scanner.js';
import { fillDefaults, type GivenParameters, pacingKinds, type Series, type TissueOverride } from '../../src/calc/series.js';
import { tissueNames } from '../../src/calc/tissues.js';

/** Evenly drawn numbers from 0 to 1. */
export type Draw = () => number;

/** A small generator of random numbers, so that a case can be drawn again from its number (mulberry32, public domain). */
export function drawFrom(seed: number): Draw {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

const pick = <T>(draw: Draw, from: readonly T[]): T => from[Math.floor(draw() * from.length)] as T;
const chance = (draw: Draw, share: number) => draw() < share;
const between = (draw: Draw, low: number, high: number) => low + draw() * (high - low);

/** A value anywhere in a range, by orders of magnitude, at either end now and then. */
function valueIn(draw: Draw, min: number, max: number, whole: boolean, aboveMin: boolean): number {
  const lowest = min + (aboveMin ? (max - min) * 1e-6 : 0);
  if (chance(draw, 0.03)) return chance(draw, 0.5) ? lowest : max;
  const from = Math.max(lowest, max * 1e-5);
  const value = chance(draw, 0.5) ? between(draw, lowest, max) : Math.exp(between(draw, Math.log(from), Math.log(max)));
  return Math.min(max, Math.max(lowest, whole ? Math.round(value) : value));
}

/** Ranges a scanner would really be asked for: most series are drawn from these, so that most can be played. */
const usual: Readonly<Partial<Record<ParameterKey, readonly [number, number]>>> = {
  fieldOfViewMm: [80, 500],
  phaseFieldOfViewPercent: [40, 100],
  phaseOversamplingPercent: [0, 100],
  matrixRead: [64, 512],
  matrixPhase: [32, 400],
  sliceCount: [1, 60],
  sliceThicknessMm: [0.8, 10],
  sliceGapMm: [0, 3],
  sliceOversamplingPercent: [0, 40],
  slabs: [1, 3],
  rounds: [1, 4],
  averages: [0.5, 4],
  volumes: [1, 20],
  dummyShots: [0, 4],
  parallelFactorPhase: [1, 4],
  parallelFactorSlice: [1, 3],
  referenceLines: [0, 48],
  simultaneousSlices: [1, 3],
  repetitionTimeMs: [3, 9000],
  echoTimeMs: [1, 120],
  secondEchoTimeMs: [2, 120],
  inversionTimeMs: [80, 2800],
  echoTrainLength: [1, 40],
  echoSpacingMs: [0.5, 15],
  pixelBandwidthHz: [60, 2500],
  linesPerBeat: [1, 40],
  flipAngleDeg: [3, 120],
  refocusingAngleDeg: [60, 180],
  fatSuppressionEveryLines: [1, 80],
  saturationBands: [0, 3],
  rfPulseStretch: [0.5, 3],
  roundsPerHold: [1, 10],
};

/** How wild the values may be, and the longest train that may be drawn. */
export interface Wildness {
  readonly extremeShare: number;
  readonly longestTrain: number;
}

function drawObject(draw: Draw, key: ParameterKey): GivenParameters[ParameterKey] {
  if (key === 'diffusion') {
    if (chance(draw, 0.5)) return undefined;
    const count = 1 + Math.floor(draw() * 4);
    return {
      bValuesSPerMm2: Array.from({ length: count }, () => (chance(draw, 0.2) ? 0 : Math.round(draw() * 3000))),
      directions: 1 + Math.floor(draw() * 64),
      averages: Array.from({ length: count }, () => 1 + Math.floor(draw() * 10)),
    };
  }
  const kind = pick(draw, pacingKinds);
  return {
    kind,
    ...(chance(draw, 0.5) ? { periodMs: between(draw, 300, 8000) } : {}),
    ...(chance(draw, 0.3) ? { windowMs: between(draw, 50, 4000) } : {}),
    ...(chance(draw, 0.5) ? { breathHold: chance(draw, 0.5) } : {}),
  };
}

/** Any value the schema allows for a parameter. */
function drawValue(draw: Draw, key: ParameterKey, wild: Wildness): GivenParameters[ParameterKey] {
  const row = parameterRow(key);
  if (row.kind === 'flag') return chance(draw, 0.5);
  if (row.kind === 'choice') return pick(draw, row.choices) as never;
  if (row.kind === 'object') return drawObject(draw, key);
  const [low, high] = chance(draw, wild.extremeShare) ? [row.min, row.max] : (usual[key] ?? [row.min, row.max]);
  const value = valueIn(draw, low, high, row.whole === true, row.aboveMin === true);
  return key === 'echoTrainLength' ? Math.min(value, wild.longestTrain) : value;
}

/** Parameters that must be given, or that only sometimes are. */
function drawGiven(draw: Draw, key: ClassKey, wild: Wildness): GivenParameters {
  const given: Record<string, unknown> = {};
  const row = classRow(key);
  for (const name of parameterKeys) {
    const own = row.parameters.includes(name);
    const parameter = parameterRow(name);
    const required =
      (parameter.kind === 'number' && parameter.otherwise === 'required') ||
      (name === 'flipAngleDeg' && row.otherwise.flipAngleDeg === 'required') ||
      (name === 'inversionTimeMs' && key === 'inversion-prepared-gradient-echo/3D');
    if (!required && !chance(draw, own ? 0.45 : 0.01)) continue;
    const value = drawValue(draw, name, wild);
    if (value !== undefined) given[name] = value;
  }
  return given as GivenParameters;
}

/** Relaxation times of a tissue nobody measured; T2 never exceeds T1. */
function drawRelaxation(draw: Draw): TissueOverride {
  const t1Ms = Math.exp(between(draw, 3, 9));
  return { t1Ms, t2Ms: t1Ms * between(draw, 0.01, 1) };
}

/** A series drawn from the whole schema. */
export function drawSeries(draw: Draw, wild: Wildness): Series {
  const key = pick(draw, classKeys);
  const row = classRow(key);
  const filled = fillDefaults(key, drawGiven(draw, key, wild));
  const parameters = { ...filled, echoTrainLength: Math.min(filled.echoTrainLength, wild.longestTrain) };
  const name = () => (chance(draw, 0.02) ? 'a tissue nobody knows' : pick(draw, tissueNames));
  const target = name();
  return {
    family: row.family as Family,
    acquisition: row.acquisition as Acquisition,
    plane: pick(draw, ['axial', 'sagittal', 'coronal', 'sagittal oblique', 'short axis']),
    purpose: pick(draw, [null, 'dynamic', 'anatomy']),
    target,
    comparison: name(),
    contrastAgent: chance(draw, 0.3),
    nullTissue: chance(draw, 0.2) ? name() : null,
    tissueOverrides: chance(draw, 0.1) ? { [target]: drawRelaxation(draw) } : {},
    parameters,
  };
}

/** One to four values of a class to set, as a person or a search would. */
export function drawEdit(draw: Draw, key: ClassKey, wild: Wildness): GivenParameters {
  const set: Record<string, unknown> = {};
  for (let i = Math.floor(draw() * 5); i > 0; i -= 1) {
    const name = pick(draw, classRow(key).parameters);
    const value = drawValue(draw, name, wild);
    if (value !== undefined) set[name] = value;
  }
  return set as GivenParameters;
}

/** A body, of which nothing may be known. */
export function drawBody(draw: Draw): Body {
  const extent = () => (chance(draw, 0.4) ? null : between(draw, 100, 600));
  return { frontBackMm: extent(), leftRightMm: extent() };
}

/** A scanner from 0.2 to 7 T, weak or strong. */
export function drawScanner(draw: Draw): Scanner {
  const fieldT = chance(draw, 0.6) ? pick(draw, [0.2, 0.55, 1, 1.5, 2.89, 3, 7]) : between(draw, 0.2, 7);
  return {
    ...plainScanner(fieldT),
    gradientMtPerM: between(draw, 10, 80),
    slewTPerMPerS: between(draw, 20, 200),
    visibleLengthMm: between(draw, 300, 600),
    maximumB1Ut: between(draw, 3, 30),
    simultaneousSliceG: chance(draw, 0.5) ? { 2: 1.1 } : {},
    pulses: chance(draw, 0.2)
      ? { refocusing: { durationMs: between(draw, 0.5, 8) }, excitation: { durationMs: 2, timeBandwidth: pick(draw, [1, 2.5, 8]) } }
      : {},
  };
}
