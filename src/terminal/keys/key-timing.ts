/** How long the key stream waits, in ms. */
export interface KeyTiming {
  /** A lone ESC byte becomes the Escape key after this long. */
  readonly escapeMs: number;
  /** For this long after that, the rest of a sequence may still come in and is swallowed. */
  readonly tailMs: number;
  /** A sequence that has begun and does not end is given up after this long. */
  readonly sequenceMs: number;
  /** A paste whose end mark never comes is delivered after this long without a byte. */
  readonly pasteIdleMs: number;
}

/**
 * Waiting times for this line: 50 ms for a lone Escape, 150 ms over SSH, where one key press may arrive in two packets.
 *
 * @example keyTiming({ SSH_CONNECTION: '10.0.0.1 50000 10.0.0.2 22' }).escapeMs //=> 150
 */
export function keyTiming(environment: Readonly<Record<string, string | undefined>>, escapeMs?: number): KeyTiming {
  return {
    escapeMs: escapeMs ?? (environment.SSH_CONNECTION ? 150 : 50),
    tailMs: 1000,
    sequenceMs: 1000,
    pasteIdleMs: 5000,
  };
}
