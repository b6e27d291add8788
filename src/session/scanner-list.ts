import { phaseTimesMs } from '../calc/chemical-shift.js';
import { fatShiftHz, larmorMhz } from '../calc/constants.js';
import { plainScanner, type Scanner } from '../calc/scanner.js';
import { carryFields } from '../search/carry.js';
import { canCarry } from '../search/carry-study.js';
import { cleanText } from '../study/clean-text.js';
import type { Study } from '../study/study.js';
import { chosenScanner, equipmentFor, equipmentNow, isFromFile, plainChoice, type ScannerChoice, sayEquipment } from './equipment.js';
import { startRow } from './hands/start-commands.js';
import { type Both, type SeriesChanges, scannerChanges } from './scanner-changes.js';
import type { State } from './state.js';

/** One scanner with one of its coils, as it can be chosen. */
export interface ScannerRow {
  readonly field: string;
  readonly choice: ScannerChoice;
  readonly name: string;
  readonly where: string;
  readonly coil: string;
  /** The one that is in use, or that the next session is begun on. */
  readonly inUse: boolean;
}

/** The scanners that can be chosen, the plain one first, each coil on a line of its own. */
export function scannerRows(state: State): readonly ScannerRow[] {
  const choices = [
    plainChoice,
    ...withNamed(state).flatMap((file): ScannerChoice[] => {
      const coils = file.coils ?? [];
      return coils.length === 0 ? [{ file, coil: null }] : coils.map(({ name }) => ({ file, coil: name }));
    }),
  ];
  const now = equipmentNow(state);
  const chosen = chosenScanner(state);
  return choices.map((choice): ScannerRow => {
    const { file, coil } = choice;
    const inUse =
      now === null
        ? file?.name === chosen.file?.name && coil === chosen.coil
        : file === null
          ? !isFromFile(now)
          : isFromFile(now) && now.scanner.name === file.name && now.coilName === (coil ?? '');
    return {
      field: `${file?.name ?? ''} ${coil ?? ''}`,
      choice,
      name: file === null ? 'no scanner file' : cleanText(file.name),
      where: file === null ? "the preset's" : `${file.fieldT} T`,
      coil: file === null ? 'usual gradients and g' : coil === null ? 'no coil named' : `coil ${cleanText(coil)}`,
      inUse,
    };
  });
}

/** The files of the folders, and one that was named by its path. */
function withNamed({ scanners, defaults }: State): State['scanners'] {
  const named = defaults.scanner?.file;
  return named == null ? scanners : [named, ...scanners.filter(({ name }) => name !== named.name)];
}

/** The line the hand is on: the one in use where none was pointed at. */
export function scannerRow(state: State): ScannerRow {
  const rows = scannerRows(state);
  const here = rows.find(({ field }) => field === state.place.fields.scanner) ?? rows.find(({ inUse }) => inUse) ?? rows[0];
  return here as ScannerRow;
}

/** The study that is looked at: that of the session, or the preset under the hand at the start. */
function studyHere(state: State): Study | null {
  if (state.opened !== null) return state.opened.study;
  const row = startRow(state);
  return row?.kind === 'preset' ? row.preset.study : null;
}

/** What a scanner changes, in words and as a table. */
export interface ScannerWords {
  readonly heading: string;
  readonly facts: readonly string[];
  /** Titles first; null without a preset to look at. */
  readonly table: readonly (readonly string[])[] | null;
  readonly notes: readonly string[];
  /** Elements and measured g of the coil: where there is room. */
  readonly coil: string;
  /** What needs a person's eye; blank where nothing does. */
  readonly attention: string;
}

const worked = new WeakMap<Study, Map<string, readonly SeriesChanges[]>>();

function changesOf(study: Study, scanner: Scanner): readonly SeriesChanges[] {
  const known = worked.get(study) ?? new Map<string, readonly SeriesChanges[]>();
  worked.set(study, known);
  const key = JSON.stringify(scanner);
  const changes = known.get(key) ?? scannerChanges(study, scanner);
  known.set(key, changes);
  return changes;
}

function pair(from: number, to: number, digits: number, unit: string): string {
  const [a, b] = [from.toFixed(digits), to.toFixed(digits)];
  return a === b ? `${a} ${unit}` : `${a} > ${b} ${unit}`;
}

function shown({ from, to }: Both, digits: number): string {
  if (from === null && to === null) return '-';
  const [a, b] = [from, to].map((value) => (value === null ? 'not known' : value.toFixed(digits)));
  return a === b ? (a as string) : `${a} > ${b}`;
}

