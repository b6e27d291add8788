import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { scannerSchema } from '../../scripts/scanner-schema.js';
import { schemaText } from '../../scripts/schema-text.js';
import { larmorMhz } from '../../src/calc/constants.js';
import { parallelNoiseFactor } from '../../src/calc/parallel-noise.js';
import { plainScanner, pulseNames } from '../../src/calc/scanner.js';
import { readScannerFile } from '../../src/study/read-scanner-file.js';
import { coilNamed, type ScannerFile, scannerNumbers, scannerOf } from '../../src/study/scanner-file.js';

const least = { format: 'holdfast scanner', version: 1, name: 'one', fieldT: 2.89 };
const coil = { name: 'body', elements: { AP: 3, RL: 4, HF: 1 }, g: [{ phase: 2, slice: 1, g: 1.1 }] };

function read(file: unknown) {
  return readScannerFile(JSON.stringify(file, null, 2), 'one.json');
}

function scannerIn(file: unknown): ScannerFile {
  const outcome = read(file);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
  return outcome.value;
}

describe('schema/scanner.schema.json', () => {
  const committed = readFileSync('schema/scanner.schema.json', 'utf8');
  it('is what the tables give today (else run: npm run schema)', () => {
    expect(committed).toBe(schemaText(scannerSchema));
  });

  it('knows every number and pulse, the defaults of a scanner without a file among them', () => {
    const { properties } = JSON.parse(committed) as { properties: Record<string, { default?: number; properties?: object }> };
    for (const [key, { otherwise }] of Object.entries(scannerNumbers)) expect(properties[key]?.default ?? null).toBe(otherwise);
    expect(Object.keys(properties.pulses?.properties ?? {})).toEqual(pulseNames);
  });
});

describe('readScannerFile', () => {
  it('takes what is left out from a scanner without a file', () => {
    expect(scannerOf(scannerIn(least))).toEqual({ ...plainScanner(2.89), name: 'one' });
  });

  it('reads everything', () => {
    const pulses = { refocusing: { durationMs: 2.4, timeBandwidth: 2.6 }, fatSaturation: { durationMs: 9, gaussian: true } };
    const file = {
      ...least,
      gradientMtPerM: 33,
      slewTPerMPerS: 120,
      visibleLengthMm: 450,
      maximumB1Ut: 18,
      modelErrorPercent: 4,
      coils: [coil],
      simultaneousSliceG: { '2': 1.08 },
      pulses,
    };
    expect(scannerOf(scannerIn(file))).toEqual({
      name: 'one',
      fieldT: 2.89,
      gradientMtPerM: 33,
      slewTPerMPerS: 120,
      visibleLengthMm: 450,
      maximumB1Ut: 18,
      modelErrorPercent: 4,
      coil,
      simultaneousSliceG: { 2: 1.08 },
      pulses,
    });
  });

  it.each([
    ['serialNumber', '12345'],
    ['deviceSerialNumber', 1],
    ['manufacturer', 'x'],
    ['maker', 'x'],
    ['vendor', 'x'],
    ['modelName', 'x'],
    ['stationName', 'x'],
    ['institutionName', 'x'],
    ['softwareVersions', 'x'],
  ])('refuses %s as an unknown key, and says that nothing may identify a device', (key, value) => {
    const outcome = read({ ...least, [key]: value });
    expect(outcome.ok ? [] : outcome.problems).toEqual([
      {
        code: 'unknown-key',
        path: key,
        message: expect.stringMatching(new RegExp(`^one\\.json, line 6, ${key}: the key "${key}" is not known here; expected `)) as string,
        hint: 'Take it out: a scanner has a nickname here, and neither a maker, a model nor a serial number.',
      },
    ]);
  });

  it('says which key was meant', () => {
    const outcome = read({ ...least, gradientMtPerm: 40 });
    expect(outcome.ok ? '' : outcome.problems[0]?.hint).toBe('Did you mean "gradientMtPerM"?');
  });

  it.each([
    ['no field', { ...least, fieldT: undefined }, 'missing-key'],
    ['a field of 0', { ...least, fieldT: 0 }, 'out-of-range'],
    ['a field in words', { ...least, fieldT: '3 T' }, 'wrong-type'],
    ['gradients of -1', { ...least, gradientMtPerM: -1 }, 'out-of-range'],
    ['no name', { ...least, name: '' }, 'wrong-length'],
    ['a name of blanks', { ...least, name: ' \u200b ' }, 'wrong-form'],
    ['g under 1', { ...least, coils: [{ ...coil, g: [{ phase: 2, slice: 1, g: 0.9 }] }] }, 'out-of-range'],
    ['R under 1', { ...least, coils: [{ ...coil, g: [{ phase: 0.5, slice: 1, g: 1 }] }] }, 'out-of-range'],
    ['g without acceleration', { ...least, coils: [{ ...coil, g: [{ phase: 1, slice: 1, g: 1.2 }] }] }, 'values-clash'],
    ['a row twice', { ...least, coils: [{ ...coil, g: [...coil.g, ...coil.g] }] }, 'values-clash'],
    ['a coil twice', { ...least, coils: [coil, { ...coil, name: 'BODY' }] }, 'duplicate-id'],
    ['an axis without elements', { ...least, coils: [{ ...coil, elements: { AP: 3, RL: 4 } }] }, 'missing-key'],
    ['a pulse that is none of ours', { ...least, pulses: { inversion: { durationMs: 3 } } }, 'unknown-key'],
    ['a pulse of two shapes', { ...least, pulses: { balanced: { durationMs: 3, gaussian: true, timeBandwidth: 2 } } }, 'values-clash'],
    ['g of one slice', { ...least, simultaneousSliceG: { '1': 1 } }, 'unknown-key'],
    ['another format', { ...least, format: 'holdfast preset' }, 'unknown-word'],
  ])('refuses %s', (_what, file, code) => {
    const outcome = read(file);
    expect(outcome.ok ? [] : outcome.problems.map((problem) => problem.code)).toEqual([code]);
  });
});

