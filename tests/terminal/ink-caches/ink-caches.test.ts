import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { build } from 'esbuild';
import fc from 'fast-check';
import stringWidth from 'string-width';
import { describe, expect, it } from 'vitest';
import { boundedCache } from '../../../src/terminal/ink-caches/bounded-cache.js';
import { asItIs, FlatOutput } from '../../../src/terminal/ink-caches/flat-output.js';
import { inkDefines, replaceInkCaches } from '../../../src/terminal/ink-caches/ink-bundling.js';
import { measureText, widestLine } from '../../../src/terminal/ink-caches/measure-text.js';
import { type TextWrap, wrapText } from '../../../src/terminal/ink-caches/wrap-text.js';
import { readFrame } from '../../../src/terminal/painter/frame-grid.js';

const inkFile = async (name: string) =>
  ((await import(new URL(`../../../node_modules/ink/build/${name}.js`, import.meta.url).href)) as { default: unknown }).default;

const measuredWidest = (value: string) => Math.max(...value.split('\n').map((line) => stringWidth(line)));

const text = fc
  .array(fc.oneof(fc.string({ maxLength: 8 }), fc.constantFrom('\n', ' ', '\u6f22\u5b57', '\u001b[31m', '\u001b[39m', 'e\u0301')), {
    maxLength: 8,
  })
  .map((parts) => parts.join(''));

describe('boundedCache', () => {
  it('remembers the latest and what was asked for, and forgets the rest', () => {
    const cache = boundedCache<number>(2);
    for (let key = 0; key < 3; key++) cache.set(String(key), key);
    expect(cache.get('0')).toBe(0);
    for (let key = 3; key < 100; key++) {
      cache.set(String(key), key);
      expect(cache.get('0')).toBe(0);
    }
    expect(cache.get('99')).toBe(99);
    expect(cache.get('50')).toBeUndefined();
  });

  it('never holds more than twice its size', () => {
    const cache = boundedCache<number>(10);
    for (let key = 0; key < 1000; key++) cache.set(String(key), key);
    const kept = Array.from({ length: 1000 }, (_, key) => cache.get(String(key))).filter((value) => value !== undefined);
    expect(kept.length).toBeLessThanOrEqual(20);
  });
});

describe('the replacements', () => {
  it('measure as ink does', async () => {
    const inkMeasure = (await inkFile('measure-text')) as typeof measureText;
    fc.assert(
      fc.property(text, (value) => {
        expect(measureText(value)).toEqual(inkMeasure(value));
        expect(measureText(value)).toEqual(inkMeasure(value));
      }),
    );
  });

  it('wrap and cut as ink does', async () => {
    const inkWrap = (await inkFile('wrap-text')) as typeof wrapText;
    const wrap = fc.constantFrom<TextWrap>('wrap', 'end', 'middle', 'truncate', 'truncate-end', 'truncate-middle', 'truncate-start');
    fc.assert(
      fc.property(text, fc.integer({ min: 1, max: 20 }), wrap, (value, width, type) => {
        expect(wrapText(value, width, type)).toBe(inkWrap(value, width, type));
        expect(wrapText(value, width, type)).toBe(inkWrap(value, width, type));
      }),
    );
  });
});

describe('whole lines', () => {
  it('are passed on as they are, each through the functions around it', () => {
    const output = new FlatOutput({ width: 20, height: 4 });
    output.write(0, 0, 'one\n\u001b[1mtwo\u001b[0m', { transformers: [(line, index) => `${index}${line}`] });
    output.write(0, 3, 'four', { transformers: [] });
    expect(output.get()).toEqual({ output: '0one\n1\u001b[1mtwo\u001b[0m\n\nfour', height: 4 });
  });

  it('beyond the last line of the screen are left out', () => {
    const output = new FlatOutput({ width: 20, height: 1 });
    output.write(0, 0, 'one\ntwo', { transformers: [] });
    expect(output.get()).toEqual({ output: 'one', height: 1 });
  });

  it('stand at their column, one after the other', () => {
    const output = new FlatOutput({ width: 20, height: 1 });
    output.write(1, 0, '\u001b[1mone\u001b[0m', { transformers: [] });
    output.write(6, 0, 'two', { transformers: [] });
    expect(output.get().output).toBe(' \u001b[1mone\u001b[0m  two');
  });

  it('come one after the other where two are meant for one place: nothing is lost', () => {
    const output = new FlatOutput({ width: 20, height: 1 });
    output.write(0, 0, 'one', { transformers: [] });
    output.clip();
    output.write(2, 0, 'two', { transformers: [] });
    output.unclip();
    expect(output.get().output).toBe('onetwo');
  });

  it('keep every style: what else there is, the painter leaves out', () => {
    const styled = '\u001b[1;31mtwo\u001b[0m';
    expect(asItIs(styled)).toBe(styled);
    expect(
      readFrame(asItIs(`a${styled}\u001b[2Jb`), { columns: 8, rows: 1 })
        .rows[0]?.cells.map(({ text }) => text)
        .join(''),
    ).toBe('atwob   ');
  });

  it('have the width that the package says', () => {
    fc.assert(
      fc.property(text, (value) => {
        expect(widestLine(value)).toBe(measuredWidest(value));
      }),
    );
  });
});

