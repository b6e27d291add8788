import { existsSync, readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { cautionCodes } from '../../src/calc/caution.js';
import { classKeyOf, classRow } from '../../src/calc/classes.js';
import { figureKeys } from '../../src/calc/figures.js';
import { parameterKeys } from '../../src/calc/parameters.js';
import { runCommand } from './run-command.js';

interface SeriesDocument {
  readonly id: string;
  readonly parameters: Record<string, unknown>;
  readonly figures: Record<string, number | null>;
  readonly fromReading: readonly string[];
  readonly signals: readonly Record<string, unknown>[];
  readonly cautions: readonly { code: string; level: string; text: string }[];
}
interface Document {
  readonly preset: string;
  readonly fieldT: number;
  readonly series: readonly SeriesDocument[];
}

async function figures(...args: string[]): Promise<Document> {
  const { exit, out, err } = await runCommand(['figures', ...args, '--json']);
  expect([exit, err]).toEqual([0, '']);
  return JSON.parse(out) as Document;
}

async function oneSeries(...args: string[]): Promise<SeriesDocument> {
  const { series } = await figures(...args);
  expect(series).toHaveLength(1);
  return series[0] as SeriesDocument;
}

const shipped = readdirSync('presets').map((name) => name.replace(/\.json$/, ''));

describe('figures --json', () => {
  it.each(shipped)('%s has the shape that outside checks read', async (id) => {
    const document = await figures(id);
    expect(Object.keys(document)).toEqual(['preset', 'fieldT', 'series']);
    expect(document.preset).toBe(id);
    for (const series of document.series) {
      expect(Object.keys(series)).toEqual(['id', 'parameters', 'figures', 'fromReading', 'signals', 'cautions']);
      expect(Object.keys(series.figures)).toEqual(figureKeys);
      for (const value of Object.values(series.figures)) expect(value === null || Number.isFinite(value)).toBe(true);
      expect(series.signals.length).toBeGreaterThan(2);
      for (const signal of series.signals) {
        expect(Object.keys(signal)).toEqual([
          'tissue',
          't1Ms',
          't2Ms',
          't2StarMs',
          'protonDensity',
          'signal',
          'secondSignal',
          'suppression',
          'diffusionFactor',
        ]);
      }
      for (const caution of series.cautions) {
        expect(Object.keys(caution)).toEqual(['code', 'level', 'text']);
        expect(cautionCodes).toContain(caution.code);
        expect(['note', 'caution', 'error']).toContain(caution.level);
      }
      expect(series.fromReading).toEqual([]);
      expect(series.figures['relativeSnr']).toBe(1);
    }
  });

  it('keeps the order of the file, and lists the target, the comparison, then the others', async () => {
    const { series } = await figures('liver-3t');
    expect(series.map(({ id }) => id)).toEqual(['ss-cor', 'dual-echo', 't2fs', 'dwi', 't1-3d']);
    const tissues = series[4]?.signals.map(({ tissue }) => tissue) ?? [];
    expect(tissues.slice(0, 2)).toEqual(['liver', 'spleen']);
    expect(new Set(tissues).size).toBe(tissues.length);
  });

  it('parameters are all those of the class, defaults filled in, absent ones left out', async () => {
    const { parameters } = await oneSeries('liver-3t', 't1-3d');
    const has = classRow(classKeyOf('spoiled-gradient-echo', '3D') as never).parameters;
    const absent = ['displayMatrix', 'reconstruction', 'secondEchoTimeMs', 'fatSuppressionEveryLines', 'roundsPerHold'];
    const expected = parameterKeys.filter((key) => has.includes(key) && !absent.includes(key));
    expect(Object.keys(parameters)).toEqual(expected);
    expect(parameters['slabs']).toBe(1);
    expect(parameters['pacing']).toEqual({ kind: 'breath-hold' });
  });

  it('a set value wins, with its unit, and what follows is carried and shown', async () => {
    const before = await oneSeries('liver-3t', 't1-3d');
    const after = await oneSeries('liver-3t', 't1-3d', '--set', 'fieldOfViewMm=38 cm', '--set', 'pixelBandwidthHz=0.8 kHz');
    expect(after.parameters['fieldOfViewMm']).toBe(380);
    expect(after.parameters['pixelBandwidthHz']).toBe(800);
    expect(after.parameters['repetitionTimeMs']).toBeLessThan(before.parameters['repetitionTimeMs'] as number);
    expect(after.cautions.map(({ code }) => code)).toContain('timing-carried');
    const kept = await oneSeries('liver-3t', 't1-3d', '--set', 'pixelBandwidthHz=800', '--set', 'repetitionTimeMs=3.55');
    expect(kept.parameters['repetitionTimeMs']).toBe(3.55);
  });

  it("reaches inside pacing with a dot, from the preset's own values", async () => {
    const { parameters } = await oneSeries('liver-3t', 't2fs', '--set', 'pacing.periodMs=5 s');
    expect(parameters['pacing']).toEqual({ kind: 'respiratory-trigger', periodMs: 5000, windowMs: 1800 });
  });

  // Counts from the rules of section 2 of the model by hand: 80 lines x 45 partitions x 3.55 ms x 4 volumes = 51.12 s.
  it('computes the time of a rewritten series from its lines', async () => {
    const { figures: now } = await oneSeries('liver-3t', 't1-3d', '--set', 'sliceThicknessMm=4', '--set', 'sliceCount=54');
    expect(now['scanTimeS']).toBeCloseTo(51.12, 9);
    expect(now['holdTimeS']).toBeCloseTo(12.78, 9);
  });

  it('another field compares with the preset at the field of its file', async () => {
    const at3 = await figures('knee-1.5t', '--field', '3 T');
    expect(at3.fieldT).toBe(3);
    const shift = at3.series[0]?.figures['chemicalShiftPx'] as number;
    const own = (await figures('knee-1.5t')).series[0]?.figures['chemicalShiftPx'] as number;
    expect(shift / own).toBeCloseTo(2, 9);
    expect(at3.series[0]?.figures['relativeSnr']).not.toBe(1);
  });

  it('a reading scales and says which figures', async () => {
    const { figures: now, fromReading } = await oneSeries('liver-3t', 't1-3d', '--reading', 'timeS=71', '--reading', 'b1rmsUt=1 uT');
    expect(now['scanTimeS']).toBeCloseTo(71, 9);
    expect(now['b1PlusRmsUt']).toBeCloseTo(1, 9);
    expect(fromReading).toEqual(['scanTimeS', 'holdTimeS', 'b1PlusRmsUt']);
  });

  it('a body too wide for an accelerated series is an error caution, and the exit code stays 0', async () => {
    const { cautions } = await oneSeries('liver-3t', 't1-3d', '--body', 'AP=430');
    expect(cautions[0]).toMatchObject({ code: 'wrap-unfoldable', level: 'error' });
  });

  it('a crossed must-keep is a caution that names its source', async () => {
    const { cautions } = await oneSeries('liver-3t', 't1-3d', '--set', 'sliceThicknessMm=6');
    const crossed = cautions.find(({ code }) => code === 'must-keep');
    expect(crossed?.text).toContain('LI-RADS v2018');
  });

  it('TE not shorter than TR: an error caution, null figures, exit code 0', async () => {
    const { cautions, figures: now } = await oneSeries('liver-3t', 't1-3d', '--set', 'echoTimeMs=20');
    expect(cautions[0]).toMatchObject({ code: 'timing-impossible', level: 'error' });
    expect(now['relativeSnr']).toBeNull();
    expect(now['scanTimeS']).not.toBeNull();
  });

  it('takes a path for a preset', async () => {
    expect(existsSync('presets/liver-3t.json')).toBe(true);
    expect(await figures('./presets/liver-3t.json')).toEqual(await figures('liver-3t'));
  });
});

describe('figures as a page', () => {
  it.each(shipped)('%s keeps to 80 columns, whole and series by series', async (id) => {
    const { series } = await figures(id);
    for (const args of [[id], ...series.map((one) => [id, one.id])]) {
      const { exit, out, err } = await runCommand(['figures', ...args]);
      expect([exit, err]).toEqual([0, '']);
      for (const line of out.split('\n')) expect(line.length, line).toBeLessThanOrEqual(80);
    }
  });

  it('has the running order by priority, with a running total', async () => {
    const { out } = await runCommand(['figures', 'liver-3t']);
    const rows = out.split('\n').filter((line) => /^(ss-cor|dual-echo|t2fs|dwi|t1-3d) /.test(line));
    expect(rows.map((line) => line.split(' ')[0])).toEqual(['t1-3d', 'ss-cor', 'dual-echo', 't2fs', 'dwi']);
    expect(rows[0]).toContain('4 x 17.0 s');
  });

  it('one series shows what is set, what was carried, and the preset beside it', async () => {
    const { out } = await runCommand(['figures', 'liver-3t', 't1-3d', '--set', 'pixelBandwidthHz=800']);
    expect(out).toMatch(/^bandwidth +800 Hz\/px +600 Hz\/px +set$/m);
    expect(out).toMatch(/^TR +3\.\d+ ms +3\.55 ms +carried$/m);
    expect(out.replace(/\n/g, ' ')).toContain('No value for slices per TR, rounds needed, T2 blur, null TI');
  });

  it('the preset of a reading is scaled by it too', async () => {
    const { out } = await runCommand(['figures', 'liver-3t', 't1-3d', '--reading', 'timeS=71', '--set', 'sliceCount=36']);
    expect(out).toMatch(/^scan time +\d+\.\d s +1:11 +-\d+ % +scanner reading$/m);
  });

  it('never clears anything, and says what the numbers are', async () => {
    const { out } = await runCommand(['figures', 'lumbar-spine-1.5t', 't2-sag', '--reading', 'b1rmsUt=2.8']);
    expect(out).not.toMatch(/\b(safe|cleared|compliant)\b/i);
    expect(out.replace(/\n/g, ' ')).toContain("RF figures are trends: read the scanner's own displayed values before starting");
    expect(out.replace(/\n/g, ' ')).toContain('not a medical device');
  });

  it('--reader makes sentences of rows, --ascii leaves nothing else', async () => {
    const { out } = await runCommand(['figures', 'liver-3t', '--reader', '--ascii']);
    expect(out).toMatch(/^t1-3d: time 1:08; breath-holds 4 x 17\.0 s; SNR 100 %/m);
    expect(out).toMatch(/^[\n\x20-\x7e]*$/);
  });
});
