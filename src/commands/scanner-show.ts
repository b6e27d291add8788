import { phaseTimesMs } from '../calc/chemical-shift.js';
import { fatShiftHz, larmorMhz } from '../calc/constants.js';
import { type Both, type SeriesChanges, scannerChanges } from '../session/scanner-changes.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { findScanner } from '../store/scanner-folder.js';
import { cleanText } from '../study/clean-text.js';
import { type CoilFile, coilNamed, type ScannerFile, type ScannerNumber, scannerNumbers, scannerOf } from '../study/scanner-file.js';
import type { Study } from '../study/study.js';
import { foldersOfScanners, readCoil } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { loadPreset, refusedByStore } from './load-preset.js';
import { type Page, pageOf } from './page.js';

/** `holdfast scanner show`: one scanner, and with `--preset` what changes in a study on it. */
export async function runScannerShow(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const found = await findScanner(io.disk, await foldersOfScanners(io), request.arguments[0] ?? '', io.workingFolder);
  if (!found.ok) return complain(refusedByStore(found.problems), io);
  const { file } = found.value;
  const coil = readCoil(request.value('coil'), file);
  if (!coil.ok) return complain(coil, io);
  const wanted = request.value('preset');
  let study: Study | null = null;
  if (wanted !== undefined) {
    const settings = await commandSettings(request, io);
    if (!settings.ok) return complain(settings, io);
    const loaded = await loadPreset(wanted, settings.value.presetFolders, io);
    if (!loaded.ok) return complain(loaded, io);
    study = loaded.value.study;
  }
  const chosen = coilNamed(file, coil.value);
  const changes = study === null ? null : scannerChanges(study, scannerOf(file, coil.value, study.region));
  if (request.has('json')) {
    io.write(`${JSON.stringify(documentOf(file, chosen, study, changes), null, 2)}\n`);
    return exitCodes.done;
  }
  const page = pageOf(request, io);
  const lines = [
    ...scannerLines(file, page),
    ...(study === null || changes === null ? [] : changeLines(study, file, chosen, changes, page)),
  ];
  io.write(page.plain(`${lines.join('\n')}\n`));
  return exitCodes.done;
}

function frequencies(fieldT: number) {
  return { larmorMhz: larmorMhz(fieldT), fatShiftHz: fatShiftHz(fieldT), ...phaseTimesMs(fieldT) };
}

function documentOf(file: ScannerFile, coil: CoilFile | null, study: Study | null, changes: readonly SeriesChanges[] | null): object {
  const shown = { scanner: file, coil: coil?.name ?? null, frequencies: frequencies(file.fieldT) };
  return study === null
    ? shown
    : { ...shown, preset: study.id, presetFieldT: study.fieldT, presetFrequencies: frequencies(study.fieldT), series: changes };
}

function scannerLines(file: ScannerFile, page: Page): string[] {
  const columns = [
    { title: 'scanner', align: 'left' },
    { title: 'value', align: 'point' },
    { title: '', align: 'left' },
  ] as const;
  const numbers = (Object.keys(scannerNumbers) as ScannerNumber[]).map((key) => {
    const { label, unit, otherwise } = scannerNumbers[key];
    const given = file[key];
    return [label, `${given ?? otherwise} ${unit}`, given === undefined ? 'usual, not in the file' : ''];
  });
  const { larmorMhz: larmor, fatShiftHz: shift, inPhaseMs, opposedPhaseMs } = frequencies(file.fieldT);
  const derived = [
    ['Larmor frequency', `${larmor.toFixed(3)} MHz`, ''],
    ['water to fat', `${shift.toFixed(1)} Hz`, ''],
    ['opposed, in phase', `${opposedPhaseMs.toFixed(2)} ms`, `${inPhaseMs.toFixed(2)} ms`],
  ];
  return [
    page.emphasis('heading', cleanText(file.name)),
    ...(file.notes === undefined ? [] : wrapText(cleanText(file.notes), page.width)),
    ...textTable(columns, [...numbers, ...derived], page.reader),
    ...pulseLines(file, page),
    ...togetherLine(file.simultaneousSliceG, 'any coil', page),
    ...(file.coils ?? []).flatMap((coil) => coilLines(coil, page)),
    ...((file.coils ?? []).length === 0 ? ['No coils: the usual g table is used.'] : []),
  ];
}

