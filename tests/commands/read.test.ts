import { mkdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { parameterKeys } from '../../src/calc/parameters.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { readPreset } from '../../src/study/read-preset.js';
import { imagesOfPreset, singleFrames } from '../headers/attributes-of-preset.js';
import { type Attribute, dicomObject } from '../headers/dicom-object.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { runCommand } from './run-command.js';

function presetImages(file: string, id: string, slices: number, uid: string) {
  const read = readPreset(readFileSync(file, 'utf8'), file);
  if (!read.ok) throw new Error(`${file} is no preset`);
  const series = read.value.series.find((one) => one.id === id)!;
  return singleFrames(imagesOfPreset({ ...series, parameters: { ...series.parameters, sliceCount: slices } }, read.value.fieldT), uid);
}

const lumbar = 'presets/lumbar-spine-1.5t.json';

/** A folder of two series of the lumbar preset. */
function exam(): string {
  const folder = temporaryFolder();
  for (const [i, image] of presetImages(lumbar, 't2-sag', 3, '1.2.3.1').entries())
    writeFileSync(join(folder, `a${i}.dcm`), dicomObject(image));
  for (const [i, image] of presetImages(lumbar, 't1-sag', 3, '1.2.3.2').entries())
    writeFileSync(join(folder, `b${i}.dcm`), dicomObject(image));
  return folder;
}

const without = (image: readonly Attribute[], ...tags: string[]) => image.filter(({ tag }) => !tags.includes(tag));

describe('holdfast read', () => {
  it('tells each series with its class, where values come from, and what is to be typed', async () => {
    const { exit, out, err } = await runCommand(['read', exam()]);
    expect([exit, err]).toEqual([0, '']);
    expect(out).toMatch(/^2 series, 6 images in 6 of 6 files$/m);
    expect(out).toMatch(/^s\d: fast spin echo, sagittal, 1\.5 T, 3 images, series number \d$/m);
    expect(out).toMatch(/^TR +3500 ms +read: RepetitionTime$/m);
    expect(out).toMatch(/^slice gap +0\.4 mm +derived$/m);
    expect(out).toContain('echo spacing (10 ms)');
    for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('writes a draft that figures and presets check take', async () => {
    const draft = join(temporaryFolder(), 'draft.json');
    const { exit, out } = await runCommand(['read', exam(), '--set', 's1:echoSpacingMs=9.5', '--out', draft]);
    expect(exit).toBe(0);
    expect(out).toContain(draft);
    const text = readFileSync(draft, 'utf8');
    expect(text).toContain('"status": "draft"');
    expect(text).toContain('"echoSpacingMs": 9.5');
    expect(text).toMatch(/"notes": ".*typed echoSpacingMs.*missing, defaults until typed/);
    expect((await runCommand(['presets', 'check', draft])).exit).toBe(0);
    expect((await runCommand(['figures', draft, 's1', '--json'])).exit).toBe(0);
    const again = await runCommand(['read', exam(), '--out', draft]);
    expect([again.exit, again.out]).toEqual([73, '']);
  });

  it('prints one JSON document', async () => {
    const { exit, out } = await runCommand(['read', exam(), '--json', '--series', 's2']);
    expect(exit).toBe(0);
    const document = JSON.parse(out) as {
      series: { id: string; picked: boolean; values: Record<string, { value: unknown; origin: string }>; missing: string[] }[];
      draft: { series: string[] };
    };
    expect(document.series.map(({ id, picked }) => [id, picked])).toEqual([
      ['s1', false],
      ['s2', true],
    ]);
    expect(document.draft.series).toEqual(['s2']);
    expect(document.series[0]!.values['phaseDirection']).toMatchObject({ origin: 'derived' });
    expect(document.series[0]!.missing).toContain('echoSpacingMs');
  });

  it('explains the mapping of every parameter, as a page and as JSON', async () => {
    const { exit, out } = await runCommand(['read', '--explain']);
    expect(exit).toBe(0);
    for (const key of parameterKeys) expect(out).toContain(`\n${key} (`);
    const json = await runCommand(['read', '--explain', '--json']);
    const { mapping } = JSON.parse(json.out) as { mapping: { parameter: string }[] };
    expect(mapping.map(({ parameter }) => parameter)).toEqual([...parameterKeys]);
  });

  it('names a cut file, a zip, a loop of folders, an unreadable file and what is no MR image, reads the rest, and ends with 1', async () => {
    const folder = exam();
    const [image] = presetImages(lumbar, 't2-sag', 1, '1.2.3.1');
    const whole = dicomObject(image!);
    writeFileSync(join(folder, 'cut.dcm'), whole.subarray(0, whole.length - 20));
    writeFileSync(join(folder, 'pack.zip'), Buffer.from('PK\u0003\u0004rest', 'latin1'));
    mkdirSync(join(folder, 'deeper'));
    symlinkSync(folder, join(folder, 'deeper', 'round'));
    symlinkSync('self', join(folder, 'self'));
    writeFileSync(
      join(folder, 'ct.dcm'),
      dicomObject([
        { tag: '0008,0060', vr: 'CS', value: 'CT' },
        { tag: '0008,0016', vr: 'UI', value: '1.2.840.10008.5.1.4.1.1.2' },
      ]),
    );
    writeFileSync(join(folder, 'big.dcm'), dicomObject(image!, { syntax: 'big-endian' }));
    writeFileSync(join(folder, 'locked.dcm'), whole);
    writeFileSync(
      join(folder, 'pixels.dcm'),
      Buffer.concat([dicomObject([...image!, { tag: '7fe0,0010', vr: 'OW', value: [1, 2, 3, 4] }])]).subarray(0, -4),
    );
    writeFileSync(join(folder, 'notes.txt'), 'notes');
    writeFileSync(join(folder, '.hidden'), 'x');
    const disk = {
      ...nodeDisk,
      open: (path: string, how: Parameters<typeof nodeDisk.open>[1]) =>
        path.endsWith('locked.dcm') ? Promise.reject(Object.assign(new Error('locked'), { code: 'EACCES' })) : nodeDisk.open(path, how),
    };
    const { exit, out, err } = await runCommand(['read', folder], { disk });
    expect(exit).toBe(1);
    expect(err).toMatch(/cut\.dcm is damaged or cut short/);
    expect(err).toMatch(/pack\.zip is a packed file/);
    expect(err).toMatch(/round leads round in a circle and was not read again/);
    expect(err).toMatch(/self leads round in a circle of links \(ELOOP\)/);
    expect(err).toMatch(/ct\.dcm holds no MR image/);
    expect(err).toMatch(/big\.dcm is stored big endian/);
    expect(err).toMatch(/locked\.dcm may not be opened by this user \(EACCES\)/);
    expect(err).toMatch(/pixels\.dcm is cut short within its pixels; its header was read/);
    expect(err).toMatch(/7 of 13 files read, 8 problems\.$/m);
    expect(out).toMatch(/^2 series, 7 images in 7 of 13 files; 1 other file passed over$/m);
  });

  it('takes a magnet a few percent off its name for one of that field, and passes over the index of a medium', async () => {
    const folder = exam();
    const index = dicomObject([{ tag: '0008,0016', vr: 'UI', value: '1.2.840.10008.1.3.10' }]);
    writeFileSync(join(folder, 'DICOMDIR'), index);
    const { exit, out } = await runCommand(['read', folder, '--field', '1.494']);
    expect(exit).toBe(0);
    expect(out).toContain('1 other file passed over');
    expect(out).toContain('read-1.494t: s1, s2');
    expect((await runCommand(['read', folder, '--field', '3'])).out).toContain('a preset has one field');
  });

  it('says of a series made from other images that it is to be picked, and what else was wrong', async () => {
    const folder = temporaryFolder();
    const [image] = presetImages(lumbar, 't2-sag', 1, '1.2.3.1');
    writeFileSync(join(folder, 'map'), dicomObject([...image!, { tag: '0008,0008', vr: 'CS', value: 'DERIVED\\SECONDARY' }]));
    writeFileSync(join(folder, 'packed.zip'), Buffer.from('PK\u0003\u0004', 'latin1'));
    const draft = join(temporaryFolder(), 'draft.json');
    const { exit, out, err } = await runCommand(['read', folder, '--out', draft]);
    expect([exit, out]).toEqual([1, '']);
    expect(err).toContain('--series s1 picks it');
    expect(err).toContain('packed.zip is a packed file');
    expect((await runCommand(['read', join(folder, 'map'), '--series', 's1', '--out', draft])).exit).toBe(0);
  });

  it('leaves a series without a needed value out of the draft, and takes it once it is typed', async () => {
    const folder = temporaryFolder();
    for (const [i, image] of presetImages(lumbar, 't2-sag', 2, '1.2.3.1').entries()) {
      writeFileSync(join(folder, `${i}`), dicomObject(without(image, '0018,0095', '0018,0023')));
    }
    const draft = join(temporaryFolder(), 'draft.json');
    const refused = await runCommand(['read', folder, '--out', draft]);
    expect(refused.exit).toBe(1);
    expect(refused.err).toContain('MRAcquisitionType does not say 2D or 3D');
    const typed = await runCommand(['read', folder, '--class', 'fast-spin-echo/2D', '--set', 'pixelBandwidthHz=180', '--out', draft]);
    expect([typed.exit, typed.err]).toEqual([0, '']);
    expect(readFileSync(draft, 'utf8')).toContain('"pixelBandwidthHz": 180');
  });

  it.each([
    [[], 64, 'FILE is missing'],
    [['nowhere'], 66, 'is not there'],
    [['README.md'], 65, 'neither a DICOM object nor a sidecar'],
    [['tests/headers/invented-bold.json', '--set', 'echoSpacing=1'], 64, 'Did you mean "echoSpacingMs"?'],
    [['tests/headers/invented-bold.json', '--class', 'fast-spin-echo'], 64, 'Did you mean fast-spin-echo/2D?'],
    [['tests/headers/invented-bold.json', '--set', 's4:averages=2'], 64, 'There are: s1.'],
    [['tests/headers/invented-bold.json', '--series', 's2'], 66, 'There are: s1.'],
    [['tests/headers/invented-bold.json', '--field', 'x'], 64, '--field'],
    [['package.json'], 65, 'without any field of an MR sidecar'],
  ] as const)('read %j ends with %i', async (args, exit, words) => {
    const ran = await runCommand(['read', ...args]);
    expect(ran.exit).toBe(exit);
    expect(ran.err).toContain(words);
  });
});
