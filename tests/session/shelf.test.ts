import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { openDraft } from '../../src/session/hands/start-commands.js';
import type { Answer, Effect, PresetChoice } from '../../src/session/message.js';
import { presetRows, revisionRow, revisionRows } from '../../src/session/preset-rows.js';
import { recordRows, recordsHeadline } from '../../src/session/record-rows.js';
import { releaseHeadline, releaseRow } from '../../src/session/release-form.js';
import type { RecordRow } from '../../src/session/shelf.js';
import { shelfText } from '../../src/session/shelf-text.js';
import { startRows } from '../../src/session/start-list.js';
import type { State } from '../../src/session/state.js';
import { draftNow, update } from '../../src/session/update.js';
import { namedRecord } from '../../src/study/record-meant.js';
import { RecordCounts } from '../../src/study/record-report.js';
import { type PresetNow, suggestVariant } from '../../src/study/record-report-suggestion.js';
import type { Study } from '../../src/study/study.js';
import { keyOf, onField, after as play, presetChoice, press, startState } from './invented-state.js';

const shipped = presetChoice('liver-3t');

/** A revision of the liver preset at the site, perhaps with another slice in the dynamic series. */
function revision(number: number, values: Record<string, unknown> = {}, head: Partial<Study> = {}): PresetChoice {
  const series = shipped.study.series.map((each) =>
    each.id === 't1-3d' ? { ...each, parameters: { ...each.parameters, ...values } } : each,
  );
  const released = { role: 'physicist', day: '2026-03-02', reason: `reason ${number}` };
  return {
    origin: 'site',
    hash: String(number),
    study: { ...shipped.study, series, status: 'reviewed', revision: number, released, ...head },
  };
}

/** The start screen of somebody at a site, with what the world answers. */
function atSite(presets: readonly PresetChoice[], secondRole = false): State {
  const start = startState(['knee-3t']);
  return {
    ...start,
    presets: [...presets, ...start.presets],
    defaults: { ...start.defaults, release: { folder: '/site', secondRole } },
  };
}

/** Presses keys and answers what they asked for. */
function withAnswers(state: State, answer: (effect: Effect) => Answer | null, ...keys: readonly string[]): State {
  const names = new Set(['enter', 'up', 'down', 'escape', 'right', 'left', 'tab', 'end', 'home', 'backspace']);
  let next = state;
  for (const key of keys.flatMap((each) => (names.has(each) ? [each] : [...each]))) {
    const { state: changed, effects } = play(next, [{ kind: 'key', key: keyOf(key), atMs: next.nowMs + 1000 }]);
    next = changed;
    for (const effect of effects) {
      const answered = 'ask' in effect ? answer(effect) : null;
      if (answered !== null && 'ask' in effect) next = update(next, { kind: 'answer', ask: effect.ask, answer: answered })[0];
    }
  }
  return next;
}

const two = [revision(2, { sliceThicknessMm: 3.5 }), revision(1)];

/** A world with these revisions in which every check passes. */
function world(revisions: readonly PresetChoice[], release: (effect: Effect) => Answer | null = () => null) {
  return (effect: Effect): Answer | null => {
    if (effect.kind === 'read-revisions') return { kind: 'revisions', presets: revisions, notes: [] };
    if (effect.kind === 'check-release') return { kind: 'checked', findings: [], newest: revisions[0]?.study ?? null };
    return release(effect);
  };
}

/** A draft of revision 2 with 4 mm, at the revisions of its preset. */
function draftWithFour(answer: (effect: Effect) => Answer | null, state = atSite(two)): State {
  const series = withAnswers(state, answer, 'right', 'liver', 'enter', 'd', 'enter');
  return withAnswers(onField(series, 'sliceThicknessMm'), answer, '+', 'o', 'm', 'enter');
}

