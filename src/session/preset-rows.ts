import type { Study } from '../study/study.js';
import type { PresetChoice } from './message.js';
import { studyOfSession } from './record-of-session.js';
import { compareTexts, isMeant } from './start-list.js';
import type { State } from './state.js';

export const originWords: Readonly<Record<PresetChoice['origin'] | 'session', string>> = {
  site: 'site',
  own: 'saved here',
  shipped: 'shipped',
  file: 'file',
  session: 'now',
};

/** One preset or revision that can be looked at; `session` is what the open session made of its preset. */
export interface PresetRow {
  readonly field: string;
  readonly study: Study;
  readonly origin: PresetChoice['origin'] | 'session';
  /** Null for the open session. */
  readonly choice: PresetChoice | null;
}

function rowOf(choice: PresetChoice): PresetRow {
  const { study, origin } = choice;
  return { field: `${origin} ${study.id}@${study.revision}`, study, origin, choice };
}

/** The session of these values, asked for with every key: worked out once. */
const known = new WeakMap<object, Study | null>();

/** What a session made of a preset is a draft, whoever released that. */
function draftOf(study: Study | null): Study | null {
  if (study === null) return null;
  const { released: _before, ...rest } = study;
  return { ...rest, status: 'draft' };
}

/** The open session as a preset: its values in the place of the planned ones. */
function sessionRow(state: State): PresetRow[] {
  const { session, opened } = state;
  if (session === null || opened === null) return [];
  let study = known.get(session);
  if (study === undefined) {
    study = draftOf(studyOfSession(state));
    known.set(session, study);
  }
  return study === null ? [] : [{ field: 'session', study, origin: 'session', choice: null }];
}

/** The presets, by region and field strength: the open session first, of each preset the current revision of every folder that has it. */
export function presetRows(state: State): readonly PresetRow[] {
  const { narrowing } = state.shelf;
  const presets = state.presets.filter((preset) => isMeant(preset, narrowing));
  presets.sort(
    (a, b) => compareTexts(a.study.region, b.study.region) || a.study.fieldT - b.study.fieldT || compareTexts(a.study.id, b.study.id),
  );
  return [...(narrowing === '' ? sessionRow(state) : []), ...presets.map(rowOf)];
}

/** The preset that the hand is on: the first where none was chosen. */
export function presetRow(state: State): PresetRow | undefined {
  const rows = presetRows(state);
  return rows.find(({ field }) => field === state.place.fields.presets) ?? rows[0];
}

/** The revisions of the chosen preset, newest first; before them the open session where it was begun on that preset. */
export function revisionRows(state: State): readonly PresetRow[] {
  const { revisions } = state.shelf;
  if (revisions === null) return [];
  const now = sessionRow(state).filter(({ study }) => study.id === revisions.id);
  return [...now, ...(revisions.presets ?? []).map(rowOf)];
}

export function revisionRow(state: State): PresetRow | undefined {
  const rows = revisionRows(state);
  return rows.find(({ field }) => field === state.place.fields.revisions) ?? rows[0];
}

/** What a revision is compared with: the marked one, of whatever preset, else the one before. */
export function comparedWith(state: State, row: PresetRow): Study | undefined {
  const { marked } = state.shelf;
  return marked !== null && marked !== row.study ? marked : rowBefore(state, row);
}

/** The revision before one of the rows: the next below; of the session what it was begun on. */
function rowBefore(state: State, row: PresetRow): Study | undefined {
  if (row.origin === 'session')
    return revisionRows(state).find(({ study, origin }) => origin !== 'session' && study.revision <= row.study.revision)?.study;
  return revisionRows(state).find(({ study, origin }) => origin !== 'session' && study.revision < row.study.revision)?.study;
}

/** Who released a revision, when and why; a dash where nobody did. */
export function releasedWords({ released }: Study): string {
  if (released === undefined) return '-';
  const second = released.secondRole === undefined ? '' : ` and ${released.secondRole}`;
  return `${released.day} ${released.role}${second}: ${released.reason}`;
}
