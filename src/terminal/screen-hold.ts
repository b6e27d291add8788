import { holdOutput } from './held-output.js';
import { enterScreen, leaveScreen } from './screen-modes.js';

/** Everything about a terminal that is changed while it is ours, and changed back. All of it is synchronous. */
export interface ScreenHold {
  readonly entered: () => boolean;
  /** Raw mode, alternate screen; other writers are kept waiting. */
  readonly enter: () => void;
  /** The screen is given back and what others wrote is shown. Raw mode stays on. */
  readonly leave: () => void;
  /** Raw mode off: the terminal is as it was found. */
  readonly cook: () => void;
  readonly write: (text: string, done?: () => void) => void;
  /** The other end is gone: nothing is written or set any more. */
  readonly lose: () => void;
}

/** Takes a terminal, not entered yet. */
export function holdScreen(input: NodeJS.ReadStream, output: NodeJS.WriteStream, errors: NodeJS.WriteStream): ScreenHold {
  const screen = holdOutput(output);
  const messages = errors.isTTY ? holdOutput(errors) : null;
  let entered = false;
  let raw = false;
  let lost = false;

  const setRaw = (on: boolean) => {
    if (raw === on || lost) return;
    raw = on;
    input.setRawMode(on);
  };
  const write = (text: string, done?: () => void) => {
    if (!lost) screen.write(text, done);
  };
  return {
    entered: () => entered,
    enter: () => {
      if (entered) return;
      entered = true;
      // The mode first: in the background it stops the process before anything is written over the shell's screen.
      setRaw(true);
      write(enterScreen);
      screen.hold();
      messages?.hold();
      input.resume();
    },
    leave: () => {
      if (!entered) return;
      entered = false;
      write(leaveScreen);
      screen.release(lost ? 'drop' : undefined);
      messages?.release(lost ? 'drop' : undefined);
    },
    cook: () => setRaw(false),
    write,
    lose: () => {
      lost = true;
    },
  };
}
