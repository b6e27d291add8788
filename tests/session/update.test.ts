import { describe, expect, it } from 'vitest';
import { fieldHere } from '../../src/session/hands/series-commands.js';
import { nextStep } from '../../src/session/next-step.js';
import { resultNow, sessionSeries } from '../../src/session/results.js';
import type { Opened } from '../../src/session/session.js';
import { initialState, type State } from '../../src/session/state.js';
import { timeline } from '../../src/session/timeline.js';
import { update } from '../../src/session/update.js';
import { seriesHeadline } from '../../src/session/verdicts.js';
import { after, keyOf, onField, press, sessionOn, startState } from './invented-state.js';

const liver = () => press(sessionOn('liver-3t'), 'enter');
const lastDraft = (state: State, key: string) =>
  update(state, { kind: 'key', key: keyOf(key), atMs: state.nowMs + 1 })[1].find(({ kind }) => kind === 'save-draft');

describe('the start', () => {
  it('a number narrows the field strength, a word the region', () => {
    const state = press(startState(['liver-3t', 'lumbar-spine-1.5t', 'brain-3t']), '3 liv', 'enter');
    expect(state.opened?.study.id).toBe('liver-3t');
    expect(state.place.screen).toBe('order');
  });

  it('keys typed ahead of the presets open what they name once it is there', () => {
    const presets = startState(['liver-3t', 'lumbar-spine-1.5t']).presets;
    const early = press(initialState(startState().defaults, { columns: 80, rows: 24 }), '3 liv', 'enter', 'enter', 'down');
    expect([early.narrowing, early.session]).toEqual(['3 liv', null]);
    const [state] = update(early, { kind: 'presets', presets, notes: [] });
    expect([state.opened?.study.id, state.place.screen]).toEqual(['liver-3t', 'series']);
    expect(state.place).toEqual(press(startState(['liver-3t', 'lumbar-spine-1.5t']), '3 liv', 'enter', 'enter', 'down').place);
    // And only once.
    expect(update(state, { kind: 'presets', presets, notes: [] })[0].session).toBe(state.session);
  });

  it('Escape leaves at once while the presets are read; without any preset Enter says so', () => {
    const early = press(initialState(startState().defaults, { columns: 80, rows: 24 }), 'enter');
    expect(update(early, { kind: 'key', key: keyOf('escape'), atMs: 1 })[1]).toEqual([{ kind: 'quit' }]);
    const [state] = update(early, { kind: 'presets', presets: [], notes: [] });
    expect(state.notice?.words).toContain('no preset');
    expect(press(state, 'enter').early).toBeNull();
  });

  it('nothing matches: it is said, and nothing opens', () => {
    const state = press(startState(), 'xyz', 'enter');
    expect(state.session).toBeNull();
    expect(state.notice?.words).toContain('Nothing matches');
  });
});

