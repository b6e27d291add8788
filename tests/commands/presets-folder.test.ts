import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { runCommand } from './run-command.js';

let homeFolder = '';
beforeEach(() => {
  homeFolder = mkdtempSync(join(tmpdir(), 'holdfast-'));
  mkdirSync(join(homeFolder, '.config', 'holdfast'), { recursive: true });
  mkdirSync(join(homeFolder, 'site'));
  const study = readFileSync(new URL('../../presets/liver-3t.json', import.meta.url), 'utf8').replace('"liver-3t"', '"site-liver"');
  writeFileSync(join(homeFolder, 'site', 'site-liver.json'), study);
});
afterEach(() => rmSync(homeFolder, { recursive: true, force: true }));
const settings = (text: string) => writeFileSync(join(homeFolder, '.config', 'holdfast', 'config.json'), text);

describe('the folder of presets that the settings name', () => {
  it.each([
    ['figures', 'site-liver'],
    ['presets', 'show', 'site-liver'],
    ['presets', 'list'],
    ['presets', 'check'],
    ['ways', 'site-liver', 't1-3d', '--hold', '20'],
    ['budget', 'site-liver', '--minutes', '30'],
    ['scanner', 'show', 'demo-3t', '--preset', 'site-liver'],
  ])('is where %s looks', async (...args) => {
    settings(JSON.stringify({ presetsFolder: join(homeFolder, 'site') }));
    const { exit, out } = await runCommand(args, { homeFolder });
    expect(exit).toBe(0);
    expect(out).toContain('site-liver');
  });

  it('gives way to the environment, and that to the option', async () => {
    settings(JSON.stringify({ presetsFolder: join(homeFolder, 'nowhere') }));
    const site = join(homeFolder, 'site');
    expect((await runCommand(['figures', 'site-liver'], { homeFolder, environment: { HOLDFAST_PRESETS: site } })).exit).toBe(0);
    const nowhere = { homeFolder, environment: { HOLDFAST_PRESETS: join(homeFolder, 'elsewhere') } };
    expect((await runCommand(['figures', 'site-liver', '--presets', site], nowhere)).exit).toBe(0);
  });

  it('wrong settings end with 78 and print nothing', async () => {
    settings('{ "presetsFolder": 7 }');
    const { exit, out } = await runCommand(['figures', 'liver-3t'], { homeFolder });
    expect([exit, out]).toEqual([78, '']);
  });
});
