/**
 * Bundles the benchmark as the program is bundled and runs it in plain Node: what compiles TypeScript on the fly also renames every
 * function as it is made, which makes code of many small functions several times slower than it ships.
 */
import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('../', import.meta.url));
process.chdir(root);
// A new group of rows is a file in bench/rows, and nothing else.
const files = (await readdir('bench/rows')).filter((file) => file.endsWith('.ts')).sort();
const imports = files.map((file, i) => `import { rows as rows${i} } from './bench/rows/${file}';`);
const entry = `${imports.join('\n')}
import { runRows } from './bench/run.ts';
export const run = (asked) => runRows([${files.map((_, i) => `...rows${i}`).join(', ')}], asked);
`;
// Inside the project, so that packages that are not bundled are found.
const folder = await mkdtemp(`${root}build/bench-`);
try {
  const outfile = `${folder}/run.mjs`;
  await build({
    absWorkingDir: root,
    stdin: { contents: entry, resolveDir: root, loader: 'js' },
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