describe('bundling', () => {
  const bundle = async (contents: string, resolveDir = process.cwd()) => {
    const outfile = join(mkdtempSync(join(tmpdir(), 'holdfast-bundle-')), 'out.mjs');
    const result = await build({
      stdin: { contents, resolveDir },
      outfile,
      bundle: true,
      write: false,
      metafile: true,
      platform: 'node',
      format: 'esm',
      define: inkDefines,
      plugins: [replaceInkCaches()],
      logLevel: 'silent',
    });
    return Object.keys(result.metafile.inputs).map((input) => input.replaceAll('\\', '/'));
  };

  it("leaves ink's own files out and puts ours in", async () => {
    const inputs = await bundle("export { render } from 'ink';");
    expect(inputs.some((input) => input.endsWith('ink/build/dom.js'))).toBe(true);
    expect(
      inputs.filter((input) => /ink\/build\/(measure-text|wrap-text|output|sanitize-ansi)\.js$|node_modules\/widest-line/.test(input)),
    ).toEqual([]);
    const ours = inputs.filter((input) => input.startsWith('src/terminal/')).map((input) => input.split('/').at(-1));
    expect(new Set(ours)).toEqual(new Set(['bounded-cache.ts', 'flat-output.ts', 'measure-text.ts', 'text-width.ts', 'wrap-text.ts']));
    expect(inputs.filter((input) => input.includes('react-devtools-core'))).toEqual([]);
  });

  it('starts string-width at its first use, and then it counts as it does', async () => {
    const contents =
      "import stringWidth from 'string-width'; export const widths = ['abc', '\u6f22a', 'e\u0301'].map((text) => stringWidth(text));";
    const { outputFiles } = await build({
      stdin: { contents, resolveDir: process.cwd() },
      bundle: true,
      write: false,
      platform: 'node',
      format: 'esm',
      plugins: [replaceInkCaches()],
      logLevel: 'silent',
    });
    const file = join(mkdtempSync(join(tmpdir(), 'holdfast-bundle-')), 'late.mjs');
    writeFileSync(file, outputFiles[0]?.text ?? '');
    const { widths } = (await import(/* @vite-ignore */ pathToFileURL(file).href)) as { widths: number[] };
    expect(widths).toEqual(['abc', '\u6f22a', 'e\u0301'].map((text) => stringWidth(text)));
  });

  it('fails if ink has moved them', async () => {
    const folder = join(mkdtempSync(join(tmpdir(), 'holdfast-bundle-')), 'node_modules/ink/build');
    mkdirSync(folder, { recursive: true });
    writeFileSync(join(folder, 'ink.js'), "import './dom.js'; export const render = 1;");
    writeFileSync(join(folder, 'dom.js'), "import './wrap-text.js';");
    await expect(bundle("export * from './ink.js';", folder)).rejects.toThrow(/measure-text/);
  });

  it('leaves files of the same name elsewhere alone', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'holdfast-bundle-'));
    writeFileSync(join(folder, 'wrap-text.js'), 'export const mine = 1;');
    const inputs = await bundle("export { mine } from './wrap-text.js';", folder);
    expect(inputs.some((input) => input.endsWith('/wrap-text.js'))).toBe(true);
  });
});