describe('scannerOf', () => {
  const regional = [
    { phase: 2, slice: 1, g: 1.3 },
    { phase: 2, slice: 1, region: 'liver', g: 1.1 },
    { phase: 3, slice: 1, region: 'prostate', g: 1.5 },
  ];
  const file = scannerIn({
    ...least,
    coils: [
      { ...coil, g: regional },
      { ...coil, name: 'head', simultaneousSliceG: { '2': 1.2 } },
    ],
    simultaneousSliceG: { '2': 1.1, '3': 1.3 },
  });

  it('takes the coil by name, upper and lower case alike, else the first', () => {
    expect(scannerOf(file, 'HEAD').coil?.name).toBe('head');
    expect(scannerOf(file).coil?.name).toBe('body');
    expect(coilNamed(file, 'knee')).toBeNull();
  });

  it('takes g measured in the region before g of any region, and never that of another region', () => {
    const g = (region: string | null, phase: number) => parallelNoiseFactor(scannerOf(file, null, region).coil, phase, 1);
    expect([g('Liver', 2), g('prostate', 2), g(null, 2)]).toEqual([1.1, 1.3, 1.3]);
    expect([g('liver', 3), g('prostate', 3)]).toEqual([null, 1.5]);
  });

  it('knows no g beyond the table, in numbers of simultaneous slices either', () => {
    expect(parallelNoiseFactor(scannerOf(file).coil, 4, 1)).toBeNull();
    expect(scannerOf(file, 'head').simultaneousSliceG).toEqual({ 2: 1.2, 3: 1.3 });
    expect(scannerOf(file).simultaneousSliceG[4]).toBeUndefined();
  });
});

describe('shipped scanners', () => {
  const files = readdirSync('scanners');

  it('are two, invented and said to be, with fields that differ from the name', () => {
    const scanners = files.map((name) => {
      const outcome = readScannerFile(readFileSync(`scanners/${name}`, 'utf8'), name);
      if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
      expect(`${outcome.value.name}.json`).toBe(name);
      expect(outcome.value.notes).toMatch(/invented/);
      return outcome.value;
    });
    expect(scanners.map(({ name, fieldT }) => [name, fieldT])).toEqual([
      ['demo-1.5t', 1.494],
      ['demo-3t', 2.894],
    ]);
    // Larmor frequency at the exact field (CODATA 2022 gamma-bar): not that of the name.
    expect(scanners.map(({ fieldT }) => Number(larmorMhz(fieldT).toFixed(3)))).toEqual([63.611, 123.219]);
    for (const { coils = [] } of scanners) expect(coils.length).toBeGreaterThan(1);
  });
});
