import type { ScreenName, State } from '../session/state.js';
import { budgetScreen } from './budget-screen.js';
import { carryScreen } from './carry-screen.js';
import { chartScreen } from './chart-screen.js';
import { headlineLine, keyLine, noticeLine } from './common-lines.js';
import { keepScreen, patientScreen, readingsScreen, recordScreen } from './form-screen.js';
import { frontScreen } from './front-screen.js';
import { headerValuesScreen } from './header-values-screen.js';
import { headersScreen } from './headers-screen.js';
import { idleWords } from './idle-words.js';
import { labelLine } from './label-line.js';
import { fill, fitLine, type Line, line, lineWidth, wrap } from './line.js';
import type { Look } from './look.js';
import { orderScreen } from './order-screen.js';
import { pictureScreen } from './picture-screen.js';
import { presetsScreen, revisionsScreen } from './presets-screen.js';
import { readerLines } from './reader-lines.js';
import { recordsScreen } from './records-screen.js';
import { releaseScreen } from './release-screen.js';
import { scannerScreen } from './scanner-screen.js';
import { seriesScreen } from './series-screen.js';
import { shelfTextScreen } from './shelf-text-screen.js';
import { startScreen } from './start-screen.js';
import { helpScreen, typeTheseScreen, whyScreen } from './text-screen.js';
import { titleLine } from './title-line.js';
import { waysScreen } from './ways-screen.js';

/** The smallest screen that is drawn. */
const smallestSize = { columns: 80, rows: 24 } as const;

type Body = (state: State, look: Look, columns: number, rows: number) => Line[];

const bodies: Readonly<Record<ScreenName, Body>> = {
  start: startScreen,
  patient: patientScreen,
  order: orderScreen,
  series: seriesScreen,
  why: whyScreen,
  'type-these': typeTheseScreen,
  chart: chartScreen,
  picture: pictureScreen,
  ways: waysScreen,
  front: frontScreen,
  keep: keepScreen,
  budget: budgetScreen,
  readings: readingsScreen,
  scanner: scannerScreen,
  carry: carryScreen,
  record: recordScreen,
  presets: presetsScreen,
  revisions: revisionsScreen,
  compare: shelfTextScreen,
  release: releaseScreen,
  records: recordsScreen,
  'past-record': shelfTextScreen,
  report: shelfTextScreen,
  headers: headersScreen,
  'header-values': headerValuesScreen,
  help: helpScreen,
};

/** A whole screen: verdict, title, body, what was just said, the keys that work here and now. */
export function screenLines(state: State, look: Look): Line[] {
  const { columns, rows } = state.size;
  if (columns < smallestSize.columns || rows < smallestSize.rows) {
    const words = `Nothing is lost: this screen is ${columns} by ${rows}, holdfast needs ${smallestSize.columns} by ${smallestSize.rows}.`;
    return wrap(words, Math.max(1, columns)).map((each) => line(each));
  }
  if (look.reader) return readerLines(state, look);
  const label = labelLine(state, columns, look);
  const bodyRows = rows - 4 - label.length;
  return [
    headlineLine(state, look, columns),
    titleLine(state, look, columns),
    ...fill(bodies[state.place.screen](state, look, columns, bodyRows), bodyRows).map((each) =>
      lineWidth(each) > columns ? fitLine(each, columns, look.glyphs.ellipsis) : each,
    ),
    ...label,
    noticeLine(state, look, columns, line(idleWords(state), 'quiet')),
    keyLine(state, look, columns),
  ];
}
