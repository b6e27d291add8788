import { mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { nodeDisk } from '../../src/store/node-disk.js';
import { readPresetFile } from '../../src/store/preset-folder.js';
import { saveDraftPreset } from '../../src/store/save-draft-preset.js';
import { readPreset } from '../../src/study/read-preset.js';
import type { Study } from '../../src/study/study.js';
import { type Fault, faultyDisk } from './faulty-disk.js';
import { inventedPreset } from './invented-study.js';
import { temporaryFolder } from './temporary-folder.js';

function studyOf(id: string): Study {
  const read = readPreset(inventedPreset(id, 3), 'x.json');
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  return read.value;
}
const brain = studyOf('brain');

describe('saveDraftPreset', () => {
  it('saves a draft that reads back as the same study', async () => {
    const folder = join(temporaryFolder(), 'presets');
    const saved = await saveDraftPreset(nodeDisk, folder, brain);
    expect(saved).toEqual({ ok: true, value: { id: 'brain-draft', path: join(folder, 'brain-draft.json') } });
    const read = await readPresetFile(nodeDisk, join(folder, 'brain-draft.json'), 'own');
    expect(read.ok && read.value.study).toEqual({ ...brain, id: 'brain-draft', status: 'draft', revision: 1 });
    expect(statSync(join(folder, 'brain-draft.json')).mode & 0o777).toBe(0o600);
    expect(readdirSync(folder)).toEqual(['brain-draft.json']);
  });

  it('never overwrites: the next one has the next number, and ids taken elsewhere are left out', async () => {
    const folder = temporaryFolder();
    writeFileSync(join(folder, 'brain-draft.json'), 'of somebody else');
    expect(await saveDraftPreset(nodeDisk, folder, brain, new Set(['brain-draft-2']))).toMatchObject({ value: { id: 'brain-draft-3' } });
    expect(await saveDraftPreset(nodeDisk, folder, studyOf('brain-draft-3'))).toMatchObject({ value: { id: 'brain-draft-2' } });
    expect(readFileSync(join(folder, 'brain-draft.json'), 'utf8')).toBe('of somebody else');
  });

  it('gives every one of many saved at once a name of its own', async () => {
    const folder = temporaryFolder();
    const saved = await Promise.all(Array.from({ length: 20 }, () => saveDraftPreset(nodeDisk, folder, brain)));
    expect(new Set(saved.map((one) => one.ok && one.value.id)).size).toBe(20);
    expect(readdirSync(folder)).toHaveLength(20);
  });

  it('works on a disk without links, and still never overwrites', async () => {
    const folder = temporaryFolder();
    const { disk } = faultyDisk({ step: 'link', code: 'EPERM' });
    expect(await saveDraftPreset(disk, folder, brain)).toMatchObject({ ok: true, value: { id: 'brain-draft' } });
    expect(await saveDraftPreset(disk, folder, brain)).toMatchObject({ ok: true, value: { id: 'brain-draft-2' } });
    expect(readdirSync(folder)).toEqual(['brain-draft-2.json', 'brain-draft.json']);
  });

  const faults: (Fault & { exitCode: number })[] = [
    { step: 'makeFolder', code: 'EACCES', exitCode: 73 },
    { step: 'open', code: 'EROFS', exitCode: 73 },
    { step: 'file.setMode', code: 'EPERM', exitCode: 74 },
    { step: 'file.write', code: 'ENOSPC', exitCode: 74 },
    { step: 'file.write', code: 'ENOSPC', tornAfter: 30, exitCode: 74 },
    { step: 'file.sync', code: 'EIO', exitCode: 74 },
    { step: 'link', code: 'EIO', exitCode: 73 },
  ];
  it.each(faults)('when $step fails with $code leaves nothing behind and says so', async ({ exitCode, ...fault }) => {
    const folder = join(temporaryFolder(), 'presets');
    if (fault.step !== 'makeFolder') mkdirSync(folder);
    expect(await saveDraftPreset(faultyDisk(fault).disk, folder, brain)).toMatchObject({ ok: false, problems: [{ exitCode }] });
    if (fault.step !== 'makeFolder') expect(readdirSync(folder)).toEqual([]);
  });

  it('when only the sync of the folder fails, the whole preset is there', async () => {
    const folder = temporaryFolder();
    expect((await saveDraftPreset(faultyDisk({ step: 'syncFolder', code: 'EIO' }).disk, folder, brain)).ok).toBe(false);
    expect((await readPresetFile(nodeDisk, join(folder, 'brain-draft.json'), 'own')).ok).toBe(true);
  });
});
