import type { Problem } from '../calc/problem.js';
import { type ExitCode, exitCodes } from './exit-codes.js';

/** Why a command stops: what to say on standard error, and the exit code. */
export interface Refusal {
  readonly ok: false;
  readonly exit: ExitCode;
  readonly problems: readonly Problem[];
}

/** A value, or the reason why the command stops. */
export type Attempt<T> = { readonly ok: true; readonly value: T } | Refusal;

/** Stops for one reason. */
export function refuse(exit: ExitCode, problem: Problem): Refusal {
  return { ok: false, exit, problems: [problem] };
}

/** Stops because the command line is wrong: `path` is the option or argument. */
export function wrongUse(path: string, message: string, hint: string): Refusal {
  return refuse(exitCodes.wrongUse, { code: 'wrong-use', path, message, hint });
}
