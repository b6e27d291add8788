import type { Disk, OpenFile } from '../../src/store/disk.js';
import { nodeDisk } from '../../src/store/node-disk.js';

export type Step = keyof Disk | `file.${keyof OpenFile}`;

/** Which step fails, how, and from which call of it on (1 is the first). */
export interface Fault {
  readonly step: Step;
  readonly code: string;
  readonly call?: number;
  /** For `file.write`: so many bytes reach the disk first; without `code` the write then ends short instead of failing. */
  readonly tornAfter?: number;
}

/** A disk on which one step fails from a given call on, and a list of the steps taken. */
export function faultyDisk(fault: Fault | null, real: Disk = nodeDisk): { disk: Disk; steps: Step[] } {
  const steps: Step[] = [];

  function meets(step: Step): boolean {
    steps.push(step);
    return fault !== null && fault.step === step && steps.filter((taken) => taken === step).length >= (fault.call ?? 1);
  }

  async function pass<T>(step: Step, act: () => Promise<T>): Promise<T> {
    if (meets(step)) throw Object.assign(new Error(`${fault!.code}: invented fault`), { code: fault!.code });
    return act();
  }

  function faultyFile(file: OpenFile): OpenFile {
    return {
      read: (into, position) => pass('file.read', () => file.read(into, position)),
      write: async (bytes) => {
        if (!meets('file.write')) return file.write(bytes);
        const written = fault!.tornAfter === undefined ? 0 : await file.write(bytes.subarray(0, fault!.tornAfter));
        if (fault!.code === '') return written;
        throw Object.assign(new Error(`${fault!.code}: invented fault`), { code: fault!.code });
      },
      sync: () => pass('file.sync', () => file.sync()),
      facts: () => pass('file.facts', () => file.facts()),
      setMode: (mode) => pass('file.setMode', () => file.setMode(mode)),
      close: async () => {
        await file.close();
        await pass('file.close', async () => {});
      },
    };
  }

  const disk: Disk = {
    facts: (path) => pass('facts', () => real.facts(path)),
    names: (folder) => pass('names', () => real.names(folder)),
    entries: (folder) => pass('entries', () => real.entries(folder)),
    open: async (path, how, mode) => faultyFile(await pass('open', () => real.open(path, how, mode))),
    makeFolder: (path, mode) => pass('makeFolder', () => real.makeFolder(path, mode)),
    setMode: (path, mode) => pass('setMode', () => real.setMode(path, mode)),
    rename: (from, to) => pass('rename', () => real.rename(from, to)),
    link: (from, to) => pass('link', () => real.link(from, to)),
    remove: (path) => pass('remove', () => real.remove(path)),
    touch: (path) => pass('touch', () => real.touch(path)),
    syncFolder: (path) => pass('syncFolder', () => real.syncFolder(path)),
  };
  return { disk, steps };
}
