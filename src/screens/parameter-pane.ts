import type { ParameterGroup } from '../calc/parameters.js';
import type { Parameters } from '../calc/series.js';
import { fieldHere, fieldsHere } from '../session/hands/series-commands.js';
import { resultNow, studySeries } from '../session/results.js';
import { isEighths, sayFieldNumber, sayFieldWords } from '../session/say-field.js';
import { fieldValue, type SeriesField } from '../session/series-fields.js';
import { isLocked } from '../session/set-field.js';
import type { State } from '../session/state.js';
import { stepSize } from '../session/step-value.js';
import { fitText } from '../terminal/text-width.js';
import { fill, type Line, line, span, windowOf } from './line.js';
import type { Look } from './look.js';
import { alignPoint } from './say-aligned.js';

const groupWords: Readonly<Record<ParameterGroup, string>> = {
  extent: 'extent',
  grid: 'grid',
  slices: 'slices',
  repeats: 'repeats',
  speed: 'speed',
  timing: 'timing',
  contrast: 'contrast, RF',
  pacing: 'pacing',
};

/** Width of the columns, and whether the groups have lines of their own. */
export interface ParameterLayout {
  readonly columns: number;
  readonly labelColumns: number;
  readonly headings: boolean;
}

const beforePoint = 5;
const fromPoint = 3;
const unitColumns = 5;
const presetColumns = 6;

type PaneRow = { readonly kind: 'heading'; readonly words: string } | { readonly kind: 'field'; readonly field: SeriesField };

/** Every parameter of the class: the preset's value where it differs, the value now, the unit. */
export function parameterPane(state: State, look: Look, layout: ParameterLayout, rows: number): Line[] {
  const { seriesId, pane } = state.place;
  const { parameters } = resultNow(state, seriesId);
  const planned = studySeries(state, seriesId).parameters;
  const fields = fieldsHere(state);
  const here = fieldHere(state);
  const all: PaneRow[] = fields.flatMap((field, at): PaneRow[] => {
    const first = layout.headings && fields[at - 1]?.group !== field.group;
    return [...(first ? [{ kind: 'heading', words: groupWords[field.group] } as const] : []), { kind: 'field', field }];
  });
  const chosen = all.findIndex((row) => row.kind === 'field' && row.field.path === here.path);
  const shown = windowOf(all, chosen, rows - 1);
  const more = shown.from + shown.items.length < all.length || shown.from > 0 ? ` ${chosen + 1}/${all.length}` : '';
  const title = layout.headings
    ? `Parameters${more}`
    : `${groupWords[here.group].charAt(0).toUpperCase()}${groupWords[here.group].slice(1)}${more}`;
  const head: Line = [
    span(fitText(title, 1 + layout.labelColumns + 1, look.glyphs.ellipsis), pane === 'main' ? 'bold' : 'quiet'),
    span(`${'preset'.padStart(presetColumns)} ${'now'.padStart(beforePoint)}`, 'quiet'),
  ];
  const lines = shown.items.map((row) =>
    row.kind === 'heading'
      ? line(row.words, 'quiet')
      : fieldLine(state, row.field, parameters, planned, row.field.path === here.path, look, layout),
  );
  return fill([head, ...lines], rows);
}

function fieldLine(
  state: State,
  field: SeriesField,
  parameters: Parameters,
  planned: Parameters,
  here: boolean,
  { glyphs }: Look,
  layout: ParameterLayout,
): Line {
  const value = fieldValue(field, parameters);
  const before = fieldValue(field, planned);
  const changed = JSON.stringify(value) !== JSON.stringify(before);
  const label = fitText(layout.labelColumns >= 22 ? field.label : field.shortLabel, layout.labelColumns, glyphs.ellipsis);
  const locked = isLocked(state, state.place.seriesId, field.key);
  const entry = here && state.entry !== null && state.place.screen === 'series';
  const pointer = here ? glyphs.pointer : ' ';
  const style = here && state.place.pane === 'main' ? 'inverse' : changed ? 'bold' : 'plain';
  const words = sayFieldWords(field, value);
  const room = beforePoint + fromPoint + 1 + unitColumns;
  if (words !== null) {
    const was = locked ? 'locked' : changed ? (sayFieldWords(field, before) ?? '') : '';
    const both = presetColumns + 1 + room;
    // Words take the room of both columns; the preset's stands before them where it fits.
    const text = was !== '' && was.length + words.length + 4 <= both ? `${was} to ${words}` : words;
    return [span(`${pointer}${label} `, style), cursorSpan(fitText(text, both, glyphs.ellipsis, 'right'), style, here)];
  }
  const number = entry ? `${state.entry?.text ?? ''}` : numberOf(field, value);
  const shown = entry ? fitText(number, beforePoint + fromPoint, glyphs.ellipsis, 'right') : alignPoint(number, beforePoint, fromPoint);
  const unit = isEighths(field, value) ? '' : field.unit;
  const was = locked ? 'locked' : changed ? numberOf(field, before) : '';
  return [
    span(`${pointer}${label} `, style),
    span(fitText(was, presetColumns, glyphs.ellipsis, 'right'), here && state.place.pane === 'main' ? 'inverse' : 'quiet'),
    span(' ', style === 'inverse' ? 'inverse' : 'plain'),
    // While something is typed the cursor stands where it is typed.
    cursorSpan(shown, style, here && !entry),
    span(` ${unit.padEnd(unitColumns)}`, style === 'inverse' ? 'inverse' : 'plain'),
  ];
}

function cursorSpan(text: string, style: 'inverse' | 'bold' | 'plain', here: boolean): Line[number] {
  return here ? { text, style, cursor: true } : span(text, style);
}

function numberOf(field: SeriesField, value: unknown): string {
  return typeof value === 'number' ? sayFieldNumber(field, value) : '-';
}

/** What the parameter under the hand is, its range and its steps: one line. */
export function parameterHint(state: State): string {
  const field = fieldHere(state);
  const { seriesId } = state.place;
  const value = fieldValue(field, resultNow(state, seriesId).parameters);
  if (isLocked(state, seriesId, field.key))
    return `${field.label}: locked in the preset by whoever reviewed it; l opens it by hand. ${field.help}`;
  if (field.kind !== 'number') return `${field.label}: ${field.help}${field.choices.length > 0 ? ` (${field.choices.join(', ')})` : ''}`;
  const unit = field.unit === '' ? '' : ` ${field.unit}`;
  const step = typeof value === 'number' ? `, step ${Number(stepSize(field, value, studySeries(state, seriesId), false).toFixed(3))}` : '';
  return `${field.label} ${field.min} to ${field.max}${unit}${step}: ${field.help}`;
}
