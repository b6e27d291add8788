import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { lineText } from '../../src/screens/line.js';
import type { Look } from '../../src/screens/look.js';
import { screenLines } from '../../src/screens/screen-lines.js';
import type { PresetChoice } from '../../src/session/message.js';
import type { Shelf } from '../../src/session/shelf.js';
import type { ScreenName, State } from '../../src/session/state.js';
import { namedRecord } from '../../src/study/record-meant.js';
import { RecordCounts } from '../../src/study/record-report.js';
import type { Study } from '../../src/study/study.js';
import { asciiGlyphs, unicodeGlyphs } from '../../src/terminal/glyphs.js';
import { textWidth } from '../../src/terminal/text-width.js';
import { onField, presetChoice, press, sessionOn, startState } from '../session/invented-state.js';

const unicode: Look = { glyphs: unicodeGlyphs, set: 'unicode', colourLevel: 0, reader: false };
const ascii: Look = { ...unicode, glyphs: asciiGlyphs, set: 'ascii' };
const reader: Look = { ...unicode, reader: true };

const shipped = presetChoice('liver-3t');
const records = [...inventedRecords(120, 5)];

function site(number: number, sliceThicknessMm: number): PresetChoice {
  const series = shipped.study.series.map((each) =>
    each.id === 't1-3d' ? { ...each, parameters: { ...each.parameters, sliceThicknessMm } } : each,
  );
  const released = {
    role: 'physicist',
    secondRole: 'lead technologist',
    day: '2026-03-02',
    reason: 'short holds of the patients from the ward',
  };
  const study: Study = { ...shipped.study, series, status: 'reviewed', revision: number, released };
  return { origin: 'site', hash: 'b', study };
}

const [newer, older] = [site(3, 4), site(2, 3)];

function report(): NonNullable<NonNullable<Shelf['report']>['read']> {
  const counts = new RecordCounts();
  for (const record of records) counts.add(record);
  const shown = { report: counts.report(), files: 2, records: 120, damaged: 1, chosen: 'liver', now: new Map() };
  return { records: 120, meant: 120, damaged: 1, stopped: false, notes: ['Line 7 of a.jsonl is damaged and was skipped'], shown };
}

const rows = records.map((record, at) => ({
  ...namedRecord(record),
  file: '/a.jsonl',
  line: at + 1,
  id: record.id,
  revision: record.preset.revision,
  series: record.series.length,
  rewritten: 2,
}));

const reading = { ask: 1, share: null, read: null, trouble: null };

function at(state: State, screen: ScreenName, shelf: Partial<Shelf>): State {
  return { ...state, place: { ...state.place, screen, back: ['start'] }, shelf: { ...state.shelf, ...shelf } };
}

const form = {
  study: newer.study,
  id: 'liver-3t',
  basedOn: 2,
  role: 'physicist',
  secondRole: '',
  reason: 'short holds',
  findings: [{ level: 'failure', code: 'must-keep', series: 't1-3d', text: 'voxel, slice 6 mm: must be at most 5 mm' }],
  trouble: null,
  newest: older.study,
  taken: null,
  notes: [],
} as const satisfies NonNullable<Shelf['release']>;

