import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readFrame } from '../../../src/terminal/painter/frame-grid.js';
import { paintDifference } from '../../../src/terminal/painter/paint-difference.js';
import { createVirtualScreen } from '../../e2e/harness/virtual-screen.js';

const size = { columns: 12, rows: 4 };

const screen = createVirtualScreen(size.columns, size.rows);

/** Cells as they look: a blank without background, inversion or line has no other looks. */
async function screenAfter(...writes: string[]): Promise<string[]> {
  screen.terminal.reset();
  await screen.write('\u001b[?7l');
  for (const write of writes) await screen.write(write);
  const cells: string[] = [];
  for (let y = 0; y < size.rows; y++) {
    for (let x = 0; x < size.columns; x++) {
      const cell = screen.cell(x, y);
      const plain = cell.text === ' ' && cell.background === 'default' && !cell.inverse && !cell.underline && !cell.strikethrough;
      cells.push(plain ? ' ' : JSON.stringify(cell));
    }
  }
  expect(screen.scrolledLines()).toBe(0);
  return cells;
}

const grid = (frame: string) => readFrame(frame, size);
const sgr = fc.constantFrom('0', '1', '2', '4', '7', '22', '24', '27', '31', '92', '39', '44', '49', '38;5;208', '48;2;1;2;3');
const part = fc.oneof(
  { weight: 4, arbitrary: fc.string({ maxLength: 6 }) },
  { weight: 2, arbitrary: fc.constantFrom(' ', '   ', '        ') },
  { weight: 2, arbitrary: sgr.map((parameters) => `\u001b[${parameters}m`) },
  { weight: 1, arbitrary: fc.constantFrom('\u6f22', '\u5b57\u6f22', '\u28ff\u2847', '\u2713', '\u00b5', '\u00b1', 'e\u0301') },
);
const frame = fc
  .array(
    fc.array(part, { maxLength: 5 }).map((parts) => parts.join('')),
    { maxLength: 5 },
  )
  .map((lines) => lines.join('\n'));

describe('painting the difference', () => {
  it('from frame A to frame B shows what painting B alone shows', async () => {
    await fc.assert(
      fc.asyncProperty(frame, frame, async (a, b) => {
        const fromA = await screenAfter(paintDifference(null, grid(a)), paintDifference(grid(a), grid(b)));
        expect(fromA).toEqual(await screenAfter(paintDifference(null, grid(b))));
      }),
      { numRuns: 400 },
    );
  });

  it('shows what the grid holds', async () => {
    await fc.assert(
      fc.asyncProperty(frame, async (a) => {
        screen.terminal.reset();
        await screen.write(paintDifference(null, grid(a)));
        grid(a).rows.forEach((row, y) => {
          row.cells.forEach((cell, x) => {
            const shown = screen.cell(x, y);
            expect(shown.text).toBe(cell.text);
            if (cell.text !== ' ') {
              const marks = cell.style.replace(/[34]8;(2(;\d+){3}|5;\d+)/g, '').split(';');
              expect([shown.bold, shown.dim, shown.underline, shown.inverse]).toEqual(
                ['1', '2', '4', '7'].map((mark) => marks.includes(mark)),
              );
            }
          });
        });
      }),
      { numRuns: 200 },
    );
  });

  it('writes nothing for the same frame', () => {
    fc.assert(
      fc.property(frame, (a) => {
        expect(paintDifference(grid(a), grid(a))).toBe('');
      }),
    );
  });

  it('writes one character for one changed digit', () => {
    expect(paintDifference(grid('time 17.0 s'), grid('time 17.4 s'))).toBe('\u001b[1;9H4');
  });

  it('writes over a short stretch that stays, and jumps over a long one', () => {
    expect(paintDifference(grid('17.0 s'), grid('19.4 s'))).toBe('\u001b[1;2H9.4');
    expect(paintDifference(grid('1 abcdefgh 2'), grid('3 abcdefgh 4'))).toBe('\u001b[1;1H3\u001b[12G4');
    expect(paintDifference(grid('1 abcde 2'), grid('3 abcde 4'))).toBe('\u001b[1;1H3\u001b[9G4');
    expect(paintDifference(grid('ab\n1 abcde 2'), grid('xb\n3 abcde 4'))).toBe('\u001b[1;1Hx\u001b[2;1H3\u001b[9G4');
  });

  it('erases a long blank end instead of writing it', () => {
    expect(paintDifference(grid('abcdefgh'), grid('ab'))).toBe('\u001b[1;3H\u001b[K');
  });

  it('ends in plain style', () => {
    expect(paintDifference(grid('a'), grid('\u001b[1;31mb'))).toBe('\u001b[1;1H\u001b[1;31mb\u001b[m');
  });

  it('addresses anew after a character whose width terminals disagree on, and writes its neighbour again', () => {
    expect(paintDifference(grid('0 mm'), grid('\u00b1 mm'))).toBe('\u001b[1;1H\u00b1\u001b[1;2H ');
    expect(paintDifference(grid('\u00b1x'), grid('0x'))).toBe('\u001b[1;1H0x');
  });

  it('uses the last cell of the last line', async () => {
    const full = Array.from({ length: size.rows }, (_, y) => String(y).repeat(size.columns)).join('\n');
    const cells = await screenAfter(paintDifference(null, grid(full)));
    expect(cells.map((cell) => JSON.parse(cell).text).join('')).toBe(full.replaceAll('\n', ''));
  });
});
