import { quit, show } from './hands/common-commands.js';
import {
  moveInHeaders,
  pastePath,
  pickAll,
  pickSeries,
  reviewNext,
  reviewSeries,
  saveHeaderDraft,
  stopHeadersOrBack,
  typePath,
} from './hands/header-commands.js';
import { clearValue, enterValue, moveInValues, turnValue, typeValue } from './hands/header-value-commands.js';
import { type KeyRow, row, upAndDown } from './key-row.js';
import type { ScreenName, State } from './state.js';

const help = row(['h', '?'], 'h', 'help', 'Help for this screen.', show('help'));
const leave = row('q', 'q', 'quit', 'Leaves.', quit);
const pick = row(' ', 'Space', 'pick', 'Picks the series for the draft, or leaves it out.', pickSeries);
const save = row(
  's',
  's',
  'save',
  'Saves the picked series that are whole as a draft preset of yours; nothing is released.',
  saveHeaderDraft,
);
const isRead = ({ headers }: State) => headers.found !== null && headers.reading === null;
const whenRead = (given: KeyRow): KeyRow => ({ ...given, when: isRead });
const digits = ['0', '1', '2', '3', '4', '5', '6', '7', '8', '9', '.'];

/** The keys of the screens of headers. */
export const headerKeys = {
  headers: [
    ...upAndDown(moveInHeaders, 'the series'),
    row(
      '/',
      '/',
      'folder',
      'Types the path of a folder to read: /data/exam; ~ is your home.',
      typePath,
      ({ headers }) => headers.reading === null,
    ),
    row('paste', '', '', '', pastePath),
    whenRead(row('enter', 'Enter', 'review', 'Reviews the series: what must be typed, and where every value comes from.', reviewSeries)),
    whenRead(pick),
    whenRead(row('a', 'a', 'all', 'Picks all series, or none.', pickAll)),
    whenRead(save),
    help,
    row('escape', 'Esc', 'back', 'Ends a reading that runs and shows what there is; else one screen back.', stopHeadersOrBack),
    leave,
  ],
  'header-values': [
    ...upAndDown(moveInValues, 'the values'),
    row(digits, '0-9', 'type', 'Begins typing a value: 38 cm, 6/8, 1.2 mm * 256.', typeValue),
    row('enter', 'Enter', '', 'Begins typing; turns a choice to the next word.', enterValue),
    row(['-', 'left'], 'left right', 'change', 'The class, a choice, yes or no; minus and plus do the same.', turnValue(-1)),
    row(['+', '=', 'right'], '', '', '', turnValue(1)),
    row(['backspace', 'delete'], 'Del', 'as read', 'Forgets what was typed: as the header says.', clearValue),
    pick,
    row('n', 'n', 'next', 'The next series.', reviewNext),
    save,
    help,
    row('escape', 'Esc', 'back', 'Back to the list of series. Nothing is lost.', stopHeadersOrBack),
    leave,
  ],
} as const satisfies Partial<Record<ScreenName, readonly KeyRow[]>>;
