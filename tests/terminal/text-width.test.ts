import fc from 'fast-check';
import stringWidth from 'string-width';
import { describe, expect, it } from 'vitest';
import { fitText, graphemesOf, isPlainText, isSureWidth, textWidth } from '../../src/terminal/text-width.js';

describe('textWidth', () => {
  it.each([
    ['', 0],
    ['abc', 3],
    ['\u001b[31mabc\u001b[39m', 3],
    ['\u6f22\u5b57', 4],
    ['e\u0301', 1],
    ['\u28ff\u2713', 2],
    ['\u{1f600}', 2],
  ])('of %j is %i', (text, width) => {
    expect(textWidth(text)).toBe(width);
  });
});

describe('isPlainText', () => {
  it('holds for characters of one column each and no others, by the package that counts them one by one', () => {
    for (let code = 0; code <= 0xffff; code += 1) {
      const character = String.fromCharCode(code);
      if (!isPlainText(character)) continue;
      expect(stringWidth(character), code.toString(16)).toBe(1);
      // Neither swallows nor joins its neighbour.
      expect(graphemesOf(`a${character}${character}b`), code.toString(16)).toHaveLength(4);
    }
  });

  it.each(['\u00ad', '\u0301', '\u6f22', '\u200d', '\u001b', '\ufe0f', '\ud83d', '\u00a9', '\u00ae'])(
    'does not hold for %j',
    (character) => {
      expect(isPlainText(`a${character}`)).toBe(false);
    },
  );
});

describe('isSureWidth', () => {
  it.each(['a', '~', '\u28ff', '\u2713', '\u00b5', '\u2212', '\u6f22'])('says yes to %j', (text) => {
    expect(isSureWidth(text)).toBe(true);
  });

  it.each(['\u00b1', '\u00b0', '\u00d7', '\u2026', '\u2500', '\u2588', '\u2190', '\u03b1', '\u{1f600}', '\u2714', 'e\u0301', '\u0085'])(
    'says no to %j',
    (text) => {
      expect(isSureWidth(text)).toBe(false);
    },
  );
});

describe('fitText', () => {
  it('fills on the side that is free', () => {
    expect(fitText('17.0', 6, '~')).toBe('17.0  ');
    expect(fitText('17.0', 6, '~', 'right')).toBe('  17.0');
  });

  it('cuts with an ellipsis, and never a wide character in half', () => {
    expect(fitText('breath-hold', 7, '~')).toBe('breath~');
    expect(fitText('\u6f22\u5b57\u6f22', 4, '~')).toBe('\u6f22~ ');
    expect(fitText('abc', 1, '~')).toBe('~');
    expect(fitText('abc', 0, '~')).toBe('');
  });

  it('is always exactly as wide as asked', () => {
    fc.assert(
      fc.property(
        fc.string({ unit: 'grapheme', maxLength: 12 }),
        fc.nat({ max: 15 }),
        fc.constantFrom('left', 'right'),
        (text, columns, align) => {
          // Where the pieces of a text add up to something else than the whole (jamo that join), no cut can be exact.
          fc.pre(graphemesOf(text).reduce((sum, grapheme) => sum + textWidth(grapheme), 0) === textWidth(text));
          expect(textWidth(fitText(text, columns, '~', align))).toBe(columns);
        },
      ),
    );
  });
});
