import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cleanText, shownValue } from '../../src/study/clean-text.js';

describe('cleanText', () => {
  it.each([
    ['liver\u001b[2J\u202E 3 T', 'liver[2J 3 T'],
    ['a\u0000b\u0007c\u007fd\u009b31me', 'abcd31me'],
    ['line one\r\nline\ttwo\u2028three', 'line one line two three'],
    ['\u2066hidden\u2069 \u200bspace\ufeff', 'hidden space'],
    ['tags\u{e0041}\u{e007f}', 'tags'],
    ['lone \ud800 half', 'lone  half'],
    ['T\u2082 \u00b5m caf\u00e9 \u4e2d', 'T\u2082 \u00b5m caf\u00e9 \u4e2d'],
    ['  ends  ', 'ends'],
  ])('%j becomes %j', (text, clean) => {
    expect(cleanText(text)).toBe(clean);
  });

  it('cuts by whole characters', () => {
    expect(cleanText('abcdefgh', 6)).toBe('abc...');
    expect(cleanText('\u{1f600}\u{1f600}\u{1f600}\u{1f600}\u{1f600}', 4)).toBe('\u{1f600}...');
    expect(cleanText('\u{1f600}\u{1f600}', 2)).toBe('\u{1f600}\u{1f600}');
  });

  it('leaves nothing that steers a terminal, and is stable', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 80 }), fc.integer({ min: 3, max: 40 }), (text, longest) => {
        const clean = cleanText(text, longest);
        // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what must be gone
        expect(clean).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u200b-\u200f\u2028-\u202e\u2060-\u206f\ufeff]/); // oxlint-disable-line no-control-regex
        expect([...clean].length).toBeLessThanOrEqual(longest);
        expect(cleanText(clean, longest)).toBe(clean);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('shownValue', () => {
  it.each([
    ['12 mm', '"12 mm"'],
    [-256, '-256'],
    [null, 'null'],
    [true, 'true'],
    [[1, 2], '[1,2]'],
    [[1, 2, 3, 4, 5, 6, 7], 'a list of 7'],
    [{ a: 1 }, 'an object'],
    ['\u001b[31mred', '"[31mred"'],
  ])('%j is shown as %s', (value, shown) => {
    expect(shownValue(value)).toBe(shown);
  });
});
