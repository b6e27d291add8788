import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { reasonCodes, reasonWords, recordReasons } from '../../src/study/record-reasons.js';
import { freeText, identifierHint, initialsText } from '../../src/study/record-text.js';

describe('freeText', () => {
  it('leaves nothing that steers a terminal or breaks a line', () => {
    expect(freeText(' in\u001b[31m\u202e  pain\n')).toBe('in[31m  pain');
  });

  it('is 80 characters at most, never cutting one in two, and cleans no further the second time', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 200 }), (text) => {
        const once = freeText(text);
        expect([...once].length).toBeLessThanOrEqual(80);
        expect(() => encodeURIComponent(once)).not.toThrow();
        expect(freeText(once)).toBe(once);
      }),
    );
  });

  it('keeps initials to four characters', () => {
    expect(initialsText(' abcdef')).toBe('abcd');
  });
});

describe('identifierHint', () => {
  it.each(['born 1.2.1950', '2026-03-02', 'seen 3/4/26'])('takes %s for a date', (text) => expect(identifierHint(text)).toMatch(/date/));
  it.each(['12345', 'case 0098123'])('takes %s for a number of a person or an exam', (text) =>
    expect(identifierHint(text)).toMatch(/number/),
  );
  it.each(['', 'pain after 2 min', 'cap 2.0 uT at 1.5 T', 'TE 1.2'])('lets %j pass', (text) => expect(identifierHint(text)).toBe(null));
});

describe('reasonWords', () => {
  it('gives the words of a code, free text as it is, and NO REASON GIVEN for a blank', () => {
    expect(reasonWords('implant-rf')).toBe('implant RF');
    expect(reasonWords('arm cannot be raised')).toBe('arm cannot be raised');
    expect(reasonWords(' ')).toBe('NO REASON GIVEN');
    expect(reasonWords('constructor')).toBe('constructor');
  });

  it('has a code for every reason that is its words in lower case, joined by hyphens', () => {
    for (const code of reasonCodes) expect(code).toBe(recordReasons[code].toLowerCase().replaceAll("'", '').replaceAll(' ', '-'));
  });
});
