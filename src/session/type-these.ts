import { parameterRow } from '../calc/parameters.js';
import { changedKeys } from './changed-keys.js';
import { resultNow, sessionSeries, studySeries } from './results.js';
import { sayParameter } from './say-parameter.js';
import type { State } from './state.js';

/** A paragraph of words. */
export interface Paragraph {
  readonly words: string;
  readonly style?: 'bold' | 'quiet' | 'plain';
  /** Columns by which every line but the first stands in. */
  readonly hanging?: number;
}

/** The changed values of a series, in the order they are typed on a scanner. */
export function typeThese(state: State): readonly Paragraph[] {
  const { seriesId } = state.place;
  const { parameters } = resultNow(state, seriesId);
  const planned = studySeries(state, seriesId).parameters;
  const set = sessionSeries(state, seriesId).set;
  const keys = changedKeys(planned, parameters);
  if (keys.length === 0)
    return [
      { words: `Type these on the scanner: ${seriesId}`, style: 'bold' },
      { words: '' },
      { words: 'Nothing: every value is the preset.' },
    ];
  const label = Math.max(...keys.map((key) => parameterRow(key).label.length)) + 2;
  return [
    { words: `Type these on the scanner: ${seriesId}`, style: 'bold' },
    { words: '' },
    ...keys.map((key) => ({
      words: `${parameterRow(key).label.padEnd(label)}${sayParameter(key, parameters[key])}   (preset ${sayParameter(key, planned[key])})${set[key] === undefined ? ', follows' : ''}`,
    })),
    { words: '' },
    { words: 'What follows the others is shown so that it can be compared: the scanner works it out itself.', style: 'quiet' },
    { words: "Then read the scanner's own time, B1+rms and SAR before starting.", style: 'plain' },
  ];
}
