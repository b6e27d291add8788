/**
 * Writes `dist/program-*.cjs`: one minified file in production mode with everything it needs inside, and `dist/holdfast.js`,
 * executable, which starts it with the code that V8 compiled of it (`dist/program-*.cache`, see `write-code-cache.ts`). The star is a
 * digest of the program: compiled code can then not be taken for that of another one.
 * Whatever is imported dynamically stays in the same file and runs only when it is asked for, so that the commands
 * never start the interface, and formulas load late.
 */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { chmod, mkdir, readdir, readFile, rename, rm, writeFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { type BuildOptions, build, type Plugin } from 'esbuild';
import { inkDefines, replaceInkCaches } from '../src/terminal/ink-caches/ink-bundling.js';
import { writeCodeCache } from './write-code-cache.js';

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
  logLevel: 'warning',
};

/** What Node starts is a plain script (`dist/package.json` says so): a module takes Node longer to start. */
const script: BuildOptions = { format: 'cjs', define: { ...inkDefines, 'import.meta.url': '""' } };

/** The program is one function that `src/launch.ts` calls: V8 keeps compiled code of scripts, not of modules. */
const program: BuildOptions = {
  format: 'cjs',
  define: { ...inkDefines, 'import.meta.url': '__programUrl' },
  banner: { js: '(function(require,__programUrl){' },
  footer: { js: '})' },
};

/** Runs the script that compiles the schemas to code; the committed schema files stay as they are. */
function compileSchemas(): void {
  const done = spawnSync(process.execPath, ['--import', 'tsx', 'scripts/schema.ts', '--code-only'], { cwd: root, stdio: 'inherit' });
  if (done.status !== 0) process.exit(done.status ?? 1);
}

/** Writes beside and renames, so that a program that starts meanwhile finds either the old file or the new one. */
async function bundle(entry: string, target: string, options: BuildOptions): Promise<void> {
  const fresh = `${root}${target}.${process.pid}`;
  // The plugin counts what it replaced: a new one for each bundle.
  await build({ ...shared, ...options, plugins: [parserAlone, replaceInkCaches()], entryPoints: [entry], outfile: fresh });
  await chmod(fresh, 0o755);
  await rename(fresh, `${root}${target}`);
}

/** Bundles the program to a file named by its digest; the name without its ending. */
async function bundleProgram(): Promise<string> {
  const fresh = `dist/program.cjs.${process.pid}`;
  await bundle('src/main.ts', fresh, program);
  const digest = createHash('sha256')
    .update(await readFile(`${root}${fresh}`))
    .digest('hex')
    .slice(0, 12);
  await rename(`${root}${fresh}`, `${root}dist/program-${digest}.cjs`);
  return `program-${digest}`;
}

/** Removes programs that `dist/holdfast.js` does not start. */
async function removeOlder(): Promise<void> {
  const started = await readFile(`${root}dist/holdfast.js`, 'utf8');
  for (const file of await readdir(`${root}dist`)) {
    const name = /^(program-[0-9a-f]+)\.(?:cjs|cache)$/.exec(file)?.[1];
    if (name !== undefined && !started.includes(name)) await rm(`${root}dist/${file}`, { force: true });
  }
}

compileSchemas();
await mkdir(`${root}dist`, { recursive: true });
await writeFile(`${root}dist/package.json`, '{ "type": "commonjs" }\n');
await bundle('src/effects/search-worker.ts', 'dist/search-worker.js', script);
await bundle('src/effects/picture-worker.ts', 'dist/picture-worker.js', script);
const name = await bundleProgram();
await writeCodeCache(root, name);
await bundle('src/launch.ts', 'dist/holdfast.js', {
  ...script,
  banner: { js: '#!/usr/bin/env node' },
  define: { __programName: JSON.stringify(name) },
});
await removeOlder();
