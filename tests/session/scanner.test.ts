import { describe, expect, it } from 'vitest';
import { larmorMhz } from '../../src/calc/constants.js';
import { draftOf } from '../../src/session/draft.js';
import { chosenScanner, equipmentNow } from '../../src/session/equipment.js';
import { openDraft, openPreset } from '../../src/session/hands/start-commands.js';
import { recordOfSession, studyOfSession } from '../../src/session/record-of-session.js';
import { resultNow } from '../../src/session/results.js';
import { scannerRows, scannerWords } from '../../src/session/scanner-list.js';
import { budgetProblemOf, searchProblemOf } from '../../src/session/search-problem.js';
import { initialState, type State } from '../../src/session/state.js';
import { draftNow, update } from '../../src/session/update.js';
import type { ScannerFile } from '../../src/study/scanner-file.js';
import { after, onField, presetChoice, press, startState } from './invented-state.js';
import { atScanner, shippedScanners, startWithScanners } from './shipped-scanners.js';

const scanners = shippedScanners;
const start = startWithScanners;

/** At the start, with a scanner and a coil chosen. */
function chosen(field: string, ids?: readonly string[]): State {
  return press(atScanner(start(ids), field), 'enter');
}

describe('a scanner chosen at the start', () => {
  it('is offered after the plain one, each coil on a line', () => {
    const rows = scannerRows(press(start(), 'tab'));
    expect(rows[0]).toMatchObject({ name: 'no scanner file', inUse: true });
    expect(rows.map(({ name, coil }) => `${name} ${coil}`)).toContain('demo-3t coil body');
    expect(rows.filter(({ inUse }) => inUse)).toHaveLength(1);
  });

  it('shows what changes: frequencies at the exact field, g, shortest TE and TR, slices in one TR', () => {
    const list = press(start(), 'tab');
    const { facts, table, attention } = scannerWords(atScanner(start(), 'demo-3t body'));
    expect(facts[0]).toContain(`Larmor ${larmorMhz(3).toFixed(3)} > ${larmorMhz(2.894).toFixed(3)} MHz`);
    expect(facts[1]).toBe('Opposed 1.15 > 1.19 ms, in phase 2.30 > 2.39 ms');
    expect(table?.[0]).toEqual(['series', 'g', 'shortest TE', 'shortest TR', 'slices/TR', 'fat px']);
    expect(table?.find(([id]) => id === 't1-3d')?.[1]).toBe('1.05 > 1.04');
    expect(attention).toBe('');
    expect(scannerWords(press(list, 'home', 'down')).attention).toMatch(/^This preset is for 3 T: carry it there/);
    const strong = { ...scanners[1], name: 'room 7', fieldT: 7 } as ScannerFile;
    const far = press(update(startState(['liver-3t']), { kind: 'scanners', scanners: [strong], notes: [] })[0], 'tab', 'down');
    expect(scannerWords(far).attention).toMatch(/^This preset is for 3 T, and nothing carries it to 7 T/);
  });

  it('is what sessions are begun on: figures, ways, budget, record and its nicknames', () => {
    const state = press(chosen('demo-3t body'), 'enter', 'p', '11', 'enter');
    expect(equipmentNow(state)).toMatchObject({ scannerName: 'demo-3t', coilName: 'body' });
    const { evaluation } = resultNow(state, 't1-3d');
    const plain = resultNow(press(start(), 'enter'), 't1-3d').evaluation;
    expect(evaluation.figures.chemicalShiftPx).toBeCloseTo((plain.figures.chemicalShiftPx as number) * (2.894 / 3), 9);
    expect(searchProblemOf(state, 't1-3d')?.scanner).toBe(equipmentNow(state)?.scanner);
    const timed = { ...state, session: { ...state.session, limits: { ...state.session?.limits, minutesLeft: 20 } } } as State;
    expect(budgetProblemOf(timed)?.scanner).toBe(equipmentNow(state)?.scanner);
    const record = recordOfSession(press(state, 'o', 'd'));
    expect(record).toMatchObject({ scanner: 'demo-3t', coil: 'body', fieldT: 2.894 });
  });

  it('is the one of the settings where that has a file, the one of the command line before it', () => {
    const size = { columns: 80, rows: 24 };
    const named = (defaults: Parameters<typeof initialState>[0]) =>
      chosenScanner(update(initialState(defaults, size), { kind: 'scanners', scanners, notes: [] })[0]);
    expect(named({ role: '', scannerName: 'Demo-3T', coilName: 'head' })).toMatchObject({ file: { name: 'demo-3t' }, coil: 'head' });
    expect(named({ role: '', scannerName: 'room 2', coilName: 'head' })).toEqual({ file: null, coil: null });
    const scanner = { file: scanners[0] as ScannerFile, coil: 'spine' };
    expect(named({ role: '', scannerName: 'demo-3t', coilName: '', scanner })).toBe(scanner);
  });

  it('g beyond the table of its coil is not known: no SNR, and the series says so', () => {
    const state = press(
      onField(press(chosen('demo-3t spine', ['lumbar-spine-1.5t']), 'enter', 'enter'), 'parallelFactorPhase'),
      '4',
      'enter',
    );
    const { figures, cautions } = resultNow(state, state.place.seriesId).evaluation;
    expect(figures.relativeSnr).toBeNull();
    expect(cautions.map(({ code }) => code)).toContain('g-unknown');
  });
});

