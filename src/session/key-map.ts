import { leaveBudget, moveInBudget, otherPlan, showBudget, takePlan } from './hands/budget-commands.js';
import {
  carryOpened,
  enterCarry,
  moveInCarry,
  saveCarried,
  turnCarried,
  turnCarry,
  typeCarry,
  whyCarried,
} from './hands/carry-commands.js';
import { moveCursor, openChart, takeValue, turnFigure } from './hands/chart-commands.js';
import { back, contrastGiven, quit, redo, show, undo } from './hands/common-commands.js';
import { clearRow, enterRow, moveInForm, turnRow, typeRow } from './hands/form-commands.js';
import { showHeaders } from './hands/header-commands.js';
import {
  anotherSession,
  lockPlace,
  markDone,
  moveInOrder,
  openSeries,
  reorder,
  skip,
  startOrNext,
  stopEarly,
  turnSeries,
} from './hands/order-commands.js';
import { showRecords } from './hands/past-record-commands.js';
import { practice } from './hands/patient-commands.js';
import { moveDivider, showPicture, turnBeside, turnClose, turnDivider } from './hands/picture-commands.js';
import { showPresets } from './hands/preset-commands.js';
import { saveAsPreset, savePage, saveRecord, turnRecordPane } from './hands/record-commands.js';
import { moveInScanners, takeScanner } from './hands/scanner-commands.js';
import {
  backToPreset,
  enterField,
  jump,
  moveInSeries,
  openLock,
  openReadings,
  step,
  turnPane,
  typeField,
  why,
} from './hands/series-commands.js';
import { choose, clearOrLeave, moveInList, narrow, widen } from './hands/start-commands.js';
import { scrollText } from './hands/text-commands.js';
import {
  moreWays,
  moveInWays,
  moveOnFront,
  recallWay,
  scrollWay,
  showFront,
  showWays,
  stopOrBack,
  takeFront,
  takeNumbered,
  takeWay,
  turnFront,
} from './hands/ways-commands.js';
import { headerKeys } from './header-keys.js';
import { type KeyRow, row, upAndDown } from './key-row.js';
import type { KeyPress } from './message.js';
import { shelfKeys } from './shelf-keys.js';
import type { ScreenName, State } from './state.js';

const digits = ['0', '1', '2', '3', '4', '5', '6', '7', '8', '9', '.'];

const canGoTo =
  (screen: ScreenName) =>
  ({ place, session }: State) =>
    session !== null && place.screen !== screen;

/** Keys of every screen but the first. */
const everywhere: readonly KeyRow[] = [
  row(['h', '?'], 'h', 'help', 'Help for this screen.', show('help')),
  row('u', 'u', 'undo', 'Takes back the last step, of whatever screen.', undo),
  row('r', 'r', 'redo', 'Does again what was taken back.', redo, ({ future }) => future.length > 0),
  row('p', 'p', 'patient', 'This patient: breath-hold, time, RF caps, body.', show('patient'), canGoTo('patient')),
  row('o', 'o', 'order', 'The running order.', show('order'), canGoTo('order')),
  row('e', 'e', 'end', 'The end: the record of the session.', show('record'), canGoTo('record')),
  row('g', 'g', '', 'Contrast is given: starts its clock, from every screen.', contrastGiven),
  row('q', 'q', 'quit', 'Leaves; the session is kept and offered at the next start.', quit),
  row('escape', 'Esc', 'back', 'One screen back. Nothing is lost.', back, ({ place }) => place.back.length > 0),
];

/** The same where a session need not be open: what belongs to one works once it is. */
const sessionKeys: readonly KeyRow[] = everywhere.map((each) =>
  each.keys.some((key) => ['u', 'r', 'p', 'o', 'e', 'g'].includes(key))
    ? { ...each, when: (state) => state.session !== null && (each.when?.(state) ?? true) }
    : each,
);

/** The ways of a series, from wherever it is looked at. */
const toWays: readonly KeyRow[] = [
  row('f', 'f', 'fit', 'Finds ways to fit: what to change, what each gains and gives up.', showWays),
  row('a', 'a', '', 'Again: the way looked at last.', recallWay, ({ lastWay }) => lastWay !== null),
];

const inMain = ({ place }: State) => place.pane === 'main';

