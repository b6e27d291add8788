import { type ClassKey, classRow, classTable } from '../calc/classes.js';
import type { ParameterKey } from '../calc/parameters.js';
import { fillDefaults, type GivenParameters } from '../calc/series.js';
import { presetLimits } from '../study/limits.js';
import { requiredParameters } from '../study/required-keys.js';
import type { Study, StudySeries } from '../study/study.js';
import type { ReadSeries } from './read-series.js';
import { regionOf } from './region-of-body-part.js';

/** A series that is not in the draft, and what a person must type first. */
export interface LeftOut {
  readonly id: string;
  readonly why: string;
}

/** A draft preset made of headers; `study` is null where no series is whole. */
export interface HeaderDraft {
  readonly study: Study | null;
  readonly leftOut: readonly LeftOut[];
}

/** A series with what a person typed for it. */
export interface SeriesToDraft {
  readonly read: ReadSeries;
  readonly typed: GivenParameters;
}

/** Parameters that the draft states: read, derived, guessed or typed. The others are left to the preset's defaults. */
export function givenOfHeaders({ read, typed }: SeriesToDraft): GivenParameters {
  const known = read.values.flatMap(({ key, value }) => (value === undefined ? [] : [[key, value] as const]));
  return { ...Object.fromEntries(known), ...typed } as GivenParameters;
}

/** Parameters that neither the headers nor a person gave and that a series of this class cannot be without. */
export function lackingFor(key: ClassKey, given: GivenParameters): readonly ParameterKey[] {
  return requiredParameters(key).filter((name) => given[name] === undefined);
}

/** A magnet a few percent off its name is one of that field. */
function isSameField(a: number, b: number | null): boolean {
  return b !== null && Math.abs(a - b) <= 0.05 * b;
}

function whyLeftOut(one: SeriesToDraft, fieldT: number | null): string | null {
  const { decision, fieldT: field } = one.read;
  if (decision.key === null) return `its class is not decided (${decision.reason}): type it`;
  const lacking = lackingFor(decision.key, givenOfHeaders(one));
  if (lacking.length > 0) return `type ${lacking.join(', ')}`;
  if (typeof field.value === 'number' && !isSameField(field.value, fieldT))
    return `it is of ${field.value} T, the draft of ${fieldT} T: a preset has one field`;
  return null;
}

function seriesOf(one: SeriesToDraft, priority: number, pair: readonly [string, string]): StudySeries {
  const { read } = one;
  const key = read.decision.key as ClassKey;
  const row = classTable[key];
  const plane = typeof read.plane.value === 'string' ? read.plane.value : 'axial';
  const given = givenOfHeaders(one);
  const parameters = Object.fromEntries(Object.entries(given).filter(([name]) => classRow(key).parameters.includes(name as ParameterKey)));
  return {
    id: read.id,
    title: `${row.label}, ${plane}${given.inversionTimeMs === undefined ? '' : ', inversion'}`,
    plane,
    purpose: null,
    priority,
    family: row.family,
    acquisition: row.acquisition,
    target: pair[0],
    comparison: pair[1],
    contrastAgent: false,
    nullTissue: null,
    tissueOverrides: {},
    parameters: fillDefaults(key, parameters as GivenParameters),
    mustKeep: [],
    ranges: {},
    pairedWith: [],
    locked: [],
    opened: [],
  };
}

/** Where the values of a series come from, in one sentence. */
function originsOf({ read, typed }: SeriesToDraft): string {
  const of = (origin: string) => read.values.filter((one) => one.origin === origin && typed[one.key] === undefined).map(({ key }) => key);
  const part = (word: string, keys: readonly string[]) => (keys.length === 0 ? [] : [`${word} ${keys.join(', ')}`]);
  return `${read.id}: ${[
    ...part('guessed', of('guess')),
    ...part('typed', Object.keys(typed)),
    ...part('derived', of('derived')),
    ...part('missing, defaults until typed', of('missing')),
  ].join('; ')}.`;
}

/**
 * A draft preset of the series that are whole; the others are named with what must be typed. Where each value comes from stands in its
 * notes. Target, comparison and region are assumed.
 *
 * @param fieldT Field a person typed; the first series' own where it is left out.
 */
export function draftOfHeaders(series: readonly SeriesToDraft[], fieldT?: number): HeaderDraft {
  const fields = series.map(({ read }) => read.fieldT.value).filter((value): value is number => typeof value === 'number');
  const field = fieldT ?? fields[0] ?? null;
  const reasons = series.map((one) => ({ one, why: field === null ? 'its field is not stated: type it' : whyLeftOut(one, field) }));
  const whole = reasons
    .filter(({ why }) => why === null)
    .map(({ one }) => one)
    .slice(0, presetLimits.series);
  const leftOut = reasons.flatMap(({ one, why }) => (why === null ? [] : [{ id: one.read.id, why }]));
  const { min, max } = presetLimits.fieldT;
  if (field === null || field < min || field > max || whole.length === 0) return { study: null, leftOut };
  const { region, pair, isAssumed } = regionOf(whole.map(({ read }) => read.bodyPart));
  const notes = [
    `Read from headers; review every value before use. What is not named here was read as it stands. Assumed: target and comparison${isAssumed ? ', region' : ''}.`,
    ...whole.map(originsOf),
  ].join(' ');
  const digits = Number(field.toFixed(3));
  return {
    study: {
      format: 'holdfast preset',
      version: 1,
      id: isAssumed ? `read-${digits}t` : `${region.replaceAll(' ', '-')}-${digits}t-read`,
      title: `${region[0]?.toUpperCase()}${region.slice(1)}, read from headers, ${digits} T`,
      region,
      fieldT: digits,
      status: 'draft',
      revision: 1,
      notes: notes.length <= presetLimits.notes ? notes : `${notes.slice(0, presetLimits.notes - 3)}...`,
      minimumSet: [],
      series: whole.map((one, i) => seriesOf(one, i + 1, pair)),
    },
    leftOut,
  };
}
