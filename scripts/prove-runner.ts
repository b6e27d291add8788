import { spawn } from 'node:child_process';
import { cpSync, existsSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Mutant } from './prove-mutants.js';
import { mutated } from './prove-mutants.js';

/** What the tests of one run said. */
export type Outcome =
  | { readonly kind: 'passed'; readonly msByFile: ReadonlyMap<string, number> }
  | { readonly kind: 'failed'; readonly by: string }
  | { readonly kind: 'timeout' };

interface Report {
  readonly testResults: readonly {
    readonly name: string;
    readonly status: string;
    readonly startTime: number;
    readonly endTime: number;
    readonly message: string;
    readonly assertionResults: readonly { readonly status: string; readonly fullName: string }[];
  }[];
}

const copied = ['src', 'tests', 'presets', 'schema', 'build', 'scripts', 'package.json', 'tsconfig.json'];

/** A copy of the project in a fresh folder, in which one change at a time is made. */
export class ProofCopy {
  readonly #root: string;
  readonly #folder: string;
  #child: number | null = null;

  constructor(root: string) {
    this.#root = root;
    this.#folder = mkdtempSync(join(tmpdir(), 'holdfast-proof-'));
    for (const part of copied) {
      if (existsSync(join(root, part))) cpSync(join(root, part), join(this.#folder, part), { recursive: true });
    }
    symlinkSync(join(root, 'node_modules'), join(this.#folder, 'node_modules'));
    const config = {
      cacheDir: join(this.#folder, 'cache'),
      test: { include: ['tests/**/*.test.ts'], isolate: false, pool: 'threads', maxWorkers: 1, testTimeout: 120_000 },
    };
    writeFileSync(join(this.#folder, 'vitest.config.mjs'), `export default ${JSON.stringify(config)};\n`);
  }

  /** Makes the change and leaves it until the next one or `restore`. */
  change(mutant: Mutant): void {
    writeFileSync(join(this.#folder, mutant.file), mutated(readFileSync(join(this.#folder, mutant.file), 'utf8'), mutant));
  }

  restore(file: string, source: string): void {
    writeFileSync(join(this.#folder, file), source);
  }

  /** Runs test files up to the first failure; never longer than `timeoutMs`. */
  async run(files: readonly string[], timeoutMs: number): Promise<Outcome> {
    const report = join(this.#folder, 'report.json');
    rmSync(report, { force: true });
    const vitest = join(this.#root, 'node_modules/vitest/vitest.mjs');
    const options = ['run', '--bail', '1', '--config', 'vitest.config.mjs', '--reporter=json', `--outputFile=${report}`];
    // A group of its own, so that what hangs can be ended whole.
    const child = spawn(process.execPath, [vitest, ...options, ...files], {
      cwd: this.#folder,
      stdio: 'ignore',
      detached: true,
    });
    this.#child = child.pid ?? null;
    const ended = await new Promise<'exit' | 'timeout'>((resolve) => {
      const timer = setTimeout(() => {
        this.#end();
        resolve('timeout');
      }, timeoutMs);
      child.once('close', () => {
        clearTimeout(timer);
        resolve('exit');
      });
    });
    this.#child = null;
    if (ended === 'timeout') return { kind: 'timeout' };
    if (child.exitCode === 0) return { kind: 'passed', msByFile: timesOf(report, this.#folder) };
    return { kind: 'failed', by: firstFailure(report, this.#folder) };
  }

  #end(): void {
    if (this.#child === null) return;
    try {
      process.kill(-this.#child, 'SIGKILL');
    } catch {
      // It ended by itself just now.
    }
  }

  remove(): void {
    this.#end();
    rmSync(this.#folder, { recursive: true, force: true });
  }
}

function read(report: string): Report | null {
  return existsSync(report) ? (JSON.parse(readFileSync(report, 'utf8')) as Report) : null;
}

function timesOf(report: string, folder: string): ReadonlyMap<string, number> {
  const results = read(report)?.testResults ?? [];
  return new Map(results.map(({ name, startTime, endTime }) => [name.slice(folder.length + 1), endTime - startTime]));
}

/** The first test that failed, or the file that could not even be loaded. */
function firstFailure(report: string, folder: string): string {
  for (const result of read(report)?.testResults ?? []) {
    if (result.status !== 'failed') continue;
    const test = result.assertionResults.find(({ status }) => status === 'failed');
    return `${result.name.slice(folder.length + 1)}: ${test?.fullName ?? result.message.split('\n')[0]}`;
  }
  return 'the tests could not be started';
}
