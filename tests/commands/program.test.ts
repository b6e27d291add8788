import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { modelVersion } from '../../src/calc/model-version.js';
import { commandTable } from '../../src/commands/command-table.js';
import { emphasise } from '../../src/commands/emphasis.js';
import { asciiOnly } from '../../src/commands/page.js';
import { textTable } from '../../src/session/text-table.js';
import { wrapText } from '../../src/session/wrap-text.js';
import { toolVersion } from '../../src/study/tool-version.js';
import { runCommand } from './run-command.js';

describe('the program', () => {
  it('has the version of its package', async () => {
    const { version } = JSON.parse(readFileSync('package.json', 'utf8')) as { version: string };
    expect(toolVersion).toBe(version);
    expect(await runCommand(['--version'])).toEqual({ exit: 0, out: `holdfast ${version}, model ${modelVersion}\n`, err: '' });
  });

  it('help names every command and keeps to 80 columns, examples first', async () => {
    const { exit, out } = await runCommand(['--help']);
    expect(exit).toBe(0);
    for (const { words } of commandTable) expect(out).toContain(words.join(' '));
    expect(out.indexOf('Examples')).toBeLessThan(out.indexOf('Commands'));
    for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it.each(commandTable.map((command) => [command.words.join(' '), command] as const))(
    'help of %s has its options',
    async (name, command) => {
      const { exit, out } = await runCommand([...name.split(' '), '-h']);
      expect(exit).toBe(0);
      for (const option of command.options) expect(out).toContain(`--${option.name}`);
      for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    },
  );

  it('help of half a command names the commands', async () => {
    expect((await runCommand(['presets', '--help'])).out).toMatch(/holdfast presets list.*\n.*holdfast presets show/);
  });

  it('opens the interface on a terminal with what the command line says, and answers its exit code', async () => {
    const seen: unknown[] = [];
    const openInterface = (options: unknown) => {
      seen.push(options);
      return Promise.resolve(7);
    };
    const ran = await runCommand(['--presets', 'here', '--ascii', '--color', '16'], { canDraw: true, openInterface });
    expect(ran).toEqual({ exit: 7, out: '', err: '' });
    expect(seen).toEqual([{ presets: 'here', records: undefined, ascii: true, reader: false, color: '16', scanner: null }]);
  });

  it('opens the interface on the scanner and coil that were named, and not on one that is not there', async () => {
    const seen: unknown[] = [];
    const openInterface = (options: unknown) => {
      seen.push(options);
      return Promise.resolve(0);
    };
    const open = (...args: readonly string[]) => runCommand(args, { canDraw: true, openInterface });
    expect((await open('--scanner', 'demo-3t', '--coil', 'HEAD')).exit).toBe(0);
    expect((await open('--scanner', 'demo-1.5t')).exit).toBe(0);
    expect(seen).toMatchObject([
      { scanner: { file: { name: 'demo-3t' }, coil: 'head' } },
      { scanner: { file: { name: 'demo-1.5t' }, coil: 'body' } },
    ]);
    expect(await open('--scanner', 'demo-4t')).toMatchObject({ exit: 66, out: '' });
    expect(await open('--scanner', 'demo-3t', '--coil', 'hand')).toMatchObject({ exit: 64, out: '' });
    expect(await open('--coil', 'head')).toMatchObject({ exit: 64, out: '' });
    expect(seen).toHaveLength(2);
  });

  it('the demo session without a terminal is worked out on the scanner that was named', async () => {
    const { exit, out } = await runCommand(['--scanner', 'demo-3t']);
    expect(exit).toBe(0);
    expect(out).toContain('On scanner demo-3t, coil body, the first of its file.');
    expect(out).not.toBe((await runCommand([])).out);
    expect((await runCommand(['--coil', 'head'])).exit).toBe(64);
  });

  it('prints the demo session without a terminal: running order, times, SNR, verdicts', async () => {
    const { exit, out, err } = await runCommand([], { environment: { HOLDFAST_PRESETS: '/nonexistent-folder' } });
    expect([exit, err]).toEqual([0, '']);
    expect(out).toContain('invented');
    expect(out).toMatch(/^t1-3d +1:08 +4 x 17\.0 s +100 % +3:28 +OVER by 6\.0 s$/m);
    expect(out).toMatch(/^44 slices of 5 mm +10\.5 s +131 % +220 mm +TOO CLOSE, 0\.5 s to spare$/m);
    expect(out).toMatch(/^Session: FITS, \d+:\d\d to spare of 25 minutes\.$/m);
    for (const line of out.split('\n')) expect(line.length, line).toBeLessThanOrEqual(80);
  });
});

describe('plain text', () => {
  it('a table lines up on the decimal point, words where numbers start', () => {
    const columns = [
      { title: 'what', align: 'left' },
      { title: 'value', align: 'point' },
    ] as const;
    expect(
      textTable(
        columns,
        [
          ['a', '380 mm'],
          ['b', '3.55 ms'],
          ['c', 'AP'],
          ['d', '1:08'],
        ],
        false,
      ),
    ).toEqual(['what  value', 'a      380 mm', 'b        3.55 ms', 'c     AP', 'd     1:08']);
  });

  it('colour takes no width, and is left out where there is none', () => {
    const paint = emphasise(true);
    const columns = [
      { title: 'v', align: 'right' },
      { title: 'n', align: 'left' },
    ] as const;
    const [, row] = textTable(columns, [[paint('over', 'OVER'), 'x']], false);
    expect(row).toBe('\u001b[31mOVER\u001b[0m  x');
    expect(emphasise(false)('over', 'OVER')).toBe('OVER');
  });

  it('a screen reader gets a sentence a row, without dashes and blanks', () => {
    const columns = [
      { title: 'series', align: 'left' },
      { title: 'time', align: 'right' },
      { title: 'holds', align: 'right' },
    ] as const;
    expect(textTable(columns, [['dwi', '0:40', '-']], true)).toEqual(['dwi: time 0:40.']);
  });

  it('wraps between words alone', () => {
    expect(wrapText('aa bbb cccccccc d', 6)).toEqual(['aa bbb', 'cccccccc', 'd']);
  });

  it('ASCII alone keeps the meaning of units and letters', () => {
    expect(asciiOnly('\u00b5T \u00d7 S\u00e3o \u4e2d \u2212 2\n')).toBe('uT x Sao ? - 2\n');
  });
});
