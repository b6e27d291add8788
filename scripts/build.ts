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

const root = fileURLToPath(new URL('../', import.meta.url));

/** The browser development tools that ink offers under DEV=true are a package of their own and no part of this program. */
const withoutDevelopmentTools: Plugin = {
  name: 'without-development-tools',
  setup(building) {
    building.onResolve({ filter: /^\.\/devtools\.js$/ }, (wanted) =>
      wanted.importer.includes('/ink/build/') ? { path: wanted.path, namespace: 'nothing' } : null,
    );
    building.onLoad({ filter: /.*/, namespace: 'nothing' }, () => ({ contents: 'export {};' }));
  },
};

/** Ink's text caches never shrink: bounded ones take their place where the terminal room has them. */
const boundedTextCaches: Plugin = {
  name: 'bounded-text-caches',
  setup(building) {
    building.onResolve({ filter: /^\.\/(measure-text|wrap-text)\.js$/ }, (wanted) => {
      const own = `${root}src/terminal/ink-caches/${wanted.path.slice(2, -3)}.ts`;
      return wanted.importer.includes('/ink/build/') && existsSync(own) ? { path: own } : null;
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
  define: { 'process.env.NODE_ENV': '"production"', 'process.env.DEV': '"false"' },
  // CommonJS packages inside the bundle ask for Node's own modules by `require`.
  banner: {
    js: "#!/usr/bin/env node\nimport { createRequire as __createRequire } from 'node:module';\nconst require = __createRequire(import.meta.url);",
  },
  plugins: [withoutDevelopmentTools, boundedTextCaches],
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
  await build({ ...shared, entryPoints: [entry], outfile: fresh });
  await chmod(fresh, 0o755);
  await rename(fresh, `${root}${target}`);
}

compileSchemas();
await mkdir(`${root}dist`, { recursive: true });
await bundle('src/main.ts', 'dist/holdfast.js');
const worker = 'src/effects/search-worker.ts';
if (existsSync(`${root}${worker}`)) await bundle(worker, 'dist/search-worker.js');
else await rm(`${root}dist/search-worker.js`, { force: true });
