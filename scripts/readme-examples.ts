import type { CommandIo } from '../src/commands/command-io.js';
import { run } from '../src/commands/run.js';
import { nodeDisk } from '../src/store/node-disk.js';
import { shippedPresetsFolder } from '../src/store/shipped-presets.js';
import { screenAfter } from './readme-screen.js';

/** A block of the README: a command line after `$`, and what it prints. */
const example = /```console\n\$ (.*)\n([\s\S]*?)```/g;

/** A block that shows a screen: its size, the preset, the keys that lead there. */
const screen = /```text screen (\d+)x(\d+) ([\w.-]+): (.*)\n([\s\S]*?)```/g;

/** The output of `holdfast ...`, `| head -N`, `| tail -N` included; standard output alone, without colour and without a terminal. */
async function outputOf(commandLine: string): Promise<string> {
  const [command = '', ...filters] = commandLine.split(' | ');
  const [program, ...args] = (command.match(/"[^"]*"|\S+/g) ?? []).map((word) => word.replace(/^"|"$/g, ''));
  if (program !== 'holdfast') throw new Error(`an example that is no command of ours: ${commandLine}`);
  let out = '';
  const io: CommandIo = {
    write: (text) => {
      out += text;
    },
    complain: () => {},
    environment: {},
    canDraw: false,
    emphasis: () => (_kind, text) => text,
    disk: nodeDisk,
    homeFolder: '/nonexistent-home',
    workingFolder: process.cwd(),
    shippedPresets: () => shippedPresetsFolder(nodeDisk, import.meta.url),
    openInterface: null,
  };
  await run(args, io);
  return filters.reduce(filtered, out);
}

function filtered(text: string, filter: string): string {
  const [, which, count] = /^(head|tail) -(\d+)$/.exec(filter) ?? [];
  if (which === undefined) throw new Error(`only head -N and tail -N are known, not ${filter}`);
  const lines = text.replace(/\n$/, '').split('\n');
  const kept = which === 'head' ? lines.slice(0, Number(count)) : lines.slice(-Number(count));
  return `${kept.join('\n')}\n`;
}

/** The text with the output of every example as the program prints it now. */
export async function withFreshExamples(text: string): Promise<string> {
  let fresh = text;
  for (const [block, commandLine = ''] of text.matchAll(example)) {
    const output = await outputOf(commandLine);
    fresh = fresh.replace(block, () => `\`\`\`console\n$ ${commandLine}\n${output}\`\`\``);
  }
  for (const [block, columns, rows, presetId = '', keys = ''] of text.matchAll(screen)) {
    const shown = await screenAfter(Number(columns), Number(rows), presetId, keys);
    fresh = fresh.replace(block, () => `\`\`\`text screen ${columns}x${rows} ${presetId}: ${keys}\n${shown}\`\`\``);
  }
  return fresh;
}
