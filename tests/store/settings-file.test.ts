import { mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { nodeDisk } from '../../src/store/node-disk.js';
import { defaultSettings, fileModeOf, settingKeys } from '../../src/store/settings.js';
import { changeSettings, readSettings, settingsPath } from '../../src/store/settings-file.js';
import { faultyDisk } from './faulty-disk.js';
import { temporaryFolder } from './temporary-folder.js';

function folderWith(text: string | Buffer): string {
  const folder = temporaryFolder();
  writeFileSync(settingsPath(folder), text);
  return folder;
}

describe('readSettings', () => {
  it('gives the defaults when there is no file, and makes none', async () => {
    const folder = join(temporaryFolder(), 'holdfast');
    expect(await readSettings(nodeDisk, folder)).toEqual({ ok: true, value: { settings: defaultSettings, notes: [] } });
    expect(() => statSync(folder)).toThrow();
  });

  it('takes what the file sets and the defaults for the rest', async () => {
    const folder = folderWith('{ "scannerName": "blue room", "restS": 30, "fileMode": "0660" }');
    const read = await readSettings(nodeDisk, folder);
    expect(read.ok && read.value.settings).toEqual({ ...defaultSettings, scannerName: 'blue room', restS: 30, fileMode: '0660' });
    expect(read.ok && fileModeOf(read.value.settings)).toBe(0o660);
  });

  it.each([
    ['no JSON', '{ "restS": '],
    ['empty', ''],
    ['no object', '[1, 2]'],
    ['binary', Buffer.from([0, 1, 2, 255])],
    ['far too large', Buffer.alloc(200_000, ' ')],
  ])('keeps a file that is %s aside under a new number, says so, and goes on with the defaults', async (_, text) => {
    const folder = folderWith(text);
    writeFileSync(join(folder, 'config.json.damaged-1'), 'an earlier one');
    const read = await readSettings(nodeDisk, folder);
    expect(read.ok && read.value.settings).toEqual(defaultSettings);
    expect(read.ok && read.value.notes).toMatchObject([
      { code: 'settings-damaged', message: expect.stringContaining('config.json.damaged-2') as string },
    ]);
    expect(readdirSync(folder)).toEqual(['config.json.damaged-1', 'config.json.damaged-2']);
    expect(readFileSync(join(folder, 'config.json.damaged-2'))).toEqual(Buffer.from(text));
    expect(readFileSync(join(folder, 'config.json.damaged-1'), 'utf8')).toBe('an earlier one');
  });

  it.each([
    ['restS', '"20"', /restS is "20", expected seconds from 0 to 600/],
    ['restS', '-1', /restS is -1/],
    ['restS', '1e999', /restS/],
    ['glyphs', '"fancy"', /expected one of auto, unicode, ascii/],
    ['colour', '16', /expected one of auto, never, 16, 256, true/],
    ['readerMode', '"yes"', /expected true or false/],
    ['fileMode', '384', /octal digits/],
    ['fileMode', '"0777"', /octal digits/],
    ['fileMode', '"0060"', /octal digits/],
    ['scannerName', '"a\\u001b[2J"', /without control characters/],
    ['recordsFile', '"records.jsonl"', /absolute path/],
  ])('refuses %s: %s with exit code 78 and leaves the file alone', async (key, value, says) => {
    const text = `{ "${key}": ${value} }`;
    const folder = folderWith(text);
    expect(await readSettings(nodeDisk, folder)).toMatchObject({
      ok: false,
      problems: [{ code: 'setting-wrong', exitCode: 78, path: key, message: expect.stringMatching(says) as string }],
    });
    expect(readFileSync(settingsPath(folder), 'utf8')).toBe(text);
  });

  it('names the nearest setting for one that is none', async () => {
    const folder = folderWith('{ "scanerName": "x", "__proto__": 1 }');
    const read = await readSettings(nodeDisk, folder);
    expect(read).toMatchObject({
      ok: false,
      problems: [{ code: 'setting-unknown', exitCode: 78, hint: 'Did you mean scannerName?' }, { exitCode: 78 }],
    });
  });

  it('refuses a file it may not read, with exit code 78', async () => {
    const folder = folderWith('{}');
    expect(await readSettings(faultyDisk({ step: 'open', code: 'EACCES' }).disk, folder)).toMatchObject({
      ok: false,
      problems: [{ exitCode: 78 }],
    });
    const asFolder = temporaryFolder();
    mkdirSync(settingsPath(asFolder));
    expect(await readSettings(nodeDisk, asFolder)).toMatchObject({ ok: false, problems: [{ code: 'is-folder', exitCode: 78 }] });
  });

  it('says when a damaged file could not be moved, and still goes on', async () => {
    const folder = folderWith('damage');
    const read = await readSettings(faultyDisk({ step: 'rename', code: 'EROFS' }).disk, folder);
    expect(read.ok && read.value.notes).toMatchObject([{ message: expect.stringContaining('left where it is') as string }]);
    expect(readdirSync(folder)).toEqual(['config.json']);
  });
});

describe('changeSettings', () => {
  it('writes only what was set, privately, and reads it back', async () => {
    const folder = join(temporaryFolder(), 'config', 'holdfast');
    const changed = await changeSettings(nodeDisk, folder, { scannerName: 'blue room', readerMode: true, presetsFolder: '/site' });
    expect(changed).toMatchObject({ ok: true, value: { settings: { scannerName: 'blue room' } } });
    await changeSettings(nodeDisk, folder, { readerMode: false });
    expect(JSON.parse(readFileSync(settingsPath(folder), 'utf8'))).toEqual({
      scannerName: 'blue room',
      readerMode: false,
      presetsFolder: '/site',
    });
    expect(readdirSync(folder)).toEqual(['config.json']);
    expect(statSync(settingsPath(folder)).mode & 0o777).toBe(0o600);
    expect(statSync(folder).mode & 0o777).toBe(0o700);
    expect(await readSettings(nodeDisk, folder)).toMatchObject({ value: { settings: { scannerName: 'blue room', readerMode: false } } });
  });

  it('accepts every default', async () => {
    const folder = temporaryFolder();
    expect((await changeSettings(nodeDisk, folder, defaultSettings)).ok).toBe(true);
    expect(Object.keys(JSON.parse(readFileSync(settingsPath(folder), 'utf8')) as object)).toEqual(settingKeys);
  });

  it('refuses a wrong value and writes nothing', async () => {
    const folder = temporaryFolder();
    expect(await changeSettings(nodeDisk, folder, { restS: Number.NaN })).toMatchObject({ ok: false, problems: [{ exitCode: 78 }] });
    expect(readdirSync(folder)).toEqual([]);
  });

  it('keeps a damaged file aside before it writes a new one', async () => {
    const folder = folderWith('damage');
    expect(await changeSettings(nodeDisk, folder, { restS: 15 })).toMatchObject({
      ok: true,
      value: { notes: [{ code: 'settings-damaged' }] },
    });
    expect(readdirSync(folder)).toEqual(['config.json', 'config.json.damaged-1']);
  });

  it('says so when the folder cannot be made', async () => {
    const folder = temporaryFolder();
    writeFileSync(join(folder, 'file'), '');
    expect(await changeSettings(nodeDisk, join(folder, 'file', 'holdfast'), { restS: 15 })).toMatchObject({
      ok: false,
      problems: [{ exitCode: 73 }],
    });
  });
});
