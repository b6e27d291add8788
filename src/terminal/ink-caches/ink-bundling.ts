/**
 * What the build script needs to bundle ink:
 *
 *     import { inkDefines, replaceInkCaches } from '../src/terminal/ink-caches/ink-bundling.js';
 *     await esbuild.build({ ..., define: inkDefines, plugins: [replaceInkCaches()] });
 *
 * Ink remembers every text it has measured or wrapped and never forgets one: over 40,000 keys the heap doubles. The plugin puts
 * `measure-text.ts` and `wrap-text.ts` of this folder in the place of ink's files, which do the same and forget, and
 * `flat-output.ts` in the place of its output, which takes apart what is whole. It fails the build when ink's files are not where they
 * were, instead of leaving its own in silently. It also leaves out ink's connection to
 * development tools: their package is not installed, and a bundled ink started with DEV=true in the environment would end at once,
 * looking for a file beside itself.
 */
import { fileURLToPath } from 'node:url';
import type { Plugin } from 'esbuild';

/** Production React, which does not keep what it drew. */
export const inkDefines: Record<string, string> = { 'process.env.NODE_ENV': '"production"' };

/** Ink's files, and what stands in their place: a file of this folder and what it exports. */
const replacements: ReadonlyMap<string, readonly [string, string]> = new Map([
  ['measure-text', ['measure-text', 'measureText']],
  ['wrap-text', ['wrap-text', 'wrapText']],
  ['widest-line', ['measure-text', 'widestLine']],
  ['output', ['flat-output', 'FlatOutput']],
]);

/** The esbuild plugin; see the head of this file. */
export function replaceInkCaches(): Plugin {
  return {
    name: 'replace-ink-caches',
    setup(build) {
      const replaced = new Set<string>();
      let inkSeen = false;
      build.onResolve({ filter: /^(?:\.\.?\/(?:.*\/)?(?:measure-text|wrap-text|output)\.js|widest-line)$/ }, ({ path, importer }) => {
        const name = /([a-z-]+)(?:\.js)?$/.exec(path)?.[1] ?? '';
        if (!/[\\/]ink[\\/]build[\\/]/.test(importer)) return undefined;
        replaced.add(name);
        return { path: name, namespace: 'ink-cache' };
      });
      // Ink imports the default export; ours is named, as everywhere in this project.
      build.onLoad({ filter: /.*/, namespace: 'ink-cache' }, ({ path }) => {
        const [file, name] = replacements.get(path) as readonly [string, string];
        return {
          contents: `export { ${name} as default } from './${file}.js';`,
          resolveDir: fileURLToPath(new URL('.', import.meta.url)),
        };
      });
      build.onLoad({ filter: /[\\/]ink[\\/]build[\\/]devtools\.js$/ }, () => ({ contents: '' }));
      build.onLoad({ filter: /[\\/]ink[\\/]build[\\/]utils\.js$/ }, () => ({ contents: 'export const isDev = () => false;' }));
      build.onLoad({ filter: /[\\/]ink[\\/]build[\\/]ink\.js$/ }, () => {
        inkSeen = true;
        return undefined;
      });
      build.onEnd(() => {
        const missing = inkSeen ? [...replacements.keys()].filter((name) => !replaced.has(name)) : [];
        return { errors: missing.map((name) => ({ text: `ink's ${name} was not found: its own would stay` })) };
      });
    },
  };
}
