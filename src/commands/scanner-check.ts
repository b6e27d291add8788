import { resolve } from 'node:path';
import type { StoreProblem } from '../store/problem-of-error.js';
import { findScanner, listScanners, readScannerPath, type StoredScanner } from '../store/scanner-folder.js';
import { cleanText } from '../study/clean-text.js';
import { foldersOfScanners } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';

/**
 * `holdfast scanner check`: one line for each file that is right on standard output, every problem of the others on standard error.
 * Exit code 1 when a file is wrong, 66 when a named file is not there.
 */
export async function runScannerCheck(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const folders = await foldersOfScanners(io);
  const right: string[] = [];
  const problems: StoreProblem[] = [];
  if (request.arguments.length === 0) {
    const listing = await listScanners(io.disk, folders);
    right.push(...listing.scanners.map((scanner) => `${scanner.path}: ${about(scanner)}`));
    problems.push(...listing.problems);
  }
  for (const name of request.arguments) {
    const path = resolve(io.workingFolder, name);
    const isThere = (await io.disk.facts(path).catch(() => null)) !== null;
    const read = isThere ? await readScannerPath(io.disk, path, 'file') : await findScanner(io.disk, folders, name, io.workingFolder);
    if (read.ok) right.push(`${name}: ${about(read.value)}`);
    else problems.push(...read.problems);
  }
  const page = pageOf(request, io);
  for (const line of right) io.write(page.plain(`right  ${cleanText(line)}\n`));
  if (problems.length === 0) return exitCodes.done;
  complain(refusedByStore(problems), io);
  return problems.some(({ exitCode }) => exitCode === exitCodes.noInput) ? exitCodes.noInput : exitCodes.failed;
}

function about({ file }: StoredScanner): string {
  const count = file.coils?.length ?? 0;
  return `${file.name}, ${file.fieldT} T, ${count} ${count === 1 ? 'coil' : 'coils'}`;
}
