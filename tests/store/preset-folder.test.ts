import { createHash } from 'node:crypto';
import { mkdirSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { describe, expect, it } from 'vitest';
import { nodeDisk } from '../../src/store/node-disk.js';
import { findPreset, listPresets, presetFolders } from '../../src/store/preset-folder.js';
import { shippedPresetsFolder } from '../../src/store/shipped-presets.js';
import { faultyDisk } from './faulty-disk.js';
import { inventedPreset } from './invented-study.js';
import { temporaryFolder } from './temporary-folder.js';

/** A site's folder, a user's and the shipped one, each with some presets. */
function threeFolders() {
  const root = temporaryFolder();
  const [site, own, shipped] = ['site', 'own', 'shipped'].map((name) => join(root, name)) as [string, string, string];
  for (const folder of [site, own, shipped]) mkdirSync(folder);
  writeFileSync(join(shipped, 'brain.json'), inventedPreset('brain'));
  writeFileSync(join(shipped, 'knee.json'), inventedPreset('knee'));
  writeFileSync(join(own, 'knee-draft.json'), inventedPreset('knee-draft'));
  writeFileSync(join(site, 'brain.json'), inventedPreset('brain', 1));
  writeFileSync(join(site, 'brain@2.json'), inventedPreset('brain', 2));
  writeFileSync(join(site, 'brain@10.json'), inventedPreset('brain', 10));
  writeFileSync(join(site, 'other-name.json'), inventedPreset('spine'));
  return { root, site, own, shipped, folders: presetFolders(site, own, shipped) };
}

describe('findPreset', () => {
  it('takes the site before the user before what ships, and the highest revision', async () => {
    const { root, site, folders } = threeFolders();
    const found = await findPreset(nodeDisk, folders, 'brain', root);
    expect(found).toMatchObject({ ok: true, value: { origin: 'site', path: join(site, 'brain@10.json'), study: { revision: 10 } } });
    expect(await findPreset(nodeDisk, folders, 'knee', root)).toMatchObject({ ok: true, value: { origin: 'shipped' } });
    expect(await findPreset(nodeDisk, folders, 'knee-draft', root)).toMatchObject({ ok: true, value: { origin: 'own' } });
  });

  it('takes a named revision, and an id whose file has another name', async () => {
    const { root, folders } = threeFolders();
    expect(await findPreset(nodeDisk, folders, 'brain@2', root)).toMatchObject({ ok: true, value: { study: { revision: 2 } } });
    expect(await findPreset(nodeDisk, folders, 'brain@3', root)).toMatchObject({ ok: false, problems: [{ exitCode: 66 }] });
    expect(await findPreset(nodeDisk, folders, 'spine', root)).toMatchObject({ ok: true, value: { study: { id: 'spine' } } });
  });

  it('takes a path, absolute or from the working folder, and a bare file name', async () => {
    const { root, shipped, folders } = threeFolders();
    const absolute = join(shipped, 'knee.json');
    for (const path of [absolute, 'shipped/knee.json', './shipped/knee.json']) {
      expect(await findPreset(nodeDisk, folders, path, root)).toMatchObject({ ok: true, value: { origin: 'file', path: absolute } });
    }
    expect(await findPreset(nodeDisk, folders, 'knee.json', shipped)).toMatchObject({ ok: true, value: { origin: 'file' } });
  });

  it('names the file by the hash of its bytes', async () => {
    const { root, folders } = threeFolders();
    const hash = createHash('sha256').update(inventedPreset('knee')).digest('hex');
    expect(await findPreset(nodeDisk, folders, 'knee', root)).toMatchObject({ value: { hash } });
  });

  it('answers 66 with the nearest id when there is none', async () => {
    const { root, folders } = threeFolders();
    const absent = await findPreset(nodeDisk, folders, 'kneee', root);
    expect(absent).toMatchObject({ ok: false, problems: [{ code: 'preset-not-there', exitCode: 66, hint: 'Did you mean knee?' }] });
    expect(await findPreset(nodeDisk, folders, './kneee', root)).toMatchObject({
      ok: false,
      problems: [{ code: 'not-there', exitCode: 66 }],
    });
    expect(await findPreset(nodeDisk, folders, root, root)).toMatchObject({ ok: false, problems: [{ code: 'is-folder', exitCode: 66 }] });
  });

  it('says what is wrong with the site’s own file and never takes the shipped one in its place', async () => {
    const { root, site, folders } = threeFolders();
    writeFileSync(join(site, 'knee.json'), '{ "format": ');
    expect(await findPreset(nodeDisk, folders, 'knee', root)).toMatchObject({ ok: false, problems: [{ exitCode: 65 }] });
    const absent = presetFolders(join(root, 'absent'), join(root, 'own'), join(root, 'shipped'));
    expect(await findPreset(nodeDisk, absent, 'knee', root)).toMatchObject({ ok: false, problems: [{ code: 'not-there', exitCode: 66 }] });
  });
});

describe('readPresetFile, by a path', () => {
  it.each([
    ['a file beyond its bound', (path: string) => writeFileSync(path, Buffer.alloc(2_000_000, ' ')), 'too-large', 65],
    ['a binary file', (path: string) => writeFileSync(path, Buffer.from([0x7f, 0x45, 0x4c, 0x46, 0, 1, 2, 0xff])), 'not-text', 65],
    ['an empty file', (path: string) => writeFileSync(path, ''), expect.any(String) as string, 65],
    ['a folder', (path: string) => mkdirSync(path), 'is-folder', 66],
    ['a link to nowhere', (path: string) => symlinkSync('/nowhere/at/all', path), 'not-there', 66],
    ['a link to itself', (path: string) => symlinkSync(path, path), 'link-loop', 66],
    ['a device', (path: string) => symlinkSync('/dev/zero', path), 'not-a-file', 66],
  ])('refuses %s', async (_, make, code, exitCode) => {
    const root = temporaryFolder();
    const path = join(root, 'x.json');
    make(path);
    expect(await findPreset(nodeDisk, [], path, root)).toMatchObject({ ok: false, problems: [{ code, exitCode }] });
  });

  it('looks at the size before it reads a byte', async () => {
    const path = join(temporaryFolder(), 'x.json');
    writeFileSync(path, Buffer.alloc(2_000_000, ' '));
    const { disk, steps } = faultyDisk(null);
    await findPreset(disk, [], path, '/');
    expect(steps).not.toContain('open');
  });

  it('follows a link to a preset, and reads past a byte order mark', async () => {
    const root = temporaryFolder();
    writeFileSync(join(root, 'real.json'), `\ufeff${inventedPreset('brain')}`);
    symlinkSync(join(root, 'real.json'), join(root, 'link.json'));
    expect(await findPreset(nodeDisk, [], join(root, 'link.json'), root)).toMatchObject({ ok: true, value: { study: { id: 'brain' } } });
  });

  it('answers 74 when the disk fails', async () => {
    const path = join(temporaryFolder(), 'x.json');
    writeFileSync(path, inventedPreset('brain'));
    for (const step of ['open', 'file.read'] as const) {
      expect(await findPreset(faultyDisk({ step, code: 'EIO' }).disk, [], path, '/')).toMatchObject({
        ok: false,
        problems: [{ exitCode: 74 }],
      });
    }
  });
});

describe('listPresets', () => {
  it('lists every preset although wrong files stand among them', async () => {
    const { site, folders } = threeFolders();
    mkdirSync(join(site, 'folder.json'));
    writeFileSync(join(site, 'wrong.json'), '[]');
    writeFileSync(join(site, 'large.json'), Buffer.alloc(1_500_000, ' '));
    writeFileSync(join(site, '.hidden.json'), 'no preset');
    writeFileSync(join(site, 'notes.txt'), 'no preset');
    const { presets, problems } = await listPresets(nodeDisk, folders);
    expect(presets.map(({ study, origin }) => `${study.id}@${study.revision} ${origin}`)).toEqual([
      'brain@10 site',
      'brain@2 site',
      'brain@1 site',
      'brain@1 shipped',
      'knee@1 shipped',
      'knee-draft@1 own',
      'spine@1 site',
    ]);
    expect(problems.map(({ exitCode }) => exitCode)).toEqual([66, 65, 65]);
  });

  it('takes a folder of the user that was never made for an empty one, and reports one that was named', async () => {
    const { root, own, shipped } = threeFolders();
    const absent = join(root, 'absent');
    expect((await listPresets(nodeDisk, presetFolders(null, absent, shipped))).problems).toEqual([]);
    const named = await listPresets(nodeDisk, presetFolders(absent, own, shipped));
    expect(named.problems).toMatchObject([{ code: 'not-there', exitCode: 66 }]);
    expect(named.presets).toHaveLength(3);
  });
});

describe('shippedPresetsFolder', () => {
  it('is found from a bundle in dist and from a source file', async () => {
    const root = temporaryFolder();
    for (const folder of ['presets', 'dist', 'src/store']) mkdirSync(join(root, folder), { recursive: true });
    writeFileSync(join(root, 'package.json'), '{}');
    for (const file of ['dist/holdfast.js', 'src/store/shipped-presets.ts']) {
      expect(await shippedPresetsFolder(nodeDisk, pathToFileURL(join(root, file)).href)).toBe(join(root, 'presets'));
    }
    expect(await shippedPresetsFolder(nodeDisk, 'file:///nowhere/x.js')).toBe(null);
  });
});
