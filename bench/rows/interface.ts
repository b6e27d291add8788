import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build, type Plugin } from 'esbuild';
import { type Driven, driveProgram } from '../drive-program.js';
import { median, percentile } from '../median.js';
import type { Measured, Row } from '../row.js';

/** Ink's connection to development tools asks for a package that is not there. */
const withoutDevelopmentTools: Plugin = {
  name: 'without-development-tools',
  setup: (building) => {
    building.onResolve({ filter: /^\.\/devtools\.js$/ }, ({ path }) => ({ path, namespace: 'nothing' }));
    building.onLoad({ filter: /.*/, namespace: 'nothing' }, () => ({ contents: 'export {};' }));
  },
};

/** The bare ink program, bundled as the program is, driven a few times: the yardstick of every row of the interface. */
async function bareInk(): Promise<readonly Driven[]> {
  const folder = await mkdtemp(join(tmpdir(), 'holdfast-bench-'));
  try {
    const outfile = join(folder, 'bare-ink.mjs');
    await build({
      entryPoints: ['bench/bare/bare-ink.tsx'],
      outfile,
      bundle: true,
      format: 'esm',
      platform: 'node',
      target: 'node20',
      minify: true,
      jsx: 'automatic',
      define: { 'process.env.NODE_ENV': '"production"', 'process.env.DEV': '"false"' },
      plugins: [withoutDevelopmentTools],
      banner: { js: "import { createRequire as __createRequire } from 'node:module';\nconst require = __createRequire(import.meta.url);" },
      logLevel: 'warning',
    });
    const runs: Driven[] = [];
    for (let i = 0; i < 5; i += 1) {
      runs.push(
        await driveProgram(outfile, [], { columns: 100, rows: 30, ready: 'ready', keys: Array.from({ length: 40 }, () => 'x'), quit: 'q' }),
      );
    }
    return runs;
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

let runs: Promise<readonly Driven[]> | null = null;

/** Of the bare program alone, without a budget: what there is to compare with. */
function bareRow(name: string, unit: Row['unit'], value: (run: Driven) => number | null): Row {
  return {
    name: `bare ink program, ${name}`,
    against: '',
    unit,
    budget: null,
    measure: async (): Promise<Measured> => {
      runs ??= bareInk();
      const values = (await runs).map(value).filter((one): one is number => one !== null);
      const middle = median(values);
      return { subject: middle, yardstick: null, ratio: middle };
    },
  };
}

export const rows: readonly Row[] = [
  bareRow('first frame', 'ms', (run) => run.firstFrameMs),
  bareRow('memory at the first frame', 'MB', (run) => run.memoryMb),
  bareRow('key to frame, 95 of 100', 'ms', (run) => percentile(run.keyMs, 0.95)),
  bareRow('bytes a key', 'bytes', (run) => median(run.keyBytes)),
];
