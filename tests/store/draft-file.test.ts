import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, utimesSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { Disk } from '../../src/store/disk.js';
import { type DraftFile, draftFile } from '../../src/store/draft-file.js';
import { draftPath, ownerPath } from '../../src/store/draft-owner.js';
import { draftText, maximumDraftBytes } from '../../src/store/draft-text.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { type RunningPrograms, runningPrograms } from '../../src/store/running-programs.js';
import { bundledProgram, start } from './child-programs.js';
import { type Fault, faultyDisk } from './faulty-disk.js';
import { temporaryFolder } from './temporary-folder.js';

const session = { region: 'liver', holdS: 11, series: [{ id: 't1-3d', done: false }] };

/** An invented machine on which programs run until they are told to be gone. */
function inventedMachine(machine = 'here') {
  const gone = new Set<number>();
  const program = (processNumber: number): RunningPrograms => ({
    self: { machine, processNumber, started: null },
    isRunning: (mark) => (mark.machine === machine ? !gone.has(mark.processNumber) : null),
  });
  return { program, end: (processNumber: number) => gone.add(processNumber) };
}

function opened(folder: string, programs: RunningPrograms, more: { id?: string; disk?: Disk; nowMs?: () => number } = {}): DraftFile {
  const ids = more.id === undefined ? null : [more.id, `${more.id}next`];
  return draftFile({
    disk: more.disk ?? nodeDisk,
    tool: '0.1.0',
    folder,
    programs,
    ...(ids === null ? {} : { newId: () => ids.shift()! }),
    ...(more.nowMs === undefined ? {} : { nowMs: more.nowMs }),
  });
}

