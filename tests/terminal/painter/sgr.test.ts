import { describe, expect, it } from 'vitest';
import { blankIsPlain, styleAfter } from '../../../src/terminal/painter/sgr.js';

describe('the style after an SGR sequence', () => {
  it.each([
    ['', '31', '31'],
    ['31', '1', '1;31'],
    ['1;31', '39', '1'],
    ['1;31', '0', ''],
    ['1;31', '', ''],
    ['1;2', '22', ''],
    ['', '38;5;208', '38;5;208'],
    ['', '38;2;213;94;0', '38;2;213;94;0'],
    ['', '38:2:213:94:0', '38;2;213;94;0'],
    ['38;2;213;94;0', '48;5;7', '38;2;213;94;0;48;5;7'],
    ['38;2;213;94;0;48;5;7', '7', '7;38;2;213;94;0;48;5;7'],
    ['38;2;1;31;7', '39', ''],
    ['31', '91', '91'],
    ['41', '49', ''],
    ['', '53', ''],
    ['31', '53', '31'],
    ['4;9', '24', '9'],
    ['', '0;1;4;32', '1;4;32'],
    ['', '4;1;32', '1;4;32'],
    ['', '38;5', ''],
    ['', '999', ''],
  ])('%j and %j give %j', (before, parameters, after) => {
    expect(styleAfter(before, parameters)).toBe(after);
  });

  it('knows which styles a blank shows', () => {
    expect(['', '1', '31', '1;2;31'].map(blankIsPlain)).toEqual([true, true, true, true]);
    expect(['7', '4', '9', '41', '31;48;5;7'].map(blankIsPlain)).toEqual([false, false, false, false, false]);
  });

  it('stays right after more looks than it remembers', () => {
    for (let red = 0; red < 256; red++) for (let green = 0; green < 10; green++) styleAfter('', `38;2;${red};${green};7`);
    expect(styleAfter('1;38;2;3;4;7', '4')).toBe('1;4;38;2;3;4;7');
    expect(styleAfter('', '31')).toBe('31');
  });
});
