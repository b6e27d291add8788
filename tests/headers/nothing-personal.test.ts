import { mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { Header } from '../../src/headers/header.js';
import { readHeaders } from '../../src/store/dicom/read-headers.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { readPreset } from '../../src/study/read-preset.js';
import { runCommand } from '../commands/run-command.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { enhancedObject, imagesOfPreset, singleFrames } from './attributes-of-preset.js';
import { type Attribute, dicomObject } from './dicom-object.js';
import { markedAttributes, marks } from './marked-object.js';

function expectNoMarks(texts: readonly string[]): void {
  for (const text of texts)
    for (const mark of marks) expect(text.includes(mark) ? text.slice(Math.max(0, text.indexOf(mark) - 60)) : '').toBe('');
}

function everyFile(folder: string): readonly string[] {
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .map((name) => join(folder, name))
    .filter((path) => statSync(path).isFile());
}

/** Everything that the command can say about a folder, and every file it writes. */
async function allOutputs(input: string): Promise<readonly string[]> {
  const home = temporaryFolder();
  const outputs: string[] = [];
  const draft = join(home, 'draft.json');
  const calls = [
    [],
    ['--json'],
    ['--reader'],
    ['--ascii'],
    ['--out', draft],
    ['--set', 's9:averages=2'],
    ['--class', 's1:x'],
    ['--series', 's77'],
  ];
  for (const call of calls) {
    const said: string[] = [];
    const { out, err } = await runCommand(['read', input, ...call], { homeFolder: home, progress: (text) => said.push(text) });
    outputs.push(out, err, ...said);
  }
  return [...outputs, ...everyFile(home).flatMap((path) => [path, readFileSync(path, 'latin1')])];
}

function liver() {
  const read = readPreset(readFileSync('presets/liver-3t.json', 'utf8'), 'liver-3t.json');
  if (!read.ok) throw new Error('no preset');
  const series = read.value.series.find(({ id }) => id === 't1-3d')!;
  return imagesOfPreset({ ...series, parameters: { ...series.parameters, sliceCount: 2 } }, 3);
}

/** An attribute of the series where both have it, unless it holds words: then the mark stands beside the word. */
function withMarks(attributes: readonly Attribute[]): readonly Attribute[] {
  const byTag = new Map(markedAttributes().map((one) => [one.tag, one]));
  for (const one of attributes)
    byTag.set(one.tag, one.vr === 'CS' && typeof one.value === 'string' ? { ...one, value: `${one.value}\\ZQXMARK` } : one);
  return [...byTag.values()];
}

describe('what could name somebody', () => {
  const uid = '1.2.7.7.7.77.9';
  const objects = {
    single: dicomObject(withMarks(singleFrames(liver(), uid)[0]!)),
    implicit: dicomObject(withMarks(singleFrames(liver(), uid)[1]!), { syntax: 'implicit' }),
    deflated: dicomObject(withMarks(singleFrames(liver(), uid)[1]!), { syntax: 'deflated' }),
    enhanced: dicomObject(withMarks(enhancedObject(liver(), uid))),
    big: dicomObject(withMarks(singleFrames(liver(), uid)[1]!), { syntax: 'big-endian' }),
    notMr: dicomObject([...markedAttributes(), { tag: '0008,0016', vr: 'UI', value: '1.2.840.10008.5.1.4.1.1.2' }]),
  };

  it('stands in thousands of attributes of the objects that are read', () => {
    expect(markedAttributes().length).toBeGreaterThan(2000);
    const text = objects.single.toString('latin1');
    for (const mark of marks) expect(text).toContain(mark);
  });

  it('reaches no output and no file, from objects of every form', async () => {
    const folder = temporaryFolder();
    for (const [name, bytes] of Object.entries(objects)) writeFileSync(join(folder, name), bytes);
    const outputs = await allOutputs(folder);
    expect(outputs.some((text) => text.includes('"format": "holdfast preset"'))).toBe(true);
    expect(outputs.some((text) => text.includes('3D spoiled gradient echo'))).toBe(true);
    expectNoMarks(outputs);
  });

  it('does not leave the reader: what it hands on holds none of it, the UID of the series included', async () => {
    const folder = temporaryFolder();
    for (const [name, bytes] of Object.entries(objects)) writeFileSync(join(folder, name), bytes);
    const handedOn: string[] = [];
    const receiver = {
      header: (header: Header) => handedOn.push(JSON.stringify(header)),
      problem: (problem: object) => handedOn.push(JSON.stringify(problem)),
    };
    await readHeaders(nodeDisk, [folder], receiver);
    expect(handedOn.length).toBeGreaterThan(5);
    expectNoMarks(handedOn);
  });

  it('reaches none from objects that are cut or damaged anywhere', async () => {
    const folder = temporaryFolder();
    const base = objects.enhanced;
    const undefinedLengths = dicomObject(withMarks(enhancedObject(liver(), uid)), { undefinedLengths: true });
    for (let i = 0; i < 60; i += 1) {
      const cut = Math.round((base.length * (i + 1)) / 61);
      writeFileSync(join(folder, `cut-${i}`), base.subarray(0, cut));
      writeFileSync(join(folder, `cut-open-${i}`), undefinedLengths.subarray(0, cut));
      const damaged = Buffer.from(base);
      damaged.writeUInt32LE(0xfffffffe - i, cut - 8);
      writeFileSync(join(folder, `damaged-${i}`), damaged);
    }
    const outputs = await allOutputs(folder);
    expect(outputs.join('')).toContain('damaged or cut short');
    expectNoMarks(outputs);
  }, 120_000);

  it('reaches none from sidecars', async () => {
    const folder = temporaryFolder();
    const named = [
      'PatientName',
      'PatientID',
      'PatientBirthDate',
      'InstitutionName',
      'InstitutionAddress',
      'DeviceSerialNumber',
      'StationName',
    ];
    const times = [
      'AcquisitionTime',
      'AcquisitionDateTime',
      'SeriesInstanceUID',
      'SeriesDescription',
      'ProtocolName',
      'ConversionSoftware',
    ];
    const fields = Object.fromEntries([...named, ...times].map((name, i) => [name, marks[i % marks.length]]));
    const base = JSON.parse(readFileSync('tests/headers/invented-bold.json', 'utf8')) as Record<string, unknown>;
    writeFileSync(
      join(folder, 'whole.json'),
      JSON.stringify({ ...fields, ...base, ScanningSequence: ['EP', 'GR', 'ZQXMARK'], BodyPart: 'ZQXMARK' }),
    );
    writeFileSync(join(folder, 'marked.json'), JSON.stringify(Object.fromEntries(Object.keys(base).map((name) => [name, 'ZQXMARK']))));
    writeFileSync(join(folder, 'broken.json'), `{"PatientName": "ZQXMARK", "EchoTime": 0.03, `);
    mkdirSync(join(folder, 'more'));
    writeFileSync(join(folder, 'more', 'keys.json'), JSON.stringify({ ZQXMARK: 1, EchoTime: 0.02, '19771231': { EchoTime: 1 } }));
    const outputs = await allOutputs(folder);
    expect(outputs.join('')).toContain('echo-planar gradient echo');
    expectNoMarks(outputs);
  });
});