/** A coil: its elements, and its measured g where it has a table. */
function coilWords({ coil }: Scanner): string {
  if (coil === null) return 'g: the usual table, values from memory: R 2 1.05, R 3 1.20, R 4 1.7, 2 x 2 1.15; beyond it not known';
  const rows = coil.g.map(({ phase, slice, g, region }) => `${phase} x ${slice} ${g}${region === undefined ? '' : ` (${region})`}`);
  const { AP, RL, HF } = coil.elements;
  const table = rows.length === 0 ? 'no g measured' : `g of R phase x slice ${rows.join(', ')}; beyond it not known`;
  return cleanText(`Coil ${coil.name}: elements AP ${AP}, RL ${RL}, HF ${HF}; ${table}`);
}

/** What changes when the scanner under the hand is chosen: frequencies at the exact field, g, shortest TE and TR, slices in one TR. */
export function scannerWords(state: State): ScannerWords {
  const { choice } = scannerRow(state);
  const study = studyHere(state);
  const fieldT = study?.fieldT ?? choice.file?.fieldT;
  if (fieldT === undefined)
    return {
      heading: 'No scanner file',
      facts: ['The field of the preset, usual gradients, usual g.'],
      table: null,
      notes: [],
      coil: '',
      attention: '',
    };
  const plain = plainScanner(fieldT);
  const equipment = equipmentFor(choice, study ?? ({ fieldT, region: '' } as Study), { role: '', scannerName: '', coilName: '' });
  const { scanner } = equipment;
  const coil = coilWords(scanner);
  const [before, after] = [phaseTimesMs(fieldT), phaseTimesMs(scanner.fieldT)];
  const facts = [
    `Field ${fieldT === scanner.fieldT ? fieldT : `${fieldT} > ${scanner.fieldT}`} T, Larmor ${pair(larmorMhz(fieldT), larmorMhz(scanner.fieldT), 3, 'MHz')}, fat ${pair(fatShiftHz(fieldT), fatShiftHz(scanner.fieldT), 1, 'Hz')}`,
    `Opposed ${pair(before.opposedPhaseMs, after.opposedPhaseMs, 2, 'ms')}, in phase ${pair(before.inPhaseMs, after.inPhaseMs, 2, 'ms')}`,
    `Gradients ${pair(plain.gradientMtPerM, scanner.gradientMtPerM, 0, 'mT/m')}, ${pair(plain.slewTPerMPerS, scanner.slewTPerMPerS, 0, 'T/m/s')}; B1 ${pair(plain.maximumB1Ut, scanner.maximumB1Ut, 0, 'uT')}; visible ${pair(plain.visibleLengthMm, scanner.visibleLengthMm, 0, 'mm')}`,
  ];
  if (study === null) return { heading: sayEquipment(equipment), facts, table: null, notes: [], coil, attention: '' };
  const changes = changesOf(study, scanner);
  const together = changes.filter(({ simultaneousG }) => simultaneousG.to === null).map(({ id }) => id);
  const away = Math.abs(scanner.fieldT - study.fieldT) > 0.05 * study.fieldT;
  return {
    heading: `${study.id} on ${sayEquipment(equipment)}`,
    facts,
    table: [
      ['series', 'g', 'shortest TE', 'shortest TR', 'slices/TR', 'fat px'],
      ...changes.map((one) => [
        one.id,
        shown(one.g, 2),
        shown(one.shortestEchoTimeMs, 2),
        shown(one.shortestRepetitionTimeMs, 1),
        shown(one.slicesPerRepetition, 0),
        shown(one.chemicalShiftPx, 2),
      ]),
    ],
    notes: [
      "Left of >: no scanner file, the preset's field. Parameters of the preset; ms.",
      ...(together.length === 0 ? [] : [`g of simultaneous slices is not known here: ${together.join(', ')}`]),
      ...(changes.some(({ g }) => g.to === null) ? ['g not known: beyond the table of this coil. No SNR, and no way uses it.'] : []),
    ],
    coil,
    attention: away ? elsewhere(study.fieldT, scanner.fieldT) : '',
  };
}

/** What is said of a preset on a magnet of another field. */
function elsewhere(presetT: number, scannerT: number): string {
  if (canCarry(presetT) && canCarry(scannerT))
    return `This preset is for ${presetT} T: carry it there (t in its running order) before it is used on ${scannerT} T`;
  const { min, max } = carryFields;
  return `This preset is for ${presetT} T, and nothing carries it to ${scannerT} T: the sources reach from ${min} to ${max} T`;
}
