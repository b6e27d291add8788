import fc from 'fast-check';
import type { Figures } from '../../src/calc/figures.js';
import { figureKeys } from '../../src/calc/figures.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { noRecordedLimits, type RecordedSeries, type SessionRecord } from '../../src/study/record.js';
import { reasonCodes } from '../../src/study/record-reasons.js';
import { holdStates, outcomeWords, qualityWords, recommendationWords } from '../../src/study/record-words.js';

/** Invented values: a dynamic liver series rewritten for a shorter breath-hold. */
export const inventedSeries: RecordedSeries = {
  id: 't1-3d',
  outcome: 'done',
  reason: 'breath-hold-short',
  quality: 'diagnostic',
  planned: {
    parameters: { repetitionTimeMs: 3.55, echoTimeMs: 1.2, flipAngleDeg: 10, sliceCount: 72, matrixPhase: 256, averages: 1 },
    figures: { scanTimeS: 17, holdTimeS: 17, voxelSliceMm: 3, relativeSnr: 1, b1PlusRmsUt: 1.4, nullTimeMs: null },
  },
  used: {
    parameters: { repetitionTimeMs: 3.55, echoTimeMs: 1.2, flipAngleDeg: 10, sliceCount: 54, matrixPhase: 224, averages: 1 },
    figures: { scanTimeS: 10.8, holdTimeS: 10.8, voxelSliceMm: 3, relativeSnr: 0.87, b1PlusRmsUt: 1.4, nullTimeMs: null },
  },
  crossed: [{ rule: 'coverage at least 200 mm', role: 'radiologist' }],
  readings: { before: { timeS: 17.2, sarWkg: 0.9 }, after: { timeS: 11, sarWkg: 0.9, operatingMode: 'normal' } },
};

/** An invented record of one session. */
export const inventedRecord: SessionRecord = {
  format: 'holdfast record',
  version: 1,
  id: '8f3c0a5b9d21e764',
  tool: '0.1.0',
  model: '1',
  day: '2026-03-02',
  preset: { id: 'liver-3t', revision: 1, hash: 'c0ffee'.repeat(10) },
  region: 'liver',
  fieldT: 3,
  scanner: 'blue room',
  coil: 'front and back',
  role: 'technologist',
  initials: 'ab',
  reasons: ['breath-hold-short'],
  limits: { ...noRecordedLimits, holdS: 11, holdState: 'expiration', minutesLeft: 20 },
  series: [inventedSeries],
  recommendation: 'make-this-a-variant',
};

const anyText = fc.string({ unit: 'binary', maxLength: 120 });
const textOrNull = fc.option(anyText, { nil: null });
const anyNumber = fc.double();
const numberOrNull = fc.option(anyNumber, { nil: null });
const keyOf = <T extends object>(words: T) => fc.constantFrom(...(Object.keys(words) as (keyof T)[]));

const anyFigures = fc.dictionary(fc.constantFrom(...figureKeys), numberOrNull, { noNullPrototype: true }) as fc.Arbitrary<Partial<Figures>>;
const anyParameters = fc.record(
  {
    repetitionTimeMs: anyNumber,
    sliceCount: fc.nat(),
    ellipticalSampling: fc.boolean(),
    phaseDirection: fc.constantFrom('AP', 'RL', 'HF'),
    inversionTimeMs: fc.constant(undefined),
    pacing: fc.record({ kind: fc.constant('breath-hold'), periodMs: anyNumber }),
    diffusion: fc.record({ bValuesSPerMm2: fc.array(anyNumber), directions: fc.nat(), averages: fc.array(anyNumber) }),
  },
  { requiredKeys: [], noNullPrototype: true },
) as fc.Arbitrary<GivenParameters>;
const anyValues = fc.record({ parameters: anyParameters, figures: anyFigures });
const anyReading = fc.option(
  fc.record(
    {
      timeS: anyNumber,
      b1rmsUt: anyNumber,
      sarWkg: anyNumber,
      operatingMode: anyText,
      changedByScanner: anyText,
      notModelled: fc.array(anyText, { maxLength: 2 }),
      conditions: fc.record({ coil: textOrNull, fieldT: anyNumber, frontBackMm: numberOrNull, leftRightMm: numberOrNull }),
    },
    { requiredKeys: [], noNullPrototype: true },
  ),
  { nil: null },
);

const anyCompared = fc.record({ predicted: anyNumber, read: anyNumber, ratio: anyNumber });
const sparse = { requiredKeys: [], noNullPrototype: true };

/** Any record the types allow, with any text and any number in it. */
export const anyRecord: fc.Arbitrary<SessionRecord> = fc.record({
  format: fc.constant('holdfast record' as const),
  version: fc.constant(1 as const),
  id: anyText,
  tool: anyText,
  model: anyText,
  day: fc.constantFrom('2026-03-02', '2024-02-29', null),
  preset: fc.record({ id: anyText, revision: fc.nat(), hash: anyText }),
  region: anyText,
  fieldT: anyNumber,
  scanner: anyText,
  coil: textOrNull,
  role: anyText,
  initials: textOrNull,
  reasons: fc.array(fc.oneof(fc.constantFrom(...reasonCodes), anyText), { maxLength: 3 }),
  limits: fc.record({
    holdS: numberOrNull,
    holdsAvailable: numberOrNull,
    holdState: fc.constantFrom(...holdStates, null),
    minutesLeft: numberOrNull,
    longestSeriesS: numberOrNull,
    b1rmsCapUt: numberOrNull,
    b1rmsReadFrom: textOrNull,
    sarCapWkg: numberOrNull,
    sarReadFrom: textOrNull,
    labelConditions: fc.array(anyText, { maxLength: 3 }),
    frontBackMm: numberOrNull,
    leftRightMm: numberOrNull,
    contrastGiven: fc.option(fc.boolean(), { nil: null }),
  }),
  series: fc.array(
    fc.record({
      id: anyText,
      class: anyText,
      outcome: keyOf(outcomeWords),
      reason: anyText,
      quality: fc.option(keyOf(qualityWords), { nil: null }),
      planned: anyValues,
      used: anyValues,
      crossed: fc.array(fc.record({ rule: anyText, role: textOrNull }), { maxLength: 2 }),
      readings: fc.record(
        {
          before: anyReading,
          after: anyReading,
          compared: fc.record({
            before: fc.record({ timeS: anyCompared, b1rmsUt: anyCompared }, sparse),
            after: fc.record({ timeS: anyCompared, b1rmsUt: anyCompared, sarWkg: anyCompared }, sparse),
          }),
        },
        { requiredKeys: ['before', 'after'], noNullPrototype: true },
      ),
    }),
    { maxLength: 3 },
  ),
  recommendation: fc.option(keyOf(recommendationWords), { nil: null }),
});
