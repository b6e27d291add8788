/** The program: joins the rooms, and answers with an exit code. Nothing of the interface is loaded before it is asked for. */
import { homedir } from 'node:os';
import type { CommandIo, InterfaceOptions } from './commands/command-io.js';
import { emphasise } from './commands/emphasis.js';
import { run } from './commands/run.js';
import { nodeDisk } from './store/node-disk.js';
import { shippedPresetsFolder } from './store/shipped-presets.js';
import { canDraw } from './terminal/can-draw.js';
import { colourChoices, colourLevel } from './terminal/colour-level.js';

/** A reader that went away (`| head`) is no fault: what it did not want is not said. */
function leaveQuietlyOnBrokenPipe(error: NodeJS.ErrnoException): void {
  if (error.code === 'EPIPE') process.exit(0);
  process.exit(74);
}

const io: CommandIo = {
  write: (text) => void process.stdout.write(text),
  complain: (text) => void process.stderr.write(text),
  environment: process.env,
  canDraw: canDraw(process.stdin, process.stdout, process.env),
  emphasis: (choice) => {
    const known = choice !== undefined && choice in colourChoices ? (choice as keyof typeof colourChoices) : undefined;
    return emphasise(colourLevel({ choice: known, environment: process.env, isTerminal: process.stdout.isTTY === true }) > 0);
  },
  outputIsSeen: process.stdout.isTTY === true,
  ...(process.stderr.isTTY ? { progress: (text: string) => void process.stderr.write(`\r\u001b[K${text}`) } : {}),
  disk: nodeDisk,
  homeFolder: homedir(),
  workingFolder: process.cwd(),
  shippedPresets: () => shippedPresetsFolder(nodeDisk, import.meta.url),
  openInterface: openOnTerminal,
};

/** Opens the interface on files, settings and drafts of this user. */
async function openOnTerminal(options: InterfaceOptions): Promise<number> {
  const [{ openInterface }, { openWorld }] = await Promise.all([import('./screens/open-interface.js'), import('./effects/open-world.js')]);
  const { disk, environment, homeFolder, workingFolder } = io;
  const { presets, records, scanner } = options;
  const world = await openWorld({
    disk,
    environment,
    homeFolder,
    workingFolder,
    shippedPresets: await io.shippedPresets(),
    presets,
    records,
    scanner,
    programUrl: import.meta.url,
  });
  return openInterface({
    ...world,
    defaults: { ...world.defaults, reader: options.reader || world.reader },
    environment,
    ascii: options.ascii || world.ascii,
    reader: options.reader || world.reader,
    color: options.color ?? world.color,
  });
}

process.stdout.on('error', leaveQuietlyOnBrokenPipe);
process.stderr.on('error', leaveQuietlyOnBrokenPipe);

async function main(): Promise<void> {
  try {
    // Not process.exit: what is still on its way to a pipe must arrive.
    process.exitCode = await run(process.argv.slice(2), io);
  } catch (error) {
    process.stderr.write(
      `holdfast: a fault of the program itself: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`,
    );
    process.exitCode = 70;
  }
}

void main();