/** Every screen of presets and records, with and without an open session. */
function screens(): readonly (readonly [string, State])[] {
  const bare = startState(['liver-3t', 'knee-3t']);
  const open = press(onField(press(sessionOn('liver-3t'), 'enter'), 'sliceThicknessMm'), '+');
  const start: State = {
    ...bare,
    presets: [newer, ...bare.presets],
    defaults: { ...bare.defaults, release: { folder: '/site', secondRole: true } },
  };
  const revisions = { id: 'liver-3t', presets: [newer, older, shipped], notes: ['a wrong file among them'] };
  const list = { records: 120, meant: 120, damaged: 1, stopped: true, notes: ['Line 7 of a.jsonl is damaged'], typed: '', rows };
  return [
    ['presets', at(start, 'presets', {})],
    ['presets of a session', at({ ...open, presets: start.presets }, 'presets', {})],
    ['nothing found', at(start, 'presets', { narrowing: 'zzz' })],
    ['revisions', at(start, 'revisions', { revisions, marked: older.study })],
    ['revisions of a session', at(open, 'revisions', { revisions })],
    ['revisions on their way', at(start, 'revisions', { revisions: { ...revisions, presets: null } })],
    ['compare', at(start, 'compare', { compared: { from: older.study, to: newer.study } })],
    ['compare with a session', at(open, 'compare', { compared: { from: older.study, to: newer.study } })],
    ['release', at(start, 'release', { release: form })],
    ['release, typing', { ...at(start, 'release', { release: form }), entry: { field: 'id', text: 'liv', ask: null, isText: true } }],
    [
      'release, somebody was first',
      at(open, 'release', {
        release: { ...form, findings: [], taken: { theirs: newer.study, base: older.study }, notes: ['changed by both: x'] },
      }),
    ],
    ['release, checking', at(start, 'release', { release: { ...form, findings: null } })],
    [
      'release, not checked',
      at(start, 'release', { release: { ...form, findings: null, trouble: 'The folder of presets /nowhere is not there.' } }),
    ],
    ['records', at(start, 'records', { list: { ...reading, read: list } })],
    ['records on their way', at(start, 'records', { list: { ...reading, share: 0.3 } })],
    ['records, failed', at(start, 'records', { list: { ...reading, trouble: 'The record file may not be opened.' } })],
    ['one record', at(start, 'past-record', { record: { ...reading, read: records[0]! } })],
    ['one record on its way', at(start, 'past-record', { record: { ...reading, share: 0.5 } })],
    ['report', at(start, 'report', { report: { ...reading, read: report() } })],
    ['report on its way', at(start, 'report', { report: { ...reading, share: 0.5 } })],
    ['nothing to show', at(start, 'report', {})],
    ['nothing to compare', at(open, 'compare', {})],
    ['nothing to release', at(start, 'release', {})],
  ];
}

const sized = (state: State, columns: number, rows_: number): State => ({ ...state, size: { columns, rows: rows_ } });
const textOf = (state: State, look: Look = unicode) => screenLines(state, look).map(lineText);
const named = (name: string) => screens().find(([each]) => each === name)![1];

