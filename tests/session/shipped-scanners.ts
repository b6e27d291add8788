import { readFileSync } from 'node:fs';
import { scannerRows } from '../../src/session/scanner-list.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { readScannerFile } from '../../src/study/read-scanner-file.js';
import type { ScannerFile } from '../../src/study/scanner-file.js';
import { press, startState } from './invented-state.js';

/** A scanner file that ships. */
function shippedScanner(name: string): ScannerFile {
  const read = readScannerFile(readFileSync(new URL(`../../scanners/${name}.json`, import.meta.url), 'utf8'), `${name}.json`);
  if (!read.ok) throw new Error(read.problems[0]?.message);
  return read.value;
}

export const shippedScanners: readonly ScannerFile[] = [shippedScanner('demo-1.5t'), shippedScanner('demo-3t')];

/** The start screen with some presets and the shipped scanners. */
export function startWithScanners(ids: readonly string[] = ['liver-3t']): State {
  return update(startState(ids), { kind: 'scanners', scanners: shippedScanners, notes: [] })[0];
}

/** The list of scanners, opened from where it is, with the hand on one of them: `demo-3t body`. */
export function atScanner(state: State, field: string): State {
  const list = press(state, 'tab');
  const at = scannerRows(list).findIndex((row) => row.field === field);
  return press(list, 'home', ...Array<string>(at).fill('down'));
}
