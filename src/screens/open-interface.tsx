import type { Draft } from '../session/draft.js';
import type { Answer, Effect, Message } from '../session/message.js';
import { type Defaults, initialState, type State } from '../session/state.js';
import { draftNow, tickEveryMs, update } from '../session/update.js';
import { colourChoices, colourLevel } from '../terminal/colour-level.js';
import { asciiGlyphs, glyphsFor } from '../terminal/glyphs.js';
import { type Mounted, mountOn } from '../terminal/mount.js';
import { openTerminal } from '../terminal/open-terminal.js';
import type { Look } from './look.js';

/** What the interface is told when it opens, and how it reaches the world outside. */
export interface InterfaceSetup {
  readonly ascii: boolean;
  readonly reader: boolean;
  /** Value of `--color`, or of the settings; undefined asks the terminal. */
  readonly color: string | undefined;
  readonly environment: Readonly<Record<string, string | undefined>>;
  readonly defaults: Defaults;
  /** Carries an effect out; null where nothing is answered. */
  readonly runEffect: (effect: Effect) => Promise<Answer | null>;
  /** What is known at the start, in pieces, as it becomes known; the first is what the first screen is about. */
  readonly firstMessages: readonly Promise<readonly Message[]>[];
  /** Hands over where things that happen outside are told. */
  readonly listen: (send: (message: Message) => void) => void;
  /** Saves what is not saved yet; called on every way out. */
  readonly leave: (draft: Draft | null) => Promise<void>;
}

/** So long the terminal shows the name of the program only; then that it waits. */
const longestBlankMs = 150;

/**
 * Opens the terminal interface. Answers its exit code when it is left.
 *
 * @returns 0; a signal or an error ends the process by itself.
 */
export async function openInterface(setup: InterfaceSetup): Promise<number> {
  const look = lookOf(setup);
  let state: State = initialState(setup.defaults, { columns: process.stdout.columns || 80, rows: process.stdout.rows || 24 });
  let mounted: Mounted | undefined;
  let ticking: { readonly everyMs: number; readonly timer: NodeJS.Timeout } | null = null;
  let left: Promise<void> | null = null;

  const leave = (): Promise<void> => {
    if (ticking !== null) clearInterval(ticking.timer);
    left ??= setup.leave(state.session?.saved === true ? null : draftNow(state));
    return left;
  };
  const terminal = openTerminal({
    environment: setup.environment,
    firstFrame: 'holdfast',
    onKey: (key) => send({ kind: 'key', key: 'text' in key ? { name: key.name, text: key.text } : { name: key.name }, atMs: Date.now() }),
    onLeave: leave,
  });

  function send(message: Message): void {
    const [next, effects] = update(state, message);
    const changed = next !== state;
    state = next;
    keepTime();
    if (changed) mounted?.redraw();
    // After the frame: an effect may load something first, and the frame need not wait for that.
    if (effects.length > 0) setImmediate(() => effects.forEach(carryOut));
  }

  function carryOut(effect: Effect): void {
    if (effect.kind === 'quit') {
      void terminal.close();
      return;
    }
    setup.runEffect(effect).then((answer) => {
      if (answer !== null && 'ask' in effect) send({ kind: 'answer', ask: effect.ask, answer });
    }, terminal.fail);
  }

  function keepTime(): void {
    const everyMs = tickEveryMs(state);
    if (everyMs === (ticking?.everyMs ?? null)) return;
    if (ticking !== null) clearInterval(ticking.timer);
    ticking = everyMs === null ? null : { everyMs, timer: setInterval(() => send({ kind: 'tick', atMs: Date.now() }), everyMs) };
  }

  setup.listen(send);
  const [shown] = setup.firstMessages.map((messages) =>
    messages.then((each) => {
      for (const message of each) send(message);
    }, terminal.fail),
  );
  mounted = await drawOn(
    terminal,
    look,
    // A screen that says no more than that it waits would only delay the one that is about to come.
    Promise.race([shown, new Promise((resolve) => setTimeout(resolve, longestBlankMs))]),
    () => state,
    (size) => {
      if (size.columns !== state.size.columns || size.rows !== state.size.rows) [state] = update(state, { kind: 'size', ...size });
    },
  ).catch((error: unknown) => {
    terminal.fail(error);
    throw error;
  });
  await terminal.closed;
  await leave();
  return 0;
}

async function drawOn(
  terminal: ReturnType<typeof openTerminal>,
  look: Look,
  worthShowing: Promise<unknown>,
  state: () => State,
  resized: (size: { readonly columns: number; readonly rows: number }) => void,
): Promise<Mounted> {
  // Ink comes with the screens: both are loaded once the terminal shows something.
  const { loadInk } = await import('../terminal/load-ink.js');
  await loadInk();
  const [{ Frame }, { screenLines }] = await Promise.all([import('./frame.js'), import('./screen-lines.js')]);
  await worthShowing;
  return mountOn(terminal, {
    colourLevel: look.colourLevel,
    element: (size) => {
      resized(size);
      return <Frame lines={screenLines(state(), look)} look={look} />;
    },
  });
}

function lookOf({ ascii, reader, color, environment }: InterfaceSetup): Look {
  const choice = color !== undefined && color in colourChoices ? (color as keyof typeof colourChoices) : undefined;
  const glyphs = glyphsFor(ascii, environment);
  return {
    glyphs,
    set: glyphs === asciiGlyphs ? 'ascii' : 'unicode',
    colourLevel: colourLevel({ choice, environment, isTerminal: true }),
    reader,
  };
}
