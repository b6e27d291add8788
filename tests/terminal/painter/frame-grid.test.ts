import { describe, expect, it } from 'vitest';
import { cursorHere } from '../../../src/terminal/painter/cursor-mark.js';
import { readFrame } from '../../../src/terminal/painter/frame-grid.js';

const size = { columns: 6, rows: 2 };
const texts = (frame: string) => readFrame(frame, size).rows.map((row) => row.cells.map((cell) => cell.text).join('|'));

describe('reading a frame', () => {
  it('fills what is missing with blanks', () => {
    expect(texts('ab')).toEqual(['a|b| | | | ', ' | | | | | ']);
  });

  it('cuts what does not fit', () => {
    expect(texts('abcdefgh\nx\ny')).toEqual(['a|b|c|d|e|f', 'x| | | | | ']);
  });

  it('gives wide characters two cells, and none of them half', () => {
    expect(texts('a\u6f22b')).toEqual(['a|\u6f22||b| | ', ' | | | | | ']);
    expect(texts('abcde\u6f22')[0]).toBe('a|b|c|d|e| ');
  });

  it('keeps accents with their letters', () => {
    expect(texts('e\u0301a')[0]).toBe('e\u0301|a| | | | ');
  });

  it('leaves out what is not to be drawn', () => {
    expect(texts('a\u0007\r\u200bb\u001b[2J\u001b]8;;x\u0007c\u001b[5;5Hd')[0]).toBe('a|b|c|d| | ');
    expect(texts('a\ud800b')[0]).toBe('a|b| | | | ');
    expect(texts('a\tb')[0]).toBe('a| |b| | | ');
  });

  it('carries styles, from line to line too', () => {
    const grid = readFrame('a\u001b[31mb\nc\u001b[39md', size);
    expect(grid.rows.map((row) => row.cells.slice(0, 2).map((cell) => cell.style))).toEqual([
      ['', '31'],
      ['31', ''],
    ]);
  });

  it('takes the same line over from the frame before, unless it begins in another style', () => {
    const before = readFrame('a\nb', size);
    expect(readFrame('x\nb', size, before).rows[1]).toBe(before.rows[1]);
    const after = readFrame('\u001b[31mx\nb', size, before);
    expect(after.rows[1]?.cells[0]?.style).toBe('31');
    expect(readFrame('x\nb', { columns: 7, rows: 2 }, before).rows[1]?.cells).toHaveLength(7);
  });

  it('finds the cursor mark', () => {
    expect(readFrame(`a\nx${cursorHere('12')}`, size).cursor).toEqual({ x: 1, y: 1 });
    expect(readFrame(`a\nx${cursorHere('')}`, size).cursor).toEqual({ x: 1, y: 1 });
    expect(readFrame('a\u001b[38;2;53;1;1mb', size).cursor).toBeNull();
    expect(readFrame(`abcdef${cursorHere('g')}`, size).cursor).toBeNull();
  });
});
