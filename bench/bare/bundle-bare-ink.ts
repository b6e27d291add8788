import { build, type Plugin } from 'esbuild';

/** Ink's connection to development tools asks for a package that is not there. */
const withoutDevelopmentTools: Plugin = {
  name: 'without-development-tools',
  setup: (building) => {
    building.onResolve({ filter: /^\.\/devtools\.js$/ }, ({ path }) => ({ path, namespace: 'nothing' }));
    building.onLoad({ filter: /.*/, namespace: 'nothing' }, () => ({ contents: 'export {};' }));
  },
};

/** Bundles the bare ink program as the program itself is bundled: one minified file in production mode. */
export async function bundleBareInk(outfile: string): Promise<void> {
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
}
