/**
 * Bundles the benchmark as the program is bundled and runs it in plain Node: what compiles TypeScript on the fly also renames every
 * function as it is made, which makes code of many small functions several times slower than it ships.
 */
import { mkdtemp, rm } from 'node:fs/promises';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('../', import.meta.url));
process.chdir(root);
// Inside the project, so that packages that are not bundled are found.
const folder = await mkdtemp(`${root}build/bench-`);
try {
  const outfile = `${folder}/run.mjs`;
  await build({
    absWorkingDir: root,
    entryPoints: ['bench/run.ts'],
    outfile,
    bundle: true,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    minify: true,
    packages: 'external',
    logLevel: 'warning',
  });
  const { run } = await import(pathToFileURL(outfile).href);
  process.exitCode = await run(process.argv.slice(2));
} finally {
  await rm(folder, { recursive: true, force: true });
}
