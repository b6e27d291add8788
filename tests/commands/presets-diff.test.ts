import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { auditRecords } from '../../scripts/invented-records.js';
import { recordLine } from '../../src/study/record-line.js';
import { inventedPreset } from '../store/invented-study.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { runCommand } from './run-command.js';

function folderWith(files: Readonly<Record<string, string>>): string {
  const folder = temporaryFolder();
  for (const [name, text] of Object.entries(files)) writeFileSync(join(folder, name), text);
  return folder;
}

const thicker = inventedPreset('brain', 2).replace('"sliceThicknessMm":5', '"sliceThicknessMm":4');

describe('presets diff', () => {
  it('shows two revisions side by side, parameters and what they do', async () => {
    const folder = folderWith({ 'brain@1.json': inventedPreset('brain', 1), 'brain@2.json': thicker });
    const { exit, out, err } = await runCommand(['presets', 'diff', 'brain@1', 'brain@2', '--presets', folder]);
    expect([exit, err]).toEqual([0, '']);
    expect(out).toMatch(/slice thickness\s+5 mm\s+4 mm\s+-20 %/);
    expect(out).toMatch(/SNR\s+100 %\s+80 %\s+-20 %/);
    for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    // One alone is compared with the revision before it.
    const alone = await runCommand(['presets', 'diff', 'brain', '--presets', folder]);
    expect(alone.out).toBe(out);
    const json = JSON.parse((await runCommand(['presets', 'diff', 'brain', '--presets', folder, '--json'])).out);
    expect(json).toMatchObject({ from: { preset: 'brain', revision: 1 }, to: { revision: 2 } });
    expect(json.series[0].parameters).toEqual([{ key: 'sliceThicknessMm', from: 5, to: 4 }]);
  });

  it('shows what a session planned and what it used', async () => {
    const records = join(temporaryFolder(), 'records.jsonl');
    writeFileSync(records, auditRecords().map(recordLine).join('\n'));
    const { exit, out } = await runCommand(['presets', 'diff', '--record', '0000000000000001', records]);
    expect(exit).toBe(0);
    expect(out).toMatch(/slice thickness\s+3 mm\s+4 mm/);
    expect(out).toMatch(/breath-hold\s+17\.0 s\s+12\.8 s/);
  });

  it.each([
    [['presets', 'diff'], 64],
    [['presets', 'diff', 'liver-3t'], 66],
    [['presets', 'diff', 'liver-3t', 'no-such'], 66],
    [['presets', 'diff', '--record', 'ffff', '--records', '/nonexistent'], 66],
  ])('%j ends with %i and prints nothing', async (args, code) => {
    const { exit, out, err } = await runCommand(args);
    expect([exit, out, err.startsWith('holdfast: ')]).toEqual([code, '', true]);
  });
});

describe('presets list, of a folder that a colleague filled', () => {
  it('lists thirty presets with wrong files among them without stopping', async () => {
    const wrong: Record<string, string> = {
      'broken.json': '{ "format": "holdfast preset"',
      'other.json': '{ "name": "package" }',
      'binary.json': '\u0000\u0001',
      'copy@3.json': inventedPreset('copied', 1).replace('"fieldT":1.5', '"fieldT":"1.5"'),
      'notes.txt': 'not a preset',
    };
    const right = Object.fromEntries(Array.from({ length: 30 }, (_, i) => [`preset-${i}.json`, inventedPreset(`preset-${i}`)]));
    const folder = folderWith({ ...right, ...wrong });
    mkdirSync(join(folder, 'folder.json'));
    const { exit, out, err } = await runCommand(['presets', 'list', '--presets', folder]);
    expect(exit).toBe(0);
    expect(out.split('\n').filter((line) => line.includes(' site '))).toHaveLength(30);
    for (const name of ['broken.json', 'other.json', 'binary.json', 'copy@3.json', 'folder.json']) expect(err).toContain(name);
    expect(err).not.toContain('notes.txt');
    expect((await runCommand(['presets', 'check', '--presets', folder])).exit).toBe(1);
  });

  it('lists the current revision of each, and all of them when asked', async () => {
    const folder = folderWith({
      'brain@1.json': inventedPreset('brain', 1),
      'brain@2.json': thicker,
      'brain.json': inventedPreset('brain', 1),
    });
    const rows = async (...more: string[]) => {
      const { out } = await runCommand(['presets', 'list', '--presets', folder, ...more]);
      return out.split('\n').filter((line) => line.includes(' site '));
    };
    expect(await rows()).toHaveLength(1);
    expect((await rows())[0]).toMatch(/brain\s.*\s2\s+site/);
    expect(await rows('--revisions')).toHaveLength(3);
  });
});

describe('presets check', () => {
  it('says in JSON what it found, file by file, and exits 1 when one fails', async () => {
    const liver = readFileSync('presets/liver-3t.json', 'utf8');
    const folder = folderWith({
      'right.json': liver,
      'pair.json': liver
        .replace(/"echoTimeMs": 1\.15, "secondEchoTimeMs": 2\.3\b/, '"echoTimeMs": 2.3, "secondEchoTimeMs": 4.6')
        .replace('"liver-3t"', '"pair"'),
      'misnamed@3.json': liver,
    });
    const run = (...files: string[]) => runCommand(['presets', 'check', ...files.map((file) => join(folder, file)), '--json']);
    const right = await run('right.json');
    expect(right.exit).toBe(0);
    expect(JSON.parse(right.out)).toMatchObject({
      ok: true,
      files: [{ ok: true, preset: 'liver-3t', revision: 1, status: 'starter', findings: [] }],
    });
    const wrong = await run('right.json', 'misnamed@3.json');
    expect([wrong.exit, wrong.err]).toEqual([1, '']);
    const { ok, files } = JSON.parse(wrong.out);
    expect([ok, files[0].ok, files[1].ok, files[1].problems[0].code]).toEqual([false, true, false, 'revision-name-differs']);
  });

  it('judges by the rules of the site too, and says so where these cannot be read', async () => {
    const rule = { region: 'Liver', mustKeep: { figure: 'voxelSliceMm', atMost: 2.5, source: 'our site' } };
    const folder = folderWith({
      'rules.json': JSON.stringify({ format: 'holdfast rules', version: 1, rules: [rule] }),
      'bad.json': '{',
    });
    const check = (file: string, preset: string) =>
      runCommand(['presets', 'check', preset], { environment: { HOLDFAST_RULES: join(folder, file) } });
    const { exit, out, err } = await check('rules.json', 'liver-3t');
    expect([exit, out]).toEqual([1, '']);
    expect(err).toContain('t1-3d: voxel, slice 3 mm: must be at most 2.5 mm (our site)');
    expect((await check('rules.json', 'knee-3t')).exit).toBe(0);
    expect((await check('bad.json', 'liver-3t')).exit).toBe(65);
  });

  it('judges pairs at the exact field of the magnet', async () => {
    expect((await runCommand(['presets', 'check', 'liver-1.5t'])).exit).toBe(0);
    const { exit, out, err } = await runCommand(['presets', 'check', 'liver-1.5t', '--field', '1.2']);
    expect([exit, out]).toEqual([1, '']);
    expect(err).toContain('[echo-pair-phase]');
    expect((await runCommand(['presets', 'check', '--field', 'three'])).exit).toBe(64);
  });
});
