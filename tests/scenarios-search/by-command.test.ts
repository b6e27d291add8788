import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { isDeepStrictEqual } from 'node:util';
import { afterAll, describe, expect, it } from 'vitest';
import { runCommand } from '../commands/run-command.js';
import { liverArterialPhase, lumbarTrain } from '../scenarios/invented-parameters.js';

const folder = await mkdtemp(join(tmpdir(), 'holdfast-moments-'));
afterAll(() => rm(folder, { recursive: true, force: true }));

interface Found {
  readonly kind: string;
  readonly changes: Readonly<Record<string, { readonly from: unknown; readonly to: unknown }>>;
  readonly figures: Readonly<Record<string, number | null>>;
  readonly cautions: readonly { readonly code: string; readonly text: string }[];
  readonly gives: readonly { readonly figure: string }[];
  readonly verdict: string;
}
interface Document {
  readonly ways: readonly Found[];
  readonly proven: boolean;
  readonly fronts: { readonly timeSnr: readonly (readonly [number, number])[] };
}
interface Plan {
  readonly plan: readonly { readonly series: string; readonly choice: string; readonly changes: object; readonly timeS: number }[];
  readonly totalS: number;
  readonly spareS: number;
}
type Given = Readonly<Record<string, unknown>>;

/** Writes a study of invented series as a preset file. */
async function preset(id: string, fieldT: number, series: readonly object[], more: object = {}): Promise<string> {
  const file = join(folder, `${id}.json`);
  const study = { format: 'holdfast preset', version: 1, id, title: id, region: 'invented', fieldT, series, ...more };
  await writeFile(file, JSON.stringify(study));
  return file;
}
const series = (
  id: string,
  family: string,
  acquisition: string,
  tissues: readonly [string, string],
  parameters: Given,
  more: object = {},
) => ({
  id,
  title: id,
  family,
  acquisition,
  target: tissues[0],
  comparison: tissues[1],
  parameters,
  ...more,
});
const json = async <T>(args: readonly string[], exit = 0): Promise<T> => {
  const ran = await runCommand([...args, '--json']);
  expect([ran.exit, ran.err]).toEqual([exit, '']);
  return JSON.parse(ran.out) as T;
};
type Values = Readonly<Record<string, number | string>>;
/** Figures of a series with values set, by the command. */
async function figuresWith(file: string, id: string, set: Values, ...more: string[]): Promise<Record<string, number>> {
  const args = Object.entries(set).flatMap(([key, value]) => ['--set', `${key}=${value}`]);
  const { series: all } = await json<{ series: { figures: Record<string, number> }[] }>(['figures', file, id, ...args, ...more]);
  return all[0]?.figures ?? {};
}
/** The way that sets exactly this, carried slices and splits aside. */
const wayThatSets = ({ ways }: Document, set: Values) =>
  ways.find(({ changes }) => {
    const own = Object.fromEntries(Object.entries(changes).map(([key, { to }]) => [key, to]));
    const { sliceCount: _follows, ...rest } = own;
    const wanted: Record<string, unknown> = { ...set };
    if (!('sliceCount' in rest) && wanted['sliceThicknessMm'] !== undefined) delete wanted['sliceCount'];
    return isDeepStrictEqual(wanted, rest);
  });
/** A found way as quick as a route with as much signal, within what times and ratios are compared by: 5 %, and 0.05. Every way keeps its limits. */
const asGood = ({ ways }: Document, route: Readonly<Record<string, number | null>>) =>
  ways.find(({ figures }) => {
    const [now, then] = [(key: string) => figures[key] ?? 0, (key: string) => route[key] ?? 0];
    return now('scanTimeS') <= then('scanTimeS') * 1.05 && now('relativeSnr') >= then('relativeSnr') - 0.05;
  });
const noClearance = (text: string) => expect(text).not.toMatch(/\b(safe|cleared|compliant|compliance)\b/i);

