import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../src/calc/scanner.js';
import { answerSearch } from '../../src/effects/answer-search.js';
import { headlineOf } from '../../src/screens/common-lines.js';
import { lineText } from '../../src/screens/line.js';
import type { Look } from '../../src/screens/look.js';
import { screenLines } from '../../src/screens/screen-lines.js';
import { planBudget } from '../../src/search/budget.js';
import { carryStudy, type StudyCarry } from '../../src/search/carry-study.js';
import { type CarryView, sayTarget } from '../../src/session/carry.js';
import { formRows } from '../../src/session/hands/form-commands.js';
import { keyMap } from '../../src/session/key-map.js';
import { budgetProblemOf } from '../../src/session/search-problem.js';
import { type State, screenNames } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { asciiGlyphs, unicodeGlyphs } from '../../src/terminal/glyphs.js';
import { textWidth } from '../../src/terminal/text-width.js';
import { pictureFailed, withPicture } from '../session/drawn-picture.js';
import { onField, press, sessionOn, startState } from '../session/invented-state.js';
import { atScanner, shippedScanners, startWithScanners } from '../session/shipped-scanners.js';

const unicode: Look = { glyphs: unicodeGlyphs, set: 'unicode', colourLevel: 0, reader: false };
const ascii: Look = { ...unicode, glyphs: asciiGlyphs, set: 'ascii' };
const reader: Look = { ...unicode, reader: true };

const at = (state: State, columns: number, rows: number): State => ({ ...state, size: { columns, rows } });
const textOf = (state: State, look: Look = unicode) => screenLines(state, look).map(lineText);

const answers = new Map<string, ReturnType<typeof answerSearch>>();

const carries = new Map<string, StudyCarry>();

/** The study that is carried, at 1.5 or 3 T. */
function carriedOf({ study, target }: CarryView): StudyCarry {
  const name = `${study.id} ${sayTarget(target)}`;
  const to = plainScanner('fieldT' in target ? target.fieldT : (target.choice.file?.fieldT ?? 3));
  const known = carries.get(name) ?? carryStudy(study, { from: plainScanner(study.fieldT), to, aim: 'contrast', rules: new Map() });
  carries.set(name, known);
  return known;
}

/** Answers the search that is open, or the plan: stopped after a while, so that every screen is soon there. */
function told(state: State): State {
  const { search, open, plan } = state;
  if (search !== null && open.search === search.ask) {
    let asked = 0;
    const stopped = () => {
      asked += 1;
      return asked > 200;
    };
    const name = search.key;
    const ways = answers.get(name) ?? answerSearch(search.problem, { stopped });
    answers.set(name, ways);
    return update(state, { kind: 'answer', ask: search.ask, answer: { kind: 'ways', ways } })[0];
  }
  const rules = state.open.carryRules;
  if (rules !== undefined) return told(update(state, { kind: 'answer', ask: rules, answer: { kind: 'rules', rules: new Map() } })[0]);
  if (state.open.carry !== undefined && state.carry !== null)
    return update(state, { kind: 'answer', ask: state.open.carry, answer: { kind: 'carried', carried: carriedOf(state.carry) } })[0];
  const problem = budgetProblemOf(state);
  if (plan === null || problem === null) return state;
  return update(state, { kind: 'answer', ask: plan.ask, answer: { kind: 'plan', plan: planBudget(problem) } })[0];
}

/** The ways and the budget, while they are worked out and when they are there. */
function waysScreens(id: string): readonly (readonly [string, State])[] {
  const order = press(sessionOn(id), 'p', '11', 'enter', 'escape');
  const searching = press(order, 'enter', 'f');
  const share = update(searching, { kind: 'progress', ask: searching.search?.ask ?? -1, share: 0.4 })[0];
  const ways = told(searching);
  return [
    ['ways, searching', share],
    ['ways', ways],
    ['ways, all of them', press(ways, 'm', 'down', 'down', 'down')],
    ['front', press(ways, 'c')],
    ['front of loss', press(ways, 'c', 'tab', 'right')],
    ['keep', press(ways, 'k')],
    ['ways help', press(ways, 'h')],
    ['picture of a way', withPicture(press(ways, 's'))],
  ];
}

