import { eastAsianWidthType } from 'get-east-asian-width';
import { describe, expect, it } from 'vitest';
import { asciiGlyphs, type Glyphs, glyphsFor, isUtf8Locale, unicodeGlyphs } from '../../src/terminal/glyphs.js';
import { textWidth } from '../../src/terminal/text-width.js';

const sets = [
  ['unicode', unicodeGlyphs],
  ['ascii', asciiGlyphs],
] as const satisfies readonly (readonly [string, Glyphs])[];

describe('the glyphs', () => {
  it('have the same keys in both sets', () => {
    expect(Object.keys(asciiGlyphs).sort()).toEqual(Object.keys(unicodeGlyphs).sort());
  });

  it.each(sets)('are one character and one column wide (%s)', (_name, glyphs) => {
    for (const glyph of Object.values(glyphs)) {
      expect([...glyph]).toHaveLength(1);
      expect(textWidth(glyph)).toBe(1);
    }
  });

  it('have no character of ambiguous width', () => {
    for (const glyph of Object.values(unicodeGlyphs)) expect(eastAsianWidthType(glyph.codePointAt(0) ?? 0)).toMatch(/^(neutral|narrow)$/);
  });

  it('are ASCII in the plain set', () => {
    for (const glyph of Object.values(asciiGlyphs)) expect(glyph).toMatch(/^[!-~]$/);
  });

  it.each(sets)('mean one thing each (%s)', (_name, glyphs) => {
    const { barRightHalf: _half, ...others } = glyphs;
    expect(new Set(Object.values(others)).size).toBe(Object.keys(others).length);
  });
});

describe('the set', () => {
  it.each([
    [{ LANG: 'de_DE.UTF-8' }, true],
    [{ LANG: 'C.utf8' }, true],
    [{ LC_CTYPE: 'UTF-8' }, true],
    [{ LANG: 'en_US.ISO-8859-1' }, false],
    [{ LANG: 'de_DE.UTF-8', LC_CTYPE: 'C' }, false],
    [{ LANG: 'C', LC_CTYPE: 'C', LC_ALL: 'en_US.UTF-8' }, true],
    [{ LANG: 'de_DE.UTF-8', LC_ALL: '' }, true],
    [{}, false],
  ])('follows the locale %j', (environment, utf8) => {
    expect(isUtf8Locale(environment)).toBe(utf8);
    expect(glyphsFor(false, environment)).toBe(utf8 ? unicodeGlyphs : asciiGlyphs);
  });

  it('is plain when asked for', () => {
    expect(glyphsFor(true, { LANG: 'de_DE.UTF-8' })).toBe(asciiGlyphs);
  });
});
