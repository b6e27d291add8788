import { validate } from '../../build/validate-scanner.js';
import type { Outcome } from '../calc/problem.js';
import { same } from '../calc/rounding.js';
import { pulseNames } from '../calc/scanner.js';
import { cleanText } from './clean-text.js';
import type { Finding, JsonPath, PlacedProblem } from './located-file.js';
import { type FileKind, placedRefusal, readSchemaFile, unexplained } from './read-schema-file.js';
import { type CoilFile, type ScannerFile, scannerLimits } from './scanner-file.js';

/** Words that identify a device or who made it, wherever they stand in a key. */
const identifying =
  /serial|manufacturer|maker|vendor|brand|model|station|institution|hospital|software|device|licen[cs]e|inventory|asset|udi\b/i;

const scannerKind: FileKind = {
  thing: 'scanner file',
  bytes: scannerLimits.bytes,
  nesting: scannerLimits.nesting,
  validate,
  schema: 'schema/scanner.schema.json',
  about: 'A scanner file holds one scanner',
  hintFor: (key) =>
    identifying.test(key) ? 'Take it out: a scanner has a nickname here, and neither a maker, a model nor a serial number.' : null,
};

/**
 * Reads the text of a scanner file. Every problem names file, line, key, what was given, what was expected and what to do.
 * Never throws for anything a file says.
 *
 * @example readScannerFile('{ "format": "holdfast scanner", "version": 1, "name": "one", "fieldT": 2.89 }', 'one.json').ok //=> true
 */
export function readScannerFile(text: string, fileName: string): Outcome<ScannerFile> {
  const read = readSchemaFile(text, fileName, scannerKind);
  if (!read.ok) return read;
  const given = read.value as ScannerFile;
  const problems: PlacedProblem[] = [...read.problems];
  checkScanner(given, (path, finding) => problems.push(read.file.problem(path, finding)));
  if (problems.length > 0) return placedRefusal(problems);
  if (!read.valid) return placedRefusal([unexplained(read.file, scannerKind.schema)]);
  const plain = JSON.parse(JSON.stringify(given)) as ScannerFile;
  return {
    ok: true,
    value: {
      ...plain,
      name: cleanText(plain.name),
      ...(plain.notes === undefined ? {} : { notes: cleanText(plain.notes) }),
      ...(plain.coils === undefined ? {} : { coils: plain.coils.map((coil) => ({ ...coil, name: cleanText(coil.name) })) }),
    },
  };
}

type Say = (path: JsonPath, finding: Finding) => void;

/** What the structure cannot tell: names, rows of a g table that stand twice, no acceleration that adds noise, pulses of two shapes. */
function checkScanner(file: ScannerFile, say: Say): void {
  if (cleanText(file.name) === '') say(['name'], emptyName);
  const coils = file.coils ?? [];
  const names = coils.map(({ name }) => cleanText(name).toLowerCase());
  coils.forEach((coil, i) => {
    const path = ['coils', i];
    if (names[i] === '') say([...path, 'name'], emptyName);
    else if (names.indexOf(names[i] as string) !== i) {
      say([...path, 'name'], {
        code: 'duplicate-id',
        given: `the coil "${cleanText(coil.name, 40)}" stands there twice`,
        expected: 'a name for each coil of its own',
        hint: 'Rename one of them.',
      });
    }
    checkNoise(coil, path, say);
  });
  for (const name of pulseNames) {
    const shape = file.pulses?.[name];
    if (shape?.gaussian === true && shape.timeBandwidth !== undefined) {
      say(['pulses', name], {
        code: 'values-clash',
        given: 'gaussian and timeBandwidth stand together',
        expected: 'one shape',
        hint: 'Take one of them out.',
      });
    }
  }
}

const emptyName: Finding = { code: 'wrong-form', given: 'a name of blanks was given', expected: 'a nickname', hint: 'Write one.' };

function checkNoise({ g }: CoilFile, path: JsonPath, say: Say): void {
  g.forEach((row, i) => {
    const twice = g.findIndex((other) => {
      return (
        same(other.phase, row.phase) &&
        same(other.slice, row.slice) &&
        (other.region ?? '').toLowerCase() === (row.region ?? '').toLowerCase()
      );
    });
    if (twice !== i) {
      say([...path, 'g', i], {
        code: 'values-clash',
        given: `R ${row.phase} x ${row.slice} stands there twice for one region`,
        expected: 'each acceleration once',
        hint: 'Take one of them out.',
      });
    }
    if (row.phase <= 1 && row.slice <= 1 && !same(row.g, 1)) {
      say([...path, 'g', i, 'g'], {
        code: 'values-clash',
        given: `g ${row.g} without acceleration`,
        expected: '1: nothing is skipped',
        hint: 'Take the row out.',
      });
    }
  });
}
