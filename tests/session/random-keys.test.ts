import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { parameterKeys } from '../../src/calc/parameters.js';
import { answerSearch } from '../../src/effects/answer-search.js';
import { headlineOf } from '../../src/screens/common-lines.js';
import { lineText } from '../../src/screens/line.js';
import { screenLines } from '../../src/screens/screen-lines.js';
import { type BudgetProblem, planBudget } from '../../src/search/budget.js';
import { type CarryProblem, carryStudy } from '../../src/search/carry-study.js';
import type { SearchProblem } from '../../src/search/problem-to-solve.js';
import { draftOf } from '../../src/session/draft.js';
import type { Answer, Effect, Message, PresetChoice } from '../../src/session/message.js';
import { shelfScreens } from '../../src/session/shelf-headline.js';
import type { ScreenName, State } from '../../src/session/state.js';
import { draftNow, update } from '../../src/session/update.js';
import { ReadingCounts } from '../../src/study/readings-report.js';
import type { SessionRecord } from '../../src/study/record.js';
import { isMeantRecord, namedRecord } from '../../src/study/record-meant.js';
import { RecordCounts } from '../../src/study/record-report.js';
import type { Study } from '../../src/study/study.js';
import { asciiGlyphs } from '../../src/terminal/glyphs.js';
import { twelveTimes } from '../study/read-times.js';
import { knownProblem, picturesOf } from './drawn-picture.js';
import { headerAnswer } from './invented-headers.js';
import { keyOf, presetChoice } from './invented-state.js';
import { startWithScanners } from './shipped-scanners.js';

const named = [
  'up',
  'down',
  'left',
  'right',
  'home',
  'end',
  'page-up',
  'page-down',
  'tab',
  'shift-tab',
  'enter',
  'escape',
  'backspace',
  'delete',
  'paste',
];
const keys = named.concat([...'abcdefghijklmnopqrstuvwxyz0123456789.-+=/*^()% ?:,']);

const look = { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 0, reader: false } as const;

/** Where somebody begins: in the running order, among the presets, with a release that lacks its word alone, or with a folder of headers. */
const beginnings = [
  [],
  ['m', 'enter', 'enter', 'escape'],
  ['m', 'tab', 'tab', 'escape', 'enter'],
  ['enter', 'down', '+', 'm', 'enter', 'r', 'down', 'down', 'enter', 'paste physicist', 'enter', 'enter', 'paste short', 'enter'],
  ['/', 'paste /exam', 'enter', 'down', 'enter'],
] as const;

/** A step of somebody at the keys, of the clock, of the window; by name, so that a failure can be read. */
const step = fc.oneof(
  { weight: 40, arbitrary: fc.constantFrom(...keys) },
  { weight: 20, arbitrary: fc.constantFrom('down', '+', '-', 'down', 'up', 'enter', 'u', 'r') },
  { weight: 4, arbitrary: fc.constantFrom('f', 'a', 'b', 'm', 'c', 'k', '1', '2', '9') },
  { weight: 3, arbitrary: fc.constantFrom('o', 't', 'tab', 'n', 's', 'w', 'right') },
  { weight: 5, arbitrary: fc.constantFrom('m', 'tab', 'd', 'r', 't', ' ', 'end', 'paste RELEASE', 'paste physicist', 'paste 2') },
  { weight: 2, arbitrary: fc.constantFrom('wait 500', 'wait 20000') },
  { weight: 1, arbitrary: fc.constantFrom('size 80 24', 'size 160 50', 'size 60 15', 'size 100 30') },
);

function messageOf(name: string, { nowMs }: State): Message {
  const [word, first, second] = name.length > 1 ? name.split(' ') : [name];
  if (word === 'wait') return { kind: 'tick', atMs: nowMs + Number(first) };
  if (word === 'size') return { kind: 'size', columns: Number(first), rows: Number(second) };
  if (word === 'paste' && first !== undefined) return { kind: 'key', key: { name: 'paste', text: first }, atMs: nowMs + 137 };
  return { kind: 'key', key: name === 'paste' ? { name, text: '38 cm\n' } : keyOf(name), atMs: nowMs + 137 };
}

