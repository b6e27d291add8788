import { describe, expect, it } from 'vitest';
import { headerHint, headerLines, headerRow, headerRows } from '../../src/session/header-rows.js';
import { headerDraft } from '../../src/session/header-view.js';
import { headerCells, headersHeadline } from '../../src/session/header-words.js';
import type { Effect } from '../../src/session/message.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { headerAnswer, inventedHeaders, pressAnswered } from './invented-headers.js';
import { keyOf, startState } from './invented-state.js';

const list = pressAnswered(startState(), '/', 'paste /exam', 'enter');
/** The review of one of the series. */
const review = (id: string, ...keys: readonly string[]) =>
  pressAnswered(list, ...Array<string>(Number(id.slice(1)) - 1).fill('down'), 'enter', ...keys);

/** The effects of one more key. */
function asked(state: State, key: string): readonly Effect[] {
  return update(state, { kind: 'key', key: keyOf(key), atMs: state.nowMs + 1 })[1];
}

/** The hand on a line of the review. */
function onLine(state: State, field: string): State {
  return { ...state, place: { ...state.place, fields: { ...state.place.fields, 'header-values': field } } };
}

const rowOf = (state: State, field: string) => headerLines(state).find((row) => row.field === field);

describe('a folder that is typed', () => {
  it('one key of the start screen begins to type its path, Enter has it read, no other key does', () => {
    const typing = pressAnswered(startState(), '/');
    expect(typing.place.screen).toBe('headers');
    expect(typing.entry).toMatchObject({ field: 'path', text: '' });
    const typed = pressAnswered(typing, '/', 'e', 'x', 'paste /a b\n');
    expect(typed.headers.reading).toBeNull();
    expect(asked(typed, 'enter')).toEqual([{ kind: 'read-headers', ask: expect.any(Number), path: '/ex/a b' }]);
  });

  it('a path of 4000 characters is taken whole', () => {
    const path = `/${'a'.repeat(3999)}`;
    expect(asked(pressAnswered(startState(), '/', `paste ${path}`), 'enter')).toMatchObject([{ path }]);
  });

  it('tells how far it is, only of this reading, and Escape ends it with what it has', () => {
    const [reading] = update(pressAnswered(startState(), '/', 'paste /exam'), { kind: 'key', key: keyOf('enter'), atMs: 1 });
    const ask = reading.open.headers as number;
    const counted = update(reading, { kind: 'counted', ask, files: 350 })[0];
    expect(headersHeadline(counted)).toBe('Reading headers: 350 files so far');
    expect(update(reading, { kind: 'counted', ask: ask + 1, files: 350 })[0]).toBe(reading);
    expect(asked(counted, 'escape')).toEqual([{ kind: 'stop-headers' }]);
    expect(asked(counted, 's')).toEqual([]);
    expect(pressAnswered(counted, '/').entry).toBeNull();
    const found = { ...inventedHeaders, isStopped: true };
    const stopped = update(counted, { kind: 'answer', ask, answer: { kind: 'headers', found } })[0];
    expect(headersHeadline(stopped)).toMatch(/^STOPPED before the end: 4 series/);
  });

  it('a wrong path is told where it was typed, to be mended there; what was read before stays', () => {
    const [reading] = update(pressAnswered(list, '/', 'paste /examx'), { kind: 'key', key: keyOf('enter'), atMs: 1 });
    const problems = [{ code: 'folder-not-there', path: '', message: 'Nothing is there under this path.', hint: '' }];
    const told = update(reading, { kind: 'answer', ask: reading.open.headers as number, answer: { kind: 'failed', problems } })[0];
    expect(told.entry).toMatchObject({ field: 'path', text: '/examx' });
    expect(told.notice).toEqual({ words: 'Nothing is there under this path.', level: 'trouble' });
    expect(told.headers.found).toBe(inventedHeaders);
    expect(pressAnswered(told, 'backspace', 'enter').headers.path).toBe('/exam');
  });
});

