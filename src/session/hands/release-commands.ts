import { shownValue } from '../../study/clean-text.js';
import { takeOver } from '../../study/preset-diff-take-over.js';
import type { Study } from '../../study/study.js';
import { type Change, type Command, neighbour, only, open, pointAt, say } from '../change.js';
import { type PresetRow, revisionRow } from '../preset-rows.js';
import { type ReleaseField, releaseNow, releaseRow, releaseRows, releaseWord, withTyped } from '../release-form.js';
import type { ReleaseForm } from '../shelf.js';
import type { State } from '../state.js';

function withForm(state: State, release: ReleaseForm): State {
  return { ...state, shelf: { ...state.shelf, release } };
}

/** The id of the preset that a draft was made from, where the site or the program has one. */
function idToRelease(state: State, { study }: PresetRow): string {
  const bare = study.id.replace(/-draft(-\d+)?$/, '');
  return state.presets.some((preset) => preset.study.id === bare) ? bare : study.id;
}

/** Opens the form on what the hand is on, and has it checked. */
export const beginRelease: Command = (state) => {
  const row = revisionRow(state);
  if (row === undefined) return only(say(state, 'The revisions are being read'));
  if (state.defaults.release?.folder == null)
    return only(say(state, "There is no folder of the site's presets: start with --presets DIR or HOLDFAST_PRESETS", 'trouble'));
  if (row.origin === 'site')
    return only(say(state, `Revision ${row.study.revision} is the site's already: change it first (d), or release a draft`, 'trouble'));
  const id = idToRelease(state, row);
  const form: ReleaseForm = {
    study: row.study,
    id,
    basedOn: id === row.study.id ? row.study.revision : null,
    role: '',
    secondRole: '',
    reason: '',
    findings: null,
    trouble: null,
    newest: null,
    taken: null,
    notes: [],
  };
  return check(pointAt(open(withForm(state, form), 'release'), ''), form);
};

/** The study as it would be written. */
function studyToRelease({ study, id, basedOn, newest }: ReleaseForm): Study {
  return { ...study, id, status: 'reviewed', revision: (basedOn ?? newest?.revision ?? 0) + 1 };
}

function check(state: State, form: ReleaseForm): Change {
  const ask = state.asks + 1;
  return [
    withForm({ ...state, asks: ask, open: { ...state.open, checks: ask } }, { ...form, findings: null, trouble: null }),
    [{ kind: 'check-release', ask, study: studyToRelease(form) }],
  ];
}

export const moveInRelease =
  (by: number): Command =>
  (state) => {
    const rows = releaseRows(state);
    const here = releaseRow(state)?.field;
    return only(pointAt({ ...state, notice: null }, neighbour(rows, ({ field }) => field === here, by)?.field ?? ''));
  };

/** Begins typing on the line of the hand; what stands there is gone on with, the word is always typed anew. */
export const typeInRelease: Command = (state) => {
  const row = releaseRow(state);
  if (row === undefined) return only(state);
  return only({ ...state, notice: null, entry: { field: row.field, text: row.shown, ask: null, isText: true } });
};

/** Takes what was typed on a line of the form; the word in full releases, if nothing stands against it. */
export function commitRelease(state: State, field: string, text: string): Change {
  const { release } = state.shelf;
  if (release === null) return only({ ...state, entry: null });
  if (field === 'word') return releaseByWord({ ...state, entry: null }, release, text);
  const form = withTyped(release, field as ReleaseField, text);
  if ('problem' in form) return only(say(state, form.problem, 'trouble'));
  const next = pointAt({ ...withForm(state, form), entry: null }, fieldAfter(state, field));
  return form.findings === null && release.findings !== null ? check(next, form) : only(next);
}

function fieldAfter(state: State, field: string): string {
  return neighbour(releaseRows(state), (row) => row.field === field, 1)?.field ?? field;
}

function releaseByWord(state: State, form: ReleaseForm, text: string): Change {
  if (text.trim() !== releaseWord) return only(say(state, `Not released: the word is ${releaseWord}, in full and in capitals`, 'trouble'));
  const now = releaseNow(state, form);
  if ('against' in now) {
    const said = say(state, `Not released. ${now.against}`, 'trouble');
    return only(now.field === null ? said : { ...pointAt(said, now.field), notice: said.notice });
  }
  const ask = state.asks + 1;
  return [
    say({ ...state, asks: ask, open: { ...state.open, release: ask } }, 'Writing the revision'),
    [{ kind: 'release', ask, study: studyToRelease(form), ...now }],
  ];
}

/** Sets one's own changes on top of the revision that somebody else released meanwhile, unless both changed the same value. */
export const takeOverOnTop: Command = (state) => {
  const { release } = state.shelf;
  if (release === null || release.taken === null) return only(say(state, 'Nobody was first: there is nothing to take over'));
  const { theirs, base } = release.taken;
  if (base === null)
    return only(
      say(state, `Revision ${release.basedOn} is not there any more: what you changed cannot be told. d shows what differs`, 'trouble'),
    );
  const { study, taken, conflicts } = takeOver(base, { ...release.study, id: release.id }, theirs);
  if (conflicts.length > 0) {
    const notes = conflicts.map(
      ({ series, key, mine, theirs: other }) =>
        `changed by both: ${nameOf(series, key)}, yours ${shownValue(mine)}, theirs ${shownValue(other)}`,
    );
    return only(
      say(
        withForm(state, { ...release, notes }),
        'Both changed the same value: decide together, then start from their revision',
        'trouble',
      ),
    );
  }
  const notes = taken.map(
    ({ series, key, theirs: other, mine }) => `taken over: ${nameOf(series, key)} ${shownValue(other)} to ${shownValue(mine)}`,
  );
  const form = { ...release, study, basedOn: theirs.revision, newest: theirs, taken: null, notes };
  const [next, effects] = check(pointAt(state, 'word'), form);
  return [say(next, `Your changes stand on top of revision ${theirs.revision}: look, then type ${releaseWord}`), effects];
};

function nameOf(series: string | null, key: string): string {
  return series === null ? key : `${series} ${key}`;
}

/** What differs: somebody else's revision and this one; else the site's newest and this one. */
export const compareRelease: Command = (state) => {
  const { release } = state.shelf;
  const from = release?.taken?.theirs ?? release?.newest;
  if (release === null || from == null) return only(say(state, 'There is no revision of the site to compare with'));
  const compared = { from, to: { ...release.study, id: release.id, revision: release.basedOn ?? release.study.revision } };
  return only(pointAt(open({ ...state, shelf: { ...state.shelf, compared } }, 'compare'), '0'));
};
