import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { runCommand } from './run-command.js';

let here = '';
beforeEach(() => {
  here = mkdtempSync(join(tmpdir(), 'holdfast-'));
});
afterEach(() => rmSync(here, { recursive: true, force: true }));
const folder = () => here;
const least = { format: 'holdfast scanner', version: 1, name: 'Room 2', fieldT: 2.89 };

function write(path: string, file: unknown): string {
  const full = join(folder(), path);
  mkdirSync(join(full, '..'), { recursive: true });
  writeFileSync(full, typeof file === 'string' ? file : JSON.stringify(file, null, 2));
  return full;
}

/** Runs with scanner files of the site in a folder. */
async function withSite(args: string[], files: Record<string, unknown>) {
  const site = join(folder(), 'site');
  mkdirSync(site, { recursive: true });
  for (const [name, file] of Object.entries(files)) write(join('site', name), file);
  return runCommand(args, { environment: { HOLDFAST_SCANNERS: site } });
}

describe('scanner list', () => {
  it('names the shipped scanners, then those of the settings and of the site', async () => {
    const { exit, out } = await runCommand(['scanner', 'list', '--json']);
    expect(exit).toBe(0);
    const names = (JSON.parse(out) as { scanners: { name: string; fieldT: number }[] }).scanners.map(({ name, fieldT }) => [name, fieldT]);
    expect(names).toEqual([
      ['demo-1.5t', 1.494],
      ['demo-3t', 2.894],
    ]);
    write('config/holdfast/scanners/mine.json', { ...least, name: 'mine' });
    const own = await runCommand(['scanner', 'list'], { environment: { XDG_CONFIG_HOME: join(folder(), 'config') } });
    expect(own.out).toMatch(/^mine +2\.89 T +settings/m);
    const site = await withSite(['scanner', 'list'], { 'room-2.json': least });
    expect(site.out).toMatch(/^Room 2 +2\.89 T +site/m);
  });

  it('tells of files that are wrong and lists the others', async () => {
    const { exit, out, err } = await withSite(['scanner', 'list'], { 'a.json': '{', 'b.json': least });
    expect(exit).toBe(0);
    expect(out).toContain('Room 2');
    expect(err).toContain('a.json, line 1');
  });

  it('ends with 66 where the folder that was named is not there', async () => {
    expect((await runCommand(['scanner', 'list'], { environment: { HOLDFAST_SCANNERS: '/nowhere/at/all' } })).exit).toBe(66);
  });
});