/** A preset at another field: while it is worked out, and when it is there. */
function carryScreens(order: State): readonly (readonly [string, State])[] {
  const working = press(onScanners(order), 't');
  const carried = told(working);
  return [
    ['carry, being worked out', working],
    ['carry', carried],
    ['carry, a value', press(carried, 'down', 'down', 'down', 'down', 'down')],
    ['carry, its end', press(carried, 'end')],
    ['carry, to a typed field', told(press(carried, '2', '.', '8', '9', 'enter'))],
    ['carry, typing', press(carried, '2', '.')],
    ['carry, why', press(carried, 'down', 'down', 'down', 'down', 'w')],
    ['carry, help', press(carried, 'h')],
  ];
}

/** The same with the shipped scanners to choose from. */
const onScanners = (state: State) => update(state, { kind: 'scanners', scanners: shippedScanners, notes: [] })[0];

/** Every screen, in the middle of some work. */
function everyScreen(id: string): readonly (readonly [string, State])[] {
  const order = press(sessionOn(id), 'p', '11', 'enter', 'escape');
  const series = press(onField(press(order, 'enter'), 'sliceThicknessMm'), '+');
  return [
    ['start', startState()],
    ['start with scanners', startWithScanners()],
    ['scanner', atScanner(startWithScanners(), 'demo-1.5t body')],
    ['scanner, help', press(startWithScanners(), 'tab', 'h')],
    ['order', order],
    ['patient', press(order, 'p')],
    ['series', series],
    ['series, consequences', press(series, 'tab')],
    ['series, cautions', press(series, 'tab', 'tab')],
    ['series, typing', press(series, '4')],
    ['why', press(series, 'tab', 'w')],
    ['why of a parameter', press(series, 'w')],
    ['type these', press(series, 't')],
    ['chart', press(series, 'c')],
    ['readings', press(series, 'd')],
    ['record', press(series, 'e')],
    ['record, reasons', press(series, 'e', 'tab')],
    ['picture, asked for', press(series, 's')],
    ['picture', withPicture(press(series, 's'))],
    ['picture, close, with a divider', withPicture(press(series, 's', 'z', 'd', 'right'))],
    ['picture, failed', pictureFailed(press(series, 's'))],
    ['series, pictures kept beside', press(withPicture(press(at(series, 160, 50), 's', 'k')), 'escape')],
    ['help', press(series, 'h')],
    ['scanner, of a session', atScanner(onScanners(order), 'demo-3t head')],
    ...carryScreens(order),
    ...waysScreens(id),
  ];
}

const sizes = [
  [80, 24],
  [100, 30],
  [160, 50],
] as const;

describe.each(['liver-3t', 'lumbar-spine-1.5t', 'heart-cine-3t', 'brain-child-fast-3t'])('the screens of %s', (id) => {
  describe.each(everyScreen(id))('%s', (_name, state) => {
    it.each(sizes)('fills %i by %i: verdict first, nothing wider than the screen', (columns, rows) => {
      for (const look of [unicode, ascii, reader]) {
        const sized = at(state, columns, rows);
        const lines = textOf(sized, look);
        expect(lines).toHaveLength(rows);
        for (const each of lines) expect(textWidth(each.trimEnd()), each).toBeLessThanOrEqual(columns);
        expect(lines[0]?.startsWith(headlineOf(sized).text.slice(0, 40))).toBe(true);
      }
    });

    it('is plain ASCII with the plain set', () => {
      for (const each of textOf(at(state, 160, 50), ascii)) expect(each).toMatch(/^[\x20-\x7e]*$/);
    });
  });
});

