import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { draftOfHeaders } from '../../../src/headers/draft-of-headers.js';
import type { Header } from '../../../src/headers/header.js';
import { readSeries } from '../../../src/headers/read-series.js';
import { readSidecar } from '../../../src/headers/read-sidecar.js';
import { SeriesCollector } from '../../../src/headers/series-collector.js';
import { objectHeaders } from '../../../src/store/dicom/object-headers.js';
import { parseObject } from '../../../src/store/dicom/parse-object.js';
import { readPreset } from '../../../src/study/read-preset.js';
import { writePreset } from '../../../src/study/write-preset.js';
import { enhancedObject, imagesOfPreset, singleFrames } from '../../headers/attributes-of-preset.js';
import { dicomObject } from '../../headers/dicom-object.js';

/** A small generator of its own, so that a failure comes again: linear congruential, Numerical Recipes' constants. */
function randomOf(seed: number): (below: number) => number {
  let state = seed >>> 0;
  return (below) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
  };
}

function seriesOf(file: string, id: string) {
  const read = readPreset(readFileSync(file, 'utf8'), file);
  if (!read.ok) throw new Error(`${file} is no preset`);
  const series = read.value.series.find((one) => one.id === id)!;
  return { ...series, parameters: { ...series.parameters, sliceCount: 3 } };
}

/** Whatever headers say: a class or none, values within range, and a draft that is a preset or none. */
function expectSound(headers: Iterable<Header>): boolean {
  const collector = new SeriesCollector();
  for (const header of headers) collector.add(header);
  const read = collector.series().map((one, i) => ({ read: readSeries(one, `s${i + 1}`), typed: {} }));
  const { study } = draftOfHeaders(read);
  if (study === null) return false;
  const again = readPreset(writePreset(study), 'draft.json');
  expect(again.ok ? [] : again.problems).toEqual([]);
  return true;
}

function mutated(bytes: Buffer, random: (below: number) => number): Buffer {
  let changed = Buffer.from(bytes);
  const times = 1 + random(4);
  for (let i = 0; i < times; i += 1) {
    // Mostly within the header proper: the preamble is 128 bytes of nothing.
    const at = 128 + random(Math.max(1, changed.length - 128));
    // The last case stands for most: values that change while the object stays one.
    switch (random(16)) {
      case 0:
        if (at < changed.length) changed[at] = random(256);
        break;
      case 1:
        if (at < changed.length) changed[at] = changed[at]! ^ (1 << random(8));
        break;
      case 2:
        changed = changed.subarray(0, at);
        break;
      case 3:
        changed = Buffer.concat([
          changed.subarray(0, at),
          Buffer.from(Array.from({ length: 1 + random(8) }, () => random(256))),
          changed.subarray(at),
        ]);
        break;
      case 4:
        changed = Buffer.concat([changed.subarray(0, at), changed.subarray(at + 1 + random(20))]);
        break;
      case 5:
        if (at + 4 <= changed.length) changed.writeUInt32LE([0xffffffff, 0, 0x7fffffff, 0xfffe, random(2 ** 31)][random(5)]!, at);
        break;
      default:
        // A digit of a decimal string becomes another, or something that is no digit.
        for (let j = at; j < Math.min(changed.length, at + 60); j += 1) {
          if (changed[j]! >= 0x30 && changed[j]! <= 0x39) {
            changed[j] = '0123456789-e.,N\\'.charCodeAt(random(16));
            break;
          }
        }
    }
  }
  return changed;
}

describe('10,000 mutated headers', () => {
  it('give a result or a reason, never an exception, and drafts that are presets', () => {
    const knee = imagesOfPreset(seriesOf('presets/knee-3t.json', seriesIds('presets/knee-3t.json')[0]!), 3, { durationS: 150 });
    const brain = imagesOfPreset(seriesOf('presets/brain-3t.json', 'dwi'), 3);
    const bases = [
      dicomObject(singleFrames(knee, '1.2.3.4')[0]!),
      dicomObject(singleFrames(brain, '1.2.3.5')[1]!, { syntax: 'implicit' }),
      dicomObject(enhancedObject(knee, '1.2.3.6'), { syntax: 'explicit', undefinedLengths: true }),
      dicomObject(enhancedObject(brain, '1.2.3.7'), { syntax: 'implicit', undefinedLengths: true }),
      dicomObject(singleFrames(knee, '1.2.3.8')[0]!, { syntax: 'deflated' }),
    ];
    for (const base of bases) expect(parseObject(base, true).kind).toBe('parsed');
    const random = randomOf(7);
    const kinds = new Map<string, number>();
    let drafts = 0;
    for (let i = 0; i < 10_000; i += 1) {
      const whole = random(4) > 0;
      const parsed = parseObject(mutated(bases[i % bases.length]!, random), whole);
      const kind = parsed.kind === 'trouble' ? parsed.trouble : parsed.kind;
      kinds.set(kind, (kinds.get(kind) ?? 0) + 1);
      const headers = parsed.kind === 'parsed' ? objectHeaders(parsed, (uid) => uid) : null;
      if (headers !== null && expectSound(headers)) drafts += 1;
    }
    // The mutations reach both ends: many are still read, many are refused.
    expect(kinds.get('parsed')).toBeGreaterThan(3000);
    expect(kinds.get('damaged')).toBeGreaterThan(500);
    expect(drafts).toBeGreaterThan(2000);
  }, 180_000);
});

function seriesIds(file: string): readonly string[] {
  return (JSON.parse(readFileSync(file, 'utf8')) as { series: { id: string }[] }).series.map(({ id }) => id);
}

describe('10,000 mutated sidecars', () => {
  const base = readFileSync('tests/headers/invented-bold.json', 'utf8');
  const strange: readonly unknown[] = [
    null,
    true,
    '',
    'SE',
    'x'.repeat(300),
    -1,
    0,
    1e308,
    5e-324,
    123456789012345680000,
    [],
    {},
    [[1]],
    [1, 'a'],
    { a: 1 },
    ['SE', 'IR', 'GR'],
  ];

  it('give a result or a reason, never an exception, and drafts that are presets', () => {
    const random = randomOf(11);
    const fields = Object.keys(JSON.parse(base) as object);
    const whole = { ReconstructionDiameter: 230, AcquisitionMatrix: [64, 0, 0, 64], PercentPhaseFieldOfView: 100 };
    const kinds = new Map<string, number>();
    let drafts = 0;
    for (let i = 0; i < 10_000; i += 1) {
      let text: string;
      if (i % 2 === 0) text = mutated(Buffer.from(' '.repeat(128) + base), random).toString('latin1');
      else {
        const json: Record<string, unknown> = { ...(JSON.parse(base) as object), ...whole };
        for (let j = 0; j <= random(3); j += 1) json[fields[random(fields.length)]!] = strange[random(strange.length)];
        text = JSON.stringify(json);
      }
      const read = readSidecar(text);
      const kind = typeof read === 'string' ? read : 'read';
      kinds.set(kind, (kinds.get(kind) ?? 0) + 1);
      if (typeof read !== 'string' && expectSound([{ source: 'sidecar', seriesKey: 'a', attributes: read }])) drafts += 1;
    }
    expect(kinds.get('read')).toBeGreaterThan(4000);
    expect(kinds.get('not-json')).toBeGreaterThan(1000);
    expect(drafts).toBeGreaterThan(1000);
  }, 120_000);
});