describe('a series by hand', () => {
  it('slices 72 to 54 by keys: one step each, and undo goes back one by one', () => {
    const state = press(onField(liver(), 'sliceCount'), ...Array<string>(9).fill('-'));
    expect(resultNow(state, 't1-3d').parameters.sliceCount).toBe(54);
    // 80 lines x ceil(54 x 1.11 rounded x 6/8) = 45 partitions x 3.55 ms.
    expect(resultNow(state, 't1-3d').evaluation.figures.holdTimeS).toBeCloseTo(12.78, 6);
    expect(press(state, 'u').notice?.words).toBe('Undone: slices 56 to 54');
    expect(press(state, ...Array<string>(9).fill('u')).session?.series[0]?.set).toEqual({});
    expect(resultNow(press(state, 'u', 'u', 'r'), 't1-3d').parameters.sliceCount).toBe(56);
  });

  it('a value put back by hand is no longer set, so that what follows it follows again', () => {
    const state = press(onField(liver(), 'pixelBandwidthHz'), '+', '-');
    expect(sessionSeries(state, 't1-3d').set).toEqual({});
  });

  it('the timing that follows is shown and not set', () => {
    const state = press(onField(liver(), 'pixelBandwidthHz'), '900', 'enter');
    expect(Object.keys(sessionSeries(state, 't1-3d').set)).toEqual(['pixelBandwidthHz']);
    expect(resultNow(state, 't1-3d').parameters.repetitionTimeMs).toBeLessThan(3.55);
  });

  it.each([
    ['fieldOfViewMm', '38 cm', 380, 'already'],
    ['fieldOfViewMm', '40 cm', 400, 'to 400'],
    ['matrixPhase', '165', 166, 'is taken as 166'],
    ['partialFourierPhase', '6/8', 0.75, '6/8'],
    ['sliceThicknessMm', '4', 4, '4.0 mm'],
  ] as const)('%s typed as %s', (path, text, value, words) => {
    const state = press(onField(liver(), path), ...text.slice(0, 1), ...text.slice(1).split(''), 'enter');
    expect(resultNow(state, 't1-3d').parameters[path]).toBe(value);
    expect(state.notice?.words).toContain(words);
    expect(state.entry).toBeNull();
  });

  it.each([
    ['sliceCount', '0', 'from 1 to 2048'],
    ['sliceThicknessMm', '4 s', 'mm'],
    ['averages', '9999', 'from 0.1 to 256'],
  ] as const)('%s typed as %s is refused with the range, and the old value stays', (path, text, words) => {
    const before = onField(liver(), path);
    const { state, effects } = after(
      before,
      [...text]
        .map((each) => ({ kind: 'key' as const, key: keyOf(each), atMs: 1 }))
        .concat([{ kind: 'key', key: keyOf('enter'), atMs: 2 }]),
    );
    const ask = effects.find((effect) => effect.kind === 'read-expression');
    expect(resultNow(state, 't1-3d').parameters).toEqual(resultNow(before, 't1-3d').parameters);
    // What may be an expression is asked outside; the rest is said at once.
    if (ask === undefined) expect(state.notice?.words).toContain(words);
    expect(state.entry).not.toBeNull();
  });

  it('an expression is asked outside, and only the newest answer counts', () => {
    const typed = press(onField(liver(), 'averages'), 'enter', '*2');
    const [asked, effects] = update(typed, { kind: 'key', key: keyOf('enter'), atMs: 9 });
    const ask = effects.find((effect) => effect.kind === 'read-expression');
    expect(ask).toMatchObject({ text: '*2', own: { name: 'averages', value: 1 } });
    const stale = update(asked, { kind: 'answer', ask: 999, answer: { kind: 'value', value: 7 } })[0];
    expect(stale).toEqual(asked);
    const answered = update(asked, { kind: 'answer', ask: asked.asks, answer: { kind: 'value', value: 2 } })[0];
    expect(resultNow(answered, 't1-3d').parameters.averages).toBe(2);
    expect(update(answered, { kind: 'answer', ask: asked.asks, answer: { kind: 'value', value: 5 } })[0]).toEqual(answered);
  });

  it('a parameter that the preset locks is opened by one key, and that can be undone', () => {
    const plain = liver();
    const opened = plain.opened as Opened;
    const series = opened.study.series.map((each) => (each.id === 't1-3d' ? { ...each, locked: ['averages' as const] } : each));
    const locked = onField({ ...plain, opened: { ...opened, study: { ...opened.study, series } } }, 'averages');
    const refused = press(locked, '+');
    expect(refused.notice?.words).toContain('locked in the preset: l opens it');
    expect(resultNow(refused, 't1-3d').parameters.averages).toBe(1);
    expect(resultNow(press(locked, 'l', '+'), 't1-3d').parameters.averages).toBe(2);
    expect(press(locked, 'l', 'u').session?.series[0]?.opened).toEqual([]);
  });

  it('pairs are edited together, as one step', () => {
    const plain = press(sessionOn('lumbar-spine-1.5t'), 'enter');
    const opened = plain.opened as Opened;
    const series = opened.study.series.map((each) => (each.id === 't2-sag' ? { ...each, pairedWith: ['t1-sag'] } : each));
    const paired = onField({ ...plain, opened: { ...opened, study: { ...opened.study, series } } }, 'sliceThicknessMm');
    const thicker = press(paired, '+');
    expect(resultNow(thicker, 't1-sag').parameters.sliceThicknessMm).toBe(resultNow(thicker, 't2-sag').parameters.sliceThicknessMm);
    expect(thicker.notice?.words).toContain('also in t1-sag');
    expect(press(thicker, 'u').session).toEqual(paired.session);
  });
});

describe('the next step', () => {
  it('tells the price that the step then has', () => {
    const state = onField(liver(), 'matrixPhase');
    const { down } = nextStep(state, 't1-3d', fieldHere(state));
    const stepped = press(state, '-');
    expect(down?.value).toBe(192);
    expect(down?.result.evaluation.figures).toEqual(resultNow(stepped, 't1-3d').evaluation.figures);
  });

  it('a plateau is named, and the jump goes to where time changes', () => {
    const state = onField(press(sessionOn('lumbar-spine-1.5t'), 'enter'), 'sliceCount');
    const { jump, sentences } = nextStep(state, 't2-sag', fieldHere(state));
    expect(sentences.join(' ')).toContain('no change in time');
    expect(jump).not.toBeNull();
    const there = press(state, 'j');
    expect(resultNow(there, 't2-sag').parameters.sliceCount).toBe(jump);
    const time = (of: State) => resultNow(of, 't2-sag').evaluation.figures.scanTimeS;
    expect(time(there)).not.toBe(time(state));
    // One before the jump nothing has changed yet.
    const before = press(there, (jump ?? 0) > 15 ? '-' : '+');
    expect(time(before)).toBe(time(state));
  });

  it('a split is named before it doubles the time', () => {
    const state = press(onField(press(sessionOn('lumbar-spine-1.5t'), 'enter'), 'sliceCount'), 'j');
    const oneLess = press(state, '-');
    const words = nextStep(oneLess, 't2-sag', fieldHere(oneLess)).sentences.join(' ');
    expect(words).toMatch(/slices fit, split into 2, \d+:\d\d becomes \d+:\d\d/);
  });
});

