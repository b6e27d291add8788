import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { buildSync } from 'esbuild';
import type { Row } from '../row.js';
import { type LatticeName, latticeNames } from '../search-lattices.js';
import type { SearchedOnce } from '../search-once.js';

/** Largest lattices of the three kinds, and the sizes that show how time grows. */
const largest = 1.2e10;
const sizes = [1e4, 1e6, 1e8, largest];

let program: string | null = null;

/** The program that searches once, bundled as the program itself is; it goes when the benchmark ends. */
function bundled(): string {
  if (program !== null) return program;
  const folder = mkdtempSync(join(tmpdir(), 'holdfast-bench-'));
  process.on('exit', () => {
    rmSync(folder, { recursive: true, force: true });
  });
  program = join(folder, 'search-once.mjs');
  buildSync({
    entryPoints: ['bench/search-once.ts'],
    outfile: program,
    bundle: true,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    minify: true,
    logLevel: 'warning',
  });
  return program;
}

function ask<T>(what: 'times' | 'memory', name: LatticeName, wanted: number): T {
  return JSON.parse(execFileSync(process.execPath, [bundled(), what, name, String(wanted)], { encoding: 'utf8' })) as T;
}

const known = new Map<string, SearchedOnce>();

/** One lattice searched in a process that has searched nothing before. */
function searched(name: LatticeName, wanted: number): SearchedOnce {
  const key = `${name} ${wanted}`;
  const once = known.get(key) ?? ask<SearchedOnce>('times', name, wanted);
  known.set(key, once);
  return once;
}

const words = (size: number) => size.toExponential(1);
const against = 'a million bare spoiled gradient-echo signals';

export const rows: readonly Row[] = latticeNames.flatMap((name): Row[] => [
  {
    name: `ways formed of a lattice of 10^10, ${name}`,
    against: 'a thousandth of what it holds',
    unit: 'ways',
    budget: 1,
    measure: async () => {
      const { formed, size } = searched(name, largest);
      return { subject: formed, yardstick: size / 1000, ratio: formed / (size / 1000) };
    },
  },
  ...(['next', 'first'] as const).flatMap((which): Row[] => {
    // The yardstick runs compiled; so does every search of a worker but its first, which is printed beside it.
    const when = which === 'next' ? '' : ', first search of a process';
    return [
      {
        name: `bests of a lattice of 10^10${when}, ${name}`,
        against,
        unit: 'ms',
        budget: which === 'next' ? 4 : null,
        measure: async () => {
          const { bestsMs, bestsYardstickMs } = searched(name, largest)[which];
          return { subject: bestsMs, yardstick: bestsYardstickMs, ratio: bestsMs / bestsYardstickMs };
        },
      },
      {
        name: `fronts of a lattice of 10^10${when}, ${name}`,
        against,
        unit: 'ms',
        budget: which === 'next' ? 14 : null,
        measure: async () => {
          const { frontsMs, frontsYardstickMs } = searched(name, largest)[which];
          return { subject: frontsMs, yardstick: frontsYardstickMs, ratio: frontsMs / frontsYardstickMs };
        },
      },
      {
        name: `bests and fronts of a lattice of 10^10 with the threads that compile and collect${when}, ${name}`,
        against,
        unit: 'ms',
        budget: null,
        measure: async () => {
          const { allMs, frontsYardstickMs } = searched(name, largest)[which];
          return { subject: allMs, yardstick: frontsYardstickMs, ratio: allMs / frontsYardstickMs };
        },
      },
    ];
  }),
  {
    name: `memory of a whole search of a lattice of 10^10 at its peak, less that of the process before, ${name}`,
    against: '',
    unit: 'MB',
    budget: 256,
    measure: async () => {
      const { peakMb } = ask<{ peakMb: number }>('memory', name, largest);
      return { subject: peakMb, yardstick: null, ratio: peakMb };
    },
  },
  ...sizes.map(
    (wanted): Row => ({
      name: `growth of bests and fronts, ${name}, ${words(wanted)} wanted`,
      against,
      unit: 'ms',
      budget: null,
      measure: async () => {
        const { bestsMs, frontsMs, frontsYardstickMs } = searched(name, wanted).next;
        return { subject: bestsMs + frontsMs, yardstick: frontsYardstickMs, ratio: (bestsMs + frontsMs) / frontsYardstickMs };
      },
    }),
  ),
]);