describe('the series that were read', () => {
  it('stand there with class or not decided, slices, coverage, and how many values are read, derived, assumed, missing', () => {
    const [first, , third] = headerCells(list);
    expect(first).toMatchObject({ id: 's1', isPicked: true, className: 'fast spin echo', slices: '4', coverage: '17.2 mm', needed: 0 });
    const { counts } = first!;
    const values = inventedHeaders.series[0]!.values;
    for (const origin of ['read', 'derived', 'missing'] as const)
      expect(counts[origin]).toBe(values.filter((one) => one.origin === origin).length);
    expect(third).toMatchObject({ className: 'not decided', needed: null });
  });

  it('Space picks and leaves out: the draft holds what is picked and whole', () => {
    expect(headerDraft(list.headers).study?.series.map(({ id }) => id)).toEqual(['s1']);
    expect(headerDraft(list.headers).leftOut.map(({ id }) => id)).toEqual(['s2', 's3', 's4']);
    const without = pressAnswered(list, ' ');
    expect(without.headers.picked).not.toContain('s1');
    expect(headerDraft(without.headers).study).toBeNull();
    expect(pressAnswered(without, ' ').headers.picked).toContain('s1');
    const none = pressAnswered(list, 'a');
    expect(none.headers.picked).toEqual([]);
    expect(headerDraft(pressAnswered(none, 'end', ' ').headers).study?.series.map(({ id }) => id)).toEqual(['s4']);
    expect(asked(none, 's')).toEqual([]);
    expect(pressAnswered(none, 's').notice?.words).toContain('No series is picked');
  });

  it('one key saves the draft, as other drafts are; back at the start the presets are listed anew', () => {
    const effects = asked(list, 's');
    expect(effects).toHaveLength(1);
    expect(effects[0]).toMatchObject({ kind: 'save-preset', study: { status: 'draft', fieldT: 1.5, series: [{ id: 's1' }] } });
    expect(asked(list, 'escape')).toEqual([{ kind: 'list-presets' }]);
    expect(pressAnswered(list, 'escape').place.screen).toBe('start');
  });

  it('nothing is saved while nothing is whole, and it is said what is lacking', () => {
    const second = pressAnswered(list, 'a', 'down', ' ');
    expect(asked(second, 's')).toEqual([]);
    expect(pressAnswered(second, 's').notice).toEqual({ words: 'Nothing is saved: s2 is left out: type echoTimeMs', level: 'trouble' });
  });
});

