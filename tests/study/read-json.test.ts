import fc from 'fast-check';
import { type Node as OutsideNode, parseTree } from 'jsonc-parser';
import { describe, expect, it } from 'vitest';
import { type JsonNode, jsonValue, readJson } from '../../src/study/read-json.js';

function outsideValue(text: string): { ok: true; value: unknown } | { ok: false } {
  try {
    return { ok: true, value: JSON.parse(text) as unknown };
  } catch {
    return { ok: false };
  }
}

/** Plain copy, since the reader's objects have no prototype. */
const plain = (value: unknown): unknown => JSON.parse(JSON.stringify(value));

describe('readJson against JSON.parse', () => {
  it('reads the same value from every JSON text', () => {
    fc.assert(
      fc.property(fc.json(), fc.constantFrom(0, 1, 2), (text, indent) => {
        const laidOut = indent === 0 ? text : JSON.stringify(JSON.parse(text), null, indent);
        const read = readJson(laidOut, 1000);
        expect(read.ok && plain(jsonValue(read.root))).toEqual(plain(JSON.parse(laidOut)));
      }),
      { numRuns: 500 },
    );
  });

  it('accepts and refuses the same damaged texts', () => {
    const scrap = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"',
      '"a"',
      '1',
      '-',
      '0',
      '.5',
      '1.',
      '1e5',
      'e',
      'true',
      'null',
      'nul',
      ' ',
      '\n',
      '\\',
      '\\n',
      '\\u00',
      '/',
      '//',
      '\u00e9',
      "'",
      '\t',
      '01',
      '+1',
    );
    const damaged = fc.tuple(fc.json(), fc.nat(), scrap, fc.nat(3)).map(([text, at, piece, cut]) => {
      const place = at % (text.length + 1);
      return text.slice(0, place) + piece + text.slice(place + cut);
    });
    const pieces = fc.array(scrap, { maxLength: 12 }).map((parts) => parts.join(''));
    fc.assert(
      fc.property(fc.oneof(damaged, pieces), (text) => {
        const outside = outsideValue(text);
        const read = readJson(text, 1000);
        // Numbers that overflow are refused here, and infinite there.
        if (!read.ok && read.fault.code === 'not-finite' && outside.ok) return;
        expect(read.ok).toBe(outside.ok);
        if (read.ok && outside.ok) expect(plain(jsonValue(read.root))).toEqual(plain(outside.value));
      }),
      { numRuns: 5000 },
    );
  });

  it('keeps the positions that another parser finds', () => {
    const compare = (own: JsonNode, other: OutsideNode | undefined): void => {
      expect(own.offset).toBe(other?.offset);
      if (own.kind === 'array')
        own.items.forEach((item, i) => {
          compare(item, other?.children?.[i]);
        });
      if (own.kind === 'object') {
        own.entries.forEach((entry, i) => {
          const property = other?.children?.[i];
          expect(entry.keyOffset).toBe(property?.children?.[0]?.offset);
          compare(entry.value, property?.children?.[1]);
        });
      }
    };
    fc.assert(
      fc.property(fc.json(), fc.nat(2), (json, indent) => {
        const text = JSON.stringify(JSON.parse(json), null, indent);
        const read = readJson(text, 1000);
        if (!read.ok) throw new Error('refused');
        compare(read.root, parseTree(text));
      }),
      { numRuns: 300 },
    );
  });
});

describe('readJson', () => {
  it('counts nesting from the outermost value and reads no deeper', () => {
    const nested = (levels: number) => `${'['.repeat(levels)}${']'.repeat(levels)}`;
    expect(readJson(nested(20), 20).ok).toBe(true);
    expect(readJson(nested(21), 20)).toEqual({
      ok: false,
      fault: { code: 'too-deep', offset: 20, given: 'nesting of more than 20 levels', expected: 'at most 20 levels' },
    });
    expect(readJson('['.repeat(500_000), 20)).toMatchObject({ ok: false, fault: { code: 'too-deep' } });
  });

  it('keeps both of two equal keys', () => {
    const read = readJson('{"a": 1, "a": 2}', 20);
    expect(read.ok && read.root.kind === 'object' && read.root.entries.map(({ key, keyOffset }) => [key, keyOffset])).toEqual([
      ['a', 1],
      ['a', 9],
    ]);
  });

  it('takes __proto__ as a key like any other', () => {
    const read = readJson('{"__proto__": {"x": 1}}', 20);
    const value = read.ok ? (jsonValue(read.root) as Record<string, unknown>) : {};
    expect(Object.keys(value)).toEqual(['__proto__']);
    expect(({} as Record<string, unknown>).x).toBe(undefined);
  });

  it.each([
    ['{"a": NaN}', 'not-finite', 6, 'NaN', 'a number'],
    ['[-Infinity]', 'not-finite', 1, '-Infinity', 'a number'],
    ['[1e999]', 'not-finite', 1, '1e999', 'a number within the range of the key'],
    ['{"a": 1,}', 'not-json', 8, '"}"', 'a key in double quotes'],
    ['{a: 1}', 'not-json', 1, '"a"', 'a key in double quotes'],
    ['[1 2]', 'not-json', 3, '"2"', '"," or "]" after an item of a list'],
    ['{"a" 1}', 'not-json', 5, '"1"', '":" after a key'],
    ['{"a": 1 "b": 2}', 'not-json', 8, '"""', '"," or "}" after a value'],
    ['{"a": 1', 'not-json', 7, 'the end of the file', '"," or "}" after a value'],
    ['[01]', 'not-json', 1, '"01"', 'a value: a number, a text in double quotes, true, false, a list or an object'],
    ['// x', 'not-json', 0, '"/"', 'a value: a number, a text in double quotes, true, false, a list or an object'],
    ['["a\\x"]', 'not-json', 3, '"\\x"', 'a backslash only before " \\ / b f n r t or uXXXX'],
    ['["abc', 'not-json', 1, 'a text without an end', 'a closing quote on the same line'],
    ['1 1', 'not-json', 2, '"1"', 'nothing after the outermost value'],
  ])('%s: what is wrong, where, and what was expected', (text, code, offset, given, expected) => {
    expect(readJson(text, 20)).toEqual({ ok: false, fault: { code, offset, given, expected } });
  });
});