/** What a search answers and what a plan is, once for each question: the keys are tried here, not the search. */
const knownWays = new Map<string, ReturnType<typeof answerSearch>>();
const knownPlans = new Map<string, ReturnType<typeof planBudget>>();

/** The search of the preset as it stands stands in for that of every set value: what it sets is still taken and undone. */
function waysFor(whole: SearchProblem): ReturnType<typeof answerSearch> {
  const { series, limits, presetFieldT } = whole;
  const tight = limits.holdS === undefined ? 'free' : limits.holdS < 6 ? 'nothing' : 'some';
  const name = `${series.id} ${presetFieldT} ${tight}`;
  let known = knownWays.get(name);
  if (known === undefined) {
    const holdS = tight === 'nothing' ? 1 : 11;
    let asked = 0;
    const stopped = () => {
      asked += 1;
      return asked > 40;
    };
    // Stopped after a while: the order of a few thousand questions, so that one search costs little.
    known = answerSearch({ ...whole, set: {}, series: { ...series }, limits: tight === 'free' ? {} : { holdS } }, { stopped });
    knownWays.set(name, known);
  }
  return known;
}

function planFor(problem: BudgetProblem): ReturnType<typeof planBudget> {
  const first = problem.study.series.find(({ id }) => !problem.done.includes(id));
  const name = `${problem.study.id} ${problem.study.series.map(({ id }) => id).join()} ${problem.done.join()}`;
  let known = knownPlans.get(name);
  if (known === undefined) {
    // As it is and skipped alone: every lattice is one point.
    const series = problem.study.series.map((each) => ({ ...each, ranges: {}, locked: parameterKeys.filter((key) => key !== 'pacing') }));
    known = planBudget({ ...problem, study: { ...problem.study, series }, asSet: {}, minutes: first === undefined ? 1 : 10 });
    knownPlans.set(name, known);
  }
  return known;
}

const records = [...inventedRecords(40, 11)];

const shipped = new Map(['liver-3t', 'lumbar-spine-1.5t', 'brain-3t', 'heart-cine-3t'].map((id) => [id, presetChoice(id)]));

/** A revision of a shipped preset at the site; under an id that was typed, of the liver. */
function revised(id: string, revision: number): PresetChoice {
  const known = shipped.get(id) ?? presetChoice('liver-3t');
  return { ...known, origin: 'site', study: { ...known.study, id, revision, status: 'reviewed', notes: `revision ${revision}` } };
}

/** What the world answers to the screens of presets and records; sometimes somebody else released first. */
function shelfAnswer(effect: Effect): Answer | null {
  switch (effect.kind) {
    case 'read-revisions':
      return { kind: 'revisions', presets: [2, 1].map((revision) => revised(effect.id, revision)), notes: ['One file is wrong'] };
    case 'check-release':
      return { kind: 'checked', findings: [], newest: revised(effect.study.id, 2).study };
    case 'release': {
      const [theirs, base] = [effect.basedOn + 1, effect.basedOn].map((revision) => revised(effect.study.id, revision).study);
      if (effect.ask % 2 === 0) return { kind: 'taken', theirs: theirs as Study, base: base as Study };
      return { kind: 'released', study: { ...effect.study, released: { ...effect.said, day: '2026-03-02' } }, path: '/site' };
    }
    case 'list-records':
    case 'report-records': {
      const meant = records.filter((record) => isMeantRecord(namedRecord(record), effect.typed));
      // Sometimes there are more than a list holds.
      const counts = { records: 42, meant: meant.length + (effect.ask % 3), damaged: 1, stopped: false, notes: [] };
      if (effect.kind === 'list-records') {
        const place = { file: '/r', revision: 1, series: 5, rewritten: 1 };
        const rows = meant.map((record, at) => ({ ...namedRecord(record), ...place, line: at + 1, id: record.id }));
        return { kind: 'record-list', list: { ...counts, typed: effect.typed, rows } };
      }
      const report = new RecordCounts();
      for (const record of meant) report.add(record);
      const shown = { report: report.report(), files: 1, records: 42, damaged: 1, chosen: effect.typed, now: new Map() };
      return { kind: 'record-report', report: { ...counts, shown } };
    }
    case 'read-record':
      return { kind: 'one-record', record: records[effect.line % records.length] as SessionRecord };
    default:
      return null;
  }
}

