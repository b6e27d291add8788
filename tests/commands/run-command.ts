import type { CommandIo } from '../../src/commands/command-io.js';
import { run } from '../../src/commands/run.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { shippedPresetsFolder } from '../../src/store/shipped-presets.js';

export interface Ran {
  readonly exit: number;
  readonly out: string;
  readonly err: string;
}

/** Runs a command line as the program does, with texts for its outputs and no terminal; the disk is real. */
export async function runCommand(args: readonly string[], changes: Partial<CommandIo> = {}): Promise<Ran> {
  let out = '';
  let err = '';
  const io: CommandIo = {
    write: (text) => {
      out += text;
    },
    complain: (text) => {
      err += text;
    },
    environment: {},
    canDraw: false,
    emphasis: () => (_kind, text) => text,
    disk: nodeDisk,
    homeFolder: '/nonexistent-home',
    workingFolder: process.cwd(),
    shippedPresets: () => shippedPresetsFolder(nodeDisk, import.meta.url),
    openInterface: null,
    ...changes,
  };
  const exit = await run(args, io);
  return { exit, out, err };
}
