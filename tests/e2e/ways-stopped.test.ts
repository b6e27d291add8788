import { spawn } from 'node:child_process';
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { unknownBody } from '../../src/calc/body.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { latticeOf, latticeSize } from '../../src/search/lattice.js';
import { readPreset } from '../../src/study/read-preset.js';
import { keyBytes } from './harness/key-bytes.js';
import { hugeLatticePreset } from './huge-lattice-preset.js';
import { newHome } from './interface-driver.js';
import { interfacesClosedAfterEach } from './moment-beginnings.js';

const bundle = new URL('../../dist/holdfast.js', import.meta.url).pathname;
const open = interfacesClosedAfterEach();

/** A home with the preset in a folder of its own. */
function homeWithPreset(): { home: string; presets: string; file: string } {
  const home = newHome();
  const presets = join(home, 'presets');
  mkdirSync(presets);
  const file = join(presets, 'huge-liver.json');
  writeFileSync(file, JSON.stringify(hugeLatticePreset));
  return { home, presets, file };
}

describe('a search over more than 10^12 ways', () => {
  it('has that many', () => {
    const read = readPreset(JSON.stringify(hugeLatticePreset), 'huge-liver.json');
    if (!read.ok) throw new Error(read.problems[0]?.message);
    const [series] = read.value.series;
    if (series === undefined) throw new Error('no series');
    const circumstances = { series, scanner: plainScanner(3), body: unknownBody, limits: {}, set: {}, opened: [], frozen: false };
    const problem = { ...circumstances, presetFieldT: 3, rules: new Map(), readings: {}, bands: {} };
    expect(latticeSize(latticeOf(problem))).toBeGreaterThan(1e12);
  });

  it('Escape gives what was found, not proven; a way of it can be taken, and the next Escape goes back', { timeout: 240_000 }, async () => {
    const { home, presets } = homeWithPreset();
    const screen = open(home, ['--presets', presets]);
    await screen.openPreset('3 everything');
    await screen.keys('p', 'This patient');
    await screen.keys(`11${keyBytes.enter}`, 'OVER by');
    await screen.escape('Running order');
    await screen.keys(keyBytes.enter, 'Series t1');
    await screen.keys('f', 'Searching');
    // It tells a share of the whole lattice once the few changes are looked through.
    await screen.program.waitFor(/Searching \d+ %/, 200_000);
    await screen.escape('NOT PROVEN: stopped, a better one may exist');
    const text = screen.program.text();
    expect(text).toMatch(/\d+ ways, the first 3; m shows all\. NOT PROVEN/);
    expect(text).toMatch(/1 closest to the preset\s+FITS, \d+\.\d s to spare/);
    expect(text).not.toContain('Proven: none is better');
    await screen.keys(keyBytes.enter, 'Way 1 taken');
    expect(screen.verdict()).toMatch(/^FITS, /);
    await screen.keys('f', 'NOT PROVEN');
    await screen.escape('Series t1');
  });

  it('a signal ends the command as signals do: nothing on standard output, killed by it', { timeout: 60_000 }, async () => {
    const { file } = homeWithPreset();
    const child = spawn(process.execPath, [bundle, 'ways', file, 't1', '--hold', '11', '--json'], { stdio: ['ignore', 'pipe', 'pipe'] });
    let out = '';
    child.stdout.on('data', (text: Buffer) => {
      out += text.toString();
    });
    const ended = new Promise((resolve) => child.on('close', (code, signal) => resolve([code, signal])));
    await new Promise((resolve) => setTimeout(resolve, 2500));
    expect(child.exitCode).toBeNull();
    child.kill('SIGINT');
    expect(await ended).toEqual([null, 'SIGINT']);
    expect(out).toBe('');
  });
});
