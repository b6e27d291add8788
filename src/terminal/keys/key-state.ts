/** What the key stream remembers between two reads. Plain data: nothing in it changes. */
export type KeyState =
  /** Between keys; `bytes` is the beginning of a UTF-8 character. */
  | { readonly mode: 'ground'; readonly bytes: readonly number[]; readonly escapedAtMs: number | null }
  /** After ESC; `bytes` is what came since. `late`: the ESC itself was given out as Escape already. */
  | { readonly mode: 'escape'; readonly bytes: readonly number[]; readonly sinceMs: number; readonly late: boolean }
  /** Inside a string sequence (a terminal's answer to somebody else's question), up to its end mark. */
  | { readonly mode: 'string'; readonly introducer: number; readonly length: number; readonly last: number; readonly sinceMs: number }
  /** Bytes that belong to a mouse report and mean nothing here. */
  | { readonly mode: 'skip'; readonly count: number; readonly sinceMs: number }
  /** Inside a bracketed paste; `tail` is the last six bytes, where the end mark shows. */
  | { readonly mode: 'paste'; readonly bytes: readonly number[]; readonly tail: string; readonly sinceMs: number };

/** Nothing read yet. */
export const noKeys: KeyState = { mode: 'ground', bytes: [], escapedAtMs: null };