describe('the series screen', () => {
  const state = press(
    onField(press(sessionOn('liver-3t'), 'p', '11', 'enter', 'escape', 'enter'), 'sliceCount'),
    ...Array<string>(9).fill('-'),
  );

  it('shows both values of what differs from the preset, and what is over in words', () => {
    const text = textOf(state).join('\n');
    expect(text).toMatch(/slices\s+72\s+54/);
    expect(text).toMatch(/breath-hold .*12\.8\s+s\s+over/);
  });

  it('lines its numbers up on the point, and nothing moves when a digit is added', () => {
    const points = (of: State) =>
      textOf(of)
        .filter((each) => / (breath-hold|voxel read|voxel phase|voxel slice) +[+\u25ca\u2800-\u28ff]{9} /.test(each))
        .map((each) => each.slice(40).indexOf('.', 24));
    const before = points(onField(state, 'sliceGapMm'));
    expect(before).toHaveLength(4);
    expect(new Set(before).size).toBe(1);
    expect(points(press(onField(state, 'sliceThicknessMm'), '12', 'enter'))).toEqual(before);
  });

  it('the price of the next step stands there in words of the same figures', () => {
    const text = textOf(onField(state, 'matrixPhase')).join('\n');
    expect(text).toMatch(/Next step\s+- 192\s+\+ 208/);
    expect(text).toMatch(/verdict\s+OVER 1\.3 s\s+OVER 2\.3 s/);
  });

  it('shows parameters, consequences, next step, cautions and the range chart together at 160 by 50', () => {
    const text = textOf(at(state, 160, 50)).join('\n');
    for (const words of ['Parameters', 'Consequences', 'Next step', 'Cautions', '1 breath-hold, s', 'Type these on the scanner'])
      expect(text).toContain(words);
  });

  it('the reader says the same figures in sentences, one thing a line', () => {
    const said = textOf(at(state, 80, 60), reader).join('\n');
    expect(said).toContain('breath-hold 12.8 s, -25 %, OVER its limit');
    expect(said).toContain('slices: 54, preset 72');
    expect(said).not.toMatch(/[\u2800-\u28ff]/);
  });

  it('a locked parameter shows as locked, with why', () => {
    const series =
      state.opened?.study.series.map((each) => (each.id === 't1-3d' ? { ...each, locked: ['averages' as const] } : each)) ?? [];
    const locked = onField(
      { ...state, notice: null, opened: state.opened === null ? null : { ...state.opened, study: { ...state.opened.study, series } } },
      'averages',
    );
    const text = textOf(locked).join('\n');
    expect(text).toMatch(/averages\s+locked\s+1/);
    expect(text).toContain('locked in the preset');
  });
});

