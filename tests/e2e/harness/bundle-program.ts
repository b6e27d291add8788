import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build } from 'esbuild';
import { inkDefines, replaceInkCaches } from '../../../src/terminal/ink-caches/ink-bundling.js';

/**
 * Bundles a test program and everything it imports into one file, as the product itself is bundled.
 *
 * @param entry Path of a `.ts` or `.tsx` file.
 * @returns Path of a file to run with node.
 */
export async function bundleProgram(entry: string): Promise<string> {
  const outfile = join(mkdtempSync(join(tmpdir(), 'holdfast-e2e-')), 'program.mjs');
  await build({
    entryPoints: [entry],
    outfile,
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    jsx: 'automatic',
    define: inkDefines,
    plugins: [replaceInkCaches()],
    banner: { js: "import { createRequire as createRequireOf } from 'node:module'; const require = createRequireOf(import.meta.url);" },
    logLevel: 'error',
  });
  return outfile;
}
