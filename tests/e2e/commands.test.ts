import { spawn, spawnSync } from 'node:child_process';
import { accessSync, constants, existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { keyBytes } from './harness/key-bytes.js';
import { start } from './harness/start.js';

const bundle = resolve('dist/holdfast.js');
let folder: string;

beforeAll(() => {
  if (!existsSync(bundle)) throw new Error('dist/holdfast.js is missing: run `npm run build` first');
  folder = mkdtempSync(join(tmpdir(), 'holdfast-commands-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Runs the bundle as a person's shell would, away from the project, without a terminal. */
function holdfast(args: readonly string[], environment: Record<string, string> = {}) {
  const env = { PATH: process.env['PATH'] ?? '', HOME: folder, ...environment };
  const { status, stdout, stderr } = spawnSync(process.execPath, [bundle, ...args], { cwd: folder, env, encoding: 'utf8', input: '' });
  return { exit: status, out: stdout, err: stderr };
}

/** Code of modules that must not run, by a text that stands in what a module does when it starts. */
const startsOf = {
  react: 'react.transitional.element',
  ink: 'must be rendered inside <Text> component',
  parser: 'Parenthesis ) expected',
  objects: 'missing required meta header attribute',
} as const;

/** How often the module was started by a command. */
function starts(module: keyof typeof startsOf, args: readonly string[]): number {
  const reports = mkdtempSync(join(folder, 'coverage-'));
  holdfast(args, { NODE_V8_COVERAGE: reports });
  return startsIn(reports, module);
}

/** The file that the bundle starts. */
function programFile(): string {
  const name = /program-[0-9a-f]+/.exec(readFileSync(bundle, 'utf8'))?.[0] ?? '';
  return join(dirname(bundle), `${name}.cjs`);
}

/** How often the module that holds a text was started: V8's own count of its outermost function, from a coverage report. */
function startsIn(reports: string, module: keyof typeof startsOf): number {
  const scripts = readdirSync(reports).flatMap(
    (name) => (JSON.parse(readFileSync(join(reports, name), 'utf8')) as { result: ScriptCoverage[] }).result,
  );
  const program = programFile();
  const script = scripts.find(({ url }) => url.endsWith(program));
  const source = readFileSync(program, 'utf8');
  const at = source.indexOf(startsOf[module]);
  if (script === undefined || at === -1) throw new Error(`no coverage of the bundle, or ${module} is not in it`);
  const around = script.functions
    .map(({ ranges }) => ranges[0] as CoverageRange)
    .filter(({ startOffset, endOffset }) => startOffset > 1 && startOffset <= at && at < endOffset)
    .sort((a, b) => a.startOffset - b.startOffset);
  if (around[0] === undefined) throw new Error(`no function of the bundle holds the start of ${module}`);
  return around[0].count;
}
interface CoverageRange {
  readonly startOffset: number;
  readonly endOffset: number;
  readonly count: number;
}
interface ScriptCoverage {
  readonly url: string;
  readonly functions: readonly { readonly ranges: readonly CoverageRange[] }[];
}

describe('the bundle', () => {
  it('can be run by its name', () => {
    accessSync(bundle, constants.X_OK);
    expect(readFileSync(bundle, 'utf8').startsWith('#!/usr/bin/env node\n')).toBe(true);
    expect(spawnSync(bundle, ['--version'], { encoding: 'utf8' }).stdout).toMatch(/^holdfast \d+\.\d+\.\d+, model \S+\n$/);
  });

  it('is the bin of the package', () => {
    const { bin } = JSON.parse(readFileSync('package.json', 'utf8')) as { bin: Record<string, string> };
    expect(resolve(bin['holdfast'] ?? '')).toBe(bundle);
  });

  it('without a terminal and without a command prints the demo session', () => {
    const { exit, out, err } = holdfast([]);
    expect([exit, err]).toEqual([0, '']);
    expect(out).toMatch(/^t1-3d +1:08 +4 x 17\.0 s +100 %/m);
  });

  it('npm start passes arguments on and prints nothing else on standard output', () => {
    const started = spawnSync(process.execPath, ['scripts/start.mjs', 'figures', 'knee-3t', '--json'], { encoding: 'utf8', input: '' });
    expect(started.status).toBe(0);
    expect(started.stdout).toBe(holdfast(['figures', 'knee-3t', '--json']).out);
    expect(spawnSync(process.execPath, ['scripts/start.mjs', 'figures', 'kne-3t'], { encoding: 'utf8', input: '' }).status).toBe(66);
  });

  it('finds its presets from any folder, and prints JSON alone', () => {
    const { exit, out, err } = holdfast(['figures', 'liver-3t', '--json']);
    expect([exit, err]).toEqual([0, '']);
    expect((JSON.parse(out) as { series: unknown[] }).series).toHaveLength(5);
  });

  it('shows no colour without a terminal, and the colour that was asked for', () => {
    expect(holdfast(['figures', 'liver-3t']).out).not.toContain('\u001b');
    expect(holdfast(['figures', 'liver-3t'], { FORCE_COLOR: '1' }).out).toContain('\u001b[1m');
    expect(holdfast(['figures', 'liver-3t', '--color', 'never'], { FORCE_COLOR: '1' }).out).not.toContain('\u001b');
    expect(holdfast(['figures', 'liver-3t', '--color', '16'], { NO_COLOR: '1' }).out).toContain('\u001b[1m');
  });

  it('ends quietly when its reader goes away', async () => {
    const child = spawn(process.execPath, [bundle, 'figures', 'liver-3t', '--json'], { cwd: folder, stdio: ['ignore', 'pipe', 'pipe'] });
    child.stdout.destroy();
    let err = '';
    child.stderr.on('data', (text: Buffer) => {
      err += text.toString();
    });
    const exit = await new Promise((ended) => child.on('close', (code, signal) => ended(signal ?? code)));
    expect([exit, err]).toEqual([0, '']);
  });
});

describe('bad input to the bundle', () => {
  it.each([
    ['unknown key', ['figures', 'liver-3t', 't1-3d', '--set', 'matrixReed=1'], 64],
    ['wrong unit', ['figures', 'liver-3t', 't1-3d', '--set', 'fieldOfViewMm=3 kg'], 64],
    ['negative matrix', ['figures', 'liver-3t', 't1-3d', '--set', 'matrixRead=-320'], 64],
    ['NaN', ['figures', 'liver-3t', 't1-3d', '--set', 'echoTimeMs=NaN'], 64],
    ['unknown option', ['figures', 'liver-3t', '--frobnicate'], 64],
    ['unknown command', ['frobnicate'], 64],
    ['unknown series', ['figures', 'liver-3t', 'nothing'], 66],
    ['unknown preset', ['figures', 'nothing'], 66],
    ['missing file', ['figures', './nothing.json'], 66],
  ] as const)('%s: a message, its exit code, nothing on standard output', (_name, args, exit) => {
    const ran = holdfast(args);
    expect([ran.exit, ran.out]).toEqual([exit, '']);
    expect(ran.err).toMatch(/^holdfast: .+\n$/);
  });

  it.each([
    ['2 MB', Buffer.alloc(2_000_000, ' ')],
    ['binary', Buffer.from(Array.from({ length: 4096 }, (_, i) => (i * 37) % 256))],
    ['half a file', Buffer.from('{"format":"holdfast preset",')],
  ])('%s: exit code 65, nothing on standard output', (name, bytes) => {
    const file = join(folder, `${name.replace(/ /g, '-')}.json`);
    writeFileSync(file, bytes);
    const ran = holdfast(['figures', file]);
    expect([ran.exit, ran.out]).toEqual([65, '']);
    expect(ran.err).toMatch(/^holdfast: .+\n$/);
  });

  it('an impossible TE is a caution of level error, its figures null, exit code 0', () => {
    const { exit, out } = holdfast(['figures', 'liver-3t', 't1-3d', '--set', 'echoTimeMs=500', '--json']);
    const { series } = JSON.parse(out) as { series: [{ figures: Record<string, unknown>; cautions: { code: string; level: string }[] }] };
    expect(exit).toBe(0);
    expect(series[0].cautions[0]).toMatchObject({ code: 'timing-impossible', level: 'error' });
    expect(series[0].figures['relativeSnr']).toBeNull();
  });
});

describe('what is loaded', () => {
  const commands = [['--version'], ['--help'], ['figures', 'liver-3t', '--json'], ['presets', 'list'], []];

  it('checking presets starts the parser of formulas: the count can see a start', () => {
    expect(starts('parser', ['presets', 'check'])).toBe(1);
  });

  it('reading headers starts the reader of objects, and no parser of formulas', () => {
    const sidecar = resolve('tests/headers/invented-bold.json');
    expect(starts('objects', ['read', sidecar])).toBe(1);
    expect(starts('parser', ['read', sidecar])).toBe(0);
  });

  it.each(commands.map((args) => [args.join(' ') || 'the demo session', args] as const))(
    '%s starts no parser of formulas',
    (_name, args) => {
      expect(starts('parser', args)).toBe(0);
    },
  );

  it.each(commands.map((args) => [args.join(' ') || 'the demo session', args] as const))(
    '%s starts neither ink nor react, nor the reader of objects',
    (_name, args) => {
      expect(starts('react', args)).toBe(0);
      expect(starts('ink', args)).toBe(0);
      expect(starts('objects', args)).toBe(0);
    },
  );

  it('the interface starts both; the parser and the reader of objects not yet: the counts can see it', async () => {
    const reports = mkdtempSync(join(folder, 'coverage-'));
    const program = start(process.execPath, [bundle], { cwd: folder, env: { HOME: folder, NODE_V8_COVERAGE: reports } });
    // A word may stand there before anything that draws is loaded: wait for a whole screen.
    await program.waitFor(
      ({ text }) =>
        text()
          .split('\n')
          .filter((line) => line.trim() !== '').length > 4,
    );
    program.press(keyBytes.ctrlC);
    await program.exited;
    const loaded = (['react', 'ink', 'parser', 'objects'] as const).map((which) => startsIn(reports, which));
    expect(loaded).toEqual([1, 1, 0, 0]);
  });
});
