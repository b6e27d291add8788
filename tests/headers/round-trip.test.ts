import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { classRow } from '../../src/calc/classes.js';
import { type ParameterKey, parameterRow } from '../../src/calc/parameters.js';
import { classOf } from '../../src/calc/series.js';
import { draftOfHeaders } from '../../src/headers/draft-of-headers.js';
import { type ReadSeries, readSeries } from '../../src/headers/read-series.js';
import { readPreset } from '../../src/study/read-preset.js';
import type { Study, StudySeries } from '../../src/study/study.js';
import { writePreset } from '../../src/study/write-preset.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { enhancedObject, imagesOfPreset, singleFrames } from './attributes-of-preset.js';
import { dcmdump } from './dcmdump.js';
import { dicomObject } from './dicom-object.js';
import { collectObjects } from './read-objects.js';

const studies: readonly Study[] = readdirSync('presets').map((name) => {
  const read = readPreset(readFileSync(join('presets', name), 'utf8'), name);
  if (!read.ok) throw new Error(`${name}: ${read.problems[0]?.message}`);
  return read.value;
});

const cases = studies.flatMap((study) => study.series.map((series) => ({ name: `${study.id} ${series.id}`, study, series })));
const uid = '1.2.826.0.1.7';

/** Parameters that no attribute of the standard holds: the table of parameters names no keyword for them. */
const withoutKeyword: readonly ParameterKey[] = [
  'slabs',
  'rounds',
  'dummyShots',
  'referenceLines',
  'referenceScanS',
  'simultaneousSlices',
  'echoSpacingMs',
  'linesPerBeat',
  'refocusingAngleDeg',
  'fatSuppressionEveryLines',
  'slabSelective',
  'rfPulseStretch',
  'reconstruction',
  'roundsPerHold',
];

/** What the keyword of a parameter can say of its value: the value, or nothing. */
function holdable(key: ParameterKey, { parameters: p }: StudySeries): { readonly value: unknown } | 'missing' {
  const value = p[key];
  if (withoutKeyword.includes(key)) return 'missing';
  // Coded alone: that there is some, not how much.
  if ((key === 'partialFourierPhase' || key === 'partialFourierSlice') && (value as number) < 1) return 'missing';
  if ((key === 'phaseOversamplingPercent' || key === 'sliceOversamplingPercent') && (value as number) > 0) return 'missing';
  if (key === 'pacing') {
    const { kind, periodMs, breathHold } = p.pacing;
    // A breath has no keyword for its period, a beat has.
    const beat =
      kind === 'cardiac-gate' ? { ...(periodMs === undefined ? {} : { periodMs }), ...(breathHold === true ? { breathHold } : {}) } : {};
    return { value: { kind, ...beat } };
  }
  return { value };
}

function expectSame(read: ReadSeries, study: Study, series: StudySeries): void {
  const key = classOf(series);
  expect(read.decision.key).toBe(key);
  expect(read.fieldT.value).toBe(study.fieldT);
  expect(read.values.map((value) => value.key).sort()).toEqual([...classRow(key).parameters].sort());
  for (const { key: name, value, origin } of read.values) {
    const wanted = holdable(name, series);
    const found = origin === 'missing' ? 'missing' : { value };
    expect({ [name]: found }).toEqual({ [name]: wanted });
  }
}

describe('a preset written as the attributes of a scanner and read back', () => {
  it('names no keyword for the parameters that are expected to be missing', () => {
    expect(withoutKeyword.filter((key) => parameterRow(key).dicom !== null)).toEqual([]);
    expect(cases.length).toBeGreaterThan(120);
  });

  it.each(cases)('$name, single-frame: every parameter with a keyword that can hold it, no other', ({ study, series }) => {
    const objects = singleFrames(imagesOfPreset(series, study.fieldT), uid).map((image) => dicomObject(image));
    const [one, ...others] = collectObjects(objects).series();
    expect(others).toEqual([]);
    expectSame(readSeries(one!, 's1'), study, series);
  });

  it.each(cases)('$name, enhanced and implicit: the same', ({ study, series }) => {
    const object = dicomObject(enhancedObject(imagesOfPreset(series, study.fieldT), uid), { syntax: 'implicit' });
    const [one, ...others] = collectObjects([object]).series();
    expect(others).toEqual([]);
    expectSame(readSeries(one!, 's1'), study, series);
  });

  it('gives drafts that are presets, with the same values where they are known', () => {
    for (const { study, series } of cases) {
      const objects = singleFrames(imagesOfPreset(series, study.fieldT), uid).map((image) => dicomObject(image));
      const read = readSeries(collectObjects(objects).series()[0]!, 's1');
      const { study: draft, leftOut } = draftOfHeaders([{ read, typed: {} }]);
      expect(leftOut).toEqual([]);
      const again = readPreset(writePreset(draft!), 'draft.json');
      expect(again).toMatchObject({ ok: true, value: { status: 'draft', fieldT: study.fieldT } });
      const values = again.ok ? again.value.series[0]!.parameters : null;
      for (const { key, origin, value } of read.values)
        if (origin !== 'missing' && value !== undefined) expect(values?.[key]).toEqual(value);
    }
  });

  it('was written in files that dcmdump reads without a word of complaint', () => {
    const folder = temporaryFolder();
    const files = cases.flatMap(({ study, series }, i) => {
      const images = imagesOfPreset(series, study.fieldT);
      const forms = [dicomObject(singleFrames(images, uid)[0]!), dicomObject(enhancedObject(images, uid), { syntax: 'implicit' })];
      return forms.map((bytes, form) => {
        const path = join(folder, `${i}-${form}.dcm`);
        writeFileSync(path, bytes);
        return path;
      });
    });
    const { exit, err } = dcmdump(['+P', '0008,0016', ...files]);
    expect([exit, err]).toEqual([0, '']);
  });
});