const knownCarries = new Map<string, ReturnType<typeof carryStudy>>();

/** What comes out for the first target stands in for every other: the keys are tried here. */
function carriedFor({ carry, circumstances }: CarryProblem): ReturnType<typeof carryStudy> {
  const known = knownCarries.get(carry.id) ?? carryStudy(carry, circumstances);
  knownCarries.set(carry.id, known);
  return known;
}

/** Twelve times that were read, and more of one class than of the others. */
const readClasses = (() => {
  const counts = new ReadingCounts();
  for (const record of twelveTimes('')) counts.add(record);
  return counts.report().scanners[0]?.classes ?? [];
})();

/** Answers what was asked, as the world might: well or badly. */
function answerTo(effect: Effect, well: boolean): Message | null {
  if (!('ask' in effect)) return null;
  const { ask } = effect;
  if (!well)
    return {
      kind: 'answer',
      ask,
      answer: { kind: 'failed', problems: [{ code: 'x', path: '', message: 'It failed.', hint: 'Try again.' }] },
    };
  if (effect.kind === 'read-expression') return { kind: 'answer', ask, answer: { kind: 'value', value: 12.345 } };
  if (effect.kind === 'read-rules') return { kind: 'answer', ask, answer: { kind: 'rules', rules: new Map() } };
  if (effect.kind === 'search') return { kind: 'answer', ask, answer: { kind: 'ways', ways: waysFor(effect.problem) } };
  if (effect.kind === 'plan') return { kind: 'answer', ask, answer: { kind: 'plan', plan: planFor(effect.problem) } };
  if (effect.kind === 'picture') return { kind: 'answer', ask, answer: { kind: 'pictures', pictures: picturesOf(knownProblem().problem) } };
  if (effect.kind === 'carry') return { kind: 'answer', ask, answer: { kind: 'carried', carried: carriedFor(effect.problem) } };
  if (effect.kind === 'read-residuals') return { kind: 'answer', ask, answer: { kind: 'residuals', classes: readClasses } };
  const shelf = headerAnswer(effect) ?? shelfAnswer(effect);
  return { kind: 'answer', ask, answer: shelf ?? { kind: 'done', words: 'Saved' } };
}