describe('3 T liver, arterial phase of 17 s, 11 s of breath: holdfast ways', async () => {
  const source = 'LI-RADS v2018 technical table as given by Santillan, Hepatoma Res 2020;6:63, table 3';
  const art = series('art', 'spoiled-gradient-echo', '3D', ['liver', 'spleen'], liverArterialPhase, {
    plane: 'axial',
    purpose: 'dynamic',
    mustKeep: [{ figure: 'voxelSliceMm', atMost: 5, source }],
  });
  const file = await preset('liver-11', 3, [art]);
  const document = await json<Document>(['ways', file, 'art', '--hold', '11']);
  const { out } = await runCommand(['ways', file, 'art', '--hold', '11']);

  it.each<[string, Values, number, number]>([
    ['4 mm and 6/8 along phase', { sliceThicknessMm: 4, sliceCount: 54, partialFourierPhase: 0.75 }, 9.6, 1],
    ['5 mm', { sliceThicknessMm: 5, sliceCount: 44 }, 10.5, 1.31],
  ])('%s: on the lattice, reached by the front, its figures as they should be', async (_words, set, holdS, snr) => {
    const figures = await figuresWith(file, 'art', set);
    expect(Math.abs((figures['holdTimeS'] ?? 0) / holdS - 1)).toBeLessThan(0.05);
    expect(Math.abs((figures['relativeSnr'] ?? 0) - snr)).toBeLessThan(0.05);
    const reached = document.fronts.timeSnr.some(
      ([timeS, value]) => timeS <= (figures['holdTimeS'] ?? 0) + 1e-9 && value >= (figures['relativeSnr'] ?? 0) - 1e-9,
    );
    expect(reached).toBe(true);
    expect(wayThatSets(document, set) ?? asGood(document, figures), 'found, or a way as good').toBeDefined();
  });

  it.each<[string, Values, number, number]>([
    ['4 mm and a phase voxel of 2.3 mm', { sliceThicknessMm: 4, sliceCount: 54, matrixPhase: 165 }, 10.5, 1.27],
    ['3.6 mm and R 3', { sliceThicknessMm: 3.6, sliceCount: 60, parallelFactorPhase: 3 }, 9.8, 0.79],
  ])('%s lies between the steps: figures --set gives it', async (_words, set, holdS, snr) => {
    const figures = await figuresWith(file, 'art', set);
    expect(Math.abs((figures['holdTimeS'] ?? 0) / holdS - 1)).toBeLessThan(0.05);
    expect(Math.abs((figures['relativeSnr'] ?? 0) - snr)).toBeLessThan(0.05);
  });

  it.each<[string, Values]>([
    ['R 3 alone', { parallelFactorPhase: 3 }],
    ['4.5 mm alone', { sliceThicknessMm: 4.5 }],
    ['6 mm', { sliceThicknessMm: 6 }],
    ['two holds', { rounds: 2 }],
    ['bandwidth x 1.4', { pixelBandwidthHz: 890 }],
  ])('the trap %s is absent', (_words, set) => {
    expect(wayThatSets(document, set)).toBeUndefined();
    for (const { figures, changes } of document.ways) {
      expect(figures['holdTimeS']).toBeLessThanOrEqual(11);
      expect(figures['voxelSliceMm']).toBeLessThanOrEqual(5);
      expect(Object.keys(changes)).not.toContain('rounds');
    }
  });

  it('says that 5 mm is exactly what must be kept, with its source; that phases match; that a timed phase is not split; what may restore the preset', () => {
    const text = out.replace(/\s+/g, ' ');
    expect(text).toContain(`voxel, slice 5 mm: exactly what must be kept, at most 5 mm (${source})`);
    expect(text).toMatch(/all phases of a dynamic series use the same values/);
    expect(text).toMatch(/a timed contrast phase is never split/);
    expect(text).toMatch(/oxygen where it is prescribed: it may restore the preset/);
    noClearance(text);
  });
});

