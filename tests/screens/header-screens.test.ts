import { describe, expect, it } from 'vitest';
import { lineText } from '../../src/screens/line.js';
import type { Look } from '../../src/screens/look.js';
import { screenLines } from '../../src/screens/screen-lines.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { asciiGlyphs, unicodeGlyphs } from '../../src/terminal/glyphs.js';
import { textWidth } from '../../src/terminal/text-width.js';
import { inventedHeaders, pressAnswered } from '../session/invented-headers.js';
import { keyOf, startState } from '../session/invented-state.js';

const unicode: Look = { glyphs: unicodeGlyphs, set: 'unicode', colourLevel: 0, reader: false };
const ascii: Look = { ...unicode, glyphs: asciiGlyphs, set: 'ascii' };
const reader: Look = { ...unicode, reader: true };

const sized = (state: State, columns: number, rows: number): State => ({ ...state, size: { columns, rows } });
const textOf = (state: State, look: Look = unicode) => screenLines(state, look).map(lineText);

const typing = pressAnswered(startState(), '/', 'paste /invented/place');
const reading = update(typing, { kind: 'key', key: keyOf('enter'), atMs: 1 })[0];
const list = pressAnswered(typing, 'enter');

function failed(): State {
  const problems = [{ code: 'folder-not-there', path: '', message: 'Nothing is there under this path.', hint: '' }];
  return update(reading, { kind: 'answer', ask: reading.open.headers as number, answer: { kind: 'failed', problems } })[0];
}

/** More series than any screen has lines. */
function many(): State {
  const series = Array.from({ length: 300 }, (_, at) => ({ ...inventedHeaders.series[at % 4]!, id: `s${at + 1}` }));
  const found = { ...inventedHeaders, series, notes: Array.from({ length: 9 }, (_, at) => `${at} files, each is damaged`) };
  return update(reading, { kind: 'answer', ask: reading.open.headers as number, answer: { kind: 'headers', found } })[0];
}

const saved = 'Draft preset read-1.5t-draft saved in /a/very/long/home/of/somebody/.local/share/holdfast/presets/read-1.5t-draft.json';

const screens: readonly (readonly [string, State])[] = [
  ['nothing read', pressAnswered(startState(), '/', 'escape')],
  ['typing a path', typing],
  ['typing a long path', pressAnswered(typing, `paste ${'/long'.repeat(60)}`)],
  ['a wrong path', failed()],
  ['reading', reading],
  ['reading, counted', update(reading, { kind: 'counted', ask: reading.open.headers as number, files: 1234 })[0]],
  ['list', list],
  ['list, saved', { ...list, notice: { words: saved, level: 'note' } }],
  ['list, stopped', { ...list, headers: { ...list.headers, found: { ...inventedHeaders, isStopped: true } } }],
  ['list of many', pressAnswered(many(), 'end')],
  ['no series', { ...list, headers: { ...list.headers, found: { ...inventedHeaders, series: [] }, picked: [] } }],
  ['list, help', pressAnswered(list, 'h')],
  ['review', pressAnswered(list, 'down', 'enter')],
  ['review, typing', pressAnswered(list, 'down', 'enter', '1', '2')],
  ['review, its end', pressAnswered(list, 'enter', 'end')],
  ['review, not decided', pressAnswered(list, 'down', 'down', 'enter')],
  ['review of diffusion', pressAnswered(list, 'end', 'enter')],
  ['review, saved', { ...pressAnswered(list, 'enter'), notice: { words: saved, level: 'note' } }],
  ['review, help', pressAnswered(list, 'enter', 'h')],
];

describe('the screens of headers', () => {
  it.each(screens)('%s: fits every size, in Unicode and ASCII, for eyes and for a screen reader', (_name, state) => {
    for (const [columns, rows] of [
      [80, 24],
      [100, 30],
      [160, 50],
    ] as const)
      for (const look of [unicode, ascii, reader]) {
        const lines = textOf(sized(state, columns, rows), look);
        expect(lines).toHaveLength(rows);
        for (const each of lines) {
          expect(textWidth(each.trimEnd()), each).toBeLessThanOrEqual(columns);
          expect(each).not.toMatch(/NaN|undefined|Infinity|\[object/);
          expect(each).not.toMatch(/\b(safe|cleared|compliant)\b/i);
          if (look === ascii) expect(each).toMatch(/^[\x20-\x7e]*$/);
        }
        expect(lines[0]?.trim()).not.toBe('');
      }
  });

  it('the list says class, slices, coverage and counts in columns under their titles; what lacks something has a sign', () => {
    const lines = textOf(sized(list, 80, 24));
    expect(lines[0]).toContain('4 series in');
    const head = lines.find((each) => each.includes('missing')) as string;
    const first = lines.find((each) => each.includes('[x] s1 ')) as string;
    for (const title of ['slices', 'coverage', 'read', 'derived', 'assumed', 'missing'])
      expect(first.charAt(head.indexOf(title) + title.length - 1), title).toMatch(/[\dm]/);
    expect(lines.find((each) => each.includes('s2*'))).toContain('fast spin echo');
    expect(lines.find((each) => each.includes('s3*'))).toContain('not decided');
    expect(lines.join('\n')).toContain('* something must be typed');
    expect(lines.join('\n')).toContain('2 files, each is a packed file');
  });

  it('a place that does not fit its line is shown whole', () => {
    for (const name of ['list, saved', 'review, saved']) {
      const text = textOf(sized(screens.find(([each]) => each === name)![1], 80, 24)).join('');
      expect(text).toContain('/a/very/long/home/of/somebody/.local/share/holdfast/presets/read-1.5t-draft.json');
    }
  });

  it('the end of a long path is where the hand is, and a wrong one is told whole', () => {
    expect(
      textOf(sized(screens[2]![1], 80, 24))
        .at(-2)
        ?.trimEnd(),
    ).toMatch(/^type: .*\/long\/long$/);
    expect(textOf(sized(failed(), 80, 24))).toContainEqual(expect.stringMatching(/^Nothing is there under this path\./));
  });

  it('a wide screen has the values of the series under the hand beside the list, and the series beside its values', () => {
    expect(textOf(sized(list, 160, 50)).join('\n')).toMatch(/\| ..TR +3500 ms/);
    expect(textOf(sized(list, 100, 30)).join('\n')).not.toContain('3500 ms');
    expect(textOf(sized(pressAnswered(list, 'enter'), 160, 50)).join('\n')).toContain('s1: fast spin echo, sagittal, 1.5 T, 4 images');
  });

  it('the path is shown nowhere but where it is typed', () => {
    for (const [name, state] of screens.filter(([each]) => !each.includes('path') && !each.includes('saved')))
      for (const look of [unicode, reader]) expect(textOf(sized(state, 160, 50), look).join('\n'), name).not.toContain('/invented');
  });

  it('the reader says series and values in sentences, the hand on its line', () => {
    expect(textOf(sized(list, 100, 60), reader).join('\n')).toMatch(/Here: s1: fast spin echo, sagittal, 1\.5 T, 4 images.*picked/);
    expect(textOf(sized(pressAnswered(list, 'down', 'enter'), 100, 60), reader).join('\n')).toContain(
      'Here: TE: to type, missing: EchoTime is not stated',
    );
  });

  it('help of the start screen names the key', () => {
    expect(textOf(sized(pressAnswered(startState(), '?'), 100, 40)).join('\n')).toContain('Reads the headers of a folder');
  });
});