function pulseLines({ pulses = {} }: ScannerFile, page: Page): string[] {
  return Object.entries(pulses).flatMap(([name, { durationMs, timeBandwidth, gaussian, powerFactor }]) => {
    const shape =
      gaussian === true ? 'Gaussian' : timeBandwidth === undefined || timeBandwidth === 0 ? 'hard' : `time-bandwidth ${timeBandwidth}`;
    const power = powerFactor === undefined ? '' : `, power factor ${powerFactor}`;
    return wrapText(`pulse ${name}: ${durationMs} ms, ${shape}${power}`, page.width);
  });
}

function togetherLine(factors: Readonly<Record<string, number>> | undefined, where: string, page: Page): string[] {
  const words = Object.entries(factors ?? {}).map(([count, g]) => `${count} slices ${g}`);
  return words.length === 0
    ? []
    : wrapText(`g of simultaneous slices, ${where}: ${words.join(', ')}; other numbers are not known`, page.width);
}

function coilLines({ name, elements, g, simultaneousSliceG }: CoilFile, page: Page): string[] {
  const rows = g.map((row) => `${row.phase} x ${row.slice} ${row.g}${row.region === undefined ? '' : ` (${row.region})`}`);
  const table = rows.length === 0 ? 'no g measured' : `g of R phase x slice: ${rows.join(', ')}; beyond it not known`;
  return [
    ...wrapText(cleanText(`coil ${name}: elements AP ${elements.AP}, RL ${elements.RL}, HF ${elements.HF}; ${table}`), page.width),
    ...togetherLine(simultaneousSliceG, `coil ${cleanText(name)}`, page),
  ];
}

function changeLines(study: Study, file: ScannerFile, coil: CoilFile | null, changes: readonly SeriesChanges[], page: Page): string[] {
  const [before, after] = [frequencies(study.fieldT), frequencies(file.fieldT)];
  const shown = ({ from, to }: Both, digits: number) => {
    const [a, b] = [from, to].map((value) => (value === null ? 'not known' : value.toFixed(digits)));
    return a === b ? (a as string) : `${a} > ${b}`;
  };
  const applies = (both: Both, digits: number) => (both.from === null && both.to === null ? '-' : shown(both, digits));
  const columns = [
    { title: 'series', align: 'left' },
    { title: 'g', align: 'left' },
    { title: 'shortest TE', align: 'left' },
    { title: 'shortest TR', align: 'left' },
    { title: 'slices/TR', align: 'left' },
    { title: 'fat px', align: 'left' },
  ] as const;
  const rows = changes.map((one) => [
    one.id,
    shown(one.g, 2),
    applies(one.shortestEchoTimeMs, 2),
    applies(one.shortestRepetitionTimeMs, 1),
    applies(one.slicesPerRepetition, 0),
    applies(one.chemicalShiftPx, 2),
  ]);
  const unknown = changes.filter(({ simultaneousG }) => simultaneousG.to === null).map(({ id }) => id);
  return [
    '',
    page.emphasis('heading', cleanText(`${study.id} on ${file.name}${coil === null ? '' : `, coil ${coil.name}`}`)),
    ...wrapText(
      `Field ${study.fieldT} > ${file.fieldT} T, Larmor ${before.larmorMhz.toFixed(3)} > ${after.larmorMhz.toFixed(3)} MHz, water to fat ${before.fatShiftHz.toFixed(1)} > ${after.fatShiftHz.toFixed(1)} Hz, opposed and in phase ${before.opposedPhaseMs.toFixed(2)}/${before.inPhaseMs.toFixed(2)} > ${after.opposedPhaseMs.toFixed(2)}/${after.inPhaseMs.toFixed(2)} ms.`,
      page.width,
    ),
    ...textTable(columns, rows, page.reader),
    ...wrapText(
      'Left of > without a scanner file at the field of the preset, right of it on this scanner; one number: no difference. Parameters are those of the preset, times in ms.',
      page.width,
    ),
    ...(unknown.length === 0 ? [] : wrapText(`g of the simultaneous slices of ${unknown.join(', ')} is not known here.`, page.width)),
  ];
}
