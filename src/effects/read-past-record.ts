import type { Answer, Effect } from '../session/message.js';
import { recordAtLine } from '../store/record-at-line.js';
import type { InterfaceWorld } from './interface-world.js';
import { beginReading, shareTeller } from './record-reading.js';

/** One record by its file and line. Null where another reading took its place. */
export async function readPastRecord(
  world: InterfaceWorld,
  { ask, file, line }: Extract<Effect, { kind: 'read-record' }>,
): Promise<Answer | null> {
  const now = beginReading(world);
  const read = await recordAtLine(world.disk, file, line, { onProgress: shareTeller(world, ask), goOn: () => now.ended === 'no' });
  if (now.ended === 'replaced') return null;
  return read.ok ? { kind: 'one-record', record: read.value } : { kind: 'failed', problems: read.problems };
}
