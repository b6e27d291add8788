import { keyMap } from '../session/key-map.js';
import type { ScreenName, State } from '../session/state.js';
import { type Paragraph, typeThese } from '../session/type-these.js';
import { whyText } from '../session/why.js';
import { fill, type Line, line, wrap } from './line.js';
import type { Look } from './look.js';

function textScreen(state: State, paragraphs: readonly Paragraph[], columns: number, rows: number): Line[] {
  const width = Math.min(columns, 100);
  const lines = paragraphs.flatMap(({ words, style, hanging = 0 }) =>
    wrap(words, width - hanging).map((each, at) => line(at === 0 ? each : `${' '.repeat(hanging)}${each}`, style ?? 'plain')),
  );
  const scrolled = Number(state.place.fields[state.place.screen] ?? 0);
  // Beside other panes the place of the screen is no number: the text is not scrolled there.
  const at = Number.isFinite(scrolled) ? Math.min(scrolled, Math.max(0, lines.length - rows)) : 0;
  const shown = lines.slice(at, at + rows);
  if (at + rows < lines.length) shown[rows - 1] = line(`${lines.length - at - rows + 1} more lines: down`, 'quiet');
  return fill(shown, rows);
}

/** Why: sentence first, then numbers, formula, source, and what it ignores. */
export function whyScreen(state: State, _look: Look, columns: number, rows: number): Line[] {
  return textScreen(state, whyText(state), columns, rows);
}

/** Only the changed values, in the order they are typed. */
export function typeTheseScreen(state: State, _look: Look, columns: number, rows: number): Line[] {
  return textScreen(state, typeThese(state), columns, rows);
}

/** Help of the screen one came from, made from the key map. */
export function helpScreen(state: State, _look: Look, columns: number, rows: number): Line[] {
  const screen: ScreenName = state.place.back.at(-1) ?? 'start';
  const keys = keyMap[screen].filter(({ shown, help }) => shown !== '' && help !== '');
  return textScreen(
    state,
    [
      { words: `Keys of this screen: ${screenWords[screen]}`, style: 'bold' },
      ...keys.map(({ shown, help }) => ({ words: `${shown.padEnd(12)}${help}`, hanging: 12 })),
      { words: '' },
      {
        words:
          'It proposes; people decide. Figures come from a model: read the scanner before starting, and follow the label and the local rules.',
      },
      { words: 'Not a medical device. It keeps nothing that points to a patient.' },
    ],
    columns,
    rows,
  );
}

/** The screens in words. */
export const screenWords: Readonly<Record<ScreenName, string>> = {
  start: 'start',
  patient: 'this patient',
  order: 'running order',
  series: 'series',
  why: 'why',
  'type-these': 'type these on the scanner',
  chart: 'range chart',
  picture: 'see it: preset and now',
  ways: 'ways to fit',
  front: 'front',
  keep: 'what is kept',
  budget: 'budget',
  readings: 'scanner readings',
  scanner: 'scanner and coil',
  carry: 'carry to another field or scanner',
  record: 'record',
  presets: 'presets',
  revisions: 'revisions',
  compare: 'compared',
  release: 'release',
  records: 'records',
  'past-record': 'one record',
  report: 'report',
  headers: 'read headers',
  'header-values': 'what was read, value by value',
  help: 'help',
};