describe('scanner show', () => {
  it('shows every number, what is usual, and the frequencies at the exact field', async () => {
    const { exit, out } = await withSite(['scanner', 'show', 'room 2'], { 'r.json': least });
    expect(exit).toBe(0);
    // gamma-bar 42.577478461 MHz/T x 2.89 T; 3.4 ppm: 418.37 Hz, 1.195/2.390 ms.
    expect(out).toMatch(/Larmor frequency +123\.049 MHz/);
    expect(out).toMatch(/water to fat +418\.4 Hz/);
    expect(out).toMatch(/opposed, in phase +1\.20 ms +2\.39 ms/);
    expect(out).toMatch(/gradient amplitude +40 mT\/m +usual, not in the file/);
    expect(out).toContain('No coils: the usual g table is used.');
  });

  it('shows what changes in a preset: frequencies, g, shortest TE and TR, capacity', async () => {
    const { exit, out } = await runCommand(['scanner', 'show', 'demo-3t', '--coil', 'head', '--preset', 'brain-3t', '--json']);
    expect(exit).toBe(0);
    const document = JSON.parse(out) as {
      frequencies: { larmorMhz: number };
      presetFrequencies: { larmorMhz: number };
      coil: string;
      series: {
        id: string;
        g: { from: number; to: number };
        shortestEchoTimeMs: { from: number; to: number };
        slicesPerRepetition: { from: number };
      }[];
    };
    expect(document.coil).toBe('head');
    expect(document.frequencies.larmorMhz / document.presetFrequencies.larmorMhz).toBeCloseTo(2.894 / 3, 9);
    const t2 = document.series.find(({ id }) => id === 't2');
    expect(t2?.g).toEqual({ from: 1.05, to: 1.03 });
    expect(t2?.shortestEchoTimeMs.to).not.toBe(t2?.shortestEchoTimeMs.from);
    expect(t2?.slicesPerRepetition.from).toBeGreaterThan(0);
    const page = await runCommand(['scanner', 'show', 'demo-3t', '--coil', 'spine', '--preset', 'brain-3t']);
    expect(page.out).toContain('brain-3t on demo-3t, coil spine');
    for (const line of page.out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it.each([
    [['scanner', 'show', 'demo-4t'], 66, 'Did you mean demo-3t?'],
    [['scanner', 'show', './nowhere.json'], 66, 'not there'],
    [['scanner', 'show', 'demo-3t', '--coil', 'hed'], 64, 'Did you mean head?'],
    [['scanner', 'show', 'demo-3t', '--preset', 'brain-9t'], 66, 'no preset'],
    [['scanner', 'show'], 64, 'NAME is missing'],
  ])('%j ends with %d', async (args, code, words) => {
    const { exit, out, err } = await runCommand(args);
    expect([exit, out]).toEqual([code, '']);
    expect(err).toContain(words);
  });
});

describe('scanner check', () => {
  it('says what is right, and every problem with its line', async () => {
    const right = write('right.json', least);
    const wrong = write('wrong.json', { ...least, serialNumber: 'x' });
    expect((await runCommand(['scanner', 'check', right])).out).toMatch(/^right .*Room 2, 2\.89 T, 0 coils$/m);
    const { exit, err } = await runCommand(['scanner', 'check', right, wrong]);
    expect(exit).toBe(1);
    expect(err).toMatch(/wrong\.json, line 6, serialNumber: .*neither a maker, a model nor a serial number/);
    expect((await runCommand(['scanner', 'check', join(folder(), 'none.json')])).exit).toBe(66);
    expect((await runCommand(['scanner', 'check'])).exit).toBe(0);
  });
});

interface Document {
  readonly fieldT: number;
  readonly series: {
    readonly id: string;
    readonly figures: Record<string, number | null>;
    readonly cautions: { code: string; level: string; text: string }[];
  }[];
}

async function figures(...args: string[]): Promise<Document> {
  const { exit, out, err } = await runCommand(['figures', ...args, '--json']);
  expect([exit, err]).toEqual([0, '']);
  return JSON.parse(out) as Document;
}

describe('figures --scanner', () => {
  it('takes exact field, gradients, pulses and the g of the coil and the region', async () => {
    const { fieldT, series } = await figures('liver-3t', '--scanner', 'demo-3t');
    expect(fieldT).toBe(2.894);
    for (const { figures: of } of series) expect(of.inPhaseMs).toBeCloseTo(1000 / (3.4 * 42.577478461 * 2.894), 9);
    const g = async (...more: string[]) => {
      const document = await figures('liver-3t', 't1-3d', '--scanner', 'demo-3t', ...more);
      return document.series[0]?.figures.relativeSnr as number;
    };
    // g at R 2: 1.04 in the liver with the body coil, 1.03 with the head coil: SNR goes as 1/g (no reference lines).
    expect((await g('--coil', 'head')) / (await g())).toBeCloseTo(1.04 / 1.03, 9);
  });

  it('knows no g beyond the coil: SNR is null, and it is said', async () => {
    const document = await figures('liver-3t', 't1-3d', '--scanner', 'demo-3t', '--coil', 'shoulder', '--set', 'parallelFactorPhase=3');
    expect(document.series[0]?.figures.relativeSnr).toBeNull();
    expect(document.series[0]?.cautions.map(({ code }) => code)).toContain('g-unknown');
  });

  it.each([
    [['--scanner', 'demo-9t'], 66],
    [['--scanner', 'demo-3t', '--coil', 'foot'], 64],
    [['--coil', 'head'], 64],
    [['--scanner', 'demo-3t', '--field', '3'], 64],
  ])('%j ends with %d', async (more, code) => {
    const { exit, out } = await runCommand(['figures', 'liver-3t', ...more]);
    expect([exit, out]).toEqual([code, '']);
  });

  it('names the scanner and the coil on the page', async () => {
    const { out } = await runCommand(['figures', 'liver-3t', '--scanner', 'demo-3t']);
    expect(out).toMatch(/^On scanner demo-3t, coil body, the first of its file\.$/m);
    expect(out).toContain('At 2.894 T, preset for 3 T.');
  });
});

describe('scenarios on a scanner', () => {
  it('an in/opposed pair copied unchanged to 3 T and to 2.89 T is flagged, with the pair that would serve', async () => {
    // Scenario: at 3.0 T both echoes are in phase (1.00 and 2.00 cycles); 1.15/2.30, at 2.89 T 1.20/2.39 would serve.
    const at3 = await figures('liver-1.5t', 'dual-echo', '--field', '3');
    const text = at3.series[0]?.cautions.find(({ code }) => code === 'echo-pair-phase')?.text ?? '';
    expect(text).toMatch(
      /both echoes are in phase at 3 T \(1\.00 and 2\.00 cycles\).*1\.15\/2\.30 ms.*3\.45\/2\.30 ms, opposed later and T2\* in the way/,
    );
    const site = write('site2/exact.json', { ...least, name: 'exact' });
    const on = await runCommand(['figures', 'liver-1.5t', 'dual-echo', '--scanner', site, '--json']);
    const cautions = (JSON.parse(on.out) as Document).series[0]?.cautions ?? [];
    expect(cautions.find(({ code }) => code === 'echo-pair-phase')?.text).toContain('1.20/2.39 ms');
  });

  it('a body of 430 mm over a field of 340: what R 2 needs, and the visible length where phase runs head to feet', async () => {
    // Scenario: at R 1 the fold stays out from 14 % oversampling, at R 2 all of the body must be encoded (26.5 %).
    const set = ['--set', 'fieldOfViewMm=340', '--set', 'phaseFieldOfViewPercent=100', '--set', 'phaseDirection=RL', '--body', 'RL=430'];
    const codes = async (factor: number, oversampling: number, ...more: string[]) => {
      const values = ['--set', `parallelFactorPhase=${factor}`, '--set', `phaseOversamplingPercent=${oversampling}`];
      const { series } = await figures('liver-3t', 't1-3d', ...set, ...values, ...more);
      return series[0]?.cautions.filter(({ code }) => code.startsWith('wrap')).map(({ code, level }) => `${code} ${level}`);
    };
    expect(await codes(1, 13)).toEqual(['wrap caution']);
    expect(await codes(1, 14)).toEqual([]);
    expect(await codes(2, 20)).toEqual(['wrap-unfoldable error']);
    expect(await codes(2, 27)).toEqual([]);
    // Head to feet the body is as long as the magnet sees: 480 mm in the shorter demo scanner, 500 mm without a file.
    const feet = [
      '--set',
      'phaseDirection=HF',
      '--set',
      'fieldOfViewMm=485',
      '--set',
      'phaseFieldOfViewPercent=100',
      '--set',
      'parallelFactorPhase=1',
    ];
    const wraps = async (...more: string[]) => {
      const { series } = await figures(
        'lumbar-spine-1.5t',
        't2-sag',
        ...feet,
        '--set',
        'phaseOversamplingPercent=0',
        '--set',
        'saturationBands=0',
        ...more,
      );
      return series[0]?.cautions.some(({ code }) => code === 'wrap') ?? false;
    };
    expect([await wraps(), await wraps('--scanner', 'demo-1.5t', '--coil', 'spine')]).toEqual([true, false]);
  });
});

describe('site rules beside a preset', () => {
  const rules = {
    format: 'holdfast rules',
    version: 1,
    rules: [{ region: 'liver', mustKeep: { rule: 'voxelSliceMm <= 2.5 mm', source: 'our site' } }],
  };

  it('are judged in figures, from HOLDFAST_RULES or beside the settings', async () => {
    const path = write('rules/mine.json', rules);
    for (const environment of [{ HOLDFAST_RULES: path }, { XDG_CONFIG_HOME: join(folder(), 'xdg') }]) {
      write('xdg/holdfast/rules.json', rules);
      const { exit, out } = await runCommand(['figures', 'liver-3t', 't1-3d', '--json'], { environment });
      expect(exit).toBe(0);
      const cautions = (JSON.parse(out) as Document).series[0]?.cautions ?? [];
      expect(cautions.filter(({ code }) => code === 'must-keep').map(({ text }) => text)).toEqual([
        'voxel, slice 3 mm: must keep voxelSliceMm <= 2.5 mm (our site)',
      ]);
    }
  });

  it('stop a command when they cannot be read', async () => {
    const path = write(
      'rules/bad.json',
      JSON.stringify({ ...rules, rules: [{ mustKeep: { rule: 'averages.constructor', source: 's' } }] }, null, 2),
    );
    const { exit, out, err } = await runCommand(['figures', 'liver-3t'], { environment: { HOLDFAST_RULES: path } });
    expect([exit, out]).toEqual([65, '']);
    expect(err).toMatch(/bad\.json, line 7, rules\.1\.mustKeep\.rule: a property is not allowed in "averages\.constructor"/);
    expect((await runCommand(['figures', 'liver-3t'], { environment: { HOLDFAST_RULES: '/nowhere.json' } })).exit).toBe(66);
  });
});

describe('presets carry', () => {
  it('prints one JSON document with every reason', async () => {
    const { exit, out, err } = await runCommand(['presets', 'carry', 'shoulder-1.5t', '--to', '3', '--json']);
    expect([exit, err]).toEqual([0, '']);
    const document = JSON.parse(out) as {
      fromT: number;
      toT: number;
      equal: string;
      series: { id: string; values: Record<string, unknown>[]; contrast: { status: string } }[];
    };
    expect(document).toMatchObject({ preset: 'shoulder-1.5t', fromT: 1.5, toT: 3, equal: 'contrast', scanner: null, draft: null });
    expect(document.series.map(({ id }) => id)).toEqual(['pdfs-ax', 't2fs-cor', 't1-cor', 't2fs-sag', 't1-sag']);
    for (const { values } of document.series) {
      const bandwidth = values.find(({ key }) => key === 'pixelBandwidthHz') as { from: number; to: number };
      expect(bandwidth.to).toBe(2 * bandwidth.from);
      for (const value of values) expect(Object.keys(value)).toEqual(['key', 'from', 'to', 'why', 'formula', 'source', 'numbers']);
    }
  });

  it('shows both sides on a page of 80 columns, the reasons, and that it is a proposal', async () => {
    const { exit, out } = await runCommand(['presets', 'carry', 'liver-1.5t', '--scanner', 'demo-3t', '--coil', 'body']);
    expect(exit).toBe(0);
    expect(out).toContain('From 1.5 T to 2.894 T, scanner demo-3t, coil body, equal contrast');
    expect(out).toContain('a person reviews and releases it');
    expect(out).toMatch(/opposed at\s+1\.19\s+ms,\s+in\s+phase\s+at\s+2\.39\s+ms/);
    for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    expect(out).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });

  it('writes a draft that reads back, and never overwrites', async () => {
    const path = join(folder(), 'carried.json');
    const first = await runCommand(['presets', 'carry', 'knee-1.5t', '--to', '0.55', '--out', path]);
    expect(first.exit).toBe(0);
    expect(first.out).toContain('extrapolated');
    const text = readFileSync(path, 'utf8');
    expect(JSON.parse(text)).toMatchObject({ id: 'knee-0.55t', status: 'draft', fieldT: 0.55, revision: 1 });
    const again = await runCommand(['presets', 'carry', 'brain-1.5t', '--to', '3', '--out', path]);
    expect([again.exit, again.out]).toEqual([73, '']);
    expect(readFileSync(path, 'utf8')).toBe(text);
    expect((await runCommand(['figures', path])).exit).toBe(0);
    expect((await runCommand(['presets', 'carry', 'brain-1.5t', '--to', '3', '--out', join(folder(), 'no', 'x.json')])).exit).toBe(73);
  });

  it.each([
    [['brain-3t'], 64],
    [['brain-3t', '--to', '3', '--scanner', 'demo-3t'], 64],
    [['brain-3t', '--to', '7'], 64],
    [['brain-3t', '--to', '0.2'], 64],
    [['brain-3t', '--to', 'x'], 64],
    [['brain-3t', '--to', '1.5', '--equal', 'beauty'], 64],
    [['brain-3t', '--scanner', 'demo-3t', '--coil', 'x'], 64],
    [['brain-3t', '--scanner', 'nobody'], 66],
    [['nobody', '--to', '3'], 66],
  ])('%j ends with %d', async (args, code) => {
    const { exit, out } = await runCommand(['presets', 'carry', ...args]);
    expect([exit, out]).toEqual([code, '']);
  });
});