describe('1.5 T lumbar T2, B1+rms at most 2.0 uT, 2.8 displayed: holdfast ways', async () => {
  const disc = 'intervertebral disc (nucleus)';
  const t2 = series('t2', 'fast-spin-echo', '2D', [disc, 'spinal cord (white matter)'], lumbarTrain, { plane: 'sagittal' });
  const file = await preset('lumbar-2ut', 1.5, [t2]);
  const reading = ['--reading', 'b1rmsUt=2.8'];
  const args = ['ways', file, 't2', '--b1rms', '2.0', ...reading];
  const document = await json<Document>(args);

  it.each([
    [120, 'FITS'],
    [125, 'TOO CLOSE'],
  ])('%d degrees alone is found, and %s', (angle, verdict) => {
    expect(wayThatSets(document, { refocusingAngleDeg: angle })?.verdict).toBe(verdict);
  });

  it.each<[string, Values, number, number]>([
    ['150 degrees and TR 5000', { refocusingAngleDeg: 150, repetitionTimeMs: 5000 }, 1.96, 165],
    ['130 degrees and TR 4000', { refocusingAngleDeg: 130, repetitionTimeMs: 4000 }, 1.91, 132],
    ['pulses twice as long', { rfPulseStretch: 2 }, 1.62, 231],
  ])('%s is found or a way as good is, and set by hand it is within the cap', async (_words, set, ut, seconds) => {
    const figures = await figuresWith(file, 't2', set, ...reading);
    expect(figures['b1PlusRmsUt']).toBeLessThan(2);
    if (ut !== 1.62) expect(Math.abs((figures['b1PlusRmsUt'] ?? 0) / ut - 1)).toBeLessThan(0.02);
    expect(Math.abs((figures['scanTimeS'] ?? 0) / seconds - 1)).toBeLessThan(0.05);
    expect(wayThatSets(document, set) ?? asGood(document, figures), 'found, or a way as good').toBeDefined();
    const byHand = Object.entries(set).flatMap(([key, value]) => ['--set', `${key}=${value}`]);
    const { ways } = await json<Document>([...args, ...byHand]);
    expect(ways.some(({ changes }) => Object.keys(changes).every((key) => key in set || key === 'rounds'))).toBe(true);
  });

  it.each<[string, Values]>([
    ['130 degrees alone', { refocusingAngleDeg: 130 }],
    ['150 degrees and TR 4800', { refocusingAngleDeg: 150, repetitionTimeMs: 4800 }],
  ])('the trap %s is absent', (_words, set) => {
    expect(wayThatSets(document, set)).toBeUndefined();
    for (const { figures } of document.ways) expect(figures['b1PlusRmsUt']).toBeLessThanOrEqual(2);
  });

  it('is scaled from the scanner and says to read it again; without a reading it is refused', async () => {
    for (const { cautions } of document.ways) expect(cautions.map(({ code }) => code)).toContain('read-scanner-again');
    noClearance(JSON.stringify(document));
    expect((await runCommand(['ways', file, 't2', '--b1rms', '2.0'])).exit).toBe(64);
  });
});

describe('3 T cervical T1, SAR at most 2.0 W/kg, 2.6 displayed: holdfast ways', async () => {
  const parameters: Given = {
    repetitionTimeMs: 600,
    echoTimeMs: 10,
    echoTrainLength: 3,
    echoSpacingMs: 10,
    refocusingAngleDeg: 150,
    sliceCount: 15,
    sliceThicknessMm: 3,
    sliceGapMm: 0.3,
    fieldOfViewMm: 240,
    matrixRead: 320,
    matrixPhase: 256,
    pixelBandwidthHz: 250,
  };
  const t1 = series('t1', 'fast-spin-echo', '2D', ['spinal cord (white matter)', 'skeletal muscle'], parameters, {
    plane: 'sagittal',
    mustKeep: [{ figure: 'voxelSliceMm', atMost: 3, source: 'ACR spine accreditation, 2022 support article' }],
  });
  const file = await preset('cervical-sar', 3, [t1]);
  const document = await json<Document>(['ways', file, 't1', '--sar', '2', '--reading', 'sarWkg=2.6']);

  it('presents TR 780, a lower angle and 11 slices side by side, each with its own cost', () => {
    expect(wayThatSets(document, { repetitionTimeMs: 780 })?.gives.map(({ figure }) => figure)).toContain('scanTimeS');
    // 127 degrees lie between two steps of 5.
    expect(wayThatSets(document, { refocusingAngleDeg: 125 })?.gives.map(({ figure }) => figure)).toContain('relativeSnr');
    const fewer = document.ways.find(({ changes }) => Object.keys(changes).join() === 'sliceCount' && changes['sliceCount']?.to === 11);
    expect(fewer?.cautions.map(({ code }) => code)).toContain('coverage-lost');
  });

  it('the trap of 131 degrees, as its step of 130, is absent', () => {
    expect(wayThatSets(document, { refocusingAngleDeg: 130 })).toBeUndefined();
    expect(wayThatSets(document, { refocusingAngleDeg: 131 })).toBeUndefined();
    noClearance(JSON.stringify(document));
  });
});