describe('the ways to fit', () => {
  const ways = told(press(sessionOn('liver-3t'), 'p', '11', 'enter', 'escape', 'enter', 'f'));

  it('numbers three first, each with its verdict, and shows what the one under the hand does on the strips', () => {
    const text = textOf(ways).join('\n');
    expect(text).toMatch(/1 closest to the preset +FITS, \d\.\d s to spare/);
    expect(text).not.toMatch(/^ +4 /m);
    expect(text).toMatch(/breath-hold .*-\d\d%/);
    expect(text).toContain('Gives up: ');
    expect(lineText(screenLines(ways, unicode)[0] ?? [])).toContain('OVER by 6.0 s');
  });

  it('at 80 by 24 nothing of a line is cut off: what is kept is said as far as it goes, and the rest counted', () => {
    const kept = textOf(at(ways, 80, 24)).find((text) => text.startsWith('k keeps')) ?? '';
    expect(kept).toMatch(/^k keeps SNR at least 70 %, .*, \d more *$/);
    expect(kept.trimEnd().length).toBeLessThanOrEqual(80);
    expect(textOf(at(ways, 160, 50)).join('\n')).toMatch(/k keeps SNR at least 70 %, .*voxel slice at most 170 %(?!.*more)/);
  });

  it('a cap without its reading is said once, and not that no limit binds', () => {
    const capped = told(
      press(sessionOn('lumbar-spine-1.5t'), 'p', 'down', 'down', 'down', 'down', 'down', '2', 'enter', 'escape', 'enter', 'f'),
    );
    const text = textOf(at(capped, 80, 24)).join('\n');
    expect(text).toContain("is not searched for: type the scanner's number (d)");
    expect(text).not.toContain('No limit binds');
  });

  it('a number from a reading has room for its mark', () => {
    const open = press(
      sessionOn('lumbar-spine-1.5t'),
      'p',
      'down',
      'down',
      'down',
      'down',
      'down',
      '2',
      'enter',
      'escape',
      'down',
      'enter',
    );
    const read = told(press(open, 'f', 'd', '2.8', 'enter', 'escape'));
    for (const [columns, rows] of [
      [80, 24],
      [100, 30],
      [160, 50],
    ] as const)
      expect(textOf(at(read, columns, rows)).find((text) => text.startsWith(' B1+rms'))).toMatch(/uT +[-+]\d+% r *\|/);
  });

  it('the chart of a front says its limit at 100 columns', () => {
    for (const keys of [['c'], ['c', 'tab']])
      expect(textOf(at(press(ways, ...keys), 100, 30)).join('\n')).toMatch(/Front: [^|]*limit 11\.0 s/);
  });

  it('a wide screen has list, strips, words and front together', () => {
    const text = textOf(at(ways, 160, 50)).join('\n');
    for (const words of ['Consequences', 'Gives up: ', 'Front: most SNR in each breath-hold', 'Before rewriting: ', 'limit 11.0 s'])
      expect(text).toContain(words);
  });

  it('the reader says the ways in sentences', () => {
    const said = textOf(at(ways, 100, 60), reader).join('\n');
    expect(said).toMatch(/Here: Way 1, closest to the preset: FITS/);
    expect(said).toMatch(/Way 3, /);
    expect(said).not.toMatch(/[\u2800-\u28ff]/);
  });

  it('where nothing fits it says what binds and what else is done, as words', () => {
    const none = press(sessionOn('liver-3t'), 'p', '2', 'enter', 'escape', 'enter', 'f');
    const whole = answerSearch(none.search!.problem, {});
    const text = textOf(update(none, { kind: 'answer', ask: none.search!.ask, answer: { kind: 'ways', ways: whole } })[0]).join('\n');
    expect(text).toContain('Nothing fits.');
    expect(text).toMatch(/breath-hold: needs \d\.\d s; the limit is 2\.0 s +OVER by/);
    expect(text).toContain('What else is done: coach');
  });
});

describe('the budget', () => {
  const order = press(sessionOn('lumbar-spine-1.5t'), 'p', 'down', 'down', 'down', '8', 'enter', 'escape');
  const plan = told(press(order, 'b'));

  it.each(sizes)('fills %i by %i with every series, its choice, times and the total', (columns, rows) => {
    for (const look of [unicode, ascii, reader]) {
      const lines = textOf(at(plan, columns, rows), look);
      expect(lines).toHaveLength(rows);
      for (const each of lines) expect(textWidth(each.trimEnd()), each).toBeLessThanOrEqual(columns);
      const text = lines.join('\n');
      for (const { id } of plan.session?.series ?? []) expect(text).toContain(id);
      expect(text).toMatch(/Together \d+:\d\d of 8:00: /);
      expect(text).toMatch(/shortened|skipped/);
    }
  });

  it('compares like with like: what stays as it is takes as long in the plan as now, rests between its holds included', () => {
    const liver = told(press(sessionOn('liver-3t'), 'p', 'down', 'down', 'down', '40', 'enter', 'escape', 'b'));
    const rows = textOf(liver).flatMap((text) => /as it is +(\S+ ?s?) +(\S+ ?s?) +\d/.exec(text)?.slice(1, 3).join('|') ?? []);
    expect(rows.length).toBeGreaterThan(3);
    for (const row of rows) expect(row.split('|')[0]?.trim()).toBe(row.split('|')[1]?.trim());
  });
});

