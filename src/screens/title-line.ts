import { classRow } from '../calc/classes.js';
import { classOf } from '../calc/series.js';
import { changedKeys } from '../session/changed-keys.js';
import { equipmentNow, isFromFile } from '../session/equipment.js';
import { fieldHere } from '../session/hands/series-commands.js';
import { pictureSet } from '../session/picture-view.js';
import { resultNow, studySeries } from '../session/results.js';
import { isShelfScreen, shelfHeadline } from '../session/shelf-headline.js';
import type { State } from '../session/state.js';
import { listedWays } from '../session/ways.js';
import { fitText } from '../terminal/text-width.js';
import { clockWords, headlineOf, withRight } from './common-lines.js';
import { type Line, span } from './line.js';
import type { Look } from './look.js';
import { screenWords } from './text-screen.js';

/** The second line: which screen of what. */
export function titleLine(state: State, look: Look, columns: number): Line {
  const { opened } = state;
  if (opened === null) return withRight([span(words(state), 'bold')], 'holdfast', columns, look, 'quiet');
  const { study } = opened;
  const right = found(state) ?? `${study.id}, ${whereOf(state, look)}${study.status === 'starter' ? ', starter' : ''}`;
  const clocks = clockWords(state);
  return clocks === ''
    ? withRight([span(words(state))], right, columns, look, 'quiet')
    : withRight([span(words(state))], clocks, columns, look);
}

/** The scanner of the session where it has a file, and the field. */
function whereOf(state: State, { glyphs }: Look): string {
  const equipment = equipmentNow(state);
  if (equipment === null) return '';
  const { scanner } = equipment;
  return isFromFile(equipment) ? `${fitText(scanner.name, 16, glyphs.ellipsis).trimEnd()} ${scanner.fieldT} T` : `${scanner.fieldT} T`;
}

/** While a series is over its limits: what the search has found. */
function found(state: State): string | null {
  const { search, place } = state;
  if (place.screen !== 'series' || search === null || search.seriesId !== place.seriesId || headlineOf(state).word !== 'OVER') return null;
  if (search.answer === null) return search.share === null ? null : `f: searching ${Math.round(search.share * 100)} %`;
  const { ways, proven } = search.answer.result;
  const count = ways.length === 0 ? 0 : listedWays(search.answer).length;
  return count > 0 ? `f: ${count} way${count > 1 ? 's' : ''} to fit` : proven ? 'f: nothing fits' : null;
}

function words(state: State): string {
  const { screen, seriesId } = state.place;
  if (screen === 'series') {
    const series = studySeries(state, seriesId);
    const now = resultNow(state, seriesId);
    const changed = changedKeys(series.parameters, now.parameters).length;
    const reading = now.evaluation.fromReading.length > 0 ? ', r: from the scanner' : '';
    return `Series ${seriesId}: ${classRow(classOf(series)).label}, ${changed === 0 ? 'as the preset' : `${changed} changed`}${reading}`;
  }
  if (screen === 'chart')
    return `Range chart: ${fieldHere({ ...state, place: { ...state.place, fields: { ...state.place.fields, series: state.place.chart?.path ?? '' } } }).label} of ${seriesId}`;
  if (screen === 'picture') return `See it: ${seriesId}, preset and ${pictureSet(state).of === 'way' ? 'this way' : 'now'}`;
  if (screen === 'ways') return `Ways to fit: ${seriesId}`;
  if (screen === 'front') return `Front of ${seriesId}: what is reached in each time`;
  if (screen === 'keep') return 'What is kept';
  if (screen === 'budget') return 'Budget: the session in the minutes left';
  if (screen === 'readings') return `Scanner readings: ${seriesId}`;
  // The first line has the session's verdict: what the screen shows is said here.
  if (isShelfScreen(screen) && state.session !== null && screen !== 'release') return shelfHeadline(state);
  const name = screenWords[screen];
  return name.charAt(0).toUpperCase() + name.slice(1);
}
