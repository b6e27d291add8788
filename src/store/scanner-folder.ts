import { basename, dirname, join, resolve } from 'node:path';
import type { Problem } from '../calc/problem.js';
import { cleanText } from '../study/clean-text.js';
import { nearestWord } from '../study/nearest-word.js';
import { readScannerFile } from '../study/read-scanner-file.js';
import { type ScannerFile, scannerLimits } from '../study/scanner-file.js';
import type { Disk } from './disk.js';
import { problemOfError, refused, type Stored, type StoreProblem, storeProblem } from './problem-of-error.js';
import { readWhole } from './read-whole.js';

/** Whose scanners a folder holds; `file` is one that was named by its path. */
export type ScannerOrigin = 'site' | 'own' | 'shipped' | 'file';

export interface ScannerFolder {
  readonly origin: ScannerOrigin;
  readonly folder: string;
  /** True for a folder that a person named: that it is not there is a problem. */
  readonly mustExist: boolean;
}

/** A scanner file and where it came from. */
export interface StoredScanner {
  readonly file: ScannerFile;
  readonly path: string;
  readonly origin: ScannerOrigin;
}

export interface ScannerListing {
  /** By name; of one name in several folders the one that is taken comes first. */
  readonly scanners: readonly StoredScanner[];
  readonly problems: readonly StoreProblem[];
}

/**
 * The folders in the order in which they are asked: the site's (`HOLDFAST_SCANNERS`), `scanners` beside the settings of this user, and
 * `scanners` beside the presets that ship with the program.
 */
export function scannerFolders(site: string | null, settingsFolder: string, shippedPresets: string | null): ScannerFolder[] {
  return [
    ...(site === null ? [] : [{ origin: 'site', folder: site, mustExist: true } as const]),
    { origin: 'own', folder: join(settingsFolder, 'scanners'), mustExist: false },
    ...(shippedPresets === null
      ? []
      : [{ origin: 'shipped', folder: join(dirname(shippedPresets), 'scanners'), mustExist: false } as const]),
  ];
}

/** Reads every scanner file of the folders. */
export async function listScanners(disk: Disk, folders: readonly ScannerFolder[]): Promise<ScannerListing> {
  const scanners: StoredScanner[] = [];
  const problems: StoreProblem[] = [];
  for (const { origin, folder, mustExist } of folders) {
    const names = await disk.names(folder).catch((error: unknown) => {
      if (mustExist || (error as { code?: string }).code !== 'ENOENT')
        problems.push(problemOfError(error, 'read', 'the folder of scanners', folder));
      return [];
    });
    for (const name of names.filter((one) => one.endsWith('.json') && !one.startsWith('.'))) {
      const read = await readScannerPath(disk, join(folder, name), origin);
      if (read.ok) scanners.push(read.value);
      else problems.push(...read.problems);
    }
  }
  const place = ({ origin }: StoredScanner) => folders.findIndex((folder) => folder.origin === origin);
  scanners.sort((a, b) => compare(plainName(a.file.name), plainName(b.file.name)) || place(a) - place(b));
  return { scanners, problems };
}

/**
 * Finds a scanner by its name, upper and lower case alike, by the name of its file, or by a path. Exit code 66 when there is none, 65 when its
 * file is wrong.
 */
export async function findScanner(
  disk: Disk,
  folders: readonly ScannerFolder[],
  wanted: string,
  workingFolder: string,
): Promise<Stored<StoredScanner>> {
  const path = resolve(workingFolder, wanted);
  if (/[/\\]/.test(wanted)) return readScannerPath(disk, path, 'file');
  const { scanners, problems } = await listScanners(disk, folders);
  const missing = problems.find(({ exitCode }) => exitCode !== 65);
  if (missing !== undefined) return { ok: false, problems: [missing] };
  const name = plainName(wanted);
  const isNamed = (of: (scanner: StoredScanner) => string) =>
    folders.flatMap(({ origin }) => scanners.filter((one) => one.origin === origin && plainName(of(one)) === name))[0];
  const found = isNamed(({ file }) => file.name) ?? isNamed((one) => basename(one.path, '.json'));
  if (found !== undefined) return { ok: true, value: found };
  // A file of that name that cannot be read is what is wrong, not that there is none.
  const own = problems.filter(({ message }) => plainName(message).startsWith(`${name}.json`));
  if (own.length > 0) return { ok: false, problems: own };
  if ((await disk.facts(path).catch(() => null)) !== null) return readScannerPath(disk, path, 'file');
  const near = nearestWord(wanted, [...new Set(scanners.map(({ file }) => file.name))]);
  const hint = near === null ? 'holdfast scanner list shows the names; a path to a file serves too.' : `Did you mean ${near}?`;
  return refused(
    storeProblem('scanner-not-there', 66, wanted, `there is no scanner ${cleanText(wanted, 60)}, neither as a name nor as a file.`, hint),
  );
}

/** Reads one scanner file; everything wrong with it comes back as problems. */
export async function readScannerPath(disk: Disk, path: string, origin: ScannerOrigin): Promise<Stored<StoredScanner>> {
  const whole = await readWhole(disk, path, 'the scanner file', scannerLimits.bytes);
  if (!whole.ok) return whole;
  const read = readScannerFile(whole.value.text, basename(path));
  if (!read.ok) return { ok: false, problems: read.problems.map((problem: Problem) => ({ ...problem, exitCode: 65 })) };
  return { ok: true, value: { file: read.value, path, origin } };
}

function plainName(name: string): string {
  return name.trim().toLowerCase();
}

function compare(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
