import type { Command } from './change.js';
import { carryRevision } from './hands/carry-commands.js';
import { back, contrastGiven, quit, show } from './hands/common-commands.js';
import {
  moveInRecords,
  narrowRecords,
  saveSuggestions,
  showRecord,
  showRecords,
  showReport,
  stopReading,
  suggestedStudies,
  widenRecords,
} from './hands/past-record-commands.js';
import {
  clearPresets,
  compareRevisions,
  editAsDraft,
  markRevision,
  moveInPresets,
  moveInRevisions,
  narrowPresets,
  saveDraft,
  showRevisions,
  widenPresets,
} from './hands/preset-commands.js';
import { beginRelease, compareRelease, moveInRelease, takeOverOnTop, typeInRelease } from './hands/release-commands.js';
import { scrollShelf } from './hands/shelf-scroll.js';
import { type KeyRow, row, upAndDown } from './key-row.js';
import { revisionRow } from './preset-rows.js';
import type { ScreenName, State } from './state.js';

const help = row(['h', '?'], 'h', 'help', 'Help for this screen.', show('help'));
const leave = row('q', 'q', 'quit', 'Leaves; the session is kept and offered at the next start.', quit);
const goBackOnly = row('escape', 'Esc', 'back', 'One screen back. Nothing is lost.', back);
const toSession = (key: string, brief: string, words: string, command: Command): KeyRow =>
  row(key, key, brief, words, command, ({ session }) => session !== null);

/** A patient may be waiting while somebody reads. */
const contrast = row('g', 'g', '', 'Contrast is given: starts its clock.', contrastGiven, ({ session }) => session !== null);

const text = (leaving: KeyRow): readonly KeyRow[] => [
  ...upAndDown(scrollShelf, 'the text'),
  row('page-down', 'PgUp PgDn', 'page', 'A page down or up.', scrollShelf('page-down')),
  row('page-up', '', '', '', scrollShelf('page-up')),
  contrast,
  help,
  leaving,
  leave,
];

const isSession = (state: State) => revisionRow(state)?.origin === 'session';
const isTaken = ({ shelf }: State) => shelf.release?.taken != null;
const stop = row('escape', 'Esc', 'back', 'Ends a reading that runs and shows what there is; else one screen back.', stopReading);

/** The keys of the screens of presets and of records. */
export const shelfKeys = {
  presets: [
    ...upAndDown(moveInPresets, 'the presets'),
    row('enter', 'Enter', 'revisions', 'The revisions of this preset: status, who, when, why.', showRevisions),
    row('tab', 'Tab', 'records', 'On to the records.', showRecords),
    row('any-text', 'a-z 0-9', 'find', 'Narrows the list by field strength, region, id or title: 3 liver.', narrowPresets),
    row('backspace', 'Backspace', '', 'Takes the last letter back.', widenPresets, ({ shelf }) => shelf.narrowing !== ''),
    row('escape', 'Esc', 'back', 'Forgets what was typed; with nothing typed, one screen back.', clearPresets),
    row('?', '?', 'help', 'Help for this screen.', show('help')),
  ],
  revisions: [
    ...upAndDown(moveInRevisions, 'the revisions'),
    row('enter', 'Enter', 'compare', 'Parameters and figures against the revision before, or against the marked one.', compareRevisions),
    row(' ', 'Space', 'mark', 'Marks a revision: Enter on another one, of whatever preset, compares the two.', markRevision),
    row('d', 'd', 'draft', 'Begins a draft of this revision: its series are changed as in any session.', editAsDraft),
    row('s', 's', 'save', 'Saves what the open session changed as a draft preset of yours.', saveDraft, isSession),
    row('r', 'r', 'release', 'Releases it as the next revision of the site: checks, role, reason, and a word typed in full.', beginRelease),
    row('t', 't', 'to', 'To another field or scanner: carries it there, as a proposal.', carryRevision),
    toSession('p', '', 'This patient.', show('patient')),
    toSession('o', 'order', 'The running order.', show('order')),
    contrast,
    help,
    goBackOnly,
    leave,
  ],
  compare: text(goBackOnly),
  release: [
    ...upAndDown(moveInRelease, 'the lines'),
    row('enter', 'Enter', 'type', 'Begins typing on the line; nothing is filled in by itself.', typeInRelease),
    row('d', 'd', 'difference', "What differs from the site's revision to this one.", compareRelease),
    row('t', 't', 'take over', 'Somebody was first: sets your changes on top of their revision.', takeOverOnTop, isTaken),
    contrast,
    help,
    goBackOnly,
    leave,
  ],
  records: [
    ...upAndDown(moveInRecords, 'the records'),
    row('enter', 'Enter', 'show', 'This record: its page, and planned against used.', showRecord),
    row('tab', 'Tab', 'report', 'The report over the records that are meant by what was typed.', showReport),
    row('any-text', 'a-z 0-9', 'find', 'Narrows by period, preset, region, role, reason: liver 2026-01..2026-03.', narrowRecords),
    row('backspace', 'Backspace', '', 'Takes the last letter back.', widenRecords, ({ shelf }) => shelf.typed !== ''),
    row('escape', 'Esc', 'back', 'Ends a reading that runs; forgets what was typed; with nothing typed, one screen back.', stopReading),
    row('?', '?', 'help', 'Help for this screen.', show('help')),
  ],
  'past-record': text(stop),
  report: [
    row(
      's',
      's',
      'save drafts',
      'Saves every suggestion as a draft preset of yours, with its evidence in its notes: a variant to review.',
      saveSuggestions,
      (state) => suggestedStudies(state).length > 0,
    ),
    ...text(stop),
  ],
} as const satisfies Partial<Record<ScreenName, readonly KeyRow[]>>;
