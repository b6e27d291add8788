import { describe, expect, it } from 'vitest';
import { lineText } from '../../src/screens/line.js';
import type { Look } from '../../src/screens/look.js';
import { screenLines } from '../../src/screens/screen-lines.js';
import { wholeItems } from '../../src/screens/whole-items.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { ReadingCounts } from '../../src/study/readings-report.js';
import { asciiGlyphs } from '../../src/terminal/glyphs.js';
import { textWidth } from '../../src/terminal/text-width.js';
import { press, sessionOn } from '../session/invented-state.js';
import { twelveTimes } from '../study/read-times.js';

const eyes: Look = { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 0, reader: false };
const reader: Look = { ...eyes, reader: true };
const sizes = [
  [80, 24],
  [100, 30],
  [160, 50],
] as const;
const linesOf = (state: State, columns: number, rows: number, look = eyes) => {
  const lines = screenLines({ ...state, size: { columns, rows } }, look).map(lineText);
  expect(lines).toHaveLength(rows);
  for (const each of lines) expect(textWidth(each.trimEnd())).toBeLessThanOrEqual(columns);
  return lines;
};

/** Types a value into a row of this patient's screen. */
function patient(state: State, field: string, value: string): State {
  const there = press(state, 'p');
  return press(
    { ...there, place: { ...there.place, fields: { ...there.place.fields, patient: field } } },
    'enter',
    value,
    'enter',
    'escape',
  );
}

const order = sessionOn('lumbar-spine-1.5t');
const capped = patient(order, 'b1rmsCapUt', '2');
const labelled = patient(patient(capped, 'condition 0', 'head coil only'), 'condition 1', 'no longer than 30 min in all');

describe('the conditions of a label', () => {
  const screens: readonly (readonly [string, readonly string[]])[] = [
    ['order', []],
    ['series', ['enter']],
    ['ways', ['enter', 'f']],
    ['readings', ['enter', 'd']],
    ['chart', ['enter', 'c']],
    ['type these', ['enter', 't']],
    ['why', ['enter', 'w']],
    ['budget', ['b']],
    ['record', ['e']],
  ];

  it.each(screens)('stay on the screen while a cap is used: %s', (_name, keys) => {
    for (const [columns, rows] of sizes)
      for (const look of [eyes, reader]) {
        const text = linesOf(press(labelled, ...keys), columns, rows, look).join('\n');
        expect(text).toContain('Label: head coil only; no longer than 30 min in all. Not typed: unknown.');
      }
  });

  it('are unknown where none is typed; without a cap nothing is said', () => {
    expect(linesOf(press(capped, 'enter'), 80, 24).join('\n')).toContain('Typed here: 0. Not typed: unknown.');
    expect(linesOf(press(order, 'enter'), 80, 24).join('\n')).not.toContain('Not typed');
  });

  it('stay where something was just said, and are counted where they are many', () => {
    const many = ['c'.repeat(30), 'd'.repeat(30), 'e'.repeat(30)].reduce(
      (state, text, at) => patient(state, `condition ${at + 2}`, text),
      labelled,
    );
    const lines = linesOf(press(many, 'enter', '+'), 80, 24);
    expect(lines.join('\n')).toContain('Label: head coil only; 4 more (p). Not typed: unknown.');
  });
});

describe('a list in one line', () => {
  const at = (columns: number) => wholeItems('Off: ', ['alpha', 'beta', 'gamma'], '.', { columns, key: 'd', ellipsis: '~' });

  it('shows as many as fit whole, counts the rest, cuts only one that is too long alone', () => {
    expect(at(80)).toBe('Off: alpha; beta; gamma.');
    expect(at(23)).toBe('Off: alpha; 2 more (d).');
    expect(at(20)).toBe('Off: a~; 2 more (d).');
    for (let columns = 19; columns < 40; columns += 1) expect(textWidth(at(columns))).toBeLessThanOrEqual(columns);
  });
});

describe('how far predictions have been off', () => {
  const dynamicOrder = sessionOn('liver-3t');
  const position = dynamicOrder.session?.series.findIndex(({ id }) => id === 't1-3d') ?? 0;
  const series = press(dynamicOrder, ...Array<string>(position).fill('down'), 'enter');
  const counts = new ReadingCounts();
  for (const record of twelveTimes('')) counts.add(record);
  const classes = counts.report().scanners[0]?.classes ?? [];
  const known = update(series, { kind: 'answer', ask: series.open.residuals as number, answer: { kind: 'residuals', classes } })[0];

  it('stands on the series screen and with the readings, and takes no line where nothing was read', () => {
    const words = 'Off so far here: time: 12 readings, median +3.4 %, worst +6 %';
    for (const [columns, rows] of sizes)
      for (const look of [eyes, reader]) {
        expect(linesOf(known, columns, rows, look).join('\n').includes(words) || look.reader).toBe(true);
        expect(linesOf(press(known, 'd'), columns, rows, look).join('\n').includes(words) || look.reader).toBe(true);
      }
    expect(linesOf(known, 80, 200, reader).join('\n')).toContain(words);
    expect(linesOf(series, 80, 24).join('\n')).not.toContain('Off so far');
  });
});
