import { cleanText } from '../study/clean-text.js';
import { idForm } from '../study/limits.js';
import { isSameContent, studyDifference } from '../study/preset-diff.js';
import { freeText, freeTextReminder } from '../study/record-text.js';
import { isReleasable } from '../study/release-checks.js';
import { releaseSaid } from '../study/release-said.js';
import type { Release } from '../study/study.js';
import type { ReleaseForm } from './shelf.js';
import type { State } from './state.js';

/** The word that must be typed in full: nobody types it by accident. */
export const releaseWord = 'RELEASE';

export const releaseFields = ['id', 'basedOn', 'role', 'secondRole', 'reason', 'word'] as const;
export type ReleaseField = (typeof releaseFields)[number];

/** One line of the form of a release. */
export interface ReleaseRow {
  readonly field: ReleaseField;
  readonly label: string;
  readonly shown: string;
  readonly help: string;
}

/** Whether the site's settings ask for a second role. */
function needsSecond(state: State): boolean {
  return state.defaults.release?.secondRole === true;
}

/** The lines of the form, in the order in which they are typed. */
export function releaseRows(state: State): readonly ReleaseRow[] {
  const { release } = state.shelf;
  if (release === null) return [];
  const rows: ReleaseRow[] = [
    { field: 'id', label: 'preset', shown: release.id, help: 'The id under which the site has it.' },
    {
      field: 'basedOn',
      label: 'made from revision',
      shown: release.basedOn === null ? '' : String(release.basedOn),
      help: 'The revision that the changes were made from; 0 for a preset that is new to the site.',
    },
    { field: 'role', label: 'role', shown: release.role, help: 'Who releases it, by role: physicist. No names.' },
    { field: 'secondRole', label: 'second role', shown: release.secondRole, help: 'Who agrees, by another role.' },
    { field: 'reason', label: 'reason', shown: release.reason, help: `Why. ${freeTextReminder}` },
    {
      field: 'word',
      label: `type ${releaseWord}`,
      shown: '',
      help: `The word ${releaseWord} in full, then Enter: everyone at the site gets this revision.`,
    },
  ];
  return needsSecond(state) ? rows : rows.filter(({ field }) => field !== 'secondRole');
}

/** The line that the hand is on. */
export function releaseRow(state: State): ReleaseRow | undefined {
  const rows = releaseRows(state);
  return rows.find(({ field }) => field === state.place.fields.release) ?? rows[0];
}

/** A typed line taken into the form, or why not. */
export function withTyped(form: ReleaseForm, field: ReleaseField, text: string): ReleaseForm | { readonly problem: string } {
  const typed = text.trim();
  if (field === 'basedOn') {
    if (!/^\d{1,7}$/.test(typed)) return { problem: `The number of a revision is expected; "${cleanText(typed, 40)}" was typed` };
    return { ...form, basedOn: Number(typed), taken: null };
  }
  if (field === 'id') {
    if (typed.length > 64 || !new RegExp(idForm).test(typed))
      return { problem: 'An id is expected: small letters, digits, dots and dashes' };
    // Another id has other revisions: what was known of the first says nothing.
    return typed === form.id ? form : { ...form, id: typed, basedOn: null, taken: null, findings: null, newest: null };
  }
  return field === 'word' ? form : { ...form, [field]: freeText(text) };
}

/** A release as it stands: what may be asked for, or the first thing that stands against it. */
export function releaseNow(
  state: State,
  form: ReleaseForm,
): { readonly said: Omit<Release, 'day'>; readonly basedOn: number } | { readonly against: string; readonly field: ReleaseField | null } {
  const { id, basedOn, newest, findings, taken } = form;
  const against = (words: string, field: ReleaseField | null = null) => ({ against: words, field });
  if (state.defaults.release?.folder == null)
    return against("There is no folder of the site's presets: start with --presets DIR or HOLDFAST_PRESETS");
  if (state.open.release !== undefined) return against('The revision is being written');
  if (taken !== null)
    return against(`Somebody was first: revision ${taken.theirs.revision}. d shows what differs, t takes your changes over`);
  if (form.trouble !== null) return against(form.trouble);
  if (findings === null) return against('The checks are not through yet');
  if (!isReleasable(findings)) return against('A check failed: mend the preset, then release it');
  if (basedOn === null)
    return against(`From which revision of ${id} was it made? The newest of the site is ${newest?.revision ?? 0}`, 'basedOn');
  if (newest !== null && basedOn > newest.revision)
    return against(`It says revision ${basedOn}; the newest of the site is ${newest.revision}`, 'basedOn');
  if (newest !== null && isSameContent(studyDifference(newest, { ...form.study, id })))
    return against(`Nothing differs from revision ${newest.revision} of the site`);
  const said = releaseSaid(form, needsSecond(state));
  return said.ok ? { said: said.value, basedOn } : against(`${said.fault.message} ${said.fault.hint}`, said.fault.of);
}

/** What the first line says of a release. */
export function releaseHeadline(state: State): string {
  const { release } = state.shelf;
  if (release === null) return 'Nothing to release';
  const { taken, findings } = release;
  if (taken !== null) return `NOT RELEASED: ${taken.theirs.released?.role ?? 'somebody'} was first with revision ${taken.theirs.revision}`;
  if (release.trouble !== null) return `CANNOT BE CHECKED: ${release.trouble}`;
  if (findings === null) return 'Checking the preset';
  const failed = findings.filter(({ level }) => level === 'failure').length;
  if (failed > 0) return `CANNOT BE RELEASED: ${failed} ${failed === 1 ? 'check' : 'checks'} failed`;
  const { basedOn, newest } = release;
  if (basedOn !== null && newest !== null && newest.revision > basedOn)
    return `Made from revision ${basedOn}; the site has revision ${newest.revision} already: d shows what differs`;
  const notes = findings.length === 0 ? '' : `, ${findings.length} to look at`;
  return `Checks passed${notes}. Not released yet: ${release.id} revision ${(release.basedOn ?? release.newest?.revision ?? 0) + 1}`;
}
