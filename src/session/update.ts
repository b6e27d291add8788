import { keepCarrying } from './carry.js';
import { type Change, only, say } from './change.js';
import { type Draft, draftLayout, draftSteps } from './draft.js';
import { takeCarryAnswer } from './hands/carry-commands.js';
import { takeExpression, typeKey } from './hands/entry-commands.js';
import { takeHeaders } from './hands/header-commands.js';
import { takeHeaderClass } from './hands/header-value-commands.js';
import { judgeAgain, openDraft } from './hands/start-commands.js';
import { keepDrawing } from './keep-drawing.js';
import { keepSearching } from './keep-searching.js';
import { keyRowFor } from './key-map.js';
import type { Answer, Effect, KeyPress, Message } from './message.js';
import { keepResiduals, takeResiduals } from './residuals.js';
import type { State } from './state.js';
import { takeShelfAnswer, withReadingShare } from './take-shelf-answer.js';

/**
 * What a message makes of the interface, and what it asks of the world outside. Pure and synchronous; every message is taken in
 * every state.
 *
 * @example update(state, { kind: 'key', key: { name: 'text', text: '+' }, atMs }) //=> [state, effects]
 */
export function update(state: State, message: Message): Change {
  const change = takeOne(state, message);
  if (message.kind !== 'presets' || state.early === null) return change;
  // What was typed ahead of the presets comes now, in its order.
  return state.early.reduce<Change>(([before, asked], key) => {
    const [after, more] = takeOne(before, { kind: 'key', key, atMs: before.nowMs });
    return [after, [...asked, ...more]];
  }, change);
}

/** Keys that are kept while the presets are read; whoever types more has left the keyboard to something else. */
const mostEarlyKeys = 50;

/** Enter has nothing to open before the presets are read, and what follows it is meant for what it opens. */
function comesTooEarly(state: State, { name }: KeyPress): boolean {
  if (state.early === null || state.drafts.length > 0 || state.place.screen !== 'start') return false;
  return name !== 'escape' && (name === 'enter' || state.early.length > 0);
}

function takeOne(state: State, message: Message): Change {
  const [moved, asked] = carryOut(state, message);
  const [sought, searched] = keepSearching(state, moved);
  const [carrying, carried] = keepCarrying(sought);
  const [drawing, drawn] = keepDrawing(state, carrying);
  const [next, looked] = keepResiduals(drawing);
  const more = [...searched, ...carried, ...drawn, ...looked];
  const effects = more.length === 0 ? asked : [...asked, ...more];
  const draft = draftToSave(state, next);
  return draft === null ? [next, effects] : [next, [...effects, { kind: 'save-draft', draft } satisfies Effect]];
}

function carryOut(state: State, message: Message): Change {
  switch (message.kind) {
    case 'key': {
      const now = { ...state, nowMs: Math.max(state.nowMs, message.atMs) };
      if (comesTooEarly(state, message.key)) return only({ ...now, early: [...(state.early ?? []), message.key].slice(0, mostEarlyKeys) });
      if (state.entry !== null) return typeKey(now, state.entry, message.key);
      const row = keyRowFor(now, message.key);
      return row === undefined ? only(now) : row.command(now, message.key);
    }
    case 'size':
      return only({ ...state, size: { columns: message.columns, rows: message.rows } });
    case 'tick':
      return only({ ...state, nowMs: Math.max(state.nowMs, message.atMs) });
    case 'presets': {
      return only({ ...state, early: null, presets: message.presets, fileNotes: withNotes(state, message.notes) });
    }
    case 'drafts':
      return only({ ...state, drafts: message.drafts });
    case 'scanners':
      return only({ ...state, scanners: message.scanners, fileNotes: withNotes(state, message.notes) });
    case 'site-rules':
      return judgeAgain({ ...state, siteRules: message.siteRules });
    case 'note':
      // Before a session is open only files are read: what is wrong with them stays in sight.
      return only(
        state.session === null ? { ...state, fileNotes: withNotes(state, [message.words]) } : say(state, message.words, 'trouble'),
      );
    case 'progress':
      return only(withReadingShare(withShare(state, message.ask, message.share), message.ask, message.share));
    case 'counted': {
      const { headers, open } = state;
      if (open.headers !== message.ask || headers.reading === null) return only(state);
      return only({ ...state, headers: { ...headers, reading: { files: message.files } } });
    }
    case 'answer':
      return takeAnswer(state, message.ask, message.answer);
  }
}

/** What is wrong with files, each thing once. */
function withNotes(state: State, notes: readonly string[]): readonly string[] {
  return [...new Set([...state.fileNotes, ...notes])];
}

