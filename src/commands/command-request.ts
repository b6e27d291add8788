/** A command line, read: its arguments and options, every option checked against the table. */
export interface CommandRequest {
  readonly arguments: readonly string[];
  /** True when the switch was given. */
  readonly has: (option: string) => boolean;
  /** The value of an option; of several the last one. */
  readonly value: (option: string) => string | undefined;
  /** All values of an option that repeats, in order. */
  readonly values: (option: string) => readonly string[];
}
