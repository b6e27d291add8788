import { type ClassKey, classRow, classTable } from '../calc/classes.js';
import { parameterRow } from '../calc/parameters.js';
import { fillDefaults, type Parameters } from '../calc/series.js';
import { givenOfHeaders, lackingFor, type SeriesToDraft } from '../headers/draft-of-headers.js';
import type { ReadValue } from '../headers/found.js';
import { headerDraft, seriesHere } from './header-view.js';
import { sayField } from './say-field.js';
import { sayParameter } from './say-parameter.js';
import { fieldValue, type SeriesField, seriesFields } from './series-fields.js';
import type { State } from './state.js';

/** Where a value comes from, as the review groups them: what must be typed first. */
export const valueGroups = ['needed', 'some', 'default', 'guess', 'derived', 'read', 'assumed'] as const;
export type ValueGroup = (typeof valueGroups)[number];

/** What stands above each group. */
const groupWords: Readonly<Record<ValueGroup, string>> = {
  needed: 'To type before it can be used',
  some: 'There is some, how much is not said: the default is as if there were none',
  default: 'Missing: the default holds until it is typed',
  guess: 'Guessed: explains the rest of the header',
  derived: 'Derived from what the header says',
  read: 'Read as it stands',
  assumed: 'Assumed for the draft',
};

/** One line of the review of a series. */
export interface HeaderRow {
  readonly field: string;
  readonly kind: 'heading' | 'class' | 'fieldT' | 'value' | 'info';
  readonly label: string;
  readonly shown: string;
  /** One or two words: read, derived, a guess, default, typed. */
  readonly origin: string;
  /** From which attributes, by which thought; or why it is missing. */
  readonly words: string;
  readonly of: SeriesField | null;
  /** A person must look: nothing is there, or a guess. */
  readonly attention: boolean;
}

/** Diffusion before anybody typed its b-values: so that its lines are there. */
const noDiffusion = { bValuesSPerMm2: [0], directions: 1, averages: [1] } as const;

/** The values of a series with the defaults of its class; null where no class is decided. */
export function parametersRead(one: SeriesToDraft): { readonly key: ClassKey; readonly parameters: Parameters } | null {
  const { key } = one.read.decision;
  if (key === null) return null;
  const parameters = fillDefaults(key, givenOfHeaders(one));
  const takesDiffusion = classRow(key).parameters.includes('diffusion');
  return { key, parameters: takesDiffusion && parameters.diffusion === undefined ? { ...parameters, diffusion: noDiffusion } : parameters };
}

/** How many values of a series are read, derived, assumed and missing; what was typed is none of them. */
export function originCounts({
  read,
  typed,
}: SeriesToDraft): Readonly<Record<'read' | 'derived' | 'assumed' | 'missing' | 'typed', number>> {
  const counts = { read: 0, derived: 0, assumed: 0, missing: 0, typed: 0 };
  for (const { key, origin } of read.values) counts[typed[key] !== undefined ? 'typed' : origin === 'guess' ? 'assumed' : origin] += 1;
  return counts;
}

/** Values of which the header says that there is some, not how much, and that nobody typed. */
export function someOf({ read, typed }: SeriesToDraft): number {
  return read.values.filter(({ key, some }) => some === true && typed[key] === undefined).length;
}

/** What a series cannot be without and nobody gave. */
export function neededOf(one: SeriesToDraft): readonly string[] {
  const { key } = one.read.decision;
  return key === null ? [] : lackingFor(key, givenOfHeaders(one));
}

function groupOf(value: ReadValue, key: ClassKey | null): ValueGroup {
  if (value.origin !== 'missing') return value.origin;
  if (value.some === true) return 'some';
  // By what the header says: a line does not move when it is typed.
  return key !== null && lackingFor(key, {}).includes(value.key) ? 'needed' : 'default';
}

const originWords: Readonly<Record<ValueGroup, string>> = {
  needed: 'missing',
  some: 'default',
  default: 'default',
  guess: 'A GUESS',
  derived: 'derived',
  read: 'read',
  assumed: 'assumed',
};

function valueRow(value: ReadValue, group: ValueGroup, one: SeriesToDraft, field: SeriesField, parameters: Parameters): HeaderRow {
  const isTyped = one.typed[value.key] !== undefined;
  const stands = one.typed[value.key] ?? value.value;
  const isNone = stands === undefined && (value.key === 'diffusion' || value.origin !== 'missing');
  // Of a value with parts one may be stated and another not.
  const lacksPart =
    !isTyped && field.inner !== null && value.origin !== 'missing' && !isNone && fieldValue(field, parameters) === undefined;
  const shown = group === 'needed' && !isTyped ? 'to type' : isNone ? 'none' : sayField(field, fieldValue(field, parameters));
  return {
    field: field.path,
    kind: 'value',
    label: field.label,
    shown,
    origin: isTyped ? 'typed' : lacksPart ? 'missing' : originWords[group],
    words: isTyped ? `the header: ${headerSays(value)}` : lacksPart ? 'not stated' : value.words,
    of: field,
    attention: lacksPart || (!isTyped && ['needed', 'some', 'guess'].includes(group)),
  };
}

