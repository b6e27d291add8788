import { readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { inventedPreset } from '../store/invented-study.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { runCommand } from './run-command.js';

describe('presets', () => {
  it('check finds every shipped preset right', async () => {
    const { exit, out, err } = await runCommand(['presets', 'check']);
    expect([exit, err]).toEqual([0, '']);
    expect(out.trim().split('\n')).toHaveLength(readdirSync('presets').length);
  });

  it("list has every shipped preset, and the site's own before the shipped one of the same id", async () => {
    const folder = temporaryFolder();
    writeFileSync(join(folder, 'knee-3t.json'), inventedPreset('knee-3t', 7));
    const { exit, out } = await runCommand(['presets', 'list'], { environment: { HOLDFAST_PRESETS: folder } });
    expect(exit).toBe(0);
    for (const name of readdirSync('presets')) expect(out).toContain(name.replace(/\.json$/, ''));
    const knees = out.split('\n').filter((line) => line.startsWith('knee-3t'));
    expect(knees.map((line) => line.includes(' site '))).toEqual([true, false]);
    const shown = await runCommand(['presets', 'show', 'knee-3t', '--presets', folder]);
    expect(shown.out).toContain('revision 7');
  });

  it('list refuses a named folder that is not there', async () => {
    const { exit, out } = await runCommand(['presets', 'list', '--presets', '/nonexistent-folder']);
    expect([exit, out]).toEqual([66, '']);
  });

  it('show has every parameter by its key, and what must be kept with its source', async () => {
    const { exit, out } = await runCommand(['presets', 'show', 'prostate-3t']);
    expect(exit).toBe(0);
    expect(out).toMatch(/^repetitionTimeMs +\d/m);
    expect(out).toContain('must keep: voxelSliceMm');
    expect(out).toContain('PI-RADS');
    for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });
});
