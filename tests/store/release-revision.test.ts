import { chmodSync, existsSync, mkdirSync, readdirSync, readFileSync, statSync, utimesSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { nodeDisk } from '../../src/store/node-disk.js';
import { allRevisions, nameProblem, newestRevision, revisionBefore } from '../../src/store/preset-revisions.js';
import { addRevision } from '../../src/store/release-revision.js';
import { readPreset } from '../../src/study/read-preset.js';
import type { Study } from '../../src/study/study.js';
import { type Fault, faultyDisk } from './faulty-disk.js';
import { inventedPreset } from './invented-study.js';
import { temporaryFolder } from './temporary-folder.js';

function studyOf(id = 'liver', revision = 1): Study {
  const read = readPreset(inventedPreset(id, revision), 'test');
  if (!read.ok) throw new Error(read.problems[0]?.message);
  return read.value;
}

function folderWith(...files: readonly (readonly [name: string, text: string])[]): string {
  const folder = temporaryFolder();
  for (const [name, text] of files) writeFileSync(join(folder, name), text);
  return folder;
}

const names = (folder: string) => readdirSync(folder).sort();

describe('addRevision', () => {
  it('writes the next revision, read-only, and leaves nothing else', async () => {
    const folder = folderWith(['liver@1.json', inventedPreset('liver')]);
    const added = await addRevision(nodeDisk, folder, { ...studyOf(), notes: 'new' }, 1);
    expect(added).toMatchObject({ ok: true, value: { kind: 'added', revision: 2 } });
    expect(names(folder)).toEqual(['liver@1.json', 'liver@2.json']);
    expect(statSync(join(folder, 'liver@2.json')).mode & 0o222).toBe(0);
    const newest = await newestRevision(nodeDisk, folder, 'liver', 'site');
    expect(newest).toMatchObject({ ok: true, value: { study: { revision: 2, notes: 'new' } } });
  });

  it('can be read by whoever can read the folder, and by nobody else', async () => {
    for (const [mode, expected] of [
      [0o750, 0o440],
      [0o775, 0o444],
      [0o700, 0o400],
    ] as const) {
      const folder = folderWith();
      chmodSync(folder, mode);
      await addRevision(nodeDisk, folder, studyOf(), 0);
      expect(statSync(join(folder, 'liver@1.json')).mode & 0o777).toBe(expected);
    }
  });

  it('tells whoever comes second, with the revision that is there, and writes nothing', async () => {
    const folder = folderWith(['liver@1.json', inventedPreset('liver')]);
    await addRevision(nodeDisk, folder, { ...studyOf(), notes: 'theirs' }, 1);
    const before = readFileSync(join(folder, 'liver@2.json'));
    const second = await addRevision(nodeDisk, folder, { ...studyOf(), notes: 'mine' }, 1);
    expect(second).toMatchObject({ ok: true, value: { kind: 'taken', newest: { study: { revision: 2, notes: 'theirs' } } } });
    expect(names(folder)).toEqual(['liver@1.json', 'liver@2.json']);
    expect(readFileSync(join(folder, 'liver@2.json'))).toEqual(before);
  });

  it('tells it also when the other one came between looking and writing', async () => {
    const folder = folderWith(['liver@1.json', inventedPreset('liver')]);
    const disk = {
      ...nodeDisk,
      link: async (from: string, to: string) => {
        writeFileSync(to, inventedPreset('liver', 2), { flag: 'wx' });
        await nodeDisk.link(from, to);
      },
    };
    expect(await addRevision(disk, folder, studyOf(), 1)).toMatchObject({
      ok: true,
      value: { kind: 'taken', newest: { study: { revision: 2 } } },
    });
    expect(readFileSync(join(folder, 'liver@2.json'), 'utf8')).toBe(inventedPreset('liver', 2));
    expect(names(folder)).toEqual(['liver@1.json', 'liver@2.json']);
  });

  it('counts a plain ID.json as the revision that it says it is', async () => {
    const folder = folderWith(['liver.json', inventedPreset('liver', 4)], ['liver@2.json', inventedPreset('liver', 2)]);
    expect(await addRevision(nodeDisk, folder, studyOf(), 2)).toMatchObject({
      ok: true,
      value: { kind: 'taken', newest: { study: { revision: 4 } } },
    });
    expect(await addRevision(nodeDisk, folder, studyOf(), 4)).toMatchObject({ ok: true, value: { kind: 'added', revision: 5 } });
  });

  it('does not take one preset for another whose id begins the same', async () => {
    const folder = folderWith(['liver@x@7.json', '{}'], ['liver-3t@9.json', inventedPreset('liver-3t', 9)], ['liver@02.json', '{}']);
    expect(await addRevision(nodeDisk, folder, studyOf(), 0)).toMatchObject({ ok: true, value: { kind: 'added', revision: 1 } });
  });

  const faults: readonly Fault[] = [
    { step: 'names', code: 'EACCES' },
    { step: 'facts', code: 'EIO' },
    { step: 'open', code: 'EROFS', call: 2 },
    { step: 'file.setMode', code: 'EPERM' },
    { step: 'file.write', code: 'ENOSPC', tornAfter: 100 },
    { step: 'file.sync', code: 'EIO' },
    { step: 'link', code: 'EIO' },
    { step: 'link', code: 'EPERM' },
  ];
  it.each(faults)('leaves the old revisions and no half file when $step fails with $code', async (fault) => {
    const folder = folderWith(['liver@1.json', inventedPreset('liver')]);
    const { disk } = faultyDisk(fault);
    const added = await addRevision(disk, folder, studyOf(), 1);
    expect(added.ok).toBe(false);
    expect(names(folder)).toEqual(['liver@1.json']);
  });

  it('refuses a file system without links rather than overwrite', async () => {
    const { disk } = faultyDisk({ step: 'link', code: 'ENOTSUP' });
    const added = await addRevision(disk, folderWith(), studyOf(), 0);
    expect(added).toMatchObject({ ok: false, problems: [{ code: 'no-links', exitCode: 73 }] });
  });

  it('says that it is not sure when the folder cannot be synced, and the revision is there whole', async () => {
    const folder = folderWith();
    const { disk } = faultyDisk({ step: 'syncFolder', code: 'EIO' });
    expect((await addRevision(disk, folder, studyOf(), 0)).ok).toBe(false);
    expect(await newestRevision(nodeDisk, folder, 'liver', 'site')).toMatchObject({ ok: true, value: { study: { revision: 1 } } });
  });

  it('removes what a killed program left an hour ago, and nothing younger, nobody else’s and no preset', async () => {
    const folder = folderWith(['liver@1.json', inventedPreset('liver')]);
    const hidden = ['.liver.0123456789abcdef.revision', '.liver.fedcba9876543210.revision', '.profile'];
    for (const name of hidden) writeFileSync(join(folder, name), 'half');
    const old = new Date(Date.now() - 2 * 3_600_000);
    for (const name of [hidden[0]!, hidden[2]!, 'liver@1.json']) utimesSync(join(folder, name), old, old);
    await addRevision(nodeDisk, folder, studyOf(), 1);
    expect(hidden.map((name) => existsSync(join(folder, name)))).toEqual([false, true, true]);
    expect(existsSync(join(folder, 'liver@1.json'))).toBe(true);
  });

  it('a folder that is not there is told', async () => {
    expect(await addRevision(nodeDisk, join(temporaryFolder(), 'none'), studyOf(), 0)).toMatchObject({
      ok: false,
      problems: [{ exitCode: 66 }],
    });
  });
});

describe('revisions in a folder', () => {
  it('are listed newest first; damaged ones are told and do not stop the others', async () => {
    const folder = folderWith(
      ['liver@1.json', inventedPreset('liver', 1)],
      ['liver@10.json', inventedPreset('liver', 10)],
      ['liver@2.json', '{'],
      ['liver@3.json', inventedPreset('liver', 4)],
    );
    mkdirSync(join(folder, 'liver@5.json'));
    const { revisions, problems } = await allRevisions(nodeDisk, folder, 'liver', 'site');
    expect(revisions.map(({ study }) => study.revision)).toEqual([10, 1]);
    expect(problems.map(({ code }) => code).sort()).toEqual(['is-folder', 'not-json', 'revision-name-differs']);
    const before = await revisionBefore(nodeDisk, folder, { id: 'liver', revision: 10 }, 'site');
    expect(before?.study.revision).toBe(1);
    expect(await revisionBefore(nodeDisk, folder, { id: 'liver', revision: 1 }, 'site')).toBeNull();
  });

  it('a name that says another revision than the file is told', async () => {
    const stored = { study: studyOf('liver', 4), origin: 'site', hash: '' } as const;
    expect(nameProblem({ ...stored, path: '/site/liver@4.json' })).toBeNull();
    expect(nameProblem({ ...stored, path: '/site/anything.json' })).toBeNull();
    expect(nameProblem({ ...stored, path: '/site/liver@3.json' })?.code).toBe('revision-name-differs');
    expect(nameProblem({ ...stored, path: '/site/spleen@4.json' })?.code).toBe('revision-name-differs');
  });
});
