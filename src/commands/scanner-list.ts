import { textTable } from '../session/text-table.js';
import { listScanners, type StoredScanner } from '../store/scanner-folder.js';
import { cleanText } from '../study/clean-text.js';
import { foldersOfScanners } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';

const originWords: Readonly<Record<StoredScanner['origin'], string>> = { site: 'site', own: 'settings', shipped: 'shipped', file: 'file' };

/** `holdfast scanner list`: what can be named. Files that are wrong are told on standard error and do not stop the others. */
export async function runScannerList(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const { scanners, problems } = await listScanners(io.disk, await foldersOfScanners(io));
  const missing = problems.find(({ exitCode }) => exitCode !== exitCodes.badData);
  if (missing !== undefined) return complain(refusedByStore([missing]), io);
  if (problems.length > 0) complain(refusedByStore(problems), io);
  if (request.has('json')) {
    io.write(
      `${JSON.stringify({ scanners: scanners.map(({ file, origin, path }) => ({ name: file.name, fieldT: file.fieldT, coils: coilsOf(file), origin, path })) }, null, 2)}\n`,
    );
    return exitCodes.done;
  }
  const page = pageOf(request, io);
  const columns = [
    { title: 'scanner', align: 'left' },
    { title: 'field', align: 'point' },
    { title: 'from', align: 'left' },
    { title: 'coils', align: 'left' },
  ] as const;
  const rows = scanners.map(({ file, origin }) => [
    cleanText(file.name),
    `${file.fieldT} T`,
    originWords[origin],
    cleanText(coilsOf(file).join(', ')),
  ]);
  io.write(page.plain(`${textTable(columns, rows, page.reader).join('\n')}\n`));
  return exitCodes.done;
}

function coilsOf({ coils = [] }: StoredScanner['file']): string[] {
  return coils.map(({ name }) => name);
}
