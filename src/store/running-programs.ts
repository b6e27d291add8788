import { readFileSync, readlinkSync } from 'node:fs';
import { hostname } from 'node:os';

/** Which running program something belongs to. */
export interface ProgramMark {
  /** Machine and, where there is one, the space its process numbers belong to. */
  readonly machine: string;
  readonly processNumber: number;
  /** When the process started, as the system counts it; null where the system does not say. Tells a process from a later one of its number. */
  readonly started: string | null;
}

/** What is known of running programs; tests put an invented one in its place. */
export interface RunningPrograms {
  readonly self: ProgramMark;
  /** Whether a program still runs; null where only its own machine could tell. */
  isRunning(mark: ProgramMark): boolean | null;
}

/** The programs of this machine. */
export function runningPrograms(): RunningPrograms {
  const machine = `${hostname()} ${processSpace()}`;
  return {
    self: { machine, processNumber: process.pid, started: startOf(process.pid) },
    isRunning: (mark) => {
      if (mark.machine !== machine) return null;
      if (!processExists(mark.processNumber)) return false;
      return mark.started === null || mark.started === startOf(mark.processNumber);
    },
  };
}

function processExists(processNumber: number): boolean {
  try {
    process.kill(processNumber, 0);
    return true;
  } catch (error) {
    // A process of another user exists as well.
    return (error as { code?: string }).code === 'EPERM';
  }
}

/** Linux: processes of two containers may have the same number (proc(5), `ns/pid`). */
function processSpace(): string {
  try {
    return readlinkSync('/proc/self/ns/pid');
  } catch {
    return '';
  }
}

/** Linux: the boot, and the ticks from boot to the start of the process (proc(5), field 22 of `stat`). */
function startOf(processNumber: number): string | null {
  try {
    const boot = readFileSync('/proc/sys/kernel/random/boot_id', 'utf8').trim();
    const stat = readFileSync(`/proc/${processNumber}/stat`, 'utf8');
    // The second field is the name in parentheses and may hold blanks: the third field follows the last parenthesis.
    return `${boot} ${stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19]}`;
  } catch {
    return null;
  }
}