/** What the header says of a value that was typed. */
function headerSays({ key, value, words }: ReadValue): string {
  return value === undefined ? words : `${sayParameter(key, value)}, ${words}`;
}

const info = (field: string, label: string, shown: string, origin: string, words: string): HeaderRow => ({
  field,
  kind: 'info',
  label,
  shown,
  origin,
  words,
  of: null,
  attention: false,
});

/** Why a series has its class. */
export function classReason({ read }: SeriesToDraft): string {
  const { reason } = read.decision;
  return reason === 'typed' ? 'by hand' : reason;
}

/** Class and field first, then value by value: missing ones, guesses, derived ones, those that were read, what the draft assumes. */
export function headerRows(state: State): readonly HeaderRow[] {
  const one = seriesHere(state);
  if (one === undefined) return [];
  const { read } = one;
  const { key, reason } = read.decision;
  const rows: HeaderRow[] = [
    {
      ...info('class', 'class', key === null ? 'not decided' : classRow(key).label, reason === 'typed' ? 'chosen' : '', classReason(one)),
      kind: 'class',
      attention: key === null,
    },
    fieldRow(state, one),
  ];
  const known = parametersRead(one);
  const fields = known === null ? [] : seriesFields(classTable[known.key], known.parameters);
  const heading = (group: ValueGroup): HeaderRow => ({ ...info(`heading ${group}`, groupWords[group], '', '', ''), kind: 'heading' });
  for (const group of valueGroups) {
    const values = read.values.filter((value) => groupOf(value, key) === group);
    const lines = values.flatMap((value): HeaderRow[] => {
      if (known !== null)
        return fields.filter((field) => field.key === value.key).map((field) => valueRow(value, group, one, field, known.parameters));
      // Without a class a missing value is one that no class may need.
      if (value.origin === 'missing') return [];
      const shown = value.value === undefined ? 'none' : sayParameter(value.key, value.value);
      return [info(value.key, parameterRow(value.key).label, shown, originWords[group], value.words)];
    });
    const all = group === 'assumed' ? [...lines, ...assumedRows(state, one)] : lines;
    if (all.length > 0) rows.push(heading(group), ...all);
  }
  return rows;
}

function fieldRow({ headers }: State, { read }: SeriesToDraft): HeaderRow {
  const { origin, value, words } = read.fieldT;
  const row = { field: 'fieldT', kind: 'fieldT', label: 'field strength', of: null } as const;
  if (headers.fieldT !== null)
    return {
      ...row,
      shown: `${headers.fieldT} T`,
      origin: 'typed',
      words: `of the whole draft; of this series ${words}`,
      attention: false,
    };
  const isKnown = typeof value === 'number';
  return {
    ...row,
    shown: isKnown ? `${Number(value.toFixed(3))} T` : 'to type',
    origin: isKnown ? origin : 'missing',
    words,
    attention: !isKnown,
  };
}

function assumedRows({ headers }: State, { read }: SeriesToDraft): HeaderRow[] {
  const { study } = headerDraft(headers);
  const series = study?.series.find(({ id }) => id === read.id);
  if (study === null || series === undefined) return [];
  return [
    info('target', 'target', series.target, 'assumed', 'no attribute says for which tissue a series is made: change it in the draft'),
    info('comparison', 'comparison', series.comparison, 'assumed', 'no attribute says against which tissue: change it in the draft'),
    ...(study.region === 'not stated'
      ? [info('region', 'region', study.region, 'assumed', 'no body part is stated among the series of the draft')]
      : []),
    ...(typeof read.plane.value === 'string' ? [] : [info('plane', 'plane', series.plane, 'assumed', read.plane.words)]),
  ];
}

/** Lines that the hand can stand on. */
export function headerLines(state: State): readonly HeaderRow[] {
  return headerRows(state).filter(({ kind }) => kind !== 'heading');
}

/** The line of the hand: at first the first that a person must look at. */
export function headerRow(state: State): HeaderRow | undefined {
  const rows = headerLines(state);
  return rows.find(({ field }) => field === state.place.fields['header-values']) ?? rows.find(({ attention }) => attention) ?? rows[0];
}

/** What may stand on a line, for the line of messages. */
export function headerHint(state: State): string {
  const row = headerRow(state);
  if (row === undefined) return '';
  if (row.kind === 'class') return 'left and right: another class; Del: as the header says';
  if (row.kind === 'fieldT') return 'field strength of the draft, in T: a preset has one';
  const { of } = row;
  if (of === null) return row.kind === 'info' && seriesHere(state)?.read.decision.key === null ? 'Choose the class first' : '';
  if (of.kind === 'number') return `${of.label} ${of.min} to ${of.max}${of.unit === '' ? '' : ` ${of.unit}`}: ${of.help}`;
  return `${of.label}: ${of.help}${of.choices.length > 0 ? ` (${of.choices.join(', ')})` : ''}`;
}