describe('the screens of presets and records', () => {
  it.each(screens())('%s: fits every size, in Unicode and ASCII, for eyes and for a screen reader', (_name, state) => {
    for (const [columns, height] of [
      [80, 24],
      [100, 30],
      [160, 50],
    ] as const) {
      for (const look of [unicode, ascii, reader]) {
        const lines = textOf(sized(state, columns, height), look);
        expect(lines).toHaveLength(height);
        for (const line of lines) {
          expect(textWidth(line.trimEnd()), line).toBeLessThanOrEqual(columns);
          expect(line).not.toMatch(/NaN|undefined|Infinity|\[object/);
          expect(line).not.toMatch(/\b(safe|cleared|compliant)\b/i);
          if (look === ascii) expect(line).toMatch(/^[\x20-\x7e]*$/);
        }
        expect(lines[0]?.trim()).not.toBe('');
      }
    }
  });

  it('compare shows parameters and figures side by side; on a wide screen two pages stand beside each other', () => {
    const narrow = textOf(sized(named('compare'), 80, 24));
    expect(narrow.some((line) => /slice thickness\s+3 mm\s+4 mm\s+\+33 %/.test(line))).toBe(true);
    const [tall] = [named('report')];
    const wide = textOf(sized(tall, 160, 50));
    expect(wide.filter((line) => line.includes('|')).length).toBeGreaterThan(30);
    const first = textOf(sized(tall, 80, 50)).slice(2, 46);
    for (const [row, line] of first.slice(0, 40).entries()) expect(wide[row + 2]?.startsWith(line.trimEnd())).toBe(true);
  });

  it('a wide screen shows what a preset holds, and what a revision changed, beside the lists', () => {
    const presets = textOf(sized(named('presets'), 160, 50)).join('\n');
    expect(presets).toMatch(/liver-3t\s+3.*\|/);
    expect(presets).toContain('pdfs-sag     Proton density, fat-suppressed, 1 must-keep');
    const revisions = textOf(sized(named('revisions'), 160, 50)).join('\n');
    expect(revisions).toMatch(/\| slice thickness\s+3 mm\s+4 mm/);
    expect(textOf(sized(named('revisions'), 100, 30)).join('\n')).not.toContain('slice thickness');
  });

  it('a report longer than the screen is scrolled to its end and no further', () => {
    const state = named('report');
    const end = press(state, 'end');
    expect(textOf(end)[21]).toContain('suggestion is a variant to review, never a preset.');
    expect(textOf(end).join('\n')).not.toContain('more lines');
    expect(press(end, 'down').place.fields.report).toBe(end.place.fields.report);
    expect(press(end, 'home').place.fields.report).toBe('0');
    const wide = sized(state, 160, 50);
    const wideEnd = press(wide, 'end');
    // No key is dead at the end of two pages either.
    expect(press(wideEnd, 'up').place.fields.report).not.toBe(wideEnd.place.fields.report);
    expect(textOf(press(wideEnd, 'up'))).not.toEqual(textOf(wideEnd));
    const page = press(state, 'page-down');
    expect(textOf(page)[2]).not.toBe(textOf(state)[2]);
  });

  it('a release says what stands against it, and who was first', () => {
    expect(textOf(named('release'))[0]).toBe('CANNOT BE RELEASED: 1 check failed'.padEnd(80));
    expect(textOf(named('release')).join('\n')).toContain('failure: t1-3d: voxel, slice 6 mm: must be at most 5 mm [must-keep]');
    const taken = textOf(sized(named('release, somebody was first'), 100, 30)).join('\n');
    expect(taken).toContain('Somebody was first: liver-3t revision 3, reviewed; released 2026-03-02 by physicist and lead');
    expect(taken).toContain('t take over');
  });

  it('while a session is open its verdict stays in the first line, save where something is released', () => {
    expect(textOf(named('presets of a session'))[0]).toMatch(/^NO LIMIT SET/);
    expect(textOf(named('compare with a session'))[1]).toContain('liver-3t revision 2 against revision 3');
    expect(textOf(named('release, somebody was first'))[0]).toMatch(/^NOT RELEASED/);
  });

  it('says in words for a screen reader what stands in columns for eyes', () => {
    const words = (name: string) => textOf(sized(named(name), 160, 50), reader).join('\n');
    expect(words('revisions')).toContain('Revision 2, reviewed, site, released 2026-03-02 physicist and lead technologist: short holds');
    expect(words('revisions')).toContain('marked');
    expect(words('compare')).toMatch(/slice thickness: rev 2 3 mm; rev 3 4 mm; change \+33 %\./);
    expect(words('release')).toContain('second role: blank');
    expect(words('records')).toMatch(/2 of 5 series rewritten, role/);
  });

  it('a screen reader reaches the last line of a text', () => {
    const state = named('report');
    const reading = { ...state, defaults: { ...state.defaults, reader: true } };
    const end = press(reading, 'end');
    expect(textOf(end, reader).join('\n')).toContain('Here: No rates from fewer than 5.');
    expect(textOf(press(end, 'up'), reader).join('\n')).not.toContain('Here: No rates');
  });

  it('a list on its way shows a bar once it has taken a while, and how to stop', () => {
    const lines = textOf(named('records on their way'), ascii).join('\n');
    expect(lines).toMatch(/^#{18}\.{42}/m);
    expect(lines).toContain('Esc stops the reading');
  });
});
