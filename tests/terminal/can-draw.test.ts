import { describe, expect, it } from 'vitest';
import { canDraw } from '../../src/terminal/can-draw.js';
import { sizeOf } from '../../src/terminal/size.js';

const terminal = { isTTY: true };

describe('canDraw', () => {
  it('needs a terminal at both ends that can address its cells', () => {
    expect(canDraw(terminal, terminal, { TERM: 'xterm' })).toBe(true);
    expect(canDraw({}, terminal, { TERM: 'xterm' })).toBe(false);
    expect(canDraw(terminal, { isTTY: false }, { TERM: 'xterm' })).toBe(false);
    expect(canDraw(terminal, terminal, { TERM: 'dumb' })).toBe(false);
  });
});

describe('sizeOf', () => {
  it('is 80 x 24 where the terminal does not say', () => {
    expect(sizeOf({ columns: 100, rows: 30 })).toEqual({ columns: 100, rows: 30 });
    expect(sizeOf({ columns: 0, rows: 0 })).toEqual({ columns: 80, rows: 24 });
    expect(sizeOf({})).toEqual({ columns: 80, rows: 24 });
  });
});
