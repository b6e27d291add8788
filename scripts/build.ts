/**
 * Writes `dist/holdfast.js`: one minified ESM file in production mode, executable, with everything it needs inside.
 * Whatever is imported dynamically stays in the same file and runs only when it is asked for, so that the commands
 * never start the interface, and formulas load late.
 */
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { chmod, mkdir, rename, rm } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { type BuildOptions, build, type Plugin } from 'esbuild';
import { inkDefines, replaceInkCaches } from '../src/terminal/ink-caches/ink-bundling.js';

const root = fileURLToPath(new URL('../', import.meta.url));

/**
 * Bundles the expression parser first and apart: what is imported late inside one file is not shaken free of what it does not use,
 * and mathjs whole is several times the parser.
 */
const parserAlone: Plugin = {
  name: 'parser-alone',
  setup(building) {
    building.onLoad({ filter: /[\\/]formulas[\\/]expression-parser\.ts$/ }, async ({ path }) => {
      const alone = await build({
        absWorkingDir: root,
        entryPoints: [path],
        bundle: true,
        format: 'esm',
        platform: 'node',
        target: 'node20',
        write: false,
      });
      return { contents: alone.outputFiles[0]?.text ?? '', loader: 'js' };
    });
  },
};

const shared: BuildOptions = {
  absWorkingDir: root,
  bundle: true,
  format: 'esm',
  platform: 'node',
  target: 'node20',
  minify: true,
  legalComments: 'none',
  jsx: 'automatic',
  define: inkDefines,
  // CommonJS packages inside the bundle ask for Node's own modules by `require`.
  banner: {
    js: "#!/usr/bin/env node\nimport { createRequire as __createRequire } from 'node:module';\nconst require = __createRequire(import.meta.url);",
  },
  logLevel: 'warning',
};

/** Runs the script that compiles the schemas to code; the committed schema files stay as they are. */
function compileSchemas(): void {
  const done = spawnSync(process.execPath, ['--import', 'tsx', 'scripts/schema.ts', '--code-only'], { cwd: root, stdio: 'inherit' });
  if (done.status !== 0) process.exit(done.status ?? 1);
}

/** Writes beside and renames, so that a program that starts meanwhile finds either the old file or the new one. */
async function bundle(entry: string, target: string): Promise<void> {
  const fresh = `${root}${target}.${process.pid}`;
  // The plugin counts what it replaced: a new one for each bundle.
  await build({ ...shared, plugins: [parserAlone, replaceInkCaches()], entryPoints: [entry], outfile: fresh });
  await chmod(fresh, 0o755);
  await rename(fresh, `${root}${target}`);
}

compileSchemas();
await mkdir(`${root}dist`, { recursive: true });
await bundle('src/main.ts', 'dist/holdfast.js');
const worker = 'src/effects/search-worker.ts';
if (existsSync(`${root}${worker}`)) await bundle(worker, 'dist/search-worker.js');
else await rm(`${root}dist/search-worker.js`, { force: true });
await bundle('src/effects/picture-worker.ts', 'dist/picture-worker.js');
