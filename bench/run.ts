/**
 * `npm run bench`: every row of bench/rows, ratios in one run with the absolute times beside them.
 * `npm run bench -- --check` ends with 1 when a budget is missed; words or phrases pick the rows whose name holds one of them.
 */
import { mkdir, readdir, rm } from 'node:fs/promises';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';
import { keepsBudget, type Row } from './row.js';

const root = fileURLToPath(new URL('../', import.meta.url));
const folder = `${root}build/bench-${process.pid}`;

/** What is measured is bundled as the program is, so that it runs as it ships. */
async function rowsOf(file: string): Promise<readonly Row[]> {
  const outfile = `${folder}/${file.replace(/\.ts$/, '.mjs')}`;
  await build({
    absWorkingDir: root,
    entryPoints: [`bench/rows/${file}`],
    outfile,
    bundle: true,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    minify: true,
    packages: 'external',
    logLevel: 'warning',
  });
  return ((await import(pathToFileURL(outfile).href)) as { rows: readonly Row[] }).rows;
}

function figure(value: number): string {
  return value >= 100 ? value.toFixed(0) : value >= 10 ? value.toFixed(1) : value.toFixed(2);
}

const asked = process.argv.slice(2);
const check = asked.includes('--check');
const words = asked.filter((word) => !word.startsWith('--'));
process.chdir(root);
await mkdir(folder, { recursive: true });
let missed = 0;
try {
  for (const file of (await readdir(`${root}bench/rows`)).sort()) {
    for (const row of await rowsOf(file)) {
      if (words.length > 0 && !words.some((word) => row.name.includes(word))) continue;
      const measured = await row.measure();
      const kept = keepsBudget(row, measured);
      if (!kept) missed += 1;
      const ratio = measured.yardstick === null ? '' : `${figure(measured.ratio)} x`;
      const budget = row.budget === null ? 'no budget' : `${kept ? 'within' : 'MISSED,'} ${row.budget}`;
      const yardstick = measured.yardstick === null ? '' : ` against ${figure(measured.yardstick)} ${row.unit}, ${row.against}`;
      console.log(`${ratio.padStart(9)}  ${budget.padEnd(12)}  ${row.name}: ${figure(measured.subject)} ${row.unit}${yardstick}`);
    }
  }
} finally {
  await rm(folder, { recursive: true, force: true });
}
if (missed > 0) console.log(`${missed} ${missed === 1 ? 'budget' : 'budgets'} missed`);
if (check && missed > 0) process.exitCode = 1;