describe('presets', () => {
  it('are found by typing and ordered by region and field', () => {
    const state = press(atSite(two), 'right');
    expect(state.place.screen).toBe('presets');
    expect(presetRows(press(state, '3 liver')).map(({ field }) => field)).toEqual(['site liver-3t@2', 'site liver-3t@1']);
    expect(presetRows(press(state, 'knee')).map(({ study }) => study.id)).toEqual(['knee-3t']);
    expect(press(state, 'x', 'escape').shelf.narrowing).toBe('');
    expect(press(state, 'x', 'escape', 'escape').place.screen).toBe('start');
  });

  it('at the start only what is taken of an id is offered, however an older one is called', () => {
    const renamed = [revision(2, {}, { title: 'Abdomen' }), revision(1, {}, { title: 'Old name' })];
    const rows = (typed: string) =>
      startRows(press(atSite(renamed), typed)).flatMap((row) => (row.kind === 'preset' ? [row.preset.study.title] : []));
    expect(rows('abdomen')).toEqual(['Abdomen']);
    expect(rows('old')).toEqual([]);
  });

  it('revisions are read late: an answer to an older question is dropped', () => {
    const [first, [asked]] = update(press(atSite(two), 'right', 'liver'), { kind: 'key', key: keyOf('enter'), atMs: 9e6 });
    if (asked?.kind !== 'read-revisions') throw new Error('no question');
    const again = press(first, 'escape', 'enter');
    const late = update(again, { kind: 'answer', ask: asked.ask, answer: { kind: 'revisions', presets: two, notes: [] } })[0];
    expect(late.shelf.revisions?.presets).toBeNull();
  });

  it('compares a revision with the one before, and with any that was marked', () => {
    const state = withAnswers(atSite(two), world(two), 'right', 'liver', 'enter');
    expect(revisionRows(state).map(({ study }) => study.revision)).toEqual([2, 1]);
    const compared = press(state, 'enter');
    const text = shelfText(compared, false).map((line) => line.text);
    expect(text.join('\n')).toMatch(/slice thickness\s+3 mm\s+3\.5 mm\s+\+17 %/);
    expect(text.join('\n')).toMatch(/SNR\s+100 %\s+117 %/);
    expect(press(state, 'down', 'enter').notice?.words).toContain('Nothing stands before revision 1');
    const backwards = press(state, ' ', 'down', 'enter');
    expect(backwards.shelf.compared).toMatchObject({ from: { revision: 2 }, to: { revision: 1 } });
  });

  it('a draft is a session on the revision; one that is not saved is not thrown away', () => {
    const state = withAnswers(atSite(two), world(two), 'right', 'liver', 'enter', 'down', 'd');
    expect(state.opened?.study.revision).toBe(1);
    expect(state.place.screen).toBe('order');
    const changed = draftWithFour(world(two));
    expect(revisionRow(changed)).toMatchObject({ origin: 'session', study: { status: 'draft', revision: 2 } });
    const refused = press(changed, 'down', 'd');
    expect(refused.notice?.words).toContain('Save the record first');
    expect(refused.session).toBe(changed.session);
    const saved = play(changed, [{ kind: 'key', key: keyOf('s'), atMs: 9e6 }]);
    expect(saved.effects.find(({ kind }) => kind === 'save-preset')).toBeDefined();
  });
});

describe('a session that was left among the presets', () => {
  it('goes on in its running order: what was shown there was not saved', () => {
    const state = draftWithFour(world(two));
    const draft = JSON.parse(JSON.stringify(draftNow(state)));
    const [again] = openDraft(startState(), draft);
    expect(again.place).toMatchObject({ screen: 'order', back: [] });
    expect(again.session?.series.find(({ id }) => id === 't1-3d')?.set).toEqual(
      state.session?.series.find(({ id }) => id === 't1-3d')?.set,
    );
  });
});