/** An answer counts when its question is the newest of its kind. */
function takeAnswer(state: State, ask: number, answer: Answer): Change {
  const kind = (Object.keys(state.open) as (keyof State['open'])[]).find((name) => state.open[name] === ask);
  if (kind === undefined) return only(state);
  const { [kind]: _answered, ...open } = state.open;
  const next = { ...state, open };
  const failed = answer.kind === 'failed' ? answer.problems.map(({ message, hint }) => `${message} ${hint}`.trim()).join(' ') : null;
  switch (kind) {
    case 'record':
      if (answer.kind !== 'done') return only(say({ ...next, recordFailed: true }, failed ?? 'The record was not saved', 'trouble'));
      return recordSaved(next, answer.words);
    case 'rules':
      return only(
        answer.kind === 'rules'
          ? { ...next, rules: answer.rules }
          : say(next, failed ?? 'The rules could not be read: they are not checked', 'trouble'),
      );
    case 'draft':
      return answer.kind === 'draft'
        ? openDraft(next, answer.session)
        : only(say(next, failed ?? 'The session could not be opened', 'trouble'));
    case 'expression': {
      const { entry } = state;
      if (entry === null || entry.ask !== ask) return only(next);
      if (answer.kind === 'value') return only(takeExpression(next, entry, answer.value));
      return only(say({ ...next, entry: { ...entry, ask: null } }, failed ?? 'The expression could not be read', 'trouble'));
    }
    case 'search': {
      const { search } = state;
      if (search === null || search.ask !== ask) return only(next);
      const said =
        answer.kind === 'ways' ? { answer: answer.ways, trouble: null } : { answer: null, trouble: failed ?? 'The search failed' };
      return only({ ...next, search: { ...search, ...said } });
    }
    case 'plan': {
      const { plan } = state;
      if (plan === null || plan.ask !== ask) return only(next);
      const said = answer.kind === 'plan' ? { answer: answer.plan, trouble: null } : { answer: null, trouble: failed ?? 'The plan failed' };
      return only({ ...next, plan: { ...plan, ...said } });
    }
    case 'carry':
    case 'carryRules':
      return only(takeCarryAnswer(next, answer, failed));
    case 'residuals':
      return only(takeResiduals(next, answer.kind === 'residuals' ? answer.classes : null));
    case 'picture': {
      const { picture } = state;
      if (picture === null || picture.ask !== ask) return only(next);
      const said =
        answer.kind === 'pictures' ? { drawn: answer.pictures, trouble: null } : { drawn: null, trouble: failed ?? 'The picture failed' };
      return only({ ...next, picture: { ...picture, ...said } });
    }
    case 'revisions':
    case 'checks':
    case 'release':
    case 'list':
    case 'one-record':
    case 'report':
      return takeShelfAnswer(next, kind, answer, failed);
    case 'headers':
      return only(takeHeaders(next, answer, failed));
    case 'headerClass':
      return only(takeHeaderClass(next, answer, failed));
    case 'preset':
    case 'page':
      return only(answer.kind === 'done' ? say(next, answer.words) : say(next, failed ?? 'Not saved', 'trouble'));
  }
}

/** How far the newest search is; of an older one nothing counts. */
function withShare(state: State, ask: number, share: number): State {
  const { search } = state;
  return search === null || search.ask !== ask || state.open.search !== ask ? state : { ...state, search: { ...search, share } };
}

/** The record stands in the file; only what was changed meanwhile still makes a draft. */
function recordSaved(state: State, words: string): Change {
  const isWhole = state.session !== null && state.session === state.saving;
  // What it holds of readings counts from now on.
  const next = say(
    { ...state, recordFailed: false, saving: null, residuals: null },
    isWhole ? words : `${words}; what was changed meanwhile is not in it`,
  );
  return isWhole
    ? [{ ...next, session: { ...state.session, saved: true } as NonNullable<State['session']> }, [{ kind: 'drop-draft' }]]
    : only(next);
}

/** The draft of a state whose session changed; null where there is nothing new to save. */
function draftToSave(before: State, after: State): Draft | null {
  const { session, opened, past, place, practiceSinceMs } = after;
  if (session === null || opened === null || session.saved) return null;
  const changed =
    session !== before.session ||
    practiceSinceMs !== before.practiceSinceMs ||
    place.screen !== before.place.screen ||
    place.seriesId !== before.place.seriesId;
  // Nothing was done yet: nothing is worth offering.
  if (!changed || (past.length === 0 && practiceSinceMs === null)) return null;
  return { layout: draftLayout, opened, session, past: past.slice(-draftSteps), place, practiceSinceMs };
}

/** The draft of the present state, for leaving in a hurry. */
export function draftNow(state: State): Draft | null {
  return draftToSave({ ...state, session: null }, state);
}

/** How often the screen must be told the time: while a hold or a clock runs; null when nothing runs. */
export function tickEveryMs(state: State): number | null {
  if (state.practiceSinceMs !== null) return 100;
  if (state.session?.series.some(({ run }) => run?.sinceMs != null) === true) return 500;
  return state.session?.contrastAtMs != null || state.session?.clockFromMs != null ? 1000 : null;
}
