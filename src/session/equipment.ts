import { plainScanner, type Scanner } from '../calc/scanner.js';
import { cleanText } from '../study/clean-text.js';
import { coilNamed, type ScannerFile, scannerOf } from '../study/scanner-file.js';
import type { Study } from '../study/study.js';
import type { State } from './state.js';

/** What a session is done on: the scanner as the model takes it, and the nicknames for the record. No serial numbers. */
export interface Equipment {
  readonly scanner: Scanner;
  readonly scannerName: string;
  /** Empty where none is named. */
  readonly coilName: string;
}

/** A scanner file and one of its coils; no file is a plain scanner at the field of the preset. */
export interface ScannerChoice {
  readonly file: ScannerFile | null;
  /** Null where the file names no coil. */
  readonly coil: string | null;
}

export const plainChoice: ScannerChoice = { file: null, coil: null };

/** A scanner file with the coil of that name, or its first. */
export function choiceOf(file: ScannerFile, coil: string | null): ScannerChoice {
  return { file, coil: (coilNamed(file, coil) ?? coilNamed(file, null))?.name ?? null };
}

const plainName = (name: string) => name.trim().toLowerCase();

/** The scanner that the next session is begun on: as was chosen, else the file that has the name in the settings, else none. */
export function chosenScanner({ scannerChoice, scanners, defaults }: State): ScannerChoice {
  if (scannerChoice !== null) return scannerChoice;
  const own = scanners.find(({ name }) => plainName(name) === plainName(defaults.scannerName));
  return own === undefined ? plainChoice : choiceOf(own, defaults.coilName === '' ? null : defaults.coilName);
}

/** A chosen scanner in a few words. */
export function sayChoice({ file, coil }: ScannerChoice): string {
  if (file === null) return "no scanner file, the preset's field";
  return cleanText(`${file.name}, ${coil === null ? 'no coil named' : `coil ${coil}`}, ${file.fieldT} T`);
}

/** A chosen scanner as a session on a study has it. */
export function equipmentFor({ file, coil }: ScannerChoice, study: Study, { scannerName, coilName, pauses }: State['defaults']): Equipment {
  const scanner = file === null ? plainScanner(study.fieldT) : scannerOf(file, coil, study.region);
  return {
    scanner: pauses === undefined ? scanner : { ...scanner, pauses },
    scannerName: file === null ? scannerName : file.name,
    coilName: file === null ? coilName : (coil ?? ''),
  };
}

/** What the open session is done on; null without one. */
export function equipmentNow({ opened, session }: Pick<State, 'opened' | 'session'>): Equipment | null {
  if (opened === null) return null;
  return opened.others?.[(session?.equipment ?? 0) - 1] ?? opened;
}

/** The scanner of the open session as the model takes it. */
export function scannerNow(state: Pick<State, 'opened' | 'session'>): Scanner | null {
  return equipmentNow(state)?.scanner ?? null;
}

/** True where a scanner file is in use. */
export function isFromFile({ scanner }: Equipment): boolean {
  return scanner.name !== plainScanner(scanner.fieldT).name;
}

/** The scanner of a session in a few words, its field with it: `demo-3t, coil body, 2.894 T`. */
export function sayEquipment(equipment: Equipment): string {
  const { scanner, coilName } = equipment;
  if (!isFromFile(equipment)) return `no scanner file, ${scanner.fieldT} T`;
  return cleanText(`${scanner.name}, ${coilName === '' ? 'no coil named' : `coil ${coilName}`}, ${scanner.fieldT} T`);
}
