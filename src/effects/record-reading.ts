import type { ReadCounts } from '../session/shelf.js';
import { recordFilesAt } from '../store/record-files.js';
import { readRecords } from '../store/record-reader.js';
import { cleanText } from '../study/clean-text.js';
import type { SessionRecord } from '../study/record.js';
import { isMeantRecord, type NamedRecord, namedRecord } from '../study/record-meant.js';
import type { InterfaceWorld } from './interface-world.js';

/** How long a reading runs before its progress is said, and how often then, ms. */
const quietMs = 200;
const everyMs = 100;
/** Damaged lines that are named. */
const mostNamed = 3;

/** The reading that runs in a world: a new one ends it. */
const running = new WeakMap<object, { ended: 'no' | 'stopped' | 'replaced' }>();

/** Ends the reading that runs; it answers with what it has. */
export function stopReading(world: InterfaceWorld): void {
  const now = running.get(world);
  if (now?.ended === 'no') now.ended = 'stopped';
}

/** A reading begins: the one before ends and answers nobody. */
export function beginReading(world: InterfaceWorld): { ended: 'no' | 'stopped' | 'replaced' } {
  const before = running.get(world);
  if (before !== undefined) before.ended = 'replaced';
  const now = { ended: 'no' as const };
  running.set(world, now);
  return now;
}

/** The files of this user's records; none where nobody recorded yet. What cannot be looked at is read all the same, and says so then. */
export async function ownRecordFiles({ disk, folders }: InterfaceWorld): Promise<readonly string[]> {
  const path = folders.recordsFile;
  return recordFilesAt(disk, path).catch((error: unknown) => ((error as { code?: string }).code === 'ENOENT' ? [] : [path]));
}

/** Says how far something is: from a while after its beginning on, and not with every piece. */
export function shareTeller(world: InterfaceWorld, ask: number): (done: number, whole: number) => void {
  let toldMs = performance.now() + quietMs - everyMs;
  return (done, whole) => {
    const nowMs = performance.now();
    if (nowMs - toldMs < everyMs) return;
    toldMs = nowMs;
    world.tell({ kind: 'progress', ask, share: whole === 0 ? 0 : Math.min(1, done / whole) });
  };
}

/**
 * Reads the records of this user that are meant by what was typed, piece by piece: keys go on between two pieces. Null where another
 * reading took its place.
 */
export async function readMeant(
  world: InterfaceWorld,
  ask: number,
  typed: string,
  onRecord: (record: SessionRecord, named: NamedRecord, file: string, line: number) => void,
): Promise<ReadCounts | null> {
  const now = beginReading(world);
  const files = await ownRecordFiles(world);
  const notes: string[] = [];
  let [records, meant, damaged] = [0, 0, 0];
  for await (const entry of readRecords(world.disk, files, { onProgress: shareTeller(world, ask) })) {
    if (now.ended !== 'no') break;
    if (entry.kind === 'record') {
      records += 1;
      const named = namedRecord(entry.record);
      if (!isMeantRecord(named, typed)) continue;
      meant += 1;
      onRecord(entry.record, named, entry.file, entry.line);
    } else if (entry.kind === 'damaged') {
      damaged += 1;
      if (damaged <= mostNamed) notes.push(cleanText(entry.problem.message));
    } else notes.push(`${entry.problem.message} ${entry.problem.hint}`);
  }
  return now.ended === 'replaced' ? null : { records, meant, damaged, stopped: now.ended === 'stopped', notes };
}
