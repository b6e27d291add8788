/**
 * Writes `schema/*.schema.json` from the tables and compiles each to `build/validate-*.js`. Run before build and test.
 * With `--code-only` the committed schemas are left alone, so that a test can tell that one no longer follows the tables.
 */
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { Ajv } from 'ajv';
import standalone from 'ajv/dist/standalone/index.js';
import { build } from 'esbuild';
import { objectSchema } from './object-schema.js';
import { presetSchema } from './preset-schema.js';
import { rulesSchema } from './rules-schema.js';
import { scannerSchema } from './scanner-schema.js';
import { schemaText } from './schema-text.js';

const root = new URL('../', import.meta.url);

/** Leaves a file alone that already says this, so that watchers and build caches stay quiet. */
async function writeIfChanged(path: string, text: string): Promise<void> {
  const file = new URL(path, root);
  const before = await readFile(file, 'utf8').catch(() => null);
  if (before !== text) await writeFile(file, text);
}

const options = {
  allErrors: true,
  verbose: true,
  messages: false,
  strict: true,
  allowUnionTypes: true,
  strictRequired: false,
  strictTypes: false,
  code: { source: true, esm: true },
} as const;
// Node gives the CommonJS module of ajv as the default import.
const toCode = ((standalone as unknown as { default?: unknown }).default ?? standalone) as (ajv: Ajv, validate: unknown) => string;

const schemas = { object: objectSchema, preset: presetSchema, rules: rulesSchema, scanner: scannerSchema };

const types = `export interface SchemaError {
  instancePath: string;
  schemaPath: string;
  keyword: string;
  params: Record<string, unknown>;
  schema: unknown;
  parentSchema: Record<string, unknown>;
  data: unknown;
  propertyName?: string;
}
export declare const validate: { (data: unknown): boolean; errors?: SchemaError[] | null };
export default validate;
`;

await mkdir(new URL('schema/', root), { recursive: true });
await mkdir(new URL('build/', root), { recursive: true });
for (const [name, schema] of Object.entries(schemas)) {
  // The build compiles only: the test that compares the committed schema with the tables must be able to fail.
  if (!process.argv.includes('--code-only')) await writeIfChanged(`schema/${name}.schema.json`, schemaText(schema));
  const ajv = new Ajv(options);
  // The ESM output of ajv still calls `require` for its run-time parts: one pass through esbuild makes it stand alone.
  const bundled = await build({
    stdin: { contents: toCode(ajv, ajv.compile(schema)), resolveDir: new URL('.', root).pathname, loader: 'js' },
    bundle: true,
    format: 'esm',
    platform: 'neutral',
    mainFields: ['module', 'main'],
    minify: true,
    write: false,
  });
  await writeIfChanged(`build/validate-${name}.js`, bundled.outputFiles[0]?.text ?? '');
  await writeIfChanged(`build/validate-${name}.d.ts`, types);
}