describe('a scanner changed in a session', () => {
  const order = press(start(), 'enter');
  const onDemo = (state: State) => press(atScanner(press(state, 'o'), 'demo-3t body'), 'enter');

  it('is one step, which undo takes back and redo does again', () => {
    const state = onDemo(order);
    expect(state.place.screen).toBe('order');
    expect(state.notice?.words).toBe('On demo-3t, coil body, 2.894 T');
    expect(equipmentNow(state)).toMatchObject({ scannerName: 'demo-3t', coilName: 'body' });
    const undone = press(state, 'u');
    expect(equipmentNow(undone)).toMatchObject({ scannerName: '', coilName: '' });
    expect(resultNow(undone, 't1-3d').evaluation.figures).toEqual(resultNow(order, 't1-3d').evaluation.figures);
    expect(equipmentNow(press(undone, 'r'))).toMatchObject({ scannerName: 'demo-3t' });
  });

  it('takes out what was read on the other one, and says so', () => {
    const read = press(press(order, 'enter', 'd'), '17', 'enter');
    expect(read.session?.series.some(({ before }) => before !== null)).toBe(true);
    const state = onDemo(read);
    expect(state.session?.series.every(({ before }) => before === null)).toBe(true);
    expect(state.notice?.words).toContain('taken out');
  });

  it('is refused once a series was run: a record has one scanner', () => {
    const state = onDemo(press(order, 'd'));
    expect(equipmentNow(state)).toMatchObject({ scannerName: '' });
    expect(state.notice?.words).toContain('one scanner and one coil');
  });

  it('goes with the draft, its undo included', () => {
    const draft = draftNow(onDemo(order));
    const kept = draftOf(JSON.parse(JSON.stringify(draft)));
    const [state] = openDraft(start(), kept);
    expect(equipmentNow(state)).toMatchObject({ scannerName: 'demo-3t', coilName: 'body' });
    expect(equipmentNow(press(state, 'u'))).toMatchObject({ scannerName: '' });
    expect(recordOfSession(press(state, 'o', 'd'))).toMatchObject({ scanner: 'demo-3t', coil: 'body' });
  });

  it('the search is asked anew', () => {
    const over = press(order, 'p', '11', 'enter', 'escape', 'enter', 'f');
    const { effects } = after(onDemo(over), [{ kind: 'key', key: { name: 'text', text: 'f' }, atMs: 1e9 }]);
    expect(effects.some((effect) => effect.kind === 'search' && effect.problem.scanner.name === 'demo-3t')).toBe(true);
  });
});

describe('the draft preset of a session', () => {
  it('has the field of the preset on a magnet a few percent off its name, else that of the scanner', () => {
    expect(studyOfSession(press(chosen('demo-3t body'), 'enter'))?.fieldT).toBe(3);
    const [far] = openPreset(chosen('demo-1.5t body'), presetChoice('liver-3t'));
    expect(studyOfSession(far)?.fieldT).toBe(1.494);
  });
});
