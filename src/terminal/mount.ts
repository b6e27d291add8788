import { EventEmitter } from 'node:events';
import type { ReactElement } from 'react';
import type { ColourLevel } from './colour-level.js';
import { FrameStream } from './frame-stream.js';
import type { LeaveReason } from './leave-reason.js';
import { loadInk } from './load-ink.js';
import { type OpenTerminal, openTerminal } from './open-terminal.js';
import type { Size } from './size.js';
import type { TerminalOptions } from './terminal-options.js';

/** What is drawn, and with how many colours. */
export interface Drawing {
  /** The screen for a size. Called for every `redraw` and every new size; it must be quick and have no effects of its own. */
  readonly element: (size: Size) => ReactElement;
  readonly colourLevel: ColourLevel;
}

/** A React tree on the terminal. */
export interface Mounted {
  /** Calls `element` again and draws what it gives. Components with a state of their own may also set it: that draws too. */
  readonly redraw: () => void;
  readonly size: () => Size;
  /** Gives the terminal back as it was found, then resolves. */
  readonly close: () => Promise<void>;
  /** Resolves when the terminal has been given back for good, whoever wanted it. */
  readonly closed: Promise<LeaveReason>;
}

/**
 * Draws a React tree on an open terminal. Loads ink first, so open the terminal with a `firstFrame` before.
 *
 * Ink gets no input: `useInput` throws, keys come by `onKey` alone. `<Static>`, `useCursor` and writing to ink's streams are out of
 * use; the cursor is placed by `cursorHere`. Ink's own screen-reader mode is off: a linear screen is drawn as any other is.
 */
export async function mountOn(terminal: OpenTerminal, { element, colourLevel }: Drawing): Promise<Mounted> {
  const { render, chalk } = await loadInk();
  chalk.level = colourLevel;
  const output = new FrameStream(terminal.size, terminal.draw);
  const tree = () => element(terminal.size());
  const instance = render(tree(), {
    stdout: output as unknown as NodeJS.WriteStream,
    stdin: Object.assign(new EventEmitter(), { isTTY: false }) as unknown as NodeJS.ReadStream,
    debug: true,
    patchConsole: false,
    exitOnCtrlC: false,
    isScreenReaderEnabled: false,
  });
  const redraw = () => instance.rerender(tree());
  const stopResizing = terminal.whenResized(redraw);
  // A component that threw ends the program as any error does; one that asked ink to exit closes the terminal.
  instance.waitUntilExit().then(terminal.close, terminal.fail);
  void terminal.closed.then(() => {
    stopResizing();
    instance.unmount();
  });
  return { redraw, size: terminal.size, close: terminal.close, closed: terminal.closed };
}

/**
 * Takes the terminal and draws a React tree on it.
 *
 * Keys may come before the promise resolves: keep what they change, and draw it once there is something to draw on.
 *
 * @example
 * let screen: Mounted | undefined;
 * const onKey = (key: Key) => { state = update(state, key); screen?.redraw(); };
 * screen = await mount({ element: (size) => <App state={state} size={size} />, colourLevel: 2, onKey });
 * await screen.closed;
 */
export async function mount(options: TerminalOptions & Drawing): Promise<Mounted> {
  const terminal = openTerminal(options);
  return mountOn(terminal, options).catch((error: unknown) => {
    terminal.fail(error);
    throw error;
  });
}
