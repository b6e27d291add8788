import { type ChildProcess, spawn } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { build, type Plugin } from 'esbuild';
import { type Mutant, mutated } from './prove-mutants.js';

/** What the tests of one run said. */
export type RunResult =
  | { readonly kind: 'passed'; readonly msByFile: ReadonlyMap<string, number> }
  | { readonly kind: 'failed'; readonly by: string }
  | { readonly kind: 'timeout' };

interface Report {
  readonly testResults: readonly {
    readonly message: string;
    readonly assertionResults: readonly {
      readonly status: string;
      readonly ancestorTitles: readonly string[];
      readonly title: string;
      readonly duration?: number;
    }[];
  }[];
}

/**
 * Runs test files on a changed source. The change is made on the way into a bundle in a fresh folder, never in the project:
 * one bundle of all the test files asked for starts several times faster than as many files.
 */
export class MutantRunner {
  readonly #root: string;
  readonly #folder = mkdtempSync(join(tmpdir(), 'holdfast-proof-'));
  readonly #sources: ReadonlyMap<string, string>;
  #child: ChildProcess | null = null;

  /** The sources as they were at the start, by path from the root: what is edited meanwhile counts in the next run. */
  constructor(root: string, sources: ReadonlyMap<string, string>) {
    this.#root = root;
    this.#sources = sources;
    symlinkSync(join(root, 'node_modules'), join(this.#folder, 'node_modules'));
    writeFileSync(join(this.#folder, 'package.json'), '{ "type": "module" }\n');
    const test = { include: ['tests/*.mjs'], isolate: false, pool: 'threads', maxWorkers: 1, testTimeout: 300_000, hookTimeout: 300_000 };
    const config = { cacheDir: join(this.#folder, 'cache'), test };
    writeFileSync(join(this.#folder, 'vitest.config.mjs'), `export default ${JSON.stringify(config)};\n`);
    mkdirSync(join(this.#folder, 'tests'));
  }

  /** Runs test files, with one change or none, up to the first failure and never longer than `timeoutMs`. */
  async run(files: readonly string[], mutant: Mutant | null, timeoutMs: number): Promise<RunResult> {
    const bundle = join(this.#folder, 'tests/all.mjs');
    // Each file is loaded inside a group of its own name, so that the report says where a test stands.
    const groups = files.map((file) => `describe(${JSON.stringify(file)}, async () => { await import(${JSON.stringify(`./${file}`)}); });`);
    await build({
      absWorkingDir: this.#root,
      stdin: { contents: `import { describe } from 'vitest';\n${groups.join('\n')}\n`, resolveDir: this.#root, loader: 'js' },
      outfile: bundle,
      bundle: true,
      format: 'esm',
      platform: 'node',
      target: 'node20',
      packages: 'external',
      plugins: [this.#changed(mutant)],
      logLevel: 'error',
    });
    const report = join(this.#folder, 'report.json');
    rmSync(report, { force: true });
    const options = ['run', '--bail', '1', '--config', 'vitest.config.mjs', '--reporter=json', `--outputFile=${report}`];
    // A process group of its own, so that what hangs can be ended whole.
    const child = spawn(process.execPath, [join(this.#root, 'node_modules/vitest/vitest.mjs'), ...options], {
      cwd: this.#folder,
      stdio: 'ignore',
      detached: true,
    });
    this.#child = child;
    const inTime = await new Promise<boolean>((resolve) => {
      const timer = setTimeout(() => {
        this.#end();
        resolve(false);
      }, timeoutMs);
      child.once('close', () => {
        clearTimeout(timer);
        resolve(true);
      });
    });
    this.#child = null;
    if (!inTime) return { kind: 'timeout' };
    return child.exitCode === 0 ? { kind: 'passed', msByFile: timesOf(report) } : { kind: 'failed', by: firstFailure(report) };
  }

  /** Hands the bundler the sources of the start, one of them changed, and tells files where they stand. */
  #changed(mutant: Mutant | null): Plugin {
    const root = this.#root;
    return {
      name: 'one-change',
      setup: (building) => {
        building.onLoad({ filter: /\/(src|tests)\/.*\.tsx?$/ }, async ({ path }) => {
          const file = path.slice(root.length);
          const source = this.#sources.get(file) ?? (await readFile(path, 'utf8'));
          const contents = mutant?.file === file ? mutated(source, mutant) : source;
          return {
            contents: contents.replaceAll('import.meta.url', JSON.stringify(pathToFileURL(path).href)),
            loader: path.endsWith('x') ? 'tsx' : 'ts',
          };
        });
      },
    };
  }

  #end(): void {
    const pid = this.#child?.pid;
    if (pid === undefined) return;
    try {
      process.kill(-pid, 'SIGKILL');
    } catch {
      // It ended by itself just now.
    }
  }

  remove(): void {
    this.#end();
    rmSync(this.#folder, { recursive: true, force: true });
  }
}

function assertions(report: string): Report['testResults'][number]['assertionResults'] {
  if (!existsSync(report)) return [];
  return (JSON.parse(readFileSync(report, 'utf8')) as Report).testResults.flatMap((result) => result.assertionResults);
}

function timesOf(report: string): ReadonlyMap<string, number> {
  const ms = new Map<string, number>();
  for (const { ancestorTitles, duration } of assertions(report)) {
    const file = ancestorTitles[0] ?? '';
    ms.set(file, (ms.get(file) ?? 0) + (duration ?? 0));
  }
  return ms;
}

/** The first test that failed, or what kept the tests from being loaded. */
function firstFailure(report: string): string {
  const failed = assertions(report).find(({ status }) => status === 'failed');
  if (failed !== undefined) return `${failed.ancestorTitles[0]}: ${[...failed.ancestorTitles.slice(1), failed.title].join(' ')}`;
  return 'tests that could not be loaded';
}
