import { type Change, type Command, neighbour, only, pointAt, say } from '../change.js';
import { draftOf } from '../draft.js';
import { chosenScanner, equipmentFor } from '../equipment.js';
import { filedStudy, judgedStudy } from '../judged-study.js';
import type { Effect, PresetChoice } from '../message.js';
import { newSession } from '../session.js';
import { isShelfScreen } from '../shelf-headline.js';
import { type StartRow, startRows } from '../start-list.js';
import { type State, startPlace } from '../state.js';

/** The line the hand is on: the first where none was chosen. */
export function startRow(state: State): StartRow | undefined {
  const rows = startRows(state);
  return rows.find(({ field }) => field === state.place.fields.start) ?? rows[0];
}

/** Moves the hand through the list. */
export const moveInList =
  (by: number): Command =>
  (state) => {
    const rows = startRows(state);
    const here = startRow(state)?.field;
    return only(pointAt(state, neighbour(rows, ({ field }) => field === here, by)?.field ?? ''));
  };

/** Narrows the list by what is typed. */
export const narrow: Command = (state, key) => only(narrowed(state, state.narrowing + (key.text ?? '')));

/** Takes the last letter back. */
export const widen: Command = (state) => only(narrowed(state, [...state.narrowing].slice(0, -1).join('')));

function narrowed(state: State, narrowing: string): State {
  const next = { ...state, narrowing: narrowing.replace(/^\s+/, '').slice(0, 40), notice: null };
  return pointAt(next, startRows(next)[0]?.field ?? '');
}

/** Forgets what was typed; with nothing typed, goes back to the session or leaves. */
export const clearOrLeave: Command = (state) => {
  if (state.narrowing !== '') return only(narrowed(state, ''));
  return [state, [{ kind: 'quit' }]];
};

/** Opens what the hand is on. */
export const choose: Command = (state) => {
  const row = startRow(state);
  if (row === undefined)
    return only(
      say(
        state,
        state.presets.length === 0 ? 'There is no preset to open: see the notes' : 'Nothing matches: take a letter back',
        'trouble',
      ),
    );
  if (row.kind === 'preset') return openPreset(state, row.preset);
  const ask = state.asks + 1;
  return [{ ...state, asks: ask, open: { ...state.open, draft: ask } }, [{ kind: 'claim-draft', ask, id: row.draft.id }]];
};

/** Begins a session on a preset, and asks for its rules to be read. */
export function openPreset(state: State, { study, hash }: PresetChoice): Change {
  const session = newSession(study, state.defaults.role);
  const opened = { ...judgedStudy(study, state.siteRules), hash, ...equipmentFor(chosenScanner(state), study, state.defaults) };
  const place = { ...startPlace, screen: 'order', seriesId: session.series[0]?.id ?? '' } as const;
  return withRules({
    ...state,
    opened,
    session,
    past: [],
    future: [],
    carry: null,
    place,
    narrowing: '',
    notice: null,
    rules: new Map(),
    recordFailed: false,
    practiceSinceMs: null,
  });
}

/** Goes on with a session that was left, everything as it was. */
export function openDraft(state: State, value: unknown): Change {
  const draft = draftOf(value);
  if (draft === null)
    return only(say(state, 'This session was saved by another version of the program and cannot be gone on with', 'trouble'));
  const { opened, session, past, place, practiceSinceMs } = draft;
  return judgeAgain(
    say(
      {
        ...state,
        opened,
        session,
        past,
        future: [],
        carry: null,
        place: isCarried(place) || isOnShelf(place) ? { ...place, screen: 'order', back: [] } : place,
        entry: null,
        rules: new Map(),
        practiceSinceMs,
        narrowing: '',
      },
      'Gone on with, everything as it was',
    ),
  );
}

/** Judges the open session by the rules of the site as they are now, and asks for all its rules to be read. */
export function judgeAgain(state: State): Change {
  const { opened } = state;
  if (opened === null) return only(state);
  const { ownMustKeeps: _before, ...rest } = opened;
  const judged = judgedStudy(filedStudy(opened), state.siteRules);
  // What is judged as before keeps what was worked out.
  const same = JSON.stringify(judged.study) === JSON.stringify(opened.study);
  return withRules(same ? state : { ...state, opened: { ...rest, ...judged }, rules: new Map() });
}

function withRules(state: State): Change {
  const mustKeeps = (state.opened?.study.series ?? [])
    .flatMap((series) => series.mustKeep)
    .filter(({ rule, when }) => rule !== undefined || when !== undefined);
  if (mustKeeps.length === 0) return only(state);
  const ask = state.asks + 1;
  const effect: Effect = { kind: 'read-rules', ask, mustKeeps };
  return [{ ...state, asks: ask, open: { ...state.open, rules: ask } }, [effect]];
}

/** Nor is what the screens of presets and records showed. */
function isOnShelf({ screen, back }: State['place']): boolean {
  return [screen, ...back].some(isShelfScreen);
}

/** A preset that was carried is not in the draft: the session goes on in its running order. */
function isCarried({ screen, back }: State['place']): boolean {
  return screen === 'carry' || back.includes('carry');
}