describe('a screen that is too small', () => {
  it.each([
    [79, 24],
    [80, 23],
    [60, 15],
    [20, 5],
  ])('%i by %i says so in one sentence and loses nothing', (columns, rows) => {
    const state = press(sessionOn('liver-3t'), 'enter');
    const small = at(state, columns, rows);
    expect(textOf(small).join(' ')).toContain('Nothing');
    expect(textOf(at(small, 80, 24))).toEqual(textOf(state));
  });
});

describe('help', () => {
  it('is made from the key map: every key of every screen is said once', () => {
    for (const screen of screenNames) {
      const rows = keyMap[screen];
      const keys = rows.filter(({ when }) => when === undefined).flatMap((row) => row.keys);
      expect(new Set(keys).size, screen).toBe(keys.length);
      for (const { shown, help } of rows) expect(shown === '' ? help === '' : help.length > 5).toBe(true);
    }
  });

  it('needs no Shift for anything in a hurry', () => {
    const letters = Object.values(keyMap).flatMap((rows) => rows.flatMap(({ keys }) => keys.filter((key) => key.length === 1)));
    for (const key of letters) expect(key).toMatch(/[a-z0-9 .\-+=/*?]/);
  });
});

describe('the words under a form', () => {
  const order = press(sessionOn('lumbar-spine-1.5t'), 'p');
  it.each([
    ['patient', order],
    ['readings', press(order, 'escape', 'enter', 'd')],
    ['record', press(order, 'e')],
  ] as const)('of %s fit on the smallest screen', (_name, state) => {
    expect(formRows(state).filter(({ help }) => help.length > 80)).toEqual([]);
  });
});

describe('what is wrong with files', () => {
  const noted = update(startState(), { kind: 'note', words: 'the settings: restS is "20", expected seconds from 0 to 600.' })[0];

  it('stays on the start screen while something is typed, also when the presets come later', () => {
    const late = update(noted, { kind: 'presets', presets: noted.presets, notes: ['broken.json, line 3: no closing brace.'] })[0];
    for (const look of [unicode, reader]) {
      const text = textOf(press(late, 'l', 'i', 'v'), look).join('\n');
      expect(text).toContain('restS is "20"');
      expect(text).toContain('broken.json, line 3');
      expect(text).toContain('Liver');
    }
  });
});

describe('the carry screen', () => {
  const carried = told(press(onScanners(press(sessionOn('lumbar-spine-1.5t'))), 't'));

  it('has preset and carried value side by side with the reason, and the line under the hand in full', () => {
    const text = textOf(press(carried, ...Array<string>(3).fill('down')));
    expect(text[0]).toMatch(/^PROPOSAL.*lumbar-spine-1\.5t, 1\.5 T to /);
    expect(text.join('\n')).toMatch(/bandwidth +\d+ Hz\/px +\d+ Hz\/px {2}\S/);
    expect(text.join('\n')).toMatch(/Formula: |Source: /);
    expect(text.join('\n')).toMatch(/\(\d+ more lines\)/);
  });

  it('a wide screen shows all series under the one that is looked at, and why beside them', () => {
    const text = textOf(at(carried, 160, 50)).join('\n');
    expect(text).toContain('All series');
    for (const { id } of carried.carry?.study.series ?? []) expect(text).toMatch(new RegExp(`^${id} .* > `, 'm'));
    expect(text).toContain('Not carried');
  });

  it('the reader says what becomes of each value and why, one thing a line', () => {
    const said = textOf(at(carried, 100, 60), reader).join('\n');
    expect(said).toMatch(/bandwidth: \d+ Hz\/px becomes \d+ Hz\/px: \S/);
    expect(said).toContain('Not carried:');
  });
});
