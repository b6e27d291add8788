import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative, resolve, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

const source = fileURLToPath(new URL('../src/', import.meta.url));

/** What each room may import of ours, itself aside. `main` is what stands outside every room. */
const mayImport: Readonly<Record<string, readonly string[]>> = {
  calc: [],
  formulas: ['calc'],
  study: ['calc', 'formulas'],
  search: ['calc', 'formulas', 'study'],
  headers: ['calc', 'formulas', 'study'],
  picture: ['calc', 'formulas', 'study'],
  session: ['calc', 'formulas', 'study', 'search', 'picture', 'headers'],
  screens: ['calc', 'formulas', 'study', 'search', 'picture', 'headers', 'session', 'terminal'],
  terminal: [],
  store: ['calc', 'formulas', 'study', 'headers'],
  effects: ['calc', 'formulas', 'study', 'search', 'picture', 'headers', 'store', 'session'],
  commands: ['calc', 'formulas', 'study', 'search', 'picture', 'headers', 'session', 'store', 'effects'],
};
const pure = new Set(['calc', 'formulas', 'study', 'search', 'picture', 'headers', 'session']);
/** The packages that a pure room may name, each in one file of its own: the parser of formulas (loaded late), the Fourier transform, the PNG writer. */
const packageFiles: Readonly<Record<string, string>> = {
  [join('formulas', 'expression-parser.ts')]: 'mathjs',
  [join('picture', 'transform.ts')]: 'fft.js',
  [join('picture', 'png-file.ts')]: 'fast-png',
};

interface Import {
  readonly file: string;
  readonly room: string;
  readonly target: string;
  readonly isType: boolean;
  /** Room of an import of ours; null for a package. */
  readonly targetRoom: string | null;
}

function sourceFiles(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const path = join(folder, entry.name);
    return entry.isDirectory() ? sourceFiles(path) : /\.tsx?$/.test(entry.name) ? [path] : [];
  });
}

function roomOf(path: string): string {
  const [first = '', ...inside] = relative(source, path).split(sep);
  return inside.length === 0 ? 'main' : first;
}

/** Every import, export-from and dynamic import of a source text. Comments are taken out first. */
function importsOf(file: string, text: string): Import[] {
  const code = text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/^\s*\/\/.*$/gm, '');
  const form =
    /(?:^|[;\s])(?:import|export)\s+(type\s+)?(?:[\w*{}\s,$]+?\s+from\s+)?['"]([^'"]+)['"]|\b(?:import|require)\(\s*['"]([^'"]+)['"]\s*\)/g;
  return [...code.matchAll(form)].map(([, type, fixed, late]) => {
    const target = (fixed ?? late) as string;
    const path = target.startsWith('.') ? resolve(dirname(file), target) : null;
    const ours = path?.startsWith(source) === true ? path : null;
    return {
      file: relative(source, file),
      room: roomOf(file),
      target,
      isType: type !== undefined,
      targetRoom: ours === null ? null : roomOf(ours),
    };
  });
}

const imports = sourceFiles(source).flatMap((file) => importsOf(file, readFileSync(file, 'utf8')));
const words = ({ file, target }: Import) => `${file} imports ${target}`;

describe('rooms', () => {
  it('reads static, type, late and re-exporting imports', () => {
    const text =
      "import { a } from '../b/c.js';\nimport type { T } from './t.js';\nexport * from 'x';\nawait import('./late.js');\n// import 'no'\n";
    const found = importsOf(join(source, 'calc', 'probe.ts'), text);
    expect(found.map(({ target, isType, targetRoom }) => [target, isType, targetRoom])).toEqual([
      ['../b/c.js', false, 'b'],
      ['./t.js', true, 'calc'],
      ['x', false, null],
      ['./late.js', false, 'calc'],
    ]);
  });

  it('has found the rooms: the checks below are of something', () => {
    expect(imports.length).toBeGreaterThan(100);
    expect(new Set(imports.map(({ room }) => room))).toContain('calc');
  });

  it('has no folder that is not a room', () => {
    const folders = readdirSync(source, { withFileTypes: true }).filter((entry) => entry.isDirectory());
    expect(folders.map(({ name }) => name).filter((name) => !(name in mayImport))).toEqual([]);
  });

  it('imports point one way', () => {
    const wrong = imports.filter(({ room, targetRoom }) => {
      if (room === 'main' || targetRoom === null || targetRoom === room) return false;
      return !(mayImport[room] ?? []).includes(targetRoom);
    });
    expect(wrong.map(words)).toEqual([]);
  });

  it('effects take message types of the session, and no code', () => {
    expect(imports.filter(({ room, targetRoom, isType }) => room === 'effects' && targetRoom === 'session' && !isType).map(words)).toEqual(
      [],
    );
  });

  it('pure rooms use no Node, no React, no terminal and no package but those that compute, each in its own file', () => {
    const wrong = imports.filter(({ room, target, file, isType }) => {
      if (!pure.has(room) || target.startsWith('.')) return false;
      const allowed = packageFiles[file];
      return !(allowed !== undefined && target.startsWith(allowed)) && !(isType && target.startsWith('mathjs'));
    });
    expect(wrong.map(words)).toEqual([]);
  });

  it('pure rooms ask no clock, no chance and no environment', () => {
    const asking = sourceFiles(source)
      .filter((file) => pure.has(roomOf(file)))
      .filter((file) =>
        /\bDate\.now\b|\bnew Date\(\)|\bMath\.random\b|\bprocess\.|\bperformance\.|\bconsole\./.test(readFileSync(file, 'utf8')),
      );
    expect(asking.map((file) => relative(source, file))).toEqual([]);
  });

  it('every import of ours leads to a file', () => {
    const lost = imports.filter(({ file, target, targetRoom }) => {
      if (targetRoom === null) return false;
      const path = resolve(source, dirname(file), target).replace(/\.js$/, '');
      return !existsSync(`${path}.ts`) && !existsSync(`${path}.tsx`);
    });
    expect(lost.map(words)).toEqual([]);
  });
});
