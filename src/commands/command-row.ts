import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import type { ExitCode } from './exit-codes.js';

/** One option of a command. */
export interface OptionRow {
  readonly name: string;
  /** What stands after it in the usage line; null for a switch. */
  readonly value: string | null;
  /** May be given more than once. */
  readonly repeats?: true;
  /** The only values it takes. */
  readonly choices?: readonly string[];
  readonly help: string;
}

/** One word of a command that is no option. */
export interface ArgumentRow {
  readonly name: string;
  readonly required: boolean;
  /** Takes all words that are left. */
  readonly repeats?: true;
}

/** One command: help, usage, suggestions and parsing follow from this row. */
export interface CommandRow {
  /** The words that call it, `presets list` as two. */
  readonly words: readonly string[];
  readonly summary: string;
  readonly details: readonly string[];
  readonly arguments: readonly ArgumentRow[];
  readonly options: readonly OptionRow[];
  readonly examples: readonly string[];
  /** Loads the code of the command, and nothing before it is called. */
  readonly load: () => Promise<(request: CommandRequest, io: CommandIo) => Promise<ExitCode>>;
}