const series: readonly KeyRow[] = [
  row(['-', 'left'], '-+', 'step', 'One step down or up; left and right do the same.', step(-1, false), inMain),
  row(['+', '=', 'right'], '', '', '', step(1, false), inMain),
  row('page-up', 'PgUp PgDn', '', 'A big step up or down.', step(1, true), inMain),
  row('page-down', '', '', '', step(-1, true), inMain),
  row(digits, '0-9', 'type', 'Begins typing a value: 38 cm, 6/8, 1.2 mm * 256.', typeField, inMain),
  row(['/', '*'], '/ *', '', 'Begins typing from the present value: /2, *1.5. After Enter also +10%.', typeField, inMain),
  row('enter', 'Enter', '', 'Begins typing; turns a choice to the next word.', enterField, inMain),
  ...upAndDown(moveInSeries, 'the pane'),
  row('tab', 'Tab', '', 'Parameters, consequences, cautions.', turnPane(1)),
  row('shift-tab', '', '', '', turnPane(-1)),
  row('w', 'w', 'why', 'Explains what the hand is on: sentence, numbers, formula, source, what it ignores.', why),
  row('c', 'c', 'chart', 'Range chart of this parameter.', openChart),
  row('j', 'j', 'jump', 'Jumps to the next value at which the time changes.', jump, inMain),
  row('t', 't', 'scanner', 'The changed values, to type on the scanner.', show('type-these')),
  row('s', 's', 'see', 'Pictures of an invented object: the preset, and the series as it is now.', showPicture),
  row('b', 'b', '', 'This parameter back to the preset.', backToPreset, inMain),
  row('d', 'd', '', 'What the scanner displays: time, B1+rms, SAR.', openReadings),
  row('l', 'l', '', 'Opens a parameter that the preset locks, or locks it again.', openLock, inMain),
  ...toWays,
  row('n', 'n', 'next', 'The next series of the running order.', turnSeries(1)),
];

const form: readonly KeyRow[] = [
  ...upAndDown(moveInForm, 'the lines'),
  row(['-', 'left'], 'left right', 'change', 'One step less or more, the word before or after.', turnRow(-1)),
  row(['+', '=', 'right'], '', '', '', turnRow(1)),
  row(digits, '0-9', 'type', 'Begins typing a number.', typeRow),
  row('enter', 'Enter', 'type', 'Begins typing; ticks and unticks.', enterRow),
  row(['backspace', 'delete'], 'Del', 'clear', 'Makes the line blank.', clearRow),
];

