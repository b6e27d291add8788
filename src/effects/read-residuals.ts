import type { Answer, Effect } from '../session/message.js';
import { readRecords } from '../store/record-reader.js';
import { plainScannerName, ReadingCounts } from '../study/readings-report.js';
import type { InterfaceWorld } from './interface-world.js';
import { ownRecordFiles } from './record-reading.js';

/** The reading that runs in a world: a new one ends it. */
const running = new WeakMap<object, { replaced: boolean }>();

/**
 * How far predictions have been off on one scanner, by the records of this user. They are read piece by piece, and keys go on between
 * two pieces; a list or a report that is read meanwhile goes its own way. Null where another scanner was asked for since.
 */
export async function readResiduals(
  world: InterfaceWorld,
  { scanner }: Extract<Effect, { kind: 'read-residuals' }>,
): Promise<Answer | null> {
  const before = running.get(world);
  if (before !== undefined) before.replaced = true;
  const now = { replaced: false };
  running.set(world, now);
  const wanted = plainScannerName(scanner);
  const counts = new ReadingCounts();
  for await (const entry of readRecords(world.disk, await ownRecordFiles(world))) {
    if (now.replaced) return null;
    // What is damaged or cannot be read is told where records are listed.
    if (entry.kind === 'record' && plainScannerName(entry.record.scanner) === wanted) counts.add(entry.record);
  }
  return now.replaced ? null : { kind: 'residuals', classes: counts.report().scanners[0]?.classes ?? [] };
}