describe('releasing', () => {
  const released = (effect: Effect): Answer | null =>
    effect.kind === 'release'
      ? { kind: 'released', study: { ...effect.study, released: { ...effect.said, day: '2026-04-01' } }, path: '/site/x' }
      : null;
  const effectsOf = (state: State, ...keys: readonly string[]) => {
    const asked: Effect[] = [];
    withAnswers(
      state,
      (effect) => {
        asked.push(effect);
        return world(two)(effect);
      },
      ...keys,
    );
    return asked.filter(({ kind }) => kind === 'release');
  };

  it('takes a typed role, a typed reason and the word in full; whatever is missing, nothing is written', () => {
    const state = draftWithFour(world(two));
    for (const keys of [
      ['r', 'end', 'enter', 'RELEASE', 'enter'],
      ['r', 'end', 'enter', 'release', 'enter'],
      ['r', 'down', 'down', 'enter', 'physicist', 'enter', 'end', 'enter', 'RELEASE', 'enter'],
      ['r', 'down', 'down', 'enter', 'physicist', 'enter', 'enter', 'short holds', 'enter', 'enter', 'RELEAS', 'enter'],
      ['r', 'down', 'down', 'enter', 'physicist', 'enter', 'enter', 'born 1.2.1950', 'enter', 'enter', 'RELEASE', 'enter'],
      ['r', 'enter', 'enter', 'enter', 'enter', 'enter', 'enter', 'enter', 'enter', 'enter', 'enter'],
    ])
      expect(effectsOf(state, ...keys), keys.join(' ')).toEqual([]);
    const [effect] = effectsOf(
      state,
      'r',
      'down',
      'down',
      'enter',
      'physicist',
      'enter',
      'enter',
      'short holds',
      'enter',
      'enter',
      'RELEASE',
      'enter',
    );
    expect(effect).toMatchObject({
      basedOn: 2,
      said: { role: 'physicist', reason: 'short holds' },
      study: { id: 'liver-3t', revision: 3, status: 'reviewed' },
    });
  });

  it('asks for a second role where the site wants it, and that is another one', () => {
    const state = draftWithFour(world(two), atSite(two, true));
    const keys = ['r', 'down', 'down', 'enter', 'physicist', 'enter'];
    const rest = ['enter', 'short holds', 'enter', 'enter', 'RELEASE', 'enter'];
    expect(effectsOf(state, ...keys, 'down', ...rest)).toEqual([]);
    expect(effectsOf(state, ...keys, 'enter', 'Physicist', 'enter', ...rest)).toEqual([]);
    expect(effectsOf(state, ...keys, 'enter', 'lead technologist', 'enter', ...rest)).toMatchObject([
      { said: { secondRole: 'lead technologist' } },
    ]);
  });

  it('is refused while a check failed or is not through, and where nothing differs', () => {
    const typed = ['r', 'down', 'down', 'enter', 'physicist', 'enter', 'enter', 'short holds', 'enter', 'enter', 'RELEASE', 'enter'];
    const finding = { level: 'failure', code: 'must-keep', series: 't1-3d', text: 'crossed' } as const;
    const failing = (effect: Effect): Answer | null =>
      effect.kind === 'check-release' ? { kind: 'checked', findings: [finding], newest: two[0]!.study } : world(two)(effect);
    const failed = withAnswers(draftWithFour(world(two)), failing, ...typed);
    expect(releaseHeadline(failed)).toBe('CANNOT BE RELEASED: 1 check failed');
    expect(failed.notice?.words).toContain('A check failed');
    const waiting = withAnswers(
      draftWithFour(world(two)),
      (effect) => (effect.kind === 'check-release' ? null : world(two)(effect)),
      ...typed,
    );
    expect(waiting.notice?.words).toContain('The checks are not through yet');
    const unchanged = withAnswers(atSite(two), world(two, released), 'right', 'liver', 'enter', 'd', 'm', 'enter', ...typed);
    expect(unchanged.notice?.words).toContain('Nothing differs from revision 2');
    expect(press(withAnswers(atSite(two), world(two), 'right', 'liver', 'enter'), 'r').notice?.words).toContain("is the site's already");
    const nowhere = { ...withAnswers(atSite(two), world(two), 'right', 'liver', 'enter') };
    expect(
      press({ ...nowhere, defaults: { ...nowhere.defaults, release: { folder: null, secondRole: false } } }, 'r').notice?.words,
    ).toContain('--presets DIR');
  });

  it('of something older than what the site has says so before anything is typed', () => {
    const state = withAnswers(atSite([...two, shipped]), world([...two, shipped]), 'right', 'liver', 'enter', 'end', 'r');
    expect(state.shelf.release).toMatchObject({ basedOn: 1, study: { status: 'starter' } });
    expect(releaseHeadline(state)).toBe('Made from revision 1; the site has revision 2 already: d shows what differs');
  });

  it('that cannot be checked says why, and writes nothing', () => {
    const problem = { code: 'not-there', path: '', message: 'The folder of presets /site is not there.', hint: 'Check the spelling.' };
    const failing = (effect: Effect): Answer | null =>
      effect.kind === 'check-release' ? { kind: 'failed', problems: [problem] } : world(two)(effect);
    const state = withAnswers(draftWithFour(world(two)), failing, 'r', 'end', 'enter', 'RELEASE', 'enter');
    expect(releaseHeadline(state)).toBe('CANNOT BE CHECKED: The folder of presets /site is not there. Check the spelling.');
    expect(state.notice?.words).toContain('Not released. The folder of presets /site is not there.');
    expect(state.open.release).toBeUndefined();
  });

  it('goes back to the revisions and reads them anew', () => {
    const keys = ['r', 'down', 'down', 'enter', 'physicist', 'enter', 'enter', 'short holds', 'enter', 'enter', 'RELEASE', 'enter'];
    const state = withAnswers(draftWithFour(world(two)), world(two, released), ...keys);
    expect([state.place.screen, state.shelf.release]).toEqual(['revisions', null]);
    expect(state.notice?.words).toBe('liver-3t revision 3, reviewed; released 2026-04-01 by physicist: short holds');
  });

  it('of a draft preset asks from which revision it was made', () => {
    const draft: PresetChoice = { ...revision(1, { sliceThicknessMm: 4 }, { id: 'liver-3t-draft', status: 'draft' }), origin: 'own' };
    const answer = (effect: Effect): Answer | null =>
      effect.kind === 'read-revisions' ? { kind: 'revisions', presets: [draft], notes: [] } : world(two)(effect);
    const state = withAnswers(atSite([...two, draft]), answer, 'right', 'draft', 'enter', 'r');
    expect(state.shelf.release).toMatchObject({ id: 'liver-3t', basedOn: null });
    const typed = withAnswers(
      state,
      answer,
      'down',
      'down',
      'enter',
      'physicist',
      'enter',
      'enter',
      'x',
      'enter',
      'enter',
      'RELEASE',
      'enter',
    );
    expect(typed.notice?.words).toContain('From which revision of liver-3t was it made? The newest of the site is 2');
    expect(releaseRow(typed)?.field).toBe('basedOn');
    const asked = withAnswers(typed, answer, 'enter', '2', 'enter', 'end', 'enter', 'RELEASE', 'enter');
    expect(asked.open.release).toBeDefined();
  });

  const keys = ['r', 'down', 'down', 'enter', 'physicist', 'enter', 'enter', 'short holds', 'enter', 'enter', 'RELEASE', 'enter'];
  const first =
    (theirs: Study, base: Study | null = two[0]!.study) =>
    (effect: Effect): Answer | null =>
      effect.kind === 'release' && effect.basedOn === 2 ? { kind: 'taken', theirs, base } : null;

  it('somebody was first: theirs is told, what differs is shown, and one key takes the own changes over on top', () => {
    const theirs = revision(3, { sliceThicknessMm: 3.5 }, { title: 'Abdomen' }).study;
    const there = first(theirs);
    const answer = (effect: Effect): Answer | null =>
      effect.kind === 'check-release' && effect.study.revision === 4
        ? { kind: 'checked', findings: [], newest: theirs }
        : world(two, there)(effect);
    const told = withAnswers(draftWithFour(answer), answer, ...keys);
    expect(releaseHeadline(told)).toBe('NOT RELEASED: physicist was first with revision 3');
    const shown = shelfText(withAnswers(told, answer, 'd'), false)
      .map((line) => line.text)
      .join('\n');
    expect(shown).toMatch(/slice thickness\s+3\.5 mm\s+4 mm/);
    const over = withAnswers(told, answer, 't');
    expect(over.shelf.release).toMatchObject({ basedOn: 3, taken: null, role: 'physicist', study: { title: 'Abdomen' } });
    expect(over.shelf.release?.notes).toEqual(['taken over: t1-3d sliceThicknessMm 3.5 to 4']);
    expect(over.notice?.words).toContain('then type RELEASE');
    // The word is typed anew: nothing goes out with the key that took the changes over.
    expect(over.open.release).toBeUndefined();
    const asked = withAnswers(over, answer, 'enter', 'RELEASE', 'enter');
    expect(asked.open.release).toBeDefined();
  });

  it('where both changed the same value a person decides; where the start is gone nothing is guessed', () => {
    const theirs = revision(3, { sliceThicknessMm: 5 }).study;
    const answer = world(two, first(theirs));
    const both = withAnswers(draftWithFour(answer), answer, ...keys, 't');
    expect(both.shelf.release?.taken).not.toBeNull();
    expect(both.shelf.release?.notes).toEqual(['changed by both: t1-3d sliceThicknessMm, yours 4, theirs 5']);
    const gone = world(two, first(theirs, null));
    expect(withAnswers(draftWithFour(gone), gone, ...keys, 't').notice?.words).toContain('Revision 2 is not there any more');
  });
});

