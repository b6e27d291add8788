import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readPreset } from '../../src/study/read-preset.js';
import { keyBytes } from './harness/key-bytes.js';
import { newHome } from './interface-driver.js';
import { interfacesClosedAfterEach } from './moment-beginnings.js';

const open = interfacesClosedAfterEach();

const source = 'our site, invented, rules of 2026';

/** A home whose site keeps a rule of its own in liver presets. */
function homeWithRule(): string {
  const home = newHome();
  const settings = join(home, '.config', 'holdfast');
  mkdirSync(settings, { recursive: true });
  const mustKeep = { rule: 'voxelVolumeMm3 <= 7 and chemicalShiftPx < 0.75', source };
  writeFileSync(
    join(settings, 'rules.json'),
    JSON.stringify({ format: 'holdfast rules', version: 1, rules: [{ region: 'liver', mustKeep }] }),
  );
  return home;
}

describe('moments of a physicist', () => {
  it('a scanner and coil chosen at the start: what changes is shown, the session is on it, and so is the record', async () => {
    const screen = open(newHome());
    await screen.program.waitFor('0.55 T', 20_000);
    await screen.keys('3 liver', 'Type to narrow: 3 liver');
    await screen.keys(keyBytes.tab, /demo-3t +2\.894 T +coil body/);
    await screen.goTo(` ${'demo-3t'.padEnd(18)} ${'2.894 T'.padStart(12)}  coil body`);
    expect(screen.program.text()).toContain('Larmor 127.732 > 123.219 MHz');
    expect(screen.program.text()).toMatch(/t1-3d +1\.05 > 1\.04 +1\.94 > 1\.88/);
    await screen.keys(keyBytes.enter, 'Scanner: demo-3t, coil body, 2.894 T');
    await screen.keys(keyBytes.enter, 'Running order');
    expect(screen.program.text()).toContain('liver-3t, demo-3t 2.894 T');
    await screen.keys('d', 'done');
    await screen.keys('e', 'Record');
    await screen.keys('s', /saved/i);
    expect(screen.records()).toMatchObject([{ scanner: 'demo-3t', coil: 'body', fieldT: 2.894 }]);
  });

  it('a rule of the site crossed by one key is seen at once with its numbers and source; the record names who accepted it', async () => {
    const screen = open(homeWithRule());
    await screen.openPreset('3 liver');
    await screen.keys(keyBytes.enter, 'Series t1-3d');
    await screen.goTo('slice thickness');
    expect(screen.program.text()).not.toContain('must-keep crossed');
    await screen.keys('+', '1 must-keep crossed');
    const text = screen.program.text().replace(/\s+/g, ' ');
    expect(text).toMatch(/voxel volume [\d.]+ mm3, chemical shift [\d.]+ px: must keep voxelVolumeMm3 <= 7 and chemicalShiftPx < 0\.75/);
    expect(text).toContain(`(${source})`);
    await screen.keys('e', 'Record');
    await screen.goTo('  crossed');
    expect(screen.program.text().replace(/\s+/g, ' ')).toContain('must keep voxelVolumeMm3 <= 7');
    await screen.keys(keyBytes.right, 'accepted by technologist');
    await screen.keys('s', /saved/i);
    const crossed = screen.records().flatMap(({ series }) => series.flatMap((one) => one.crossed));
    expect(crossed).toEqual([{ rule: expect.stringContaining(source), role: 'technologist' }]);
  });

  it('rules that cannot be read are told, and the rest works', async () => {
    const home = homeWithRule();
    writeFileSync(join(home, '.config', 'holdfast', 'rules.json'), '{ "format": "holdfast rules", "version": 1, "rules": 3 }');
    const screen = open(home);
    await screen.program.waitFor(/The rules of the site are not checked: .*rules\.json/s, 20_000);
    await screen.openPreset('3 liver');
  });

  it('a preset carried to another field: side by side, why, and one key saves a draft that is not released', async () => {
    const home = newHome();
    const screen = open(home);
    await screen.openPreset('1.5 shoulder');
    await screen.keys('t', 'PROPOSAL: shoulder-1.5t, 1.5 T to 3 T, equal contrast ratio');
    expect(screen.program.text()).toMatch(/bandwidth +180 Hz\/px +360 Hz\/px +equal chemical shift/);
    await screen.goTo('bandwidth');
    expect(screen.program.text()).toContain('Formula: ');
    await screen.keys('w', 'It ignores');
    await screen.escape('PROPOSAL');
    await screen.keys('2.89', 'type: 2.89');
    await screen.keys(keyBytes.enter, 'PROPOSAL: shoulder-1.5t, 1.5 T to 2.89 T');
    await screen.keys('s', 'Draft preset shoulder-2.89t-draft saved');
    const folder = join(home, '.local', 'share', 'holdfast', 'presets');
    const [name = ''] = readdirSync(folder);
    const read = readPreset(readFileSync(join(folder, name), 'utf8'), name);
    expect(read.ok && read.value).toMatchObject({ status: 'draft', revision: 1, fieldT: 2.89 });
    expect(read.ok && read.value.released).toBeFalsy();
    expect(screen.program.text()).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });
});
