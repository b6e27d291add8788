import { chartDotBit, chartDots } from '../terminal/chart-dots.js';
import type { Line, Style } from './line.js';
import type { Look } from './look.js';

/** A field of dots, two by four in a cell, and whose curve a cell belongs to. */
export class Plot {
  readonly #dots: Uint8Array;
  readonly #owner: Int8Array;
  readonly #marks: (string | undefined)[];

  constructor(
    readonly width: number,
    readonly height: number,
    readonly look: Look,
  ) {
    this.#dots = new Uint8Array(width * height);
    this.#owner = new Int8Array(width * height).fill(-1);
    this.#marks = Array.from({ length: width * height }, () => undefined);
  }

  /** Sets a dot; rows count from the bottom. */
  dot(x: number, y: number, owner: 0 | 1): void {
    const cell = (this.height - 1 - (y >> 2)) * this.width + (x >> 1);
    if (cell < 0 || cell >= this.#dots.length) return;
    this.#dots[cell] = (this.#dots[cell] ?? 0) | chartDotBit((x & 1) as 0 | 1, (3 - (y & 3)) as 0 | 1 | 2 | 3);
    if (this.#owner[cell] !== 0) this.#owner[cell] = owner;
  }

  /** A line across, where no curve is. */
  level(y: number, sign: string): void {
    const row = this.height - 1 - (y >> 2);
    for (let x = 0; x < this.width; x += 1) this.#marks[row * this.width + x] ??= sign;
  }

  /** A line upwards, where no curve is: the cursor, or a limit with a sign of its own. */
  upright(x: number, sign: string = this.look.glyphs.verticalRule): void {
    for (let row = 0; row < this.height; row += 1) this.#marks[row * this.width + x] = sign;
  }

  lines(): Line[] {
    return Array.from({ length: this.height }, (_, row) => {
      const cells = Array.from({ length: this.width }, (_cell, x): { text: string; style: Style } => {
        const at = row * this.width + x;
        const dots = this.#dots[at] ?? 0;
        if (dots === 0) return { text: this.#marks[at] ?? ' ', style: this.#marks[at] === undefined ? 'plain' : 'quiet' };
        return { text: chartDots(dots, this.look.set), style: this.#owner[at] === 0 ? 'first' : 'second' };
      });
      return joined(cells);
    });
  }
}

/** Neighbours of one style become one stretch. */
function joined(cells: readonly { text: string; style: Style }[]): Line {
  const spans: { text: string; style: Style }[] = [];
  for (const cell of cells) {
    const last = spans.at(-1);
    if (last?.style === cell.style) last.text += cell.text;
    else spans.push({ ...cell });
  }
  return spans;
}
