import { spawnSync } from 'node:child_process';

/** Runs dcmdump of DCMTK, which shares nothing with our reader; says what to do where it is missing. */
export function dcmdump(args: readonly string[]): { readonly out: string; readonly err: string; readonly exit: number | null } {
  const { stdout, stderr, status, error } = spawnSync('dcmdump', args, { encoding: 'latin1', maxBuffer: 512 * 1024 * 1024 });
  if (error !== undefined) throw new Error('dcmdump is not there: install it with `apt-get install dcmtk`');
  return { out: stdout, err: stderr, exit: status };
}
