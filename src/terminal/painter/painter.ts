import type { Size } from '../size.js';
import { type Grid, readFrame } from './frame-grid.js';
import { paintDifference } from './paint-difference.js';

/** A clock and its alarm, so that tests can hold time. */
export interface PainterClock {
  /** Steady, in ms. */
  readonly now: () => number;
  /** Runs something after so many ms, 0 meaning as soon as the work at hand is done. Returns how to call it off. */
  readonly after: (delayMs: number, run: () => void) => () => void;
}

/** What a painter needs. */
export interface PainterOptions {
  /** Writes to the terminal and calls `done` when the next write may follow. */
  readonly write: (text: string, done: () => void) => void;
  readonly size: Size;
  /** Asks the terminal after each frame whether it is done, and waits for the answer before the next. */
  readonly paced: boolean;
  readonly clock?: PainterClock;
}

/** Draws whole frames by writing what differs. Create it paused; `start` begins. */
export interface Painter {
  /** The screen shall look like this. Later frames replace those that have not been written yet; the last is always drawn. */
  readonly draw: (frame: string) => void;
  /** The terminal has a new size: everything is drawn again. */
  readonly resize: (size: Size) => void;
  /** The terminal has answered a status query. */
  readonly answered: () => void;
  /** True while an answer is outstanding, which would end up in the shell if nobody took it. */
  readonly awaitsAnswer: () => boolean;
  /** The terminal is ours, its screen unknown: draws the latest frame from nothing, before it returns. */
  readonly start: () => void;
  /** Nothing is written from now on; frames are remembered. */
  readonly pause: () => void;
}

/** At most 30 frames a second. */
const frameIntervalMs = 1000 / 30;
/** A terminal that has not answered by then is taken for one that never will; should it answer later, pacing begins then. */
const probeMs = 2000;
/** An answer that is lost on the way must not stop the picture for ever. */
const lostAnswerMs = 5000;

/** About what one number takes, with the way there. */
const shortStretch = 40;

const statusQuery = '\u001b[5n';
const beginUpdate = '\u001b[?2026h';
const endUpdate = '\u001b[?2026l';
const hideCursor = '\u001b[?25l';
const showCursor = '\u001b[?25h';

const systemClock: PainterClock = {
  now: () => performance.now(),
  after: (delayMs, run) => {
    if (delayMs <= 0) {
      const soon = setImmediate(run);
      return () => clearImmediate(soon);
    }
    const timer = setTimeout(run, Math.ceil(delayMs));
    return () => clearTimeout(timer);
  },
};

class CellPainter implements Painter {
  readonly #options: PainterOptions;
  readonly #clock: PainterClock;
  #size: Size;
  #frame = '';
  #shown: Grid | null = null;
  #cursorShown = false;
  #dirty = false;
  #running = false;
  #writing = false;
  #lastMs = Number.NEGATIVE_INFINITY;
  #pacing: 'unknown' | 'asking' | 'on' | 'off' = 'unknown';
  #unanswered = 0;
  #callOff: (() => void) | null = null;
  #callOffWait: (() => void) | null = null;

  constructor(options: PainterOptions) {
    this.#options = options;
    this.#clock = options.clock ?? systemClock;
    this.#size = options.size;
    if (!options.paced) this.#pacing = 'off';
  }

  draw = (frame: string): void => {
    this.#frame = frame;
    this.#dirty = true;
    this.#schedule();
  };

  resize = (size: Size): void => {
    this.#size = size;
    this.#shown = null;
    this.#dirty = true;
    this.#schedule();
  };

  answered = (): void => {
    if (this.#unanswered === 0) return;
    this.#unanswered--;
    this.#pacing = 'on';
    this.#callOffWait?.();
    this.#schedule();
  };

  awaitsAnswer = (): boolean => this.#unanswered > 0;

  start = (): void => {
    this.#running = true;
    this.#shown = null;
    this.#cursorShown = false;
    this.#dirty = true;
    this.#unanswered = 0;
    if (this.#pacing === 'asking') this.#pacing = 'unknown';
    // At once, not when the work at hand is done: that work may be loading everything else.
    this.#paint();
  };

  pause = (): void => {
    this.#running = false;
    this.#callOff?.();
    this.#callOff = null;
    this.#callOffWait?.();
  };

  #schedule(): void {
    if (!this.#running || !this.#dirty || this.#writing || this.#callOff !== null) return;
    if (this.#pacing === 'on' && this.#unanswered > 0) return;
    const waitMs = Math.max(0, this.#lastMs + frameIntervalMs - this.#clock.now());
    this.#callOff = this.#clock.after(waitMs, () => {
      this.#callOff = null;
      this.#paint();
    });
  }

  #paint(): void {
    this.#dirty = false;
    const grid = readFrame(this.#frame, this.#size, this.#shown ?? undefined);
    const text = this.#textFor(grid);
    this.#shown = grid;
    this.#cursorShown = grid.cursor !== null;
    if (text === '') return;
    this.#lastMs = this.#clock.now();
    this.#writing = true;
    this.#options.write(beginUpdate + text + endUpdate + this.#query(), () => {
      this.#writing = false;
      this.#schedule();
    });
  }

  #textFor(grid: Grid): string {
    const cells = paintDifference(this.#shown, grid);
    const { cursor } = grid;
    if (cursor === null) return (this.#cursorShown ? hideCursor : '') + cells;
    const before = this.#shown?.cursor;
    const still = this.#cursorShown && cells === '' && before?.x === cursor.x && before.y === cursor.y;
    if (still) return '';
    // Hidden while it runs over the screen, so that terminals without update marks do not show it jumping; not for one short stretch.
    const hide = this.#cursorShown && cells.length > shortStretch ? hideCursor : '';
    return `${hide}${cells}\u001b[${cursor.y + 1};${cursor.x + 1}H${this.#cursorShown && hide === '' ? '' : showCursor}`;
  }

  #query(): string {
    if (this.#pacing !== 'unknown' && this.#pacing !== 'on') return '';
    const waitMs = this.#pacing === 'on' ? lostAnswerMs : probeMs;
    if (this.#pacing === 'unknown') this.#pacing = 'asking';
    this.#unanswered++;
    this.#callOffWait?.();
    const callOff = this.#clock.after(waitMs, () => {
      this.#callOffWait = null;
      this.#pacing = 'off';
      this.#schedule();
    });
    this.#callOffWait = () => {
      callOff();
      this.#callOffWait = null;
    };
    return statusQuery;
  }
}

/**
 * A painter for one terminal. It writes each frame in one piece, inside synchronised-update marks (DEC private mode 2026), addresses
 * cells absolutely and never scrolls. A single frame goes out at once; under repeat, at most 30 a second do.
 */
export function createPainter(options: PainterOptions): Painter {
  return new CellPainter(options);
}
