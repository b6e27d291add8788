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
import { readFile } from 'node:fs/promises';
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Plugin } from 'esbuild';
import { layoutEngineFile } from './layout-engine.js';

/** Production React, which does not keep what it drew. */
export const inkDefines: Record<string, string> = { 'process.env.NODE_ENV': '"production"' };

/** Ink's files, and what stands in their place: a file of this folder and what it exports. */
const replacements: ReadonlyMap<string, readonly [string, string]> = new Map([
  ['measure-text', ['measure-text', 'measureText']],
  ['wrap-text', ['wrap-text', 'wrapText']],
  ['widest-line', ['measure-text', 'widestLine']],
  ['output', ['flat-output', 'FlatOutput']],
  ['sanitize-ansi', ['flat-output', 'asItIs']],
]);

/** The esbuild plugin; see the head of this file. */
export function replaceInkCaches(): Plugin {
  return {
    name: 'replace-ink-caches',
    setup(build) {
      const replaced = new Set<string>();
      let inkSeen = false;
      build.onResolve(
        { filter: /^(?:\.\.?\/(?:.*\/)?(?:measure-text|wrap-text|output|sanitize-ansi)\.js|widest-line)$/ },
        ({ path, importer }) => {
          const name = /([a-z-]+)(?:\.js)?$/.exec(path)?.[1] ?? '';
          if (!/[\\/]ink[\\/]build[\\/]/.test(importer)) return undefined;
          replaced.add(name);
          return { path: name, namespace: 'ink-cache' };
        },
      );
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
      // Nothing may wait at the top level: the bundle is one function, and V8 keeps compiled code of such a one only.
      build.onLoad({ filter: /[\\/]ink[\\/]build[\\/]reconciler\.js$/ }, async ({ path }) => {
        const own = await readFile(path, 'utf8');
        const contents = own.replace(/await import\('\.\/devtools\.js'\);/, '').replace('await loadPackageJson()', '{}');
        const waits = /^ {0,4}[^/*]*\bawait\b/m.test(contents.replace(/^async function loadPackageJson[\s\S]*?^}/m, ''));
        return waits ? { errors: [{ text: "ink's reconciler.js waits at its top level, where it did not before" }] } : { contents };
      });
      build.onLoad({ filter: /[\\/]yoga-layout[\\/]dist[\\/]src[\\/]index\.js$/ }, ({ path }) => ({
        contents: layoutEngineFile,
        resolveDir: dirname(path),
      }));
      // Its first use compiles a pattern of all emoji, which takes tens of milliseconds: few screens ever ask for one.
      build.onResolve({ filter: /^string-width$/ }, ({ path, namespace, pluginData, resolveDir }) => {
        if (pluginData === 'own') return undefined;
        // Asked for by what stands in its place: the package itself.
        if (namespace === 'late') return build.resolve(path, { kind: 'require-call', resolveDir, pluginData: 'own' });
        return { path, namespace: 'late', pluginData: resolveDir };
      });
      build.onLoad({ filter: /^string-width$/, namespace: 'late' }, ({ pluginData }) => ({
        contents: `let own; export default (text, options) => (own ??= require('string-width').default)(text, options);`,
        resolveDir: pluginData as string,
      }));
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
