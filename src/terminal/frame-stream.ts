import { EventEmitter } from 'node:events';
import type { Size } from './size.js';

/**
 * The output stream that ink writes to: in its debug mode, one whole frame a write and nothing else. It says that it is no terminal,
 * so that ink leaves cursor and modes alone.
 */
export class FrameStream extends EventEmitter {
  readonly isTTY = false;
  readonly #size: () => Size;
  readonly #onFrame: (frame: string) => void;

  constructor(size: () => Size, onFrame: (frame: string) => void) {
    super();
    this.#size = size;
    this.#onFrame = onFrame;
  }

  get columns(): number {
    return this.#size().columns;
  }

  get rows(): number {
    return this.#size().rows;
  }

  write(frame: string): boolean {
    this.#onFrame(frame);
    return true;
  }
}
