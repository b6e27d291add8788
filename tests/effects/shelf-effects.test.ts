import { mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { openWorld } from '../../src/effects/open-world.js';
import type { Answer, Message } from '../../src/session/message.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { recordLine } from '../../src/study/record-line.js';
import type { Study } from '../../src/study/study.js';
import { presetChoice } from '../session/invented-state.js';
import { temporaryFolder } from '../store/temporary-folder.js';

const liver = presetChoice('liver-3t').study;
const said = { role: 'physicist', reason: 'short holds' } as const;

/** A home with the folder of a site, and the world of somebody who works there. */
async function atSite(files: Readonly<Record<string, string>> = {}) {
  const home = temporaryFolder();
  const site = join(home, 'site');
  mkdirSync(site);
  mkdirSync(join(home, '.config', 'holdfast'), { recursive: true });
  for (const [name, text] of Object.entries(files)) writeFileSync(join(home, name), text);
  const world = await openWorld({
    disk: nodeDisk,
    environment: {},
    homeFolder: home,
    workingFolder: home,
    shippedPresets: new URL('../../presets', import.meta.url).pathname,
    presets: site,
    records: join(home, 'records.jsonl'),
    programUrl: import.meta.url,
  });
  const told: Message[] = [];
  world.listen((message) => told.push(message));
  return { home, site, told, leave: world.leave, run: world.runEffect, names: () => readdirSync(site).sort() };
}

function changed(study: Study, sliceThicknessMm: number, revision = study.revision): Study {
  const series = study.series.map((each) =>
    each.id === 't1-3d' ? { ...each, parameters: { ...each.parameters, sliceThicknessMm } } : each,
  );
  return { ...study, series, status: 'reviewed', revision };
}

const studyIn = (answer: Answer | null): Study => {
  if (answer?.kind !== 'released') throw new Error(JSON.stringify(answer));
  return answer.study;
};

describe('releasing from the interface', () => {
  it('adds the next revision with role, day and reason, and tells the list of presets anew', async () => {
    const { run, names, told, site } = await atSite();
    const study = studyIn(await run({ kind: 'release', ask: 1, study: changed(liver, 4, 1), basedOn: 0, said }));
    expect(names()).toEqual(['liver-3t@1.json']);
    expect(study.released).toMatchObject({ role: 'physicist', reason: 'short holds', day: expect.stringMatching(/^\d{4}-\d\d-\d\d$/) });
    expect(JSON.parse(readFileSync(join(site, 'liver-3t@1.json'), 'utf8'))).toMatchObject({ status: 'reviewed', revision: 1 });
    const listed = told.find(({ kind }) => kind === 'presets');
    expect(
      listed?.kind === 'presets' && listed.presets.some(({ study: each, origin }) => each.id === 'liver-3t' && origin === 'site'),
    ).toBe(true);
  });

  it('whoever comes second gets their revision and the one that both started from; nothing is written', async () => {
    const { run, names } = await atSite();
    await run({ kind: 'release', ask: 1, study: changed(liver, 3, 1), basedOn: 0, said });
    await run({ kind: 'release', ask: 2, study: changed(liver, 4, 2), basedOn: 1, said: { ...said, reason: 'theirs' } });
    const answer = await run({ kind: 'release', ask: 3, study: changed(liver, 3.5, 2), basedOn: 1, said });
    expect(answer).toMatchObject({ kind: 'taken', theirs: { revision: 2, released: { reason: 'theirs' } }, base: { revision: 1 } });
    expect(names()).toEqual(['liver-3t@1.json', 'liver-3t@2.json']);
  });

  it('is checked once more, by the rules of the site too: what fails is not written', async () => {
    const rule = { region: 'liver', mustKeep: { figure: 'voxelSliceMm', atMost: 3.2, source: 'our site' } };
    const rules = JSON.stringify({ format: 'holdfast rules', version: 1, rules: [rule] });
    const { run, names } = await atSite({ '.config/holdfast/rules.json': rules });
    const study = changed(liver, 4, 1);
    const checked = await run({ kind: 'check-release', ask: 1, study });
    expect(checked).toMatchObject({ kind: 'checked', newest: null });
    const answer = await run({ kind: 'release', ask: 2, study, basedOn: 0, said });
    for (const each of [checked, answer]) {
      if (each?.kind !== 'checked') throw new Error('not checked');
      expect(each.findings.filter(({ level }) => level === 'failure').map(({ text }) => text)).toContainEqual(
        expect.stringContaining('our site'),
      );
    }
    expect(names()).toEqual([]);
  });

  it('all revisions are read, newest first, site before what ships; a wrong file among them is told', async () => {
    const { run, site } = await atSite();
    await run({ kind: 'release', ask: 1, study: changed(liver, 3, 1), basedOn: 0, said });
    await run({ kind: 'release', ask: 2, study: changed(liver, 4, 2), basedOn: 1, said });
    writeFileSync(join(site, 'liver-3t@7.json'), '{');
    writeFileSync(
      join(site, 'liver-3t.json'),
      readFileSync(join(site, 'liver-3t@2.json'), 'utf8').replace('short holds', 'another reason'),
    );
    const answer = await run({ kind: 'read-revisions', ask: 3, id: 'liver-3t' });
    if (answer?.kind !== 'revisions') throw new Error('no revisions');
    expect(answer.presets.map(({ origin, study }) => `${origin} ${study.revision}`)).toEqual(['site 2', 'site 1', 'shipped 1']);
    expect(answer.notes.join()).toContain('liver-3t@7.json');
    expect(answer.notes.join()).toContain('liver-3t.json says that it is revision 2 too');
  });
});

describe("a colleague's folder", () => {
  it('of thirty presets with wrong files among them is listed without stopping, of each the current revision', async () => {
    const { run, site, told } = await atSite();
    const text = readFileSync('presets/knee-3t.json', 'utf8');
    for (let at = 0; at < 30; at += 1) writeFileSync(join(site, `knee-${at}.json`), text.replace('"knee-3t"', `"knee-${at}"`));
    for (const revision of [2, 3])
      writeFileSync(join(site, `knee-7@${revision}.json`), JSON.stringify({ ...JSON.parse(text), id: 'knee-7', revision }));
    writeFileSync(join(site, 'half.json'), text.slice(0, 700));
    writeFileSync(join(site, 'binary.json'), Buffer.from([0, 1, 2, 255, 254]));
    writeFileSync(join(site, 'empty.json'), '');
    mkdirSync(join(site, 'folder.json'));
    symlinkSync(join(site, 'nowhere'), join(site, 'dangling.json'));
    await run({ kind: 'list-presets' });
    const listed = told.find(({ kind }) => kind === 'presets');
    if (listed?.kind !== 'presets') throw new Error('no list');
    const ofSite = listed.presets.filter(({ origin }) => origin === 'site');
    expect(ofSite).toHaveLength(30);
    expect(ofSite.find(({ study }) => study.id === 'knee-7')?.study.revision).toBe(3);
    for (const name of ['half.json', 'binary.json', 'empty.json', 'folder.json', 'dangling.json'])
      expect(
        listed.notes.some((note) => note.includes(name)),
        name,
      ).toBe(true);
  });
});

describe('records from the interface', () => {
  const records = [...inventedRecords(700, 9)];
  const lines = records.map((record) => `${recordLine(record)}\n`);
  const inFile = () => atSite({ 'records.jsonl': ['damaged\n', ...lines].join('') });

  it('are listed newest first, damaged lines counted and named', async () => {
    const { run } = await inFile();
    const answer = await run({ kind: 'list-records', ask: 1, typed: '' });
    if (answer?.kind !== 'record-list') throw new Error('no list');
    const { rows, ...counts } = answer.list;
    expect(counts).toMatchObject({ records: 700, meant: 700, damaged: 1, stopped: false });
    expect(counts.notes).toEqual([expect.stringContaining('Line 1 of')]);
    const days = rows.map(({ day }) => day ?? '');
    expect(days).toEqual([...days].sort().reverse());
    expect(rows[0]?.id).toBe(records.filter(({ day }) => day === days[0]).at(-1)?.id);
  });

  it('one is found by its file and line; a line that holds none is told', async () => {
    const { run } = await inFile();
    const list = await run({ kind: 'list-records', ask: 1, typed: 'pain' });
    if (list?.kind !== 'record-list') throw new Error('no list');
    for (const { file, line, id } of list.list.rows.slice(0, 5))
      expect(await run({ kind: 'read-record', ask: 2, file, line })).toMatchObject({ kind: 'one-record', record: { id } });
    const [row] = list.list.rows;
    expect(await run({ kind: 'read-record', ask: 3, file: row!.file, line: 1 })).toMatchObject({ kind: 'failed' });
    expect(await run({ kind: 'read-record', ask: 4, file: row!.file, line: 9999 })).toMatchObject({ kind: 'failed' });
    expect(await run({ kind: 'read-record', ask: 5, file: '/nowhere', line: 1 })).toMatchObject({ kind: 'failed' });
  });

  it('the report counts what is meant by the typed words', async () => {
    const { run } = await inFile();
    const answer = await run({ kind: 'report-records', ask: 1, typed: 'trainee' });
    if (answer?.kind !== 'record-report') throw new Error('no report');
    const count = records.filter(({ role }) => role === 'trainee').length;
    expect(count).toBeGreaterThan(0);
    expect(answer.report).toMatchObject({
      meant: count,
      records: 700,
      shown: { report: { sessions: count }, files: 1, chosen: 'trainee' },
    });
    expect(answer.report.shown.now.get('liver-3t')?.study?.id).toBe('liver-3t');
  });

  it('a long reading goes on between keys, is stopped with what it has, and gives way to another', async () => {
    const { run } = await inFile();
    let turns = 0;
    const turning = setInterval(() => {
      turns += 1;
    }, 0);
    const whole = await run({ kind: 'list-records', ask: 1, typed: '' });
    clearInterval(turning);
    // The file comes in pieces; between two of them others have their turn.
    expect(turns).toBeGreaterThan(5);
    expect(whole).toMatchObject({ kind: 'record-list' });

    const stopped = run({ kind: 'list-records', ask: 2, typed: '' });
    await new Promise((resolve) => setTimeout(resolve, 5));
    await run({ kind: 'stop-reading' });
    const answer = await stopped;
    if (answer?.kind !== 'record-list') throw new Error('no list');
    expect(answer.list.stopped).toBe(true);
    expect(answer.list.records).toBeLessThan(700);

    const left = await inFile();
    const reading = left.run({ kind: 'report-records', ask: 9, typed: '' });
    await left.leave(null);
    // Whoever leaves does not wait for the end of the files.
    expect(await reading).toMatchObject({ kind: 'record-report', report: { stopped: true } });

    const first = run({ kind: 'report-records', ask: 3, typed: '' });
    const second = run({ kind: 'list-records', ask: 4, typed: '' });
    expect(await first).toBeNull();
    expect(await second).toMatchObject({ kind: 'record-list', list: { records: 700, stopped: false } });
  });

  it('nobody recorded anything yet: no trouble, no records; a folder of files reads as one', async () => {
    const none = await atSite();
    expect(await none.run({ kind: 'list-records', ask: 1, typed: '' })).toMatchObject({ list: { records: 0, notes: [] } });
    const some = await atSite();
    mkdirSync(join(some.home, 'records.jsonl'));
    writeFileSync(join(some.home, 'records.jsonl', 'a.jsonl'), lines.slice(0, 3).join(''));
    writeFileSync(join(some.home, 'records.jsonl', 'b.jsonl'), lines.slice(3, 5).join(''));
    writeFileSync(join(some.home, 'records.jsonl', 'notes.txt'), 'no records');
    expect(await some.run({ kind: 'list-records', ask: 1, typed: '' })).toMatchObject({ list: { records: 5, damaged: 0 } });
  });
});
