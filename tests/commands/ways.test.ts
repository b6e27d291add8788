import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { liverArterialPhase } from '../scenarios/invented-parameters.js';
import { runCommand } from './run-command.js';

const folder = await mkdtemp(join(tmpdir(), 'holdfast-ways-'));
afterAll(() => rm(folder, { recursive: true, force: true }));

const { fatSuppression: _, ...parameters } = liverArterialPhase;

/** An invented study of one series with few values to choose among, so that each test is quick. */
async function preset(more: object = {}): Promise<string> {
  const file = join(folder, `small-${Math.abs(hash(JSON.stringify(more)))}.json`);
  const study = {
    format: 'holdfast preset',
    version: 1,
    id: 'small',
    title: 'Small, invented',
    region: 'liver',
    fieldT: 3,
    series: [
      {
        id: 't1',
        title: 'T1',
        family: 'spoiled-gradient-echo',
        acquisition: '3D',
        target: 'liver',
        comparison: 'spleen',
        parameters,
        locked: ['phaseOversamplingPercent', 'sliceOversamplingPercent', 'parallelFactorSlice', 'partialFourierSlice', 'averages'],
        ...more,
      },
    ],
  };
  await writeFile(file, JSON.stringify(study));
  return file;
}

function hash(text: string): number {
  let sum = 0;
  for (let i = 0; i < text.length; i += 1) sum = (Math.imul(sum, 31) + text.charCodeAt(i)) | 0;
  return sum;
}

interface Document {
  readonly preset: string;
  readonly series: readonly unknown[];
  readonly ways: readonly {
    readonly kind: string;
    readonly changes: Record<string, { from: unknown; to: unknown }>;
    readonly figures: Record<string, number | null>;
    readonly gives: readonly { readonly figure: string; readonly from: number; readonly to: number }[];
    readonly verdict: string;
    readonly spare: Record<string, number | null>;
  }[];
  readonly lattice: number;
  readonly formed: number;
  readonly fitting: number | null;
  readonly proven: boolean;
  readonly bands: Record<string, number>;
  readonly fronts: { readonly timeSnr: readonly [number, number][]; readonly timeLoss: readonly [number, number][] };
  readonly nearest: unknown;
  readonly binding: readonly { readonly limits: readonly string[]; readonly needs: Record<string, number | null> }[];
}

