/** A reading of a folder, and what became of it. */
export interface HeaderReading {
  readonly ended: 'no' | 'stopped' | 'replaced';
}

/** The reading that runs in a world. */
const running = new WeakMap<object, { ended: HeaderReading['ended'] }>();

/** A reading begins: one before it ends and answers nobody. */
export function beginHeaders(world: object): HeaderReading {
  const before = running.get(world);
  if (before !== undefined) before.ended = 'replaced';
  const now = { ended: 'no' as const };
  running.set(world, now);
  return now;
}

/** Ends the reading that runs; it answers with what it has. */
export function stopHeaders(world: object): void {
  const now = running.get(world);
  if (now?.ended === 'no') now.ended = 'stopped';
}
