import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { spawn } from '@lydell/node-pty';

/** What a person does first, and what is then on the screen. */
const way: readonly (readonly [string, string])[] = [
  ['0.55 T', '3 liver'],
  ['3 liver', '\r'],
  ['Running order', '\r'],
  ['Series ', '+'],
  ['1 changed', '-'],
  ['as the preset', 'q'],
];
const longestMs = 60_000;
const esc = '\u001b';
const statusQuery = new RegExp(`${esc}\\[5n`, 'g');
const controlSequence = new RegExp(`${esc}\\[[0-9;?]*[ -/]*[@-~]`, 'g');

/**
 * Walks the program from its start to the series screen in a pseudo-terminal and writes a file beside it: the code that V8
 * compiled on the way. Without it the program starts slower and does the same, so a walk that fails is said and ends nothing.
 */
export async function writeCodeCache(root: string, name: string): Promise<void> {
  const target = `${root}dist/${name}.cache`;
  // The same program has the same code.
  if (existsSync(target)) return;
  const home = mkdtempSync(join(tmpdir(), 'holdfast-code-'));
  try {
    await walk([`${root}scripts/launch-and-keep-code.mjs`, `${root}dist/${name}.cjs`, target], home);
  } finally {
    rmSync(home, { recursive: true, force: true });
  }
  if (!existsSync(target)) console.error('The compiled code could not be kept: the program will start slower, and do the same.');
}

function walk(args: readonly string[], home: string): Promise<void> {
  return new Promise((resolve) => {
    const env = { PATH: process.env.PATH ?? '', HOME: home, TERM: 'xterm-256color', LANG: 'C.UTF-8', COLORTERM: 'truecolor' };
    const program = spawn(process.execPath, [...args], { name: 'xterm-256color', cols: 100, rows: 30, env });
    const tooLong = setTimeout(() => program.kill('SIGKILL'), longestMs);
    let seen = '';
    let at = 0;
    program.onData((data) => {
      // Status queries are answered, as a terminal does.
      for (const _ of data.matchAll(statusQuery)) program.write(`${esc}[0n`);
      seen += data.replaceAll(controlSequence, ' ');
      const step = way[at];
      if (step === undefined || !seen.includes(step[0])) return;
      at += 1;
      seen = '';
      program.write(step[1]);
    });
    program.onExit(() => {
      clearTimeout(tooLong);
      resolve();
    });
  });
}