describe('a child, awake, five minutes: holdfast budget', async () => {
  const common: Given = {
    fieldOfViewMm: 200,
    matrixRead: 256,
    sliceCount: 20,
    sliceThicknessMm: 4,
    sliceGapMm: 0.4,
    pixelBandwidthHz: 250,
    echoTimeMs: 90,
  };
  const brain = ['white matter', 'CSF'] as const;
  const all = [
    series('localiser', 'spoiled-gradient-echo', '2D', brain, {
      ...common,
      echoTimeMs: 3,
      flipAngleDeg: 30,
      repetitionTimeMs: 150,
      matrixPhase: 100,
      sliceCount: 3,
    }),
    series('dwi', 'echo-planar-spin-echo', '2D', brain, {
      ...common,
      repetitionTimeMs: 4000,
      echoTimeMs: 80,
      matrixRead: 128,
      matrixPhase: 128,
      pixelBandwidthHz: 1800,
      parallelFactorPhase: 2,
      diffusion: { bValuesSPerMm2: [0, 1000], directions: 3, averages: [1, 3] },
    }),
    series('t2', 'fast-spin-echo', '2D', brain, {
      ...common,
      repetitionTimeMs: 4000,
      matrixPhase: 256,
      parallelFactorPhase: 2,
      echoTrainLength: 16,
      dummyShots: 1,
    }),
    series('flair', 'fast-spin-echo', '2D', brain, {
      ...common,
      repetitionTimeMs: 9000,
      inversionTimeMs: 2500,
      matrixPhase: 192,
      parallelFactorPhase: 2,
      echoTrainLength: 16,
      rounds: 2,
    }),
    series('t1', 'spoiled-gradient-echo', '2D', brain, {
      ...common,
      echoTimeMs: 4,
      flipAngleDeg: 70,
      repetitionTimeMs: 220,
      matrixPhase: 192,
      parallelFactorPhase: 2,
      rounds: 2,
    }),
  ];
  const withMinimum = await preset('child', 3, all, { minimumSet: ['dwi', 't2'] });
  const without = await preset('child-plain', 3, all);

  it.each([
    ['with its minimum set', withMinimum],
    ['without a minimum set', without],
  ])('%s: everything stays as it is, 4:51, in the order given; too close, and nothing is rewritten for that', async (_words, file) => {
    const { plan, totalS } = await json<Plan>(['budget', file, '--minutes', '5', '--overhead', '10']);
    expect(plan.map(({ series: id, choice, changes }) => [id, choice, changes])).toEqual(all.map(({ id }) => [id, 'as it is', {}]));
    expect(Math.abs(totalS - 291)).toBeLessThan(1);
    expect((await runCommand(['budget', file, '--minutes', '5', '--overhead', '10'])).out).toContain('TOO CLOSE');
  });

  it('once localiser, diffusion and T2 are done, the minimum answer exists: what is left may be given up', async () => {
    const done = ['localiser', 'dwi', 't2'].flatMap((id) => ['--done', id]);
    // Exit code 0: nothing more fits, and nothing more is needed.
    const { plan } = await json<Plan>(['budget', withMinimum, '--minutes', '0.2', '--overhead', '10', ...done]);
    expect(plan.map(({ choice }) => choice)).toEqual(['skipped', 'skipped']);
  });
});

