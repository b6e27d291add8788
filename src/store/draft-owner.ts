import { join } from 'node:path';
import type { Disk } from './disk.js';
import type { Stored } from './problem-of-error.js';
import { readWhole } from './read-whole.js';
import type { ProgramMark, RunningPrograms } from './running-programs.js';
import { writeWhole } from './write-whole.js';

/** A program marks its draft as its own this often. */
export const heartbeatMs = 30_000;
/** A program on another machine that has been silent for so long is taken to be gone. */
const silenceMs = 10 * heartbeatMs;

const maximumOwnerBytes = 4096;

export function draftPath(folder: string, id: string): string {
  return join(folder, `draft-${id}.json`);
}

export function ownerPath(folder: string, id: string): string {
  return join(folder, `draft-${id}.owner`);
}

/** Marks a draft as this program's. */
export function writeOwner(disk: Disk, folder: string, id: string, self: ProgramMark, fileMode: number): Promise<Stored<void>> {
  return writeWhole(disk, ownerPath(folder, id), JSON.stringify(self), fileMode, "the draft's mark");
}

/** Whether nobody works on a draft any more: it was never marked, was let go, or its program has ended. */
export async function isForsaken(disk: Disk, folder: string, id: string, programs: RunningPrograms, nowMs: number): Promise<boolean> {
  const path = ownerPath(folder, id);
  const file = await readWhole(disk, path, "the draft's mark", maximumOwnerBytes);
  if (!file.ok) return file.problems[0]!.code === 'not-there';
  const mark = markOf(file.value.text);
  const running = mark === null ? null : programs.isRunning(mark);
  return running === null ? nowMs - file.value.facts.modifiedMs > silenceMs : !running;
}

function markOf(text: string): ProgramMark | null {
  try {
    const { machine, processNumber, started } = JSON.parse(text) as Partial<ProgramMark>;
    const isMark = typeof machine === 'string' && Number.isInteger(processNumber) && (started === null || typeof started === 'string');
    return isMark ? { machine, processNumber: processNumber!, started } : null;
  } catch {
    return null;
  }
}