describe('holdfast ways', () => {
  it('prints one JSON document, and figures --set with the changes of a way gives its figures', async () => {
    const file = await preset();
    const { exit, out, err } = await runCommand(['ways', file, 't1', '--hold', '11', '--json']);
    expect([exit, err]).toEqual([0, '']);
    const document = JSON.parse(out) as Document;
    expect(Object.keys(document)).toEqual([
      'preset',
      'fieldT',
      'series',
      'ways',
      'lattice',
      'formed',
      'fitting',
      'proven',
      'bands',
      'fronts',
      'nearest',
      'binding',
    ]);
    expect([document.proven, document.nearest, document.binding]).toEqual([true, null, []]);
    expect(document.fitting).toBeGreaterThan(0);
    for (const { changes, figures } of document.ways) {
      const set = Object.entries(changes).flatMap(([key, { to }]) => ['--set', `${key}=${String(to)}`]);
      const again = JSON.parse((await runCommand(['figures', file, 't1', ...set, '--json'])).out) as { series: { figures: object }[] };
      expect(again.series[0]?.figures).toEqual(figures);
    }
  });

  it('names a split that follows in what a way gives up, and counts no more than three settings among its changes', async () => {
    const args = ['ways', 'lumbar-spine-1.5t', 't1-sag', '--b1rms', '2', '--reading', 'b1rmsUt=2.8'];
    const { ways } = JSON.parse((await runCommand([...args, '--json'])).out) as Document;
    const split = ways.filter(({ figures }) => Number(figures['roundsNeeded']) > 1);
    expect(split.length).toBeGreaterThan(0);
    for (const { gives } of split) expect(gives.find(({ figure }) => figure === 'roundsNeeded')).toMatchObject({ from: 1, to: 2 });
    for (const { changes } of ways) expect(Object.keys(changes).filter((key) => key !== 'sliceCount').length).toBeLessThanOrEqual(3);
    expect((await runCommand(args)).out).toContain('split into 2 acquisitions');
  });

  it('as text it keeps to 80 columns, numbers the ways and never calls anything safe', async () => {
    const { out } = await runCommand(['ways', await preset(), 't1', '--hold', '11']);
    expect(out).toContain('1. closest to the preset');
    expect(out.split('\n').every((line) => line.length <= 80)).toBe(true);
    expect(out).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });

  it('says what binds where nothing fits, with what it would need, and exits 1', async () => {
    const { exit, out } = await runCommand(['ways', await preset(), 't1', '--hold', '2', '--json']);
    const document = JSON.parse(out) as Document;
    expect([exit, document.ways.length, document.fitting]).toEqual([1, 0, 0]);
    const hold = document.binding.find(({ limits }) => limits.join() === 'holdS');
    expect(hold?.needs['holdS']).toBeGreaterThan(2);
    expect((await runCommand(['ways', await preset(), 't1', '--hold', '2'])).out).toMatch(
      /What binds: breath-hold: needs [\d.]+ s; the limit is 2.0 s/,
    );
  });

  it('offers the series as it stands where it fits already', async () => {
    const document = JSON.parse((await runCommand(['ways', await preset(), 't1', '--hold', '20', '--json'])).out) as Document;
    expect(document.ways.find(({ kind }) => kind === 'closest')?.changes).toEqual({});
  });

  it.each<[string, readonly string[], RegExp]>([
    ['a hold of nothing', ['--hold', '0'], /--hold takes more than 0/],
    ['a hold that is no number', ['--hold', 'NaN'], /--hold/],
    ['a negative time', ['--time', '-5'], /--time takes more than 0/],
    ['a B1+rms cap without its reading', ['--b1rms', '2'], /--b1rms needs what the scanner displays.*--reading b1rmsUt/s],
    ['a SAR cap without its reading', ['--sar', '2'], /--sar needs what the scanner displays.*--reading sarWkg/s],
    ['a hold longer than the series may be', ['--hold', '20', '--time', '10'], /contradict/],
    ['a ratio of RF power of nothing', ['--rf-ratio', '0'], /--rf-ratio takes more than 0/],
    ['a reading that is none', ['--hold', '11', '--reading', 'b1rms=2'], /--reading knows timeS, b1rmsUt, sarWkg.*Did you mean b1rmsUt/s],
    ['an option that is none', ['--hold', '11', '--kind', 'closest'], /no option --kind/],
    ['a limit given twice', ['--hold', '11', '--hold', '12'], /--hold was given more than once/],
    ['a band given twice', ['--keep', 'relativeSnr=0.8', '--keep', 'relativeSnr=0.9'], /--keep names relativeSnr twice/],
    ['a figure that is none', ['--keep', 'relativeSNR=0.8'], /Did you mean relativeSnr/],
    ['a parameter that is none', ['--open', 'flipAngle'], /Did you mean flipAngleDeg/],
    ['a parameter that the preset locks', ['--open', 'averages'], /the preset locks it/],
    ['a value both set and opened', ['--set', 'flipAngleDeg=12', '--open', 'flipAngleDeg'], /--set and --open both name flipAngleDeg/],
  ])('refuses %s with 64 and says why', async (_what, args, message) => {
    const { exit, out, err } = await runCommand(['ways', await preset(), 't1', ...args]);
    expect([exit, out]).toEqual([64, '']);
    expect(err).toMatch(message);
  });

  it('a range whose ends contradict each other is bad data: 65', async () => {
    const { exit, err } = await runCommand([
      'ways',
      await preset({ ranges: { sliceThicknessMm: { min: 5, max: 3, step: 0.5 } } }),
      't1',
      '--hold',
      '11',
    ]);
    expect(exit).toBe(65);
    expect(err).toContain('min');
  });

  const everything = [
    'phaseOversamplingPercent',
    'sliceOversamplingPercent',
    'parallelFactorPhase',
    'parallelFactorSlice',
    'partialFourierPhase',
    'partialFourierSlice',
    'averages',
    'matrixPhase',
    'sliceThicknessMm',
  ];

  it.each<[string, object, RegExp]>([
    ['a preset that locks everything', { locked: everything }, /Nothing may change in t1/],
    [
      'ranges of one value each',
      { locked: everything.filter((key) => key !== 'matrixPhase'), ranges: { matrixPhase: [200] } },
      /Nothing may change in t1/,
    ],
    ['an empty range', { ranges: { sliceThicknessMm: [] } }, /expected at least 1/],
    ['a range without a step', { ranges: { sliceThicknessMm: { min: 2, max: 4, step: 0 } } }, /step: 0 was given/],
    [
      'a must-keep whose limits contradict each other',
      { mustKeep: [{ figure: 'voxelSliceMm', atMost: 2, atLeast: 3, source: 'invented' }] },
      /lower limit is above the upper one/,
    ],
    [
      'an unknown kind of pacing',
      { parameters: { ...parameters, pacing: { kind: 'breath' } } },
      /pacing\.kind: "breath" was given.*Did you mean "breath-hold"/s,
    ],
    ['an unknown class', { family: 'spoiled' }, /family: "spoiled" was given/],
  ])('%s is bad data: 65 and says why', async (_what, more, message) => {
    const { exit, out, err } = await runCommand(['ways', await preset(more), 't1', '--hold', '11']);
    expect([exit, out]).toEqual([65, '']);
    expect(err).toMatch(message);
  });

  it('values set by hand that leave nothing to search are wrong use: 64; an opened parameter is something to search', async () => {
    const file = await preset({ locked: everything.filter((key) => key !== 'matrixPhase') });
    const args = ['ways', file, 't1', '--hold', '11', '--set', 'matrixPhase=192'];
    const { exit, out, err } = await runCommand(args);
    expect([exit, out]).toEqual([64, '']);
    expect(err).toMatch(/nothing is left to search/);
    expect((await runCommand([...args, '--open', 'flipAngleDeg'])).exit).toBe(1);
  });

  it('a series that is not there: 66', async () => {
    expect((await runCommand(['ways', await preset(), 't2', '--hold', '11'])).exit).toBe(66);
  });

  it('keeps a band that is asked for', async () => {
    const document = JSON.parse(
      (await runCommand(['ways', await preset(), 't1', '--hold', '11', '--keep', 'relativeSnr=0.95', '--json'])).out,
    ) as Document;
    expect(document.bands['relativeSnr']).toBe(0.95);
    for (const { figures } of document.ways) expect(figures['relativeSnr']).toBeGreaterThanOrEqual(0.95);
  });
});
