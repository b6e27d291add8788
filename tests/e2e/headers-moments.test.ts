import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readPreset } from '../../src/study/read-preset.js';
import { inventedFolder } from '../session/invented-headers.js';
import { keyBytes, pasted } from './harness/key-bytes.js';
import { newHome } from './interface-driver.js';
import { interfacesClosedAfterEach } from './moment-beginnings.js';

const open = interfacesClosedAfterEach();

describe('moments with what a scanner wrote', () => {
  it('a folder is pasted, its series seen, a missing value typed, and one key saves a draft that the start screen then offers', async () => {
    const home = newHome();
    const exam = join(home, 'exam');
    mkdirSync(exam);
    for (const [at, bytes] of inventedFolder.entries()) writeFileSync(join(exam, `${String(at).padStart(4, '0')}.dcm`), bytes);
    writeFileSync(join(exam, 'packed.zip'), 'PK\u0003\u0004');
    const screen = open(home);
    await screen.program.waitFor('0.55 T', 20_000);
    await screen.keys('/', 'Read headers');
    await screen.keys(pasted(`${exam}/nowhere`), 'nowhere');
    await screen.keys(keyBytes.enter, 'Nothing is there under this path');
    for (let letters = 0; letters < '/nowhere'.length; letters += 1) screen.program.press(keyBytes.backspace);
    await screen.keys(keyBytes.enter, /4 series in 28 of 29 files/);
    expect(screen.program.text()).toMatch(/\[x\] s1 +fast spin echo/);
    expect(screen.program.text()).toMatch(/\[x\] s3\* +not decided/);
    expect(screen.program.text()).toContain('1 file is a packed file');
    await screen.keys(keyBytes.down, 's2: ');
    await screen.keys(keyBytes.enter, 's2: 1 value to type');
    await screen.keys('0.012 s', 'type: 0.012 s');
    await screen.keys(keyBytes.enter, 's2: can be saved');
    await screen.escape(/Draft read-1\.5t: s1, s2/);
    await screen.keys('s', 'Draft preset read-1.5t-draft saved');
    const folder = join(home, '.local', 'share', 'holdfast', 'presets');
    const [name = ''] = readdirSync(folder);
    const read = readPreset(readFileSync(join(folder, name), 'utf8'), name);
    expect(read.ok && read.value).toMatchObject({ id: 'read-1.5t-draft', status: 'draft', fieldT: 1.5 });
    expect(read.ok && read.value.series.map(({ parameters }) => parameters.echoTimeMs)).toEqual([expect.any(Number), 12]);
    await screen.escape('Type to narrow');
    await screen.keys('read', /Type to narrow: read[\s\S]*read from headers/);
    await screen.keys(keyBytes.enter, 'Running order');
    expect(screen.program.text()).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });
});
