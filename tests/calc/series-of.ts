import { type Baseline, baselineOf } from '../../src/calc/baseline.js';
import { type Body, unknownBody } from '../../src/calc/body.js';
import type { CautionCode } from '../../src/calc/caution.js';
import { type Acquisition, type ClassKey, classRow, type Family } from '../../src/calc/classes.js';
import { type EvaluateOptions, type Evaluation, evaluate } from '../../src/calc/evaluate.js';
import { type Carried, resolveParameters } from '../../src/calc/resolve.js';
import { plainScanner, type Scanner } from '../../src/calc/scanner.js';
import { fillDefaults, type GivenParameters, type Parameters, type Series } from '../../src/calc/series.js';

/** Parameters every class must be given; invented, so that a test names only what it is about. */
const plainParameters = {
  repetitionTimeMs: 1000,
  echoTimeMs: 10,
  fieldOfViewMm: 256,
  matrixRead: 256,
  matrixPhase: 256,
  sliceCount: 1,
  sliceThicknessMm: 5,
  pixelBandwidthHz: 200,
} as const satisfies GivenParameters;

/** Parameters of a class with its defaults, over the invented ones. */
export function parametersOf(key: ClassKey, given: GivenParameters = {}): Parameters {
  const angle = classRow(key).otherwise.flipAngleDeg === 'required' ? { flipAngleDeg: 20 } : {};
  const inversion = key === 'inversion-prepared-gradient-echo/3D' ? { inversionTimeMs: 500 } : {};
  return fillDefaults(key, { ...plainParameters, ...angle, ...inversion, ...given });
}

/** An invented series of a class. */
export function seriesOf(key: ClassKey, given: GivenParameters = {}, besides: Partial<Series> = {}): Series {
  const row = classRow(key);
  return {
    family: row.family as Family,
    acquisition: row.acquisition as Acquisition,
    plane: 'axial',
    purpose: null,
    target: 'liver',
    comparison: 'spleen',
    contrastAgent: false,
    nullTissue: null,
    tissueOverrides: {},
    parameters: parametersOf(key, given),
    ...besides,
  };
}

export interface Edited extends Evaluation {
  readonly parameters: Parameters;
  readonly carried: readonly Carried[];
  readonly baseline: Baseline;
  /** Codes of the cautions, worst first. */
  readonly codes: readonly CautionCode[];
}

interface Circumstances extends EvaluateOptions {
  readonly body?: Body;
  /** Scanner of the preset; plain at this field unless given. */
  readonly fieldT?: number;
  readonly scanner?: Scanner;
  /** Scanner of the edit, when another. */
  readonly onto?: Scanner;
}

/** A series as its own baseline, then some values set: what follows by itself, and what comes out. */
export function edit(series: Series, set: GivenParameters = {}, circumstances: Circumstances = {}): Edited {
  const { body = unknownBody, fieldT = 1.5, scanner = plainScanner(fieldT), onto = scanner, ...options } = circumstances;
  const baseline = baselineOf(series, scanner);
  const { parameters, carried } = resolveParameters(baseline, set, onto);
  const evaluation = evaluate({ ...series, parameters }, onto, body, baseline, options);
  return { ...evaluation, parameters, carried, baseline, codes: evaluation.cautions.map((caution) => caution.code) };
}
