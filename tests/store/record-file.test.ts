import { appendFileSync, chmodSync, mkdirSync, readFileSync, statSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { nodeDisk } from '../../src/store/node-disk.js';
import { appendRecord, maximumRecordBytes } from '../../src/store/record-file.js';
import { type RecordEntry, readRecords } from '../../src/store/record-reader.js';
import { recordLine } from '../../src/study/record-line.js';
import { inventedRecord } from '../study/records.js';
import { bundledProgram, start } from './child-programs.js';
import { type Fault, faultyDisk } from './faulty-disk.js';
import { temporaryFolder } from './temporary-folder.js';

const first = { ...inventedRecord, id: '0000000000000001' };
const second = { ...inventedRecord, id: '0000000000000002' };

async function entriesOf(...paths: string[]): Promise<RecordEntry[]> {
  const entries: RecordEntry[] = [];
  for await (const entry of readRecords(nodeDisk, paths)) entries.push(entry);
  return entries;
}

const idsOf = (entries: readonly RecordEntry[]) => entries.flatMap((entry) => (entry.kind === 'record' ? [entry.record.id] : []));

describe('appendRecord', () => {
  it('makes the file and its folders, private to their owner', async () => {
    const folder = join(temporaryFolder(), 'share', 'holdfast');
    const path = join(folder, 'records.jsonl');
    expect(await appendRecord(nodeDisk, path, first)).toEqual({ ok: true, value: undefined });
    expect(statSync(path).mode & 0o777).toBe(0o600);
    expect(statSync(folder).mode & 0o777).toBe(0o700);
  });

  it('follows the mode of the settings, whatever the mask of the process', async () => {
    const folder = join(temporaryFolder(), 'holdfast');
    await appendRecord(nodeDisk, join(folder, 'records.jsonl'), first, { fileMode: 0o660 });
    expect(statSync(join(folder, 'records.jsonl')).mode & 0o777).toBe(0o660);
    expect(statSync(folder).mode & 0o777).toBe(0o770);
  });

  it('leaves the mode of a file and folder that were there', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    writeFileSync(path, '');
    chmodSync(path, 0o644);
    await appendRecord(nodeDisk, path, first);
    expect(statSync(path).mode & 0o777).toBe(0o644);
  });

  it('writes each record in one write, with a newline before and after', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    const { disk, steps } = faultyDisk(null);
    await appendRecord(disk, path, first);
    await appendRecord(disk, path, second);
    expect(steps.filter((step) => step === 'file.write')).toHaveLength(2);
    expect(readFileSync(path, 'utf8')).toBe(`\n${recordLine(first)}\n\n${recordLine(second)}\n`);
  });

  it('syncs after the write, the folder too when the file is new, and reads back last', async () => {
    const { disk, steps } = faultyDisk(null);
    await appendRecord(disk, join(temporaryFolder(), 'records.jsonl'), first);
    const order = steps.filter((step) => ['file.write', 'file.sync', 'syncFolder', 'file.read'].includes(step));
    expect(order).toEqual(['file.write', 'file.sync', 'syncFolder', 'file.read']);
  });

  it('is not harmed by a torn line before it', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    writeFileSync(path, recordLine(first).slice(0, 100));
    expect((await appendRecord(nodeDisk, path, second)).ok).toBe(true);
    const entries = await entriesOf(path);
    expect(entries.map(({ kind }) => kind)).toEqual(['damaged', 'record']);
    expect(idsOf(entries)).toEqual([second.id]);
  });

  const faults: (Fault & { exitCode: number; says: RegExp })[] = [
    { step: 'makeFolder', code: 'EACCES', exitCode: 73, says: /may not be opened/ },
    { step: 'makeFolder', code: 'ENOSPC', exitCode: 73, says: /disk is full/ },
    { step: 'facts', code: 'EACCES', exitCode: 73, says: /may not be opened/ },
    { step: 'open', code: 'EROFS', exitCode: 73, says: /read-only/ },
    { step: 'file.setMode', code: 'EPERM', exitCode: 73, says: /may not be changed/ },
    { step: 'file.facts', code: 'EIO', exitCode: 74, says: /disk reports an error/ },
    { step: 'file.write', code: 'ENOSPC', exitCode: 74, says: /disk is full/ },
    { step: 'file.write', code: 'EDQUOT', exitCode: 74, says: /quota/ },
    { step: 'file.write', code: 'EIO', tornAfter: 60, exitCode: 74, says: /disk reports an error/ },
    { step: 'file.write', code: '', tornAfter: 60, exitCode: 74, says: /was not saved.*took 60 of \d+ bytes/ },
    { step: 'file.sync', code: 'EIO', exitCode: 74, says: /disk reports an error/ },
    { step: 'syncFolder', code: 'EIO', exitCode: 74, says: /disk reports an error/ },
    { step: 'file.read', code: 'EIO', exitCode: 74, says: /disk reports an error/ },
  ];
  it.each(faults)('when $step fails with "$code" says so, and harms no record before or after', async ({ exitCode, says, ...fault }) => {
    const folder = join(temporaryFolder(), 'made');
    const path = join(folder, 'records.jsonl');
    // Steps that only a new file takes are tried on one.
    const onNewFile = ['syncFolder', 'file.setMode'].includes(fault.step);
    if (!onNewFile) await appendRecord(nodeDisk, path, first);
    const outcome = await appendRecord(faultyDisk(fault).disk, path, second);
    expect(outcome.ok ? null : outcome.problems).toMatchObject([{ exitCode, message: expect.stringMatching(says) as string }]);
    expect(outcome.ok ? '' : outcome.problems[0]!.hint).not.toBe('');

    const third = { ...inventedRecord, id: '0000000000000003' };
    expect((await appendRecord(nodeDisk, path, third)).ok).toBe(true);
    const ids = idsOf(await entriesOf(path));
    if (!onNewFile) expect(ids[0]).toBe(first.id);
    expect(ids.at(-1)).toBe(third.id);
  });

  it('takes a write that the read-back does not find for a failure', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    const { disk } = faultyDisk(null);
    const forgetful = {
      ...disk,
      open: async (...args: Parameters<typeof disk.open>) => ({
        ...(await disk.open(...args)),
        write: async (bytes: Uint8Array) => bytes.length,
      }),
    };
    expect(await appendRecord(forgetful, path, first)).toMatchObject({
      ok: false,
      problems: [{ code: 'record-not-read-back', exitCode: 74 }],
    });
  });

  it('is not harmed by an error on closing', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    expect((await appendRecord(faultyDisk({ step: 'file.close', code: 'EIO' }).disk, path, first)).ok).toBe(true);
    expect(idsOf(await entriesOf(path))).toEqual([first.id]);
  });

  it('saved again after a failed sync does not stand there twice; saved again after a torn write does stand there', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    expect((await appendRecord(faultyDisk({ step: 'file.sync', code: 'EIO' }).disk, path, first)).ok).toBe(false);
    expect((await appendRecord(nodeDisk, path, first, { again: true })).ok).toBe(true);
    expect((await appendRecord(faultyDisk({ step: 'file.write', code: '', tornAfter: 50 }).disk, path, second)).ok).toBe(false);
    expect((await appendRecord(nodeDisk, path, second, { again: true })).ok).toBe(true);
    const entries = await entriesOf(path);
    expect(idsOf(entries)).toEqual([first.id, second.id]);
    expect(entries.filter(({ kind }) => kind === 'damaged')).toHaveLength(1);
  });

  it('refuses a folder, a device, and a record beyond its bound', async () => {
    const folder = temporaryFolder();
    expect(await appendRecord(nodeDisk, folder, first)).toMatchObject({ ok: false, problems: [{ code: 'is-folder', exitCode: 73 }] });
    expect(await appendRecord(nodeDisk, '/dev/full', first)).toMatchObject({ ok: false, problems: [{ code: 'not-a-file', exitCode: 74 }] });
    const many = { ...first, series: Array.from({ length: 2000 }, () => first.series[0]!) };
    const path = join(folder, 'records.jsonl');
    expect(await appendRecord(nodeDisk, path, many)).toMatchObject({ ok: false, problems: [{ code: 'record-too-long', exitCode: 65 }] });
    expect(() => statSync(path)).toThrow();
  });

  it('takes whole lines from eight programs that append at once', { timeout: 3_600_000 }, async () => {
    const folder = temporaryFolder();
    const path = join(folder, 'records.jsonl');
    const program = await bundledProgram(
      folder,
      `import { nodeDisk } from '../../src/store/node-disk.js';
       import { appendRecord } from '../../src/store/record-file.js';
       const [path, name, count, template] = process.argv.slice(2);
       const record = JSON.parse(template);
       let failed = 0;
       for (let i = 0; i < Number(count); i += 1) {
         const scanner = 'x'.repeat((i * 37) % 80);
         if (!(await appendRecord(nodeDisk, path, { ...record, id: name + '-' + i, scanner })).ok) failed += 1;
       }
       process.exitCode = failed === 0 ? 0 : 1;`,
    );
    // HOLDFAST_APPENDS=10000 is the full run: 80,000 lines, several minutes.
    const count = Number(process.env.HOLDFAST_APPENDS ?? 400);
    const programs = Array.from({ length: 8 }, (_, index) =>
      start(program, [path, `p${index}`, String(count), JSON.stringify(inventedRecord)]),
    );
    for (const { ended } of programs) expect((await ended).code).toBe(0);
    const entries = await entriesOf(path);
    expect(entries.filter(({ kind }) => kind !== 'record')).toEqual([]);
    expect(new Set(idsOf(entries)).size).toBe(8 * count);
    expect(entries).toHaveLength(8 * count);
  });
});