describe('draftFile', () => {
  it('writes nothing before the first save, then one private file', async () => {
    const folder = join(temporaryFolder(), 'state', 'holdfast');
    const draft = opened(folder, runningPrograms(), { id: 'a' });
    expect(await draft.unfinished()).toEqual({ drafts: [], problems: [] });
    expect(existsSync(folder)).toBe(false);
    expect(await draft.save(session)).toEqual({ ok: true, value: undefined });
    expect(readdirSync(folder)).toEqual(['draft-a.json', 'draft-a.owner']);
    expect(statSync(folder).mode & 0o777).toBe(0o700);
    for (const name of readdirSync(folder)) expect(statSync(join(folder, name)).mode & 0o777).toBe(0o600);
  });

  it('gives back everything as it was once its program is gone, and not before', async () => {
    const folder = temporaryFolder();
    const { program, end } = inventedMachine();
    await opened(folder, program(1)).save({ old: true });
    const first = opened(folder, program(1), { id: 'a' });
    await first.save({ old: true });
    await first.save(session);
    const second = opened(folder, program(2));
    expect((await second.unfinished()).drafts).toEqual([]);
    end(1);
    const { drafts } = await second.unfinished();
    expect(drafts).toHaveLength(2);
    expect(drafts.find(({ id }) => id === 'a')?.session).toEqual(session);
    expect(await second.claim('a')).toEqual({ ok: true, value: session });
  });

  it('goes on with a claimed draft as its own, hidden from others', async () => {
    const folder = temporaryFolder();
    const { program, end } = inventedMachine();
    await opened(folder, program(1), { id: 'a' }).save(session);
    end(1);
    const second = opened(folder, program(2), { id: 'b' });
    await second.claim('a');
    await second.save({ ...session, holdS: 12 });
    expect((await opened(folder, program(3)).unfinished()).drafts).toEqual([]);
    expect(readdirSync(folder)).toEqual(['draft-bnext.json', 'draft-bnext.owner']);
    end(2);
    expect((await opened(folder, program(3)).unfinished()).drafts).toMatchObject([{ session: { holdS: 12 } }]);
  });

  it('is offered after being let go, and gone after being discarded', async () => {
    const folder = temporaryFolder();
    const { program } = inventedMachine();
    const left = opened(folder, program(1), { id: 'a' });
    await left.save(session);
    await left.leave();
    expect(await left.save(session)).toMatchObject({ ok: false, problems: [{ code: 'draft-closed' }] });
    expect((await opened(folder, program(2)).unfinished()).drafts).toMatchObject([{ id: 'a' }]);

    const discarded = opened(folder, program(3), { id: 'c' });
    await discarded.save(session);
    expect(await discarded.discard()).toEqual({ ok: true, value: undefined });
    expect(await discarded.discard()).toEqual({ ok: true, value: undefined });
    expect(existsSync(draftPath(folder, 'c'))).toBe(false);
  });

  it('lists the newest first', async () => {
    const folder = temporaryFolder();
    const { program, end } = inventedMachine();
    for (const [index, id] of ['a', 'b', 'c'].entries()) {
      await opened(folder, program(1), { id }).save({ id });
      utimesSync(draftPath(folder, id), 1000, 1000 + ((index * 7) % 3) * 60);
    }
    end(1);
    const { drafts } = await opened(folder, program(2), { nowMs: () => 1_200_000 }).unfinished();
    expect(drafts.map(({ id, ageMs }) => [id, ageMs])).toEqual([
      ['c', 80_000],
      ['b', 140_000],
      ['a', 200_000],
    ]);
  });

  it('leaves a draft of another machine alone while that beats, and offers it after five silent minutes', async () => {
    const folder = temporaryFolder();
    const there = opened(folder, inventedMachine('there').program(1), { id: 'a' });
    await there.save(session);
    const { program } = inventedMachine('here');
    const minutesLater = (minutes: number) => opened(folder, program(2), { nowMs: () => Date.now() + minutes * 60_000 });
    expect((await minutesLater(4).unfinished()).drafts).toEqual([]);
    expect((await minutesLater(6).unfinished()).drafts).toHaveLength(1);
    utimesSync(ownerPath(folder, 'a'), 1000, 1000);
    await there.beat();
    expect((await minutesLater(4).unfinished()).drafts).toEqual([]);
  });

  it('keeps a damaged draft aside, says so once, and offers the others', async () => {
    const folder = temporaryFolder();
    const { program, end } = inventedMachine();
    for (const id of ['a', 'b']) await opened(folder, program(1), { id }).save(session);
    end(1);
    const text = readFileSync(draftPath(folder, 'a'), 'utf8');
    writeFileSync(draftPath(folder, 'a'), text.replace('liver', 'lover'));
    const second = opened(folder, program(2));
    const listed = await second.unfinished();
    expect(listed.drafts.map(({ id }) => id)).toEqual(['b']);
    expect(listed.problems).toMatchObject([
      { code: 'draft-damaged', message: expect.stringContaining('draft-a.json.damaged-1') as string },
    ]);
    expect(readFileSync(`${draftPath(folder, 'a')}.damaged-1`, 'utf8')).toContain('lover');
    expect((await second.unfinished()).problems).toEqual([]);
  });

  it('leaves the draft of a later version alone and says so', async () => {
    const folder = temporaryFolder();
    mkdirSync(folder, { recursive: true });
    const { withSum } = await import('../../src/study/line-sum.js');
    writeFileSync(draftPath(folder, 'a'), withSum('{"format":"holdfast draft","version":2,"tool":"9","session":{}}'));
    const listed = await opened(folder, inventedMachine().program(1)).unfinished();
    expect(listed).toMatchObject({ drafts: [], problems: [{ code: 'draft-of-later-version' }] });
    expect(existsSync(draftPath(folder, 'a'))).toBe(true);
  });

  it('clears away what a stopped program left half-written, but nothing of one that is just starting', async () => {
    const folder = temporaryFolder();
    const { program, end } = inventedMachine();
    await opened(folder, program(1), { id: 'a' }).save(session);
    end(1);
    writeFileSync(`${draftPath(folder, 'a')}.tmp`, 'half');
    writeFileSync(`${ownerPath(folder, 'b')}.tmp`, 'half');
    await opened(folder, program(2)).unfinished();
    expect(readdirSync(folder)).toEqual(['draft-a.json', 'draft-a.owner', 'draft-b.owner.tmp']);
  });

  it('refuses a session beyond its bound, writing nothing', async () => {
    const folder = temporaryFolder();
    const outcome = await opened(folder, inventedMachine().program(1)).save('x'.repeat(maximumDraftBytes));
    expect(outcome).toMatchObject({ ok: false, problems: [{ code: 'draft-too-long' }] });
    expect(readdirSync(folder)).toEqual([]);
  });

  const faults: (Fault & { exitCode: number })[] = [
    { step: 'open', code: 'ENOSPC', exitCode: 73 },
    { step: 'open', code: 'EROFS', exitCode: 73 },
    { step: 'file.setMode', code: 'EPERM', exitCode: 74 },
    { step: 'file.write', code: 'ENOSPC', exitCode: 74 },
    { step: 'file.write', code: 'EIO', tornAfter: 40, exitCode: 74 },
    { step: 'file.sync', code: 'EIO', exitCode: 74 },
    { step: 'file.close', code: 'EDQUOT', exitCode: 74 },
    { step: 'rename', code: 'EIO', exitCode: 73 },
    { step: 'syncFolder', code: 'EIO', exitCode: 74 },
  ];
  it.each(faults)('when $step fails with $code while saving, the old or the new session stands whole', async ({ exitCode, ...fault }) => {
    const folder = temporaryFolder();
    const { program, end } = inventedMachine();
    // The first save makes the mark and the draft; its steps are counted so that the fault meets the second.
    const { disk: counting, steps } = faultyDisk(null);
    await opened(folder, program(1), { id: 'x', disk: counting }).save({ saved: 'old' });
    const call = steps.filter((step) => step === fault.step).length + 1;
    const draft = opened(folder, program(1), { id: 'a', disk: faultyDisk({ ...fault, call }).disk });
    expect((await draft.save({ saved: 'old' })).ok).toBe(true);
    expect(await draft.save({ saved: 'new' })).toMatchObject({ ok: false, problems: [{ exitCode }] });
    end(1);
    const { drafts, problems } = await opened(folder, program(2)).unfinished();
    expect(problems).toEqual([]);
    expect(drafts.find(({ id }) => id === 'a')?.session).toEqual({ saved: fault.step === 'syncFolder' ? 'new' : 'old' });
  });

  it('takes a short write to a file of its own for no failure', async () => {
    const folder = temporaryFolder();
    const { disk } = faultyDisk({ step: 'file.write', code: '', tornAfter: 10 });
    expect((await opened(folder, inventedMachine().program(1), { id: 'a', disk }).save(session)).ok).toBe(true);
    expect(readFileSync(draftPath(folder, 'a'), 'utf8')).toBe(draftText(session, '0.1.0'));
  });
});

