import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { withFreshExamples } from '../scripts/readme-examples.js';
import { cautionCodes } from '../src/calc/caution.js';
import { commandTable } from '../src/commands/command-table.js';
import { exitCodes } from '../src/commands/exit-codes.js';

const readme = readFileSync('README.md', 'utf8');
const developers = readFileSync('DEVELOPERS.md', 'utf8');

describe('README.md', () => {
  it('shows what the program prints (npm run readme writes it anew)', async () => {
    expect(readme.match(/```console/g)?.length ?? 0).toBeGreaterThan(2);
    expect(readme).toContain('```text screen ');
    expect(await withFreshExamples(readme)).toBe(readme);
  }, 180_000);

  it('names every command and every exit code', () => {
    expect(commandTable.map(({ words }) => `holdfast ${words.join(' ')}`).filter((words) => !readme.includes(words))).toEqual([]);
    expect(
      Object.values(exitCodes).filter(
        (code) =>
          !readme.includes(`
| ${code} |`),
      ),
    ).toEqual([]);
  });
});

describe('DEVELOPERS.md', () => {
  it('lists every caution code', () => {
    expect(cautionCodes.filter((code) => !developers.includes(`| \`${code}\` |`))).toEqual([]);
  });

  it('lists every problem code of the sources', () => {
    const sources = readdirSync('src', { recursive: true, encoding: 'utf8' }).filter((name) => /\.tsx?$/.test(name));
    const form = /(?:\bcode: |\brefused\(|\bstoreProblem\(|\bstop\()\s*'([a-z]+(?:-[a-z]+)+)'/g;
    const codes = sources.flatMap((name) => [...readFileSync(`src/${name}`, 'utf8').matchAll(form)].map(([, code]) => code as string));
    expect(codes.length).toBeGreaterThan(30);
    expect([...new Set(codes)].filter((code) => !developers.includes(`\`${code}\``))).toEqual([]);
  });

  it('names every script of the package, and every script that it names is there', () => {
    const { scripts } = JSON.parse(readFileSync('package.json', 'utf8')) as { scripts: Record<string, string> };
    const named = [...developers.matchAll(/`npm (?:run )?([a-z0-9:]+)/g)].map(([, name]) => name as string);
    expect(Object.keys(scripts).filter((name) => !named.includes(name))).toEqual([]);
    expect(named.filter((name) => !(name in scripts) && !['ci', 'install', 'link'].includes(name))).toEqual([]);
  });

  it('gives a reason for every package', () => {
    const { dependencies, devDependencies } = JSON.parse(readFileSync('package.json', 'utf8')) as Record<string, Record<string, string>>;
    const names = Object.keys({ ...dependencies, ...devDependencies });
    expect(names.filter((name) => !developers.includes(`\`${name}\``))).toEqual([]);
  });

  it('names only files that are there', () => {
    const files = [...developers.matchAll(/`((?:src|tests|scripts|bench|presets|schema)\/[\w./-]*[\w/])`/g)].map(
      ([, path]) => path as string,
    );
    expect(files.length).toBeGreaterThan(20);
    expect(files.filter((path) => !existsSync(path))).toEqual([]);
  });
});
