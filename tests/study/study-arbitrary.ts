import fc from 'fast-check';
import { type ClassKey, classKeys, classRow } from '../../src/calc/classes.js';
import { figureKeys } from '../../src/calc/figures.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../../src/calc/parameters.js';
import { fillDefaults, type GivenParameters, pacingKinds } from '../../src/calc/series.js';
import { tissueNames } from '../../src/calc/tissues.js';
import { requiredParameters } from '../../src/study/required-keys.js';
import type { MustKeep, Release, Study, StudySeries } from '../../src/study/study.js';

const word = (longest: number) =>
  fc.stringMatching(
    new RegExp(
      `^[A-Za-z0-9"\\\\\\\\{}\\u00e9\\u4e2d][A-Za-z0-9 ,."\\\\\\\\{}\\u00e9\\u4e2d-]{0,${longest - 2}}[A-Za-z0-9"\\u00e9\\u4e2d]$`,
    ),
  );
const id = fc.stringMatching(/^[a-z0-9][a-z0-9.-]{0,12}$/);

function valueFor(key: ParameterKey): fc.Arbitrary<unknown> {
  const row = parameterRow(key);
  if (row.kind === 'flag') return fc.boolean();
  if (row.kind === 'choice') return fc.constantFrom(...row.choices);
  if (row.kind === 'number') {
    const value = row.whole
      ? fc.integer({ min: row.min, max: row.max })
      : fc.double({ min: row.min, max: row.max, noNaN: true, minExcluded: row.aboveMin === true });
    return value.map((number) => number + 0);
  }
  if (key === 'pacing') {
    return fc.record(
      {
        kind: fc.constantFrom(...pacingKinds),
        periodMs: fc.integer({ min: 2000, max: 6000 }),
        windowMs: fc.integer({ min: 1, max: 2000 }),
        breathHold: fc.boolean(),
      },
      { requiredKeys: ['kind'] },
    );
  }
  return fc
    .tuple(
      fc.uniqueArray(fc.integer({ min: 0, max: 3000 }), { minLength: 1, maxLength: 4 }),
      fc.integer({ min: 1, max: 64 }),
      fc.integer({ min: 1, max: 16 }),
    )
    .map(([bValuesSPerMm2, directions, average]) => ({ bValuesSPerMm2, directions, averages: bValuesSPerMm2.map((_, i) => average + i) }));
}

function givenFor(key: ClassKey): fc.Arbitrary<GivenParameters> {
  const model = Object.fromEntries(parameterKeys.map((name) => [name, valueFor(name)]));
  return fc.record(model, { requiredKeys: [...requiredParameters(key)] }).map((given) => {
    const { averages, ...rest } = given as Record<string, unknown>;
    return (rest.diffusion === undefined && averages !== undefined ? { ...rest, averages } : rest) as GivenParameters;
  });
}

const source = word(40);
const limit = fc.double({ min: -1000, max: 1000, noNaN: true, noDefaultInfinity: true }).map((x) => x + 0);
const mustKeep: fc.Arbitrary<MustKeep> = fc.oneof(
  fc.record({ figure: fc.constantFrom(...figureKeys), atMost: limit, source }),
  fc.record({ parameter: fc.constant('echoTimeMs' as const), between: fc.tuple(limit, fc.constant(1000)), source }),
  fc.record({ parameter: fc.constant('diffusion' as const), atLeast: limit, when: fc.constant('averages > 1'), source }),
  fc.record({ rule: fc.constantFrom('voxelVolumeMm3 <= 4 and chemicalShiftPx < 1', 'scanTimeS / volumes <= 15'), source }),
);

function seriesFor(key: ClassKey): fc.Arbitrary<Omit<StudySeries, 'id' | 'pairedWith'>> {
  const { family, acquisition } = classRow(key);
  return fc.record({
    title: word(30),
    plane: word(12),
    purpose: fc.option(word(12)),
    priority: fc.integer({ min: 0, max: 99 }),
    family: fc.constant(family as StudySeries['family']),
    acquisition: fc.constant(acquisition),
    target: fc.constantFrom(...tissueNames),
    comparison: fc.constantFrom(...tissueNames),
    contrastAgent: fc.boolean(),
    nullTissue: fc.option(fc.constantFrom(...tissueNames)),
    tissueOverrides: fc.dictionary(
      fc.constantFrom(...tissueNames),
      fc.record({ t1Ms: fc.integer({ min: 1, max: 5000 }), protonDensity: fc.constant(0.7) }, { requiredKeys: [] }),
      { maxKeys: 2 },
    ),
    parameters: givenFor(key).map((given) => fillDefaults(key, given)),
    ranges: fc.constantFrom(
      {},
      { averages: [1, 2] as const },
      { sliceThicknessMm: { min: 2.5, max: 6, step: 0.5 }, fatSuppression: ['none', 'spectral'] as const },
    ),
    mustKeep: fc.array(mustKeep, { maxLength: 3 }),
    locked: fc.constantFrom([], ['averages'] as const),
    opened: fc.constantFrom([], ['echoTimeMs', 'refocusingAngleDeg'] as const),
  });
}

const release: fc.Arbitrary<Release> = fc.oneof(
  fc.record({ role: word(20), day: fc.constant('2026-03-02'), reason: word(60) }),
  fc.record({ role: word(20), secondRole: word(20), day: fc.constant('2026-03-02'), reason: word(60) }),
);

/** Random studies over every class, parameter and kind of must-keep, as `readPreset` would give them. */
export const arbitraryStudy: fc.Arbitrary<Study> = fc
  .tuple(
    fc.record({
      id,
      title: word(30),
      region: word(20),
      fieldT: fc.constantFrom(0.55, 1.5, 3, 2.89),
      status: fc.constantFrom('draft' as const, 'starter' as const, 'reviewed' as const),
      revision: fc.integer({ min: 1, max: 99 }),
      notes: fc.oneof(fc.constant(''), word(80)),
    }),
    fc.option(release, { nil: undefined }),
    fc.uniqueArray(id, { minLength: 1, maxLength: 3 }),
    fc.array(fc.constantFrom(...classKeys).chain(seriesFor), { minLength: 3, maxLength: 3 }),
  )
  .map(([head, released, ids, all]) => ({
    format: 'holdfast preset' as const,
    version: 1 as const,
    ...head,
    ...(released === undefined ? {} : { released }),
    minimumSet: ids.length > 1 ? [ids[0] as string, ids] : [],
    series: ids.map(
      (seriesId, i): StudySeries => ({
        ...(all[i] as Omit<StudySeries, 'id' | 'pairedWith'>),
        id: seriesId,
        pairedWith: i > 0 ? [ids[0] as string] : [],
      }),
    ),
  }));