describe('drafts of real programs', () => {
  const imports = `import { draftFile } from '../../src/store/draft-file.js';
    import { nodeDisk } from '../../src/store/node-disk.js';
    const [folder, wanted] = process.argv.slice(2);
    const draft = draftFile({ disk: nodeDisk, tool: 'x', folder });`;

  it('survive a program that is killed while it saves without pause', { timeout: 30_000 }, async () => {
    const folder = temporaryFolder();
    const program = await bundledProgram(
      folder,
      `${imports}
       for (let count = 0; ; count += 1) {
         const saved = await draft.save({ count, filler: 'x'.repeat(20000), again: count });
         if (!saved.ok) throw new Error(saved.problems[0].message);
         if (count === 5) console.log('saving');
       }`,
    );
    const drafts = join(folder, 'drafts');
    for (let time = 0; time < 5; time += 1) {
      const { child, ended, firstLine } = start(program, [drafts]);
      await firstLine;
      await new Promise((resolve) => setTimeout(resolve, time * 7));
      child.kill('SIGKILL');
      await ended;
    }
    const listed = await draftFile({ disk: nodeDisk, tool: 'x', folder: drafts }).unfinished();
    expect(listed.problems).toEqual([]);
    expect(listed.drafts).toHaveLength(5);
    for (const { session: saved } of listed.drafts) {
      const { count, again } = saved as { count: number; again: number };
      expect(again).toBe(count);
      expect(count).toBeGreaterThanOrEqual(5);
    }
  });

  it('are not offered while their program runs', { timeout: 30_000 }, async () => {
    const folder = temporaryFolder();
    const program = await bundledProgram(folder, `${imports} await draft.save({}); console.log('saved'); setTimeout(() => {}, 60000);`);
    const drafts = join(folder, 'drafts');
    const { child, ended, firstLine } = start(program, [drafts]);
    await firstLine;
    const other = draftFile({ disk: nodeDisk, tool: 'x', folder: drafts });
    expect((await other.unfinished()).drafts).toEqual([]);
    child.kill('SIGSTOP');
    expect((await other.unfinished()).drafts).toEqual([]);
    child.kill('SIGKILL');
    await ended;
    expect((await other.unfinished()).drafts).toHaveLength(1);
  });

  it('are taken by exactly one of eight programs that claim at once', { timeout: 30_000 }, async () => {
    const folder = temporaryFolder();
    const drafts = join(folder, 'drafts');
    const { program: invented, end } = inventedMachine();
    const ids = Array.from({ length: 30 }, (_, index) => `d${index}`);
    for (const id of ids) await opened(drafts, invented(1), { id }).save({ id });
    end(1);
    const program = await bundledProgram(
      folder,
      `${imports}
       for (const id of wanted.split(',')) {
         const own = draftFile({ disk: nodeDisk, tool: 'x', folder });
         const claimed = await own.claim(id);
         if (claimed.ok) console.log(id + ' ' + claimed.value.id);
         else if (claimed.problems[0].code !== 'draft-taken') throw new Error(claimed.problems[0].message);
       }`,
    );
    const programs = Array.from({ length: 8 }, () => start(program, [drafts, ids.join(',')]));
    const ends = await Promise.all(programs.map(({ ended }) => ended));
    expect(ends.map(({ code }) => code)).toEqual(Array(8).fill(0));
    const taken = ends.flatMap(({ output }) => output.trim().split('\n')).filter((line) => line !== '');
    expect(taken.sort()).toEqual(ids.map((id) => `${id} ${id}`).sort());
    expect(readdirSync(drafts).filter((name) => name.endsWith('.json'))).toHaveLength(30);
  });
});
