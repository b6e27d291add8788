import { type ChildProcess, spawn } from 'node:child_process';
import { join } from 'node:path';
import { build } from 'esbuild';

/** A program of a few lines, bundled with what it imports, to be run in processes of its own. */
export async function bundledProgram(folder: string, source: string): Promise<string> {
  const outfile = join(folder, `program-${Math.random().toString(36).slice(2)}.mjs`);
  await build({
    stdin: { contents: source, resolveDir: import.meta.dirname, loader: 'ts' },
    bundle: true,
    platform: 'node',
    format: 'esm',
    outfile,
    logLevel: 'error',
  });
  return outfile;
}

export interface Ended {
  readonly code: number | null;
  readonly output: string;
}

/** Starts a bundled program; `ended` resolves when it has left, with what it printed. */
export function start(
  program: string,
  args: readonly string[],
): { child: ChildProcess; ended: Promise<Ended>; firstLine: Promise<string> } {
  const child = spawn(process.execPath, [program, ...args], { stdio: ['ignore', 'pipe', 'inherit'] });
  let output = '';
  let tellFirstLine: (line: string) => void = () => {};
  const firstLine = new Promise<string>((resolve) => {
    tellFirstLine = resolve;
  });
  child.stdout.on('data', (data: Buffer) => {
    output += data.toString();
    if (output.includes('\n')) tellFirstLine(output.slice(0, output.indexOf('\n')));
  });
  const ended = new Promise<Ended>((resolve) => child.on('close', (code) => resolve({ code, output })));
  return { child, ended, firstLine };
}