describe('3 T liver diffusion, distorted: holdfast ways', async () => {
  const parameters = {
    repetitionTimeMs: 4800,
    echoTimeMs: 90,
    echoSpacingMs: 0.6,
    sliceCount: 20,
    sliceThicknessMm: 6,
    fieldOfViewMm: 380,
    matrixRead: 128,
    matrixPhase: 128,
    pixelBandwidthHz: 2000,
    parallelFactorPhase: 2,
    diffusion: { bValuesSPerMm2: [50, 800], directions: 3, averages: [1, 4] },
  };
  const more = { plane: 'axial', tissueOverrides: { liver: { t2Ms: 80 } }, locked: ['sliceThicknessMm'] };
  const file = await preset('dwi-distorted', 3, [series('dwi', 'echo-planar-spin-echo', '2D', ['liver', 'spleen'], parameters, more)]);
  const asked = ['ways', file, 'dwi', '--keep', 'distortionPxPer100Hz=0.7', '--keep', 'relativeContrast=0.5'];
  /** A scanner whose coil has this many elements front to back. */
  const scannerWith = async (elements: number) => {
    const path = join(folder, `scanner-${elements}.json`);
    const g = [2, 3].map((phase) => ({ phase, slice: 1, region: 'abdomen', g: phase === 2 ? 1.05 : 1.2 }));
    const coil = { name: 'body', elements: { AP: elements, RL: 8, HF: 4 }, g: g.map(({ region: _any, ...row }) => row) };
    await writeFile(
      path,
      JSON.stringify({
        format: 'holdfast scanner',
        version: 1,
        name: 'invented',
        fieldT: 3,
        gradientMtPerM: 40,
        slewTPerMPerS: 150,
        visibleLengthMm: 500,
        maximumB1Ut: 20,
        modelErrorPercent: 5,
        coils: [coil],
      }),
    );
    return path;
  };

  it('R 3 is found: 3.8 to 2.6 px at 100 Hz, fat 16.7 to 11.1 px', async () => {
    const way = wayThatSets(await json<Document>(asked), { parallelFactorPhase: 3 });
    expect(way?.figures['distortionPxPer100Hz']).toBeCloseTo(2.6, 1);
    expect(way?.figures['chemicalShiftPx']).toBeCloseTo(11.1, 0);
    expect((await figuresWith(file, 'dwi', {}))['distortionPxPer100Hz']).toBeCloseTo(3.8, 1);
  });

  it('it is recommended only where the coil has elements along phase', async () => {
    const found = async (elements: number) => {
      const ran = await runCommand([...asked, '--scanner', await scannerWith(elements), '--json']);
      return wayThatSets(JSON.parse(ran.out) as Document, { parallelFactorPhase: 3 });
    };
    expect(await found(4)).toBeDefined();
    expect(await found(2)).toBeUndefined();
  });
});

describe('an aortic ghost over the left lobe, phase swapped by hand: holdfast ways', async () => {
  const parameters: Given = { ...liverArterialPhase, fieldOfViewMm: 400, phaseFieldOfViewPercent: 75, matrixPhase: 212 };
  const file = await preset('aorta', 3, [series('t1', 'spoiled-gradient-echo', '3D', ['liver', 'spleen'], parameters, { plane: 'axial' })]);
  const swap = ['--set', 'phaseDirection=RL', '--set', 'phaseFieldOfViewPercent=100'];

  it.each([11, 15])('within %d s the swap alone, 22.7 s, is absent, and bands above and below are offered first', async (holdS) => {
    const figures = await figuresWith(file, 't1', { phaseDirection: 'RL', phaseFieldOfViewPercent: 100 });
    expect(Math.abs((figures['holdTimeS'] ?? 0) / 22.7 - 1)).toBeLessThan(0.05);
    const { out } = await runCommand(['ways', file, 't1', '--hold', String(holdS), ...swap]);
    expect(out.replace(/\s+/g, ' ')).toMatch(
      /(Before rewriting|What else is done): leave phase as it was and set saturation bands above and below first/,
    );
    const ran = await runCommand(['ways', file, 't1', '--hold', String(holdS), ...swap, '--json']);
    for (const { changes, figures: own } of (JSON.parse(ran.out) as Document).ways) {
      expect(own['holdTimeS']).toBeLessThanOrEqual(holdS);
      expect(Object.keys(changes).filter((key) => !['phaseDirection', 'phaseFieldOfViewPercent'].includes(key))).not.toEqual([]);
    }
  });

  it('without a swap the bands are not spoken of', async () => {
    expect((await runCommand(['ways', file, 't1', '--hold', '15'])).out).not.toContain('saturation bands');
  });
});
