import { plainScanner, type Scanner } from '../calc/scanner.js';
import { foldersOf } from '../store/folders.js';
import { findScanner, type ScannerFolder, scannerFolders } from '../store/scanner-folder.js';
import { cleanText } from '../study/clean-text.js';
import { nearestWord } from '../study/nearest-word.js';
import { coilNamed, type ScannerFile, scannerOf } from '../study/scanner-file.js';
import type { Study } from '../study/study.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { refusedByStore } from './load-preset.js';

/** The folders that scanner files are looked for in, in their order. */
export async function foldersOfScanners(io: CommandIo): Promise<ScannerFolder[]> {
  const { environment, homeFolder, workingFolder } = io;
  const { settingsFolder, siteScannersFolder } = foldersOf({ environment, homeFolder, workingFolder });
  return scannerFolders(siteScannersFolder, settingsFolder, await io.shippedPresets());
}

/** Name of a coil of a scanner, or null for the first; refused where the scanner has none of that name. */
export function readCoil(wanted: string | undefined, file: ScannerFile): Attempt<string | null> {
  if (wanted === undefined || coilNamed(file, wanted) !== null) return { ok: true, value: wanted ?? null };
  const names = (file.coils ?? []).map(({ name }) => name);
  const near = nearestWord(wanted, names);
  const hint =
    names.length === 0 ? 'Its file names no coils.' : near === null ? `Its coils: ${names.join(', ')}.` : `Did you mean ${near}?`;
  return wrongUse('--coil', `Scanner ${file.name} has no coil "${cleanText(wanted, 40)}".`, hint);
}

/** A scanner that was chosen for a study: its file, or null where none was named. */
export interface ChosenScanner {
  readonly scanner: Scanner;
  readonly file: ScannerFile | null;
}

/**
 * The scanner that `--scanner` and `--coil` name for a study; without them a plain one at `fieldT`. Of a coil's g table the rows of the study's
 * region count, and those of any region.
 */
export async function chooseScanner(request: CommandRequest, io: CommandIo, study: Study, fieldT: number): Promise<Attempt<ChosenScanner>> {
  const wanted = request.value('scanner');
  if (wanted === undefined) {
    if (request.has('coil')) return coilAlone;
    return { ok: true, value: { scanner: plainScanner(fieldT), file: null } };
  }
  if (request.has('field'))
    return wrongUse('--field', '--field and --scanner both say the field.', 'Leave --field away: the scanner file has its own.');
  const named = await namedScanner(wanted, request, io);
  if (!named.ok) return named;
  const { file, coil } = named.value;
  return { ok: true, value: { scanner: scannerOf(file, coil, study.region), file } };
}

async function namedScanner(wanted: string, request: CommandRequest, io: CommandIo): Promise<Attempt<NamedScanner>> {
  const found = await findScanner(io.disk, await foldersOfScanners(io), wanted, io.workingFolder);
  if (!found.ok) return refusedByStore(found.problems);
  const { file } = found.value;
  const coil = readCoil(request.value('coil'), file);
  return coil.ok ? { ok: true, value: { file, coil: coil.value } } : coil;
}

/** A scanner file and the coil that was named with it; null takes its first. */
interface NamedScanner {
  readonly file: ScannerFile;
  readonly coil: string | null;
}

/** The scanner that `--scanner` and `--coil` name for sessions that are begun, with the coil's own name; null where neither is given. */
export async function scannerToBeginOn(request: CommandRequest, io: CommandIo): Promise<Attempt<NamedScanner | null>> {
  const wanted = request.value('scanner');
  if (wanted !== undefined) {
    const named = await namedScanner(wanted, request, io);
    if (!named.ok) return named;
    const { file, coil } = named.value;
    return { ok: true, value: { file, coil: coilNamed(file, coil)?.name ?? null } };
  }
  if (request.has('coil')) return coilAlone;
  return { ok: true, value: null };
}

const coilAlone = wrongUse('--coil', '--coil names a coil of a scanner file.', 'Add --scanner NAME.');

/** The scanner in one line, for the head of a page. */
export function scannerLine({ scanner }: ChosenScanner, request: CommandRequest): string {
  const coil =
    scanner.coil === null
      ? 'the usual g table, its file names no coil'
      : `coil ${scanner.coil.name}${request.has('coil') ? '' : ', the first of its file'}`;
  return cleanText(`On scanner ${scanner.name}, ${coil}.`);
}
