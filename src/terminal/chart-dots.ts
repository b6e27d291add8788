/**
 * A cell of a chart holds eight dots, two columns of four. Bits as in the Unicode braille block (Unicode 16, 12.1: U+2800 plus one bit a
 * dot), which numbers them 1 2 3 7 down the left column and 4 5 6 8 down the right.
 */
const bits: readonly (readonly [number, number])[] = [
  [0x01, 0x08],
  [0x02, 0x10],
  [0x04, 0x20],
  [0x40, 0x80],
];

/**
 * The bit of one dot in a cell.
 *
 * @param column 0 left, 1 right.
 * @param row 0 (top) to 3.
 * @example chartDotBit(1, 3) //=> 128
 */
export function chartDotBit(column: 0 | 1, row: 0 | 1 | 2 | 3): number {
  return bits[row]?.[column] ?? 0;
}

/** Nearest ASCII sign to a cell with dots in its upper, middle and lower part. */
const asciiSigns = [' ', '.', '-', ';', "'", ':', '"', '|'] as const;

/**
 * The character for a cell with these dots: braille, or the ASCII sign that comes nearest (upper, middle and lower part).
 *
 * @param dots Sum of dot bits, 0 to 255.
 * @example chartDots(0b1001_0010, 'unicode') //=> '\u2892'
 */
export function chartDots(dots: number, set: 'unicode' | 'ascii'): string {
  if (set === 'unicode') return dots === 0 ? ' ' : String.fromCharCode(0x2800 + (dots & 0xff));
  const upper = dots & 0x09 ? 4 : 0;
  const middle = dots & 0x36 ? 2 : 0;
  const lower = dots & 0xc0 ? 1 : 0;
  return asciiSigns[upper + middle + lower] ?? ' ';
}