describe('records', () => {
  const records = [...inventedRecords(30, 3)];
  const rows = records.map(
    (record, at): RecordRow => ({
      ...namedRecord(record),
      file: '/r.jsonl',
      line: at + 1,
      id: record.id,
      revision: record.preset.revision,
      series: record.series.length,
      rewritten: 0,
    }),
  );
  const list = (typed: string, meant = rows.length): Answer => ({
    kind: 'record-list',
    list: { records: meant, meant, damaged: 1, stopped: false, notes: ['Line 4 is damaged'], typed, rows },
  });
  const answer = (effect: Effect): Answer | null => {
    if (effect.kind === 'list-records') return list(effect.typed);
    return effect.kind === 'read-record' ? { kind: 'one-record', record: records[effect.line - 1]! } : null;
  };

  it('are listed and found by typing, without reading again where all are here', () => {
    const state = withAnswers(startState(), answer, 'left');
    expect(recordsHeadline(state)).toBe('30 of 30 records, 1 damaged line skipped');
    const { state: typed, effects } = play(
      state,
      [...'trainee'].map((text) => ({ kind: 'key', key: { name: 'text', text }, atMs: 1 }) as const),
    );
    expect(effects).toEqual([]);
    const found = recordRows(typed);
    expect(found.length).toBeGreaterThan(0);
    expect(found.length).toBeLessThan(30);
    expect(found.every(({ role }) => role === 'trainee')).toBe(true);
    expect(recordsHeadline(typed)).toContain(`${found.length} of 30`);
  });

  it('are read again where only the newest are here; the older reading is not waited for', () => {
    const state = withAnswers(startState(), (effect) => (effect.kind === 'list-records' ? list('', 5000) : null), 'left');
    const { state: typed, effects } = play(state, [{ kind: 'key', key: { name: 'text', text: 'p' }, atMs: 1 }]);
    expect(effects).toMatchObject([{ kind: 'list-records', typed: 'p' }]);
    const again = play(typed, [{ kind: 'key', key: { name: 'text', text: 'a' }, atMs: 2 }]);
    const [first] = effects;
    const late = update(again.state, { kind: 'answer', ask: first !== undefined && 'ask' in first ? first.ask : -1, answer: list('p') })[0];
    expect(late.shelf.list?.read).toBeNull();
  });

  it('a period that is being typed is read for again, since its end widens it', () => {
    const state = withAnswers(
      startState(),
      (effect) => (effect.kind === 'list-records' ? list(effect.typed, effect.typed === '' ? 5000 : 30) : null),
      'left',
      '2026-01',
    );
    const asked = (text: string) =>
      play(
        state,
        [...text].map((each) => ({ kind: 'key', key: { name: 'text', text: each }, atMs: 1 }) as const),
      ).effects;
    expect(asked(' l')).toEqual([]);
    expect(asked('.')).toMatchObject([{ typed: '2026-01.' }]);
    expect(asked('..')).toMatchObject([{ typed: '2026-01.' }, { typed: '2026-01..' }]);
  });

  it('a list that gave way to a report is read again when one comes back', () => {
    const state = press(startState(), 'left', 'tab');
    expect([state.place.screen, state.shelf.list]).toEqual(['report', null]);
    const ask = state.open.report ?? -1;
    const failed = update(state, { kind: 'answer', ask, answer: { kind: 'failed', problems: [] } })[0];
    const back = play(failed, [{ kind: 'key', key: keyOf('escape'), atMs: 1 }]);
    expect([back.state.place.screen, back.effects]).toMatchObject(['records', [{ kind: 'list-records' }]]);
  });

  it('a long reading says how far it is, takes keys, and Escape ends it before it goes back', () => {
    const state = press(startState(), 'left');
    const ask = state.open.list ?? -1;
    const told = update(state, { kind: 'progress', ask, share: 0.4 })[0];
    expect(recordsHeadline(told)).toBe('Reading the records: 40 %');
    expect(update(told, { kind: 'progress', ask: ask - 1, share: 0.9 })[0]).toBe(told);
    const stopped = play(told, [{ kind: 'key', key: keyOf('escape'), atMs: 1 }]);
    expect(stopped.effects).toEqual([{ kind: 'stop-reading' }]);
    expect(stopped.state.place.screen).toBe('records');
    const answered = update(stopped.state, { kind: 'answer', ask, answer: list('') })[0];
    expect(press(answered, 'escape').place.screen).toBe('start');
  });

  it('what the report suggests is saved as drafts by one key, and only where it suggests something', () => {
    const counts = new RecordCounts();
    for (const record of inventedRecords(400, 2)) counts.add(record);
    const report = counts.report();
    const suggestions = report.presets[0]!.series.map((series) => suggestVariant(shipped.study, report.presets[0]!, series, new Map()));
    const variants = suggestions.filter(({ kind }) => kind === 'variant').length;
    expect(variants).toBeGreaterThan(0);
    const withNow =
      (now: ReadonlyMap<string, PresetNow>) =>
      (effect: Effect): Answer | null => {
        if (effect.kind !== 'report-records') return answer(effect);
        const shown = { report, files: 1, records: 400, damaged: 0, chosen: '', now };
        return { kind: 'record-report', report: { records: 400, meant: 400, damaged: 0, stopped: false, notes: [], shown } };
      };
    const none = withAnswers(startState(), withNow(new Map()), 'left', 'tab');
    expect(play(none, [{ kind: 'key', key: keyOf('s'), atMs: 9e6 }]).effects).toEqual([]);
    const some = withAnswers(startState(), withNow(new Map([['liver-3t', { study: shipped.study, suggestions }]])), 'left', 'tab');
    const { effects, state } = play(some, [{ kind: 'key', key: keyOf('s'), atMs: 9e6 }]);
    expect(effects.map(({ kind }) => kind)).toEqual(Array.from({ length: variants }, () => 'save-preset'));
    expect(effects[0]).toMatchObject({ study: { status: 'draft', notes: expect.stringContaining('nobody has reviewed it') } });
    expect(state.open.preset).toBe(state.asks);
  });

  it('one is shown planned against used, and the report is of what was typed', () => {
    const state = withAnswers(startState(), answer, 'left', 'enter');
    const text = shelfText(state, false).map((line) => line.text);
    expect(text[0]).toContain(records[0]!.id);
    expect(text.some((line) => /planned\s+used/.test(line))).toBe(true);
    const asked = play(press(withAnswers(startState(), answer, 'left'), 'pain'), [{ kind: 'key', key: keyOf('tab'), atMs: 9e6 }]);
    expect(asked.effects).toMatchObject([{ kind: 'report-records', typed: 'pain' }]);
  });
});