describe('readRecords', () => {
  it('reads several files as one stream, counts damaged lines by number, and takes empty lines for no damage', async () => {
    const folder = temporaryFolder();
    const [one, two] = [join(folder, 'one.jsonl'), join(folder, 'two.jsonl')];
    const harmed = recordLine(second).replace('liver', 'lover');
    writeFileSync(one, `\n\n${recordLine(first)}\n${harmed}\n \r\nnot a record\n${recordLine(first)}`);
    writeFileSync(two, `${recordLine(second)}\r\n`);
    const entries = await entriesOf(one, join(folder, 'absent.jsonl'), two);
    expect(entries.map((entry) => (entry.kind === 'unread' ? [entry.kind] : [entry.kind, entry.line]))).toEqual([
      ['record', 3],
      ['damaged', 4],
      ['damaged', 6],
      ['record', 7],
      ['unread'],
      ['record', 1],
    ]);
    const [, damaged] = entries;
    expect(damaged?.kind === 'damaged' && damaged.problem).toMatchObject({
      code: 'record-sum-differs',
      message: expect.stringMatching(/^Line 4 of .*one\.jsonl is damaged and was skipped: /) as string,
    });
    const absent = entries.find((entry) => entry.kind === 'unread');
    expect(absent?.problem).toMatchObject({ code: 'not-there', exitCode: 66 });
  });

  it('skips a line longer than a record can be, however long, and reads what follows', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    for (const length of [maximumRecordBytes + 1, 5 * maximumRecordBytes]) {
      writeFileSync(path, `${'x'.repeat(length)}\n${recordLine(first)}\n`);
      const entries = await entriesOf(path);
      expect(entries.map((entry) => entry.kind)).toEqual(['damaged', 'record']);
      expect(entries[0]?.kind === 'damaged' && entries[0].problem.code).toBe('record-too-long');
    }
    writeFileSync(path, 'x'.repeat(3 * maximumRecordBytes));
    expect(await entriesOf(path)).toMatchObject([{ kind: 'damaged', line: 1 }]);
  });

  it('reads every line wherever the pieces of the file are cut', async () => {
    const path = join(temporaryFolder(), 'records.jsonl');
    writeFileSync(path, '');
    for (let index = 0; index < 400; index += 1)
      appendFileSync(path, `${recordLine({ ...first, id: String(index), scanner: 'x'.repeat(index % 80) })}\n`);
    expect(statSync(path).size).toBeGreaterThan(2 * 256 * 1024);
    expect(idsOf(await entriesOf(path))).toEqual(Array.from({ length: 400 }, (_, index) => String(index)));
  });

  it('tells how far it is, over all files', async () => {
    const folder = temporaryFolder();
    const paths = [join(folder, 'a'), join(folder, 'b')];
    for (const path of paths) writeFileSync(path, `${recordLine(first)}\n`);
    const told: number[][] = [];
    for await (const _ of readRecords(nodeDisk, paths, { onProgress: (read, total) => told.push([read, total]) }));
    const size = statSync(paths[0]!).size;
    expect(told).toEqual([
      [size, 2 * size],
      [2 * size, 2 * size],
    ]);
  });

  it('reports a folder, a pipe, and a disk that fails in the middle, and never throws', async () => {
    const folder = temporaryFolder();
    mkdirSync(join(folder, 'sub'));
    symlinkSync('loop', join(folder, 'loop'));
    expect(await entriesOf(join(folder, 'sub'))).toMatchObject([{ kind: 'unread', problem: { code: 'is-folder', exitCode: 66 } }]);
    expect(await entriesOf('/dev/null')).toMatchObject([{ kind: 'unread', problem: { code: 'not-a-file', exitCode: 74 } }]);
    expect(await entriesOf(join(folder, 'loop'))).toMatchObject([{ kind: 'unread', problem: { code: 'link-loop', exitCode: 66 } }]);
    const path = join(folder, 'records.jsonl');
    writeFileSync(path, `${recordLine(first)}\n`);
    const kinds: string[] = [];
    for await (const entry of readRecords(faultyDisk({ step: 'file.read', call: 2, code: 'EIO' }).disk, [path])) kinds.push(entry.kind);
    expect(kinds).toEqual(['record', 'unread']);
  });
});
