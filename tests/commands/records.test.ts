import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { auditRecords, inventedRecords, shippedStudy } from '../../scripts/invented-records.js';
import { parameterKeys } from '../../src/calc/parameters.js';
import type { SessionRecord } from '../../src/study/record.js';
import { recordLine } from '../../src/study/record-line.js';
import { readRecordLine } from '../../src/study/record-line-reader.js';
import { writePreset } from '../../src/study/write-preset.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { runCommand } from './run-command.js';

const text = (records: readonly SessionRecord[]) => records.map((record) => `\n${recordLine(record)}\n`).join('');

/** Forty invented liver sessions, and a site whose current revision is 3. */
function audit() {
  const folder = temporaryFolder();
  const file = join(folder, 'records.jsonl');
  writeFileSync(file, text(auditRecords()));
  const site = join(folder, 'site');
  mkdirSync(site);
  for (const revision of [2, 3])
    writeFileSync(join(site, `liver-3t@${revision}.json`), writePreset({ ...shippedStudy('liver-3t'), revision }));
  const run = (...args: string[]) => runCommand([...args, '--presets', site, '--records', file], { homeFolder: folder });
  return { folder, file, site, run };
}

describe('records report', () => {
  it('of forty liver sessions counts by direction and reason, lists the breach, suggests the variant, says revisions are mixed', async () => {
    const { run } = audit();
    const { exit, out, err } = await run('records', 'report');
    expect([exit, err]).toEqual([0, '']);
    expect(out).toContain('Series t1-3d: run 40, rewritten 16 of 40 (40 %)');
    expect(out).toMatch(/slice thickness\s+16\s+16\s+0\s+\+1 mm/);
    expect(out).toMatch(/4 mm\s+12 {2}#+/);
    expect(out).toMatch(/breath-hold short\s+15/);
    expect(out).toMatch(/NO REASON GIVEN\s+1/);
    expect(out).toContain('ACCEPTED BY NOBODY');
    expect(out).toContain('revisions mixed: 8 from rev 2, current rev 3 (32 sessions)');
    expect(out).toContain('VARIANT TO REVIEW');
    expect(out).not.toMatch(/\b(safe|cleared|compliant)\b/i);
    for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    const reader = await run('records', 'report', '--reader');
    expect(reader.out).toContain('reasons: breath-hold short 15, NO REASON GIVEN 1.');
    expect(reader.out).not.toContain('##');
  });

  it('says the same in JSON', async () => {
    const { run, file } = audit();
    const { out } = await run('records', 'report', '--json');
    const report = JSON.parse(out);
    expect(report).toMatchObject({ sessions: 40, records: 40, damaged: 0, files: [file] });
    expect(report.presets[0]).toMatchObject({ preset: 'liver-3t', currentRevision: 3, sessions: 40 });
    expect(report.presets[0].series[0]).toMatchObject({ recorded: 40, rewritten: 16, rates: { rewritten: 0.4 } });
    expect(report.presets[0].suggestions[0]).toMatchObject({
      kind: 'variant to review',
      times: 12,
      good: 12,
      set: { sliceThicknessMm: 4, sliceCount: 54 },
    });
  });

  it('saves suggestions as drafts when asked, and never else', async () => {
    const { run, folder, site } = audit();
    const own = join(folder, '.local', 'share', 'holdfast', 'presets');
    await run('records', 'report');
    expect(existsSync(own)).toBe(false);
    const { exit, err } = await run('records', 'report', '--save-drafts');
    expect([exit, err.includes('draft to review: liver-3t-draft')]).toEqual([0, true]);
    const draft = JSON.parse(readFileSync(join(own, 'liver-3t-draft.json'), 'utf8'));
    expect([draft.status, draft.notes.includes('12 of 40 (30 %) records')]).toEqual(['draft', true]);
    expect(readdirSync(site)).toHaveLength(2);
  });

  it('filters by period, preset, region, role and reason', async () => {
    const folder = temporaryFolder();
    const [one, two] = auditRecords() as [SessionRecord, SessionRecord, ...SessionRecord[]];
    const records = [
      one,
      { ...two, day: '2026-06-01', role: 'Trainee', region: 'knee', preset: { ...two.preset, id: 'knee-3t' }, reasons: ['pain'] },
      { ...two, day: null, id: 'withoutday' },
    ];
    writeFileSync(join(folder, 'r.jsonl'), text(records));
    const sessions = async (...filter: string[]) => {
      const { out } = await runCommand(['records', 'report', join(folder, 'r.jsonl'), '--json', ...filter], { homeFolder: folder });
      return JSON.parse(out).sessions;
    };
    expect(await sessions()).toBe(3);
    expect(await sessions('--from', '2026-01-05', '--to', '2026-01-05')).toBe(1);
    expect(await sessions('--from', '2026-01-06')).toBe(1);
    expect(await sessions('--preset', 'knee-3t')).toBe(1);
    expect(await sessions('--region', 'LIVER')).toBe(2);
    expect(await sessions('--role', 'trainee')).toBe(1);
    expect(await sessions('--reason', 'pain')).toBe(1);
    expect(await sessions('--reason', 'breath-hold short')).toBe(3);
    expect(await sessions('--reason', 'fever')).toBe(0);
  });

  it('reads several files and a folder of them as one, each once; names, counts and skips damaged lines', async () => {
    const folder = temporaryFolder();
    const [first, second, third] = auditRecords().map((record) => recordLine(record));
    writeFileSync(join(folder, 'a.jsonl'), `${first}\n${second!.replace('"done"', '"gone"')}\n\n${third!.slice(0, 500)}`);
    writeFileSync(join(folder, 'b.jsonl'), `${second}\n`);
    writeFileSync(join(folder, 'b.txt'), 'not records');
    const { exit, out, err } = await runCommand(['records', 'report', folder, join(folder, 'b.jsonl'), '--json'], { homeFolder: folder });
    expect(exit).toBe(0);
    expect(JSON.parse(out)).toMatchObject({ sessions: 2, damaged: 2 });
    expect(err).toContain(`Line 2 of ${join(folder, 'a.jsonl')} is damaged and was skipped`);
    expect(err).toContain(`Line 4 of ${join(folder, 'a.jsonl')} is damaged and was skipped`);
    expect(err.trim().split('\n')).toHaveLength(2);
  });

  it('names the first twenty damaged lines and counts the others', async () => {
    const folder = temporaryFolder();
    writeFileSync(join(folder, 'a.jsonl'), 'damaged\n'.repeat(50));
    const { exit, err } = await runCommand(['records', 'list', join(folder, 'a.jsonl')], { homeFolder: folder });
    expect([exit, err.trim().split('\n').length]).toEqual([0, 21]);
    expect(err).toContain('and 30 more damaged lines');
  });

  it('says how far a long reading is where somebody looks, and clears that', async () => {
    const folder = temporaryFolder();
    const records = [...inventedRecords(600)];
    writeFileSync(join(folder, 'a.jsonl'), text(records));
    const said: string[] = [];
    const { exit } = await runCommand(['records', 'report', join(folder, 'a.jsonl')], {
      homeFolder: folder,
      progress: (words) => said.push(words),
    });
    expect(exit).toBe(0);
    expect(said.length).toBeGreaterThan(10);
    expect(said.slice(-2)).toEqual(['reading records: 100 %', '']);
    expect(new Set(said).size).toBe(said.length);
  });

  it('tells a screen reader each quarter once, a line each, and writes nothing anew', async () => {
    const folder = temporaryFolder();
    writeFileSync(join(folder, 'a.jsonl'), text([...inventedRecords(600)]));
    const said: string[] = [];
    const { err } = await runCommand(['records', 'report', join(folder, 'a.jsonl'), '--reader'], {
      homeFolder: folder,
      progress: (words) => said.push(words),
    });
    expect(said).toEqual([]);
    expect(err.trim().split('\n')).toEqual([0, 25, 50, 75, 100].map((share) => `reading records: ${share} %`));
  });

  it('says nothing between rows that are seen as they are read; where they go into a file it does', async () => {
    const folder = temporaryFolder();
    writeFileSync(join(folder, 'a.jsonl'), text([...inventedRecords(600)]));
    for (const outputIsSeen of [true, false]) {
      const said: string[] = [];
      await runCommand(['records', 'list', join(folder, 'a.jsonl')], {
        homeFolder: folder,
        outputIsSeen,
        progress: (words) => said.push(words),
      });
      expect(said.length > 10, `seen ${outputIsSeen}`).toBe(!outputIsSeen);
    }
  });
});

describe('records list and show', () => {
  it('list has one line a session, with how much was rewritten and why', async () => {
    const { run } = audit();
    const { out } = await run('records', 'list', '--from', '2026-02-02');
    const lines = out.trimEnd().split('\n');
    expect(lines[0]).toMatch(/^record +day +preset +rev +rewritten +reasons$/);
    expect(lines[1]).toMatch(/^000000000000000f {2}2026-02-02 {2}liver-3t +3 {2}1 of 1 {5}breath-hold short$/);
    expect(lines).toHaveLength(27);
    const json = JSON.parse((await run('records', 'list', '--json')).out);
    expect([json.length, json[15].rewritten, json[39].rewritten]).toEqual([40, 1, 0]);
    expect(JSON.parse((await run('records', 'list', '--json', '--role', 'nobody')).out)).toEqual([]);
  });

  it('show prints the page of one session, found by the beginning of its id', async () => {
    const { run } = audit();
    const { exit, out } = await run('records', 'show', '0000000000000010');
    expect([exit, out.includes('ACCEPTED BY NOBODY')]).toEqual([0, true]);
    expect(JSON.parse((await run('records', 'show', '0000000000000010', '--json')).out).id).toBe('0000000000000010');
    expect((await run('records', 'show', '000000000000001')).exit).toBe(64);
    expect((await run('records', 'show', 'ffff')).exit).toBe(66);
  });
});

describe('records export', () => {
  it('as a table: one row a series, every parameter and figure planned and used', async () => {
    const { run } = audit();
    const { out } = await run('records', 'export', '--csv');
    const rows = out.trimEnd().split('\r\n');
    expect(rows).toHaveLength(41);
    const head = rows[0]!.split(',');
    for (const key of parameterKeys) expect(head).toEqual(expect.arrayContaining([`planned.${key}`, `used.${key}`]));
    const cells = rows[1]!.split(',');
    const cell = (name: string) => cells[head.indexOf(name)];
    expect([cell('record'), cell('planned.sliceThicknessMm'), cell('used.sliceThicknessMm')]).toEqual(['0000000000000001', '3', '4']);
  });

  it('as lines that are records again', async () => {
    const { run } = audit();
    const { out } = await run('records', 'export', '--lines', '--reason', 'breath-hold short');
    const lines = out.trimEnd().split('\n');
    expect(lines).toHaveLength(15);
    expect(lines.map((line) => readRecordLine(line).ok)).not.toContain(false);
    expect(lines[0]).toBe(recordLine(auditRecords()[0]!));
  });

  it('as a change request: one page with what, why, how often, figures, must-keeps and evidence', async () => {
    const { run } = audit();
    const { exit, out } = await run('records', 'export', '--change-request', '--preset', 'liver-3t');
    expect(exit).toBe(0);
    const lines = out.trimEnd().split('\n');
    expect(lines.length).toBeLessThanOrEqual(60);
    for (const line of lines) expect(line.length).toBeLessThanOrEqual(80);
    for (const part of [
      'slice thickness 3 mm to 4 mm',
      'breath-hold short 12',
      '12 of 40 (30 %)',
      'kept: voxel, slice 4 mm',
      'small count: 12 sessions',
      'Decided by (role)',
    ])
      expect(out.replace(/\s+/g, ' ')).toContain(part);
    expect(out).toMatch(/breath-hold\s+17\.0 s\s+12\.8 s/);
  });

  it.each([
    [['--csv', '--lines'], 64],
    [[], 64],
    [['--change-request'], 64],
    [['--change-request', '--preset', 'knee-3t'], 1],
    [['--change-request', '--preset', 'liver-3t', '--series', 'none'], 64],
    [['--csv', '--from', 'march'], 64],
    [['--csv', '--from', '2026-02-30'], 64],
    [['--csv', '--from', '2026-03-02', '--to', '2026-03-01'], 64],
    [['--csv', '/nonexistent.jsonl'], 66],
  ])('%j ends with %i and prints nothing', async (options, code) => {
    const { run } = audit();
    const { exit, out, err } = await run('records', 'export', ...options);
    expect([exit, out, err.startsWith('holdfast: ')]).toEqual([code, '', true]);
  });

  it('settings name the file of records and the folder of presets; wrong ones end with 78', async () => {
    const { folder, file, site } = audit();
    mkdirSync(join(folder, '.config', 'holdfast'), { recursive: true });
    const settings = join(folder, '.config', 'holdfast', 'config.json');
    writeFileSync(settings, JSON.stringify({ recordsFile: file, presetsFolder: site }));
    const { exit, out } = await runCommand(['records', 'report'], { homeFolder: folder });
    expect([exit, out.includes('current rev 3')]).toEqual([0, true]);
    writeFileSync(settings, '{ "recordsFile": 7 }');
    expect((await runCommand(['records', 'report'], { homeFolder: folder })).exit).toBe(78);
  });
});