/** What does not hold of a state although it must: the session can explain itself. */
function faults(state: State): string[] {
  const { session, opened, place } = state;
  const found: string[] = [];
  const must = (holds: boolean, words: string) => {
    if (!holds) found.push(words);
  };
  must((session === null) === (opened === null), 'a session has its preset');
  if (session !== null && opened !== null) {
    must(
      session.series.length === opened.study.series.length &&
        opened.study.series.every(({ id }) => session.series.some((series) => series.id === id)),
      'every series once',
    );
    must(session.series.filter(({ run }) => run !== null).length <= 1, 'one series runs at most');
    must(
      session.series.every(({ state: word, run }) => (word === 'running') === (run !== null)),
      'what is called running runs',
    );
    must(
      session.series.some(({ id }) => id === place.seriesId),
      'the series looked at is there',
    );
    const { limits } = session;
    must(
      [limits.holdS, limits.minutesLeft, limits.longestSeriesS, limits.b1rmsCapUt, limits.sarCapWkg].every(
        (limit) => limit === null || limit > 0,
      ),
      'limits are positive',
    );
    must((session.contrastAtMs !== null) === (limits.contrastGiven === true), 'contrast and its clock agree');
  } else must(['start', 'help', 'scanner', 'carry', 'why', ...shelfScreens].includes(place.screen), `no session on ${place.screen}`);
  const { search, plan, open } = state;
  must(
    search === null || session === null || session.series.some(({ id }) => id === search.seriesId),
    'the search is of a series of the session',
  );
  must(open.search === undefined || search?.ask === open.search, 'only the newest search is waited for');
  must(open.plan === undefined || plan?.ask === open.plan, 'only the newest plan is waited for');
  must([open.search, open.plan, open.carry].filter((ask) => ask !== undefined).length <= 1, 'one worker does one thing');
  must(open.residuals === undefined || state.residuals !== null, 'what is asked of the records is waited for');
  must(place.screen !== 'carry' || state.carry !== null, 'the carry screen has a preset');
  const readings = [open.list, open['one-record'], open.report].filter((ask) => ask !== undefined);
  must(readings.length <= 1, 'one reading of records at a time');
  must(open.release === undefined || state.shelf.release !== null, 'what is being released is known');
  must((open.headers !== undefined) === (state.headers.reading !== null), 'headers are read while they are waited for');
  must(
    state.headers.picked.every((id) => state.headers.found?.series.some((one) => one.id === id)),
    'what is picked was read',
  );
  must(!place.back.includes(place.screen), 'back leads elsewhere');
  const { text } = headlineOf(state);
  must(text !== '' && !/NaN|undefined|Infinity|null/.test(text), `the verdict is words: ${text}`);
  return found;
}

describe('update under random keys', () => {
  it('takes 100,000 keys without an exception and without a state the session cannot explain', () => {
    let count = 0;
    const seen = new Set<ScreenName>();
    fc.assert(
      fc.property(
        fc.array(step, { minLength: 500, maxLength: 500 }),
        fc.boolean(),
        fc.constantFrom(['liver-3t'], ['lumbar-spine-1.5t'], ['brain-3t', 'heart-cine-3t']),
        fc.constantFrom(...beginnings),
        (messages, well, presets, beginning) => {
          const start = startWithScanners(presets);
          let state: State = { ...start, defaults: { ...start.defaults, release: { folder: '/site', secondRole: false } } };
          const send = (next: Message) => {
            const [changed, effects] = update(state, next);
            state = changed;
            for (const effect of effects) {
              const answer = answerTo(effect, well);
              if (answer !== null) state = update(state, answer)[0];
            }
          };
          if (beginning[0] !== '/') send({ kind: 'key', key: keyOf('enter'), atMs: 1 });
          for (const next of [...beginning, ...messages]) {
            send(messageOf(next, state));
            count += 1;
            seen.add(state.place.screen);
            const found = faults(state);
            if (found.length > 0) expect(found).toEqual([]);
            if (count % 50 !== 0) continue;
            const draft = draftNow(state);
            if (draft !== null) expect(draftOf(JSON.parse(JSON.stringify(draft)))).not.toBeNull();
            const lines = screenLines(state, look);
            for (const each of lines) expect(lineText(each)).not.toMatch(/NaN|undefined|Infinity/);
            if (state.size.columns >= 80 && state.size.rows >= 24) {
              expect(lines).toHaveLength(state.size.rows);
              for (const each of lines) expect(lineText(each).trimEnd().length, lineText(each)).toBeLessThanOrEqual(state.size.columns);
            }
          }
        },
      ),
      { numRuns: 200, endOnFailure: true },
    );
    expect(count).toBeGreaterThanOrEqual(100_000);
    // They did go there: presets, a comparison, a release, records, the report.
    expect([...shelfScreens, 'scanner', 'carry'].filter((screen) => !seen.has(screen as ScreenName))).toEqual([]);
  }, 600_000);
});
