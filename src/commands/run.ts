import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { exitCodes } from './exit-codes.js';
import { readCommandLine } from './read-command-line.js';

/**
 * Runs a command line and answers its exit code. Code is loaded for what was asked and nothing else.
 *
 * @param args The words after the program's name.
 */
export async function run(args: readonly string[], io: CommandIo): Promise<number> {
  const line = readCommandLine(args);
  if (!line.ok) return complain(line, io);
  switch (line.value.kind) {
    case 'version': {
      const { toolVersion } = await import('../study/tool-version.js');
      const { modelVersion } = await import('../calc/model-version.js');
      io.write(`holdfast ${toolVersion}, model ${modelVersion}\n`);
      return exitCodes.done;
    }
    case 'help': {
      const { commandHelp, groupHelp, programHelp } = await import('./help.js');
      const { command, group } = line.value;
      io.write(command !== null ? commandHelp(command) : group !== null ? groupHelp(group) : programHelp());
      return exitCodes.done;
    }
    case 'command':
      return (await line.value.command.load())(line.value.request, io);
    case 'interface': {
      const { request } = line.value;
      if (!io.canDraw || io.openInterface === null) return (await import('./demo.js')).runDemo(request, io);
      const scanner = await beginOn(request, io);
      if (!scanner.ok) return complain(scanner, io);
      return io.openInterface({
        scanner: scanner.value,
        presets: request.value('presets'),
        records: request.value('records'),
        ascii: request.has('ascii'),
        reader: request.has('reader'),
        color: request.value('color'),
      });
    }
  }
}

/** The scanner that was named for the interface; nothing is loaded where none was. */
async function beginOn(request: CommandRequest, io: CommandIo): ReturnType<typeof import('./choose-scanner.js')['scannerToBeginOn']> {
  if (!request.has('scanner') && !request.has('coil')) return { ok: true, value: null };
  return (await import('./choose-scanner.js')).scannerToBeginOn(request, io);
}