describe('limits and the clock', () => {
  it('the verdict is OVER by 6.0 s for 17.0 s in 11 s', () => {
    const state = press(liver(), 'p', '11', 'enter', 'escape');
    expect(seriesHeadline(state, 't1-3d').text).toBe('OVER by 6.0 s: breath-hold 17.0 s, this patient 11 s');
  });

  it('a practice hold fills in the seconds between two keys', () => {
    const patient = press(liver(), 'p');
    const begun = update(patient, { kind: 'key', key: keyOf('s'), atMs: 100_000 })[0];
    const ended = update(begun, { kind: 'key', key: keyOf('s'), atMs: 112_340 })[0];
    expect(ended.session?.limits.holdS).toBe(12.3);
    expect(ended.practiceSinceMs).toBeNull();
  });

  it('the time of the patient runs from the first series that is started', () => {
    const limited = press(sessionOn('liver-3t'), 'p', 'down', 'down', 'down', '10', 'enter', 'escape');
    expect(timeline(limited).leftS).toBe(600);
    const later = update(limited, { kind: 'tick', atMs: limited.nowMs + 60_000 })[0];
    expect(timeline(later).leftS).toBe(600);
    const started = press(later, 's');
    const gone = update(started, { kind: 'tick', atMs: started.nowMs + 90_000 })[0];
    expect(timeline(gone).leftS).toBeCloseTo(510, 6);
  });

  it('a running series counts its breath-holds, and is done after the last', () => {
    let state = press(sessionOn('liver-3t'), 's', 's');
    for (const hold of [1, 2, 3, 4]) {
      expect(state.session?.series[0]?.run?.holdsDone).toBe(hold - 1);
      state = update(state, { kind: 'tick', atMs: state.nowMs + 18_000 })[0];
      state = press(state, 's');
    }
    expect(state.session?.series[0]?.state).toBe('done');
    expect(press(state, 's').session?.series[0]?.run?.again).toBe(true);
  });

  it('a series that keeps its place is passed by the others', () => {
    const order = (state: State) => state.session?.series.map(({ id }) => id);
    const state = press(sessionOn('liver-3t'), 'down', 'l', 'up', '+');
    expect(order(state)).toEqual(['dual-echo', 'ss-cor', 't1-3d', 't2fs', 'dwi']);
  });
});

describe('what is kept', () => {
  it('every change of the session is saved as a draft, and looking is not', () => {
    const state = onField(liver(), 'sliceCount');
    expect(lastDraft(state, '-')).toBeDefined();
    expect(lastDraft(state, 'down')).toBeUndefined();
  });

  it('a record is saved once, and again only after a change', () => {
    const changed = press(onField(liver(), 'sliceCount'), '-', 'e');
    const [saving, effects] = update(changed, { kind: 'key', key: keyOf('s'), atMs: changed.nowMs + 1 });
    const effect = effects.find(({ kind }) => kind === 'save-record');
    expect(effect).toMatchObject({ record: { preset: { id: 'liver-3t' }, series: [{ id: 't1-3d', outcome: 'done' }] }, again: false });
    const [saved, then] = update(saving, { kind: 'answer', ask: saving.asks, answer: { kind: 'done', words: 'Saved' } });
    expect(then).toEqual([{ kind: 'drop-draft' }]);
    expect(update(saved, { kind: 'key', key: keyOf('s'), atMs: saved.nowMs + 1 })[1]).toEqual([]);
    expect(press(saved, 'u').session?.saved).toBe(false);
  });

  it('a failed saving says so and is tried again as the same record', () => {
    const changed = press(onField(liver(), 'sliceCount'), '-', 'e', 's');
    const problems = [{ code: 'disk-full', path: '', message: 'The disk is full.', hint: 'Make room.' }];
    const failed = update(changed, { kind: 'answer', ask: changed.asks, answer: { kind: 'failed', problems } })[0];
    expect(failed.notice).toEqual({ words: 'The disk is full. Make room.', level: 'trouble' });
    expect(update(failed, { kind: 'key', key: keyOf('s'), atMs: failed.nowMs + 1 })[1][0]).toMatchObject({
      kind: 'save-record',
      again: true,
    });
  });

  it('what is changed while the record is being saved is not taken for saved', () => {
    const saving = press(onField(liver(), 'sliceCount'), '-', 'e', 's');
    const changed = press(saving, 'g');
    const answered = update(changed, { kind: 'answer', ask: saving.asks, answer: { kind: 'done', words: 'Saved' } })[0];
    expect(answered.session?.saved).toBe(false);
    expect(answered.notice?.words).toContain('changed meanwhile');
  });

  it('a session of another layout is not gone on with', () => {
    const asked = { ...startState(), asks: 1, open: { draft: 1 } };
    const state = update(asked, { kind: 'answer', ask: 1, answer: { kind: 'draft', session: { layout: 99 } } })[0];
    expect(state.session).toBeNull();
    expect(state.notice?.level).toBe('trouble');
  });
});
