import type { Refusal } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { ExitCode } from './exit-codes.js';

/** Says on standard error why a command stops, one line a problem, and answers its exit code. */
export function complain({ exit, problems }: Refusal, io: CommandIo): ExitCode {
  for (const { message, hint } of problems) io.complain(`holdfast: ${message} ${hint}\n`);
  return exit;
}
