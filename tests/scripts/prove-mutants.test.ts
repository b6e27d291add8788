import { describe, expect, it } from 'vitest';
import { mutantsOf, mutated, otherNumbers } from '../../scripts/prove-mutants.js';

const changes = (source: string) => mutantsOf('a.ts', source).map((place) => place.map((mutant) => mutated(source, mutant)));

/** Code that fills a number into a text. */
const filled = (code: string) => `const s = \`\${${code}} of 7\`;`;

describe('the changes of a source', () => {
  it('turn signs, operators and comparisons, one at a time', () => {
    expect(changes('export const f = (a: number, b: number) => a + b;')).toEqual([['export const f = (a: number, b: number) => a - b;']]);
    expect(changes('f(a ** b, -c);')).toEqual([['f(a * b, -c);'], ['f(a ** b, +c);']]);
    expect(changes('if (a < b && !c) d *= e;')).toEqual([
      ['if (a <= b && !c) d *= e;', 'if (a >= b && !c) d *= e;'],
      ['if (a < b || !c) d *= e;'],
      ['if (a < b && c) d *= e;'],
      ['if (a < b && !c) d /= e;'],
    ]);
    expect(changes('f(Math.min(a, b));')).toEqual([['f(Math.max(a, b));']]);
  });

  it('turn numbers and flags of tables, those filled into texts as well, but no texts, keys or types', () => {
    expect(changes("export const row = { 3: true, help: '5 ms', x: 2.5 } as const;")).toEqual([
      ["export const row = { 3: false, help: '5 ms', x: 2.5 } as const;"],
      [
        "export const row = { 3: true, help: '5 ms', x: 2.75 } as const;",
        "export const row = { 3: true, help: '5 ms', x: 2.25 } as const;",
        "export const row = { 3: true, help: '5 ms', x: (-2.5) } as const;",
      ],
    ]);
    expect(changes('export type Level = 1 | 2; let a: 3 = b as 3;')).toEqual([]);
    expect(changes(filled('x.toFixed(1)'))).toEqual([[filled('x.toFixed(2)'), filled('x.toFixed(0)'), filled('x.toFixed((-1))')]]);
  });

  it('find an operator behind a comment that holds the same sign', () => {
    expect(changes('f(a /* a - b */ - b);')).toEqual([['f(a /* a - b */ + b);']]);
  });

  it('leave out what would not parse', () => {
    expect(changes('f(a ?? b ?? c);')).toEqual([]);
    expect(changes('f(a ?? b);')).toEqual([['f(a && b);']]);
  });

  it('mark the place in its line and know the line', () => {
    const [place] = mutantsOf('a.ts', 'let a = b;\n  a = c / d; // of d\n');
    expect(place?.[0]).toMatchObject({ line: 2, marked: 'a = c [[/]] d; // of d', was: '/', becomes: '*', kind: 'operator' });
  });
});

describe('the other numbers', () => {
  it('differ enough to matter', () => {
    expect(otherNumbers(0)).toEqual(['1']);
    expect(otherNumbers(1)).toEqual(['2', '0', '(-1)']);
    expect(otherNumbers(180)).toEqual(['181', '179', '(-180)']);
    expect(otherNumbers(0.05)).toEqual(['0.055', '0.045', '(-0.05)']);
    expect(otherNumbers(1e-9)).toEqual(['0.01']);
  });
});