describe('the review', () => {
  it('begins with what must be typed, then defaults, derived and read values, each with where it comes from', () => {
    const state = review('s2');
    const headings = headerRows(state)
      .filter(({ kind }) => kind === 'heading')
      .map(({ field }) => field.split(' ')[1]);
    expect(headings).toEqual(['needed', 'some', 'default', 'derived', 'read']);
    const some = headerLines(state).filter(({ words }) => words.includes('how much is not stated'));
    expect(some.length).toBeGreaterThan(0);
    for (const row of some) expect(row).toMatchObject({ origin: 'default', attention: true });
    expect(headerRow(state)).toMatchObject({ field: 'echoTimeMs', shown: 'to type', origin: 'missing', words: 'EchoTime is not stated' });
    expect(rowOf(state, 'repetitionTimeMs')).toMatchObject({ origin: 'read', words: 'RepetitionTime' });
    expect(rowOf(state, 'echoSpacingMs')).toMatchObject({ origin: 'default', shown: '10.00 ms' });
    expect(headerHint(state)).toMatch(/^TE 0\.01 to 5000 ms/);
  });

  it('a value is typed with its unit; the line stays, the count falls, and the series is whole', () => {
    const typed = pressAnswered(review('s2'), '0', '.', '0', '1', '2', ' ', 's', 'enter');
    expect(typed.headers.typed).toEqual({ s2: { echoTimeMs: 12 } });
    expect(headerRow(typed)).toMatchObject({
      field: 'echoTimeMs',
      shown: '12.00 ms',
      origin: 'typed',
      words: 'the header: EchoTime is not stated',
    });
    expect(typed.notice?.words).toBe('TE: nothing more must be typed');
    expect(headersHeadline(typed)).toMatch(/^s2: can be saved; \d+ missing at their defaults, 1 of them said to be there$/);
    expect(headerDraft(typed.headers).study?.series.find(({ id }) => id === 's2')?.parameters.echoTimeMs).toBe(12);
    expect(headerDraft(typed.headers).study?.notes).toContain('typed echoTimeMs');
    const cleared = pressAnswered(typed, 'delete');
    expect(cleared.headers.typed).toEqual({ s2: {} });
    expect(headersHeadline(cleared)).toBe('s2: 1 value to type before it can be used');
  });

  it('a value out of range is refused with the range, and stays typed', () => {
    const state = pressAnswered(review('s2'), '9', '9', '9', '9', 'enter');
    expect(state.entry).toMatchObject({ text: '9999' });
    expect(state.notice).toMatchObject({ words: expect.stringContaining('0.01 to 5000 ms'), level: 'trouble' });
    expect(state.headers.typed).toEqual({});
  });

  it('an expression is worked out outside and taken within the range', () => {
    const waiting = pressAnswered(review('s2'), '8', '*', '2', 'enter');
    const ask = waiting.open.expression as number;
    expect(waiting.entry?.ask).toBe(ask);
    const taken = update(waiting, { kind: 'answer', ask, answer: { kind: 'value', value: 16 } })[0];
    expect(taken.headers.typed).toEqual({ s2: { echoTimeMs: 16 } });
    const refused = update(waiting, { kind: 'answer', ask, answer: { kind: 'value', value: 1e9 } })[0];
    expect(refused.entry).toMatchObject({ ask: null, text: '8*2' });
    expect(refused.headers.typed).toEqual({});
  });

  it('a class is chosen where none was decided; what it needs is told then; Del gives back what the header says', () => {
    const undecided = review('s3');
    expect(headersHeadline(undecided)).toBe('s3: class not decided');
    expect(headerRow(undecided)?.field).toBe('class');
    expect(pressAnswered(onLine(undecided, 'repetitionTimeMs'), '1').notice?.words).toContain('Choose the class first');
    const chosen = pressAnswered(undecided, 'right');
    expect(headerRow(chosen)).toMatchObject({ field: 'class', shown: 'spin echo', origin: 'chosen' });
    expect(pressAnswered(chosen, 'right', 'right').headers.found?.series[2]?.decision.key).toBe('fast-spin-echo/2D');
    expect(headersHeadline(chosen)).toMatch(/^s3: can be saved/);
    expect(headersHeadline(pressAnswered(chosen, 'delete'))).toBe('s3: class not decided');
    expect(headerAnswer({ kind: 'class-headers', ask: 1, id: 's9', key: null })).toBeNull();
  });

  it('a part of a value that is not stated says so, though the others are read', () => {
    const read = { key: 'pacing', origin: 'read', value: { kind: 'respiratory-trigger' }, words: 'a gate' } as const;
    const [first, ...others] = inventedHeaders.series;
    const paced = { ...first!, values: first!.values.map((one) => (one.key === 'pacing' ? read : one)) };
    const { headers } = review('s1');
    const state = { ...review('s1'), headers: { ...headers, found: { ...inventedHeaders, series: [paced, ...others] } } };
    expect(rowOf(state, 'pacing.kind')).toMatchObject({ shown: 'respiratory trigger', origin: 'read' });
    expect(rowOf(state, 'pacing.periodMs')).toMatchObject({ origin: 'missing', words: 'not stated', attention: true });
    const typed = pressAnswered(onLine(state, 'pacing.periodMs'), '4', ' ', 's', 'enter');
    expect(typed.headers.typed.s1).toEqual({ pacing: { kind: 'respiratory-trigger', periodMs: 4000 } });
  });

  it('choices and flags turn; b-values bring as many averages', () => {
    const state = review('s1');
    const turned = pressAnswered(onLine(state, 'flowCompensation'), 'right');
    expect(turned.headers.typed.s1).toEqual({ flowCompensation: true });
    expect(pressAnswered(turned, 'left').headers.typed.s1).toEqual({ flowCompensation: false });
    const diffusion = pressAnswered(onLine(review('s4'), 'diffusion.bValuesSPerMm2'), 'enter', 'paste 0, 500, 1000', 'enter');
    const taken = diffusion.headers.typed.s4?.diffusion;
    expect(taken?.bValuesSPerMm2).toEqual([0, 500, 1000]);
    expect(taken?.averages).toHaveLength(3);
  });

  it('the field of the draft is typed once: series of another field are left out and named', () => {
    const typed = pressAnswered(onLine(review('s4'), 'fieldT'), '3', 'enter');
    expect(typed.headers.fieldT).toBe(3);
    const { study, leftOut } = headerDraft(typed.headers);
    expect(study?.fieldT).toBe(3);
    expect(study?.series.map(({ id }) => id)).toEqual(['s4']);
    expect(leftOut.find(({ id }) => id === 's1')?.why).toContain('a preset has one field');
    expect(pressAnswered(onLine(typed, 'fieldT'), '9', '9', 'enter').entry?.text).toBe('99');
  });

  it('n goes to the next series, round the list; Escape goes back to the list with the hand on it', () => {
    const next = review('s3', 'n');
    expect(next.headers.seriesId).toBe('s4');
    expect(pressAnswered(next, 'n').headers.seriesId).toBe('s1');
    const back = pressAnswered(next, 'escape');
    expect([back.place.screen, back.place.fields.headers]).toEqual(['headers', 's4']);
  });

  it('says what the draft assumes', () => {
    const assumed = headerRows(review('s1')).filter(({ origin }) => origin === 'assumed');
    expect(assumed.map(({ field }) => field)).toEqual(['target', 'comparison', 'region']);
  });
});
