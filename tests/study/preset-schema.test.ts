import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { presetSchema } from '../../scripts/preset-schema.js';
import { schemaText } from '../../scripts/schema-text.js';
import { classKeys } from '../../src/calc/classes.js';
import { figureKeys } from '../../src/calc/figures.js';
import { parameterKeys, parameterRow } from '../../src/calc/parameters.js';
import { tissueNames } from '../../src/calc/tissues.js';

type Tree = { readonly [key: string]: Tree } & { readonly enum?: readonly string[]; readonly required?: readonly string[] };

const committed = readFileSync(new URL('../../schema/preset.schema.json', import.meta.url), 'utf8');
const seriesSchema = (JSON.parse(committed) as Tree).properties?.series?.items as Tree;

describe('schema/preset.schema.json', () => {
  it('is what the tables give today (else run: npm run schema)', () => {
    expect(committed).toBe(schemaText(presetSchema));
  });

  it('knows every parameter, figure, family and tissue, each with a description where it is a parameter', () => {
    const parameters = seriesSchema.properties?.parameters?.properties as unknown as Readonly<Record<string, { description: string }>>;
    expect(Object.keys(parameters)).toEqual(parameterKeys);
    for (const key of parameterKeys) expect(parameters[key]?.description).toContain(parameterRow(key).help);
    expect(seriesSchema.properties?.mustKeep?.items?.properties?.figure?.enum).toEqual(figureKeys);
    expect(seriesSchema.properties?.target?.enum).toEqual(tissueNames);
    const families = seriesSchema.properties?.family?.enum ?? [];
    expect(new Set(families)).toEqual(new Set(classKeys.map((key) => key.split('/')[0])));
  });

  it('requires what a preset file must say', () => {
    expect((JSON.parse(committed) as Tree).required).toEqual(['format', 'version', 'id', 'title', 'region', 'fieldT', 'series']);
    expect(seriesSchema.required).toEqual(['id', 'title', 'family', 'acquisition', 'target', 'comparison', 'parameters']);
    const required = seriesSchema.properties?.parameters?.required ?? [];
    expect([...required].sort()).toEqual(
      [
        'repetitionTimeMs',
        'echoTimeMs',
        'fieldOfViewMm',
        'matrixRead',
        'matrixPhase',
        'sliceCount',
        'sliceThicknessMm',
        'pixelBandwidthHz',
      ].sort(),
    );
  });
});

describe('the compiled validator', () => {
  it('accepts and refuses what the schema itself does', async () => {
    const { Ajv } = await import('ajv');
    const { validate } = await import('../../build/validate-preset.js');
    const interpreted = new Ajv({ allErrors: true, strict: false }).compile(presetSchema);
    const shipped = JSON.parse(readFileSync(new URL('../../presets/liver-3t.json', import.meta.url), 'utf8')) as object;
    expect([validate(shipped), interpreted(shipped)]).toEqual([true, true]);
    const paths: string[][] = [];
    const walk = (node: unknown, path: string[]): void => {
      paths.push(path);
      if (typeof node === 'object' && node !== null) for (const [key, value] of Object.entries(node)) walk(value, [...path, key]);
    };
    walk(shipped, []);
    const value = fc.oneof(fc.jsonValue(), fc.constantFrom(0, 0.5, 1, 3, 1000, 'none', '2D', 'liver', 'fast-spin-echo'));
    fc.assert(
      fc.property(fc.constantFrom(...paths), fc.option(fc.string(), { freq: 4 }), value, (path, more, replacement) => {
        const copy = structuredClone(shipped) as Record<string, unknown>;
        let parent = copy;
        for (const key of path.slice(0, -1)) parent = parent[key] as Record<string, unknown>;
        const last = path.at(-1);
        if (last !== undefined) parent[last] = replacement;
        if (more !== null && more !== '__proto__') copy[more] = replacement;
        expect(validate(copy)).toBe(interpreted(copy));
      }),
      { numRuns: 500 },
    );
  });
});
