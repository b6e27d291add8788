import type { Key } from './keys/key.js';
import type { LeaveReason } from './leave-reason.js';

/** How a terminal is set up, and whom it tells what. */
export interface TerminalOptions {
  /** One key at a time, never Ctrl-C, Ctrl-\ and Ctrl-Z: those are dealt with here. */
  readonly onKey: (key: Key) => void;
  /** Called once, before anything else happens, whichever way out is taken. Save here; a promise is waited for, two seconds at most. */
  readonly onLeave?: (reason: LeaveReason) => void | Promise<void>;
  /** Called before Ctrl-Z, or SIGTSTP, stops the process. Save here, synchronously. */
  readonly onSuspend?: () => void;
  /** Shown at once, before anything slow is loaded: lines joined by `\n`. */
  readonly firstFrame?: string;
  /** Paces frames by the terminal's own answers. True unless told otherwise. */
  readonly paced?: boolean;
  /** Wait for the rest of a sequence after ESC, in ms. 50 unless told otherwise, 150 over SSH. */
  readonly escapeMs?: number;
  /** Standard input, output and error unless told otherwise. The first two are terminals: see `canDraw`. */
  readonly input?: NodeJS.ReadStream;
  readonly output?: NodeJS.WriteStream;
  readonly errors?: NodeJS.WriteStream;
  readonly environment?: Readonly<Record<string, string | undefined>>;
}