/** What every key does, screen by screen; the screen's own lines come before those of every screen. */
export const keyMap: Readonly<Record<ScreenName, readonly KeyRow[]>> = {
  start: [
    ...upAndDown(moveInList, 'the list'),
    row('enter', 'Enter', 'open', 'Opens the preset, or goes on with the session.', choose),
    row('any-text', 'a-z 0-9', 'narrow', 'Narrows the list: 3 liver.', narrow),
    row('tab', 'Tab', 'scanner', 'Scanner and coil of the next session, and what changes on them.', show('scanner')),
    row('backspace', 'Backspace', 'widen', 'Takes the last letter back.', widen, ({ narrowing }) => narrowing !== ''),
    row('escape', 'Esc', 'leave', 'Forgets what was typed; with nothing typed, leaves.', clearOrLeave),
    row('right', 'Right', 'presets', 'The presets: revisions, comparing, drafts, releasing.', showPresets),
    row('left', 'Left', 'records', 'The records: what was used, and the report.', showRecords),
    row('/', '/', 'headers', 'Reads the headers of a folder: what a scanner really did becomes a draft preset.', showHeaders),
    row('?', '?', 'help', 'Help for this screen.', show('help')),
  ],
  patient: [
    ...form,
    row('s', 's', 'practice', 'Starts a practice hold, and stops it: the seconds are filled in.', practice),
    ...everywhere,
  ],
  order: [
    ...upAndDown(moveInOrder, 'the series'),
    row('enter', 'Enter', 'open', 'Opens the series.', openSeries),
    row('s', 's', 'start', 'Starts the series, then each breath-hold; on a done series, once more.', startOrNext),
    row('d', 'd', 'done', 'The series is done.', markDone),
    row(
      'c',
      'c',
      'cut short',
      'Cut short: the running series is stopped early.',
      stopEarly,
      (state) => state.session?.series.some(({ run }) => run !== null) === true,
    ),
    row('k', 'k', 'skip', 'Skips a series, or takes it back in.', skip),
    row(['-', 'left'], '- +', 'move', 'Moves the series earlier or later.', reorder(-1)),
    row(['+', '=', 'right'], '', '', '', reorder(1)),
    row('l', 'l', '', 'The series keeps its place, or may move.', lockPlace),
    row('b', 'b', 'budget', 'Plans the session into the minutes left: as it is, shortened, skipped.', showBudget),
    ...toWays,
    row('n', 'n', '', 'New session; after the record is saved.', anotherSession),
    row('m', 'm', '', 'More: presets and their revisions, and from there the records.', showPresets),
    row('tab', 'Tab', 'on scanner', 'Scanner and coil of this session, and what changes on them.', show('scanner')),
    row('t', 't', 'to field', 'To another field or scanner: carries the preset there, as a proposal.', carryOpened),
    ...everywhere,
  ],
  series: [...series, ...everywhere],
  why: [...upAndDown(scrollText, 'the text'), row('w', 'w', '', 'Back to the series.', back), ...everywhere],
  'type-these': [...upAndDown(scrollText, 'the text'), row('t', 't', '', 'Back to the series.', back), ...everywhere],
  chart: [
    row(['-', 'left'], 'left right', 'move', 'Moves the cursor along the parameter; minus and plus do the same.', moveCursor(-1)),
    row(['+', '=', 'right'], '', '', '', moveCursor(1)),
    row('page-down', 'PgUp PgDn', '', 'Five values on.', moveCursor(-5)),
    row('page-up', '', '', '', moveCursor(5)),
    row('home', 'Home End', '', 'First and last value.', moveCursor(-9999)),
    row('end', '', '', '', moveCursor(9999)),
    row('up', 'up down', '2nd figure', 'Another figure on the second curve.', turnFigure(1, -1)),
    row('down', '', '', '', turnFigure(1, 1)),
    row('tab', 'Tab', '1st figure', 'Another figure on the first curve.', turnFigure(0, 1)),
    row('shift-tab', '', '', '', turnFigure(0, -1)),
    row('enter', 'Enter', 'take', 'Takes the value under the cursor.', takeValue),
    ...everywhere,
  ],
  picture: [
    row('z', 'z', 'close or whole', 'Between the whole field and the square at the fine lines.', turnClose),
    row('d', 'd', 'divider', 'Both side by side, or one picture: the preset left of a divider.', turnDivider),
    row(['-', 'left'], 'left right', 'move', 'Moves the divider; minus and plus do the same.', moveDivider(-0.05)),
    row(['+', '=', 'right'], '', '', '', moveDivider(0.05)),
    row('k', 'k', '', 'Keeps the pictures beside the series on a wide screen, in the place of the range chart; or no longer.', turnBeside),
    row('s', 's', '', 'Back to where this was opened.', back),
    ...everywhere,
  ],
  ways: [
    ...upAndDown(moveInWays, 'the ways'),
    row('enter', 'Enter', 'take', 'Takes the way under the hand; undo takes it back.', takeWay),
    row(digits.slice(1, 10), '1-9', 'take it', 'Takes the way with this number.', takeNumbered),
    row('page-down', 'PgUp PgDn', '', 'Scrolls what is said of the way.', scrollWay(4)),
    row('page-up', '', '', '', scrollWay(-4)),
    row('m', 'm', 'more', 'Shows every way, or the first three alone.', moreWays),
    row('s', 's', 'see', 'Pictures of an invented object: the preset, and the way under the hand.', showPicture),
    row('c', 'c', 'chart', 'The front: the most SNR, or the least loss, in every time.', showFront),
    row('k', 'k', 'keep', 'How much of each figure every way keeps; can be changed.', show('keep')),
    row('a', 'a', '', 'Again: the way looked at last.', recallWay, ({ lastWay }) => lastWay !== null),
    row('d', 'd', '', 'What the scanner displays: a cap needs its number.', openReadings),
    row('f', 'f', '', 'Back to the series.', back),
    row('escape', 'Esc', 'back', 'One screen back; a running search is ended first and gives what it has.', stopOrBack),
    ...everywhere.filter(({ keys }) => !keys.includes('escape')),
  ],
  front: [
    row(['-', 'left'], 'left right', 'move', 'Moves along the front; minus and plus do the same.', moveOnFront(-1)),
    row(['+', '=', 'right'], '', '', '', moveOnFront(1)),
    row('page-down', 'PgUp PgDn', '', 'Ten points on.', moveOnFront(-10)),
    row('page-up', '', '', '', moveOnFront(10)),
    row('home', 'Home End', '', 'First and last point.', moveOnFront(-99999)),
    row('end', '', '', '', moveOnFront(99999)),
    row(['tab', 'shift-tab'], 'Tab', 'SNR or loss', 'The most SNR, or the least loss of everything together.', turnFront),
    row('enter', 'Enter', 'take', 'Takes this point with all its changes; undo takes it back.', takeFront),
    row('s', 's', 'see', 'Pictures of an invented object: the preset, and this point.', showPicture),
    row('c', 'c', '', 'Back to the ways.', back),
    ...everywhere,
  ],
  keep: [...form, row('k', 'k', '', 'Back to the ways.', back), ...everywhere],
  budget: [
    ...upAndDown(moveInBudget, 'the series'),
    row('enter', 'Enter', 'take', 'Takes the plan: one step, which undo takes back.', takePlan),
    row(
      'n',
      'n',
      'other plan',
      'The other plan, where one keeps nearly as much.',
      otherPlan,
      ({ plan }) => plan?.answer?.alternative != null,
    ),
    row(['escape', 'b'], 'Esc', 'back', 'Back to the running order; a plan that is worked out is ended.', leaveBudget),
    ...everywhere.filter(({ keys }) => !keys.includes('escape')),
  ],
  readings: [...form, ...everywhere],
  carry: [
    ...upAndDown(moveInCarry, 'the lines'),
    row(
      ['-', 'left'],
      'left right',
      'change',
      'Another field or scanner, coil, what is kept equal, or series; minus and plus do the same.',
      turnCarry(-1),
    ),
    row(['+', '=', 'right'], '', '', '', turnCarry(1)),
    row(digits, '0-9', 'type', 'Begins typing a field: 2.89 T.', typeCarry),
    row('enter', 'Enter', '', 'Types a field, turns a choice; on other lines explains.', enterCarry),
    row('w', 'w', 'why', 'Explains the line: sentence, numbers, formula, source, what it ignores.', whyCarried),
    row('n', 'n', 'next', 'The next series.', turnCarried(1)),
    row('s', 's', 'save', 'Saves the proposal as a draft preset; nothing is released.', saveCarried),
    ...sessionKeys,
  ],
  scanner: [
    ...upAndDown(moveInScanners, 'the scanners and their coils'),
    row('enter', 'Enter', 'take', 'Takes this scanner and coil; in a session undo takes them back.', takeScanner),
    row('tab', 'Tab', '', 'Back to where this was opened.', back),
    ...sessionKeys,
  ],
  record: [
    ...form,
    row(' ', 'Space', '', 'Ticks and unticks.', enterRow),
    row(['tab', 'shift-tab'], 'Tab', 'reasons', 'Between the record and its reasons.', turnRecordPane),
    row('s', 's', 'save', 'Saves the record: one line at the end of the file.', saveRecord),
    row('d', 'd', '', 'Saves the values as a draft preset.', saveAsPreset),
    row('t', 't', '', 'Writes one page of plain text to print.', savePage),
    ...everywhere,
  ],
  ...shelfKeys,
  ...headerKeys,
  help: [...upAndDown(scrollText, 'the text'), ...everywhere],
};

/** Keys while something is typed, for the bottom line. */
export const entryKeys: readonly Pick<KeyRow, 'shown' | 'brief'>[] = [
  { shown: 'Enter', brief: 'take it' },
  { shown: 'Esc', brief: 'leave it' },
  { shown: 'Backspace', brief: 'last letter' },
];

/** The name under which the map knows a key. */
function keyName(key: KeyPress): string {
  return key.name === 'text' ? (key.text ?? '') : key.name;
}

/** The line of the map for a key on the present screen, where it works now. */
export function keyRowFor(state: State, key: KeyPress): KeyRow | undefined {
  const name = keyName(key);
  const rows = keyMap[state.place.screen];
  const works = ({ when }: KeyRow) => when === undefined || when(state);
  const exact = rows.find((candidate) => candidate.keys.includes(name) && works(candidate));
  if (exact !== undefined) return exact;
  return key.name === 'text' || key.name === 'paste' ? rows.find(({ keys }) => keys.includes('any-text')) : undefined;
}
