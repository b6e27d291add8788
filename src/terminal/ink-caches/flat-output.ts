import { widestLine } from './measure-text.js';

/** How ink hands over a text: each line goes through the functions of the components around it. */
interface WriteOptions {
  readonly transformers: readonly ((line: string, index: number) => string)[];
}

/**
 * Takes the place of ink's own `Output`, which takes every text apart into cells and puts them together again, though the painter is
 * about to do that by itself. Whole lines are all this program gives to ink, so they are passed on as they are. Ink's own page about a
 * component that threw is made of boxes: its texts come one after the other, none over another, so that its message can be read.
 */
export class FlatOutput {
  readonly #lines: string[];

  constructor({ height }: { readonly width: number; readonly height: number }) {
    this.#lines = Array.from({ length: height }, () => '');
  }

  /** Takes a text whose first character stands at column `x` of line `y`, counted from 0. */
  write(x: number, y: number, text: string, { transformers }: WriteOptions): void {
    if (text === '') return;
    text.split('\n').forEach((given, index) => {
      const row = y + index;
      if (row >= this.#lines.length) return;
      const before = this.#lines[row] as string;
      const gap = ' '.repeat(Math.max(0, x - widestLine(before)));
      this.#lines[row] = before + gap + transformers.reduce((line, transform) => transform(line, index), given);
    });
  }

  /** Boxes that cut off what is in them are not drawn here. */
  clip(): void {}

  unclip(): void {}

  get(): { readonly output: string; readonly height: number } {
    return { output: this.#lines.join('\n'), height: this.#lines.length };
  }
}

/**
 * Takes the place of ink's search for control sequences that are no styles: texts from files lose theirs when they are read, and the
 * painter leaves out whatever is not a style.
 */
export function asItIs(text: string): string {
  return text;
}
